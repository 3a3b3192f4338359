"""High-precision values of distribution functions and quantiles (mpmath 1.3.0, 40 digits), written to values.json.

Route: the normal distribution by mpmath's erfc; t and chi-square tails by numerical integration of the density (not by
the incomplete beta and gamma functions that the program uses, though mpmath's own are asserted to agree to 22 digits); quantiles by root finding on those integrals. Every argument is a
double, taken exactly; every result is printed with 25 digits and read back as the nearest double.

Run: python3 make.py > values.json
"""
import json
from mpmath import mp, mpf, erfc, sqrt, gamma, pi, quad, log, exp, findroot, inf, loggamma, betainc, gammainc

mp.dps = 40
out = {"normal": [], "t": [], "chiSquare": []}
S = lambda v: mp.nstr(v, 25)

for z in ["-37.5", "-30", "-20.125", "-12", "-8.3", "-6", "-5.65", "-4", "-3.1", "-1.96", "-1", "-0.7", "-0.66", "-0.3", "-0.01", "0", "1e-9", "0.25", "0.6744897501960817", "1.5", "3", "5"]:
    x = mpf(float(z))
    out["normal"].append({"z": float(z), "cdf": S(erfc(-x / sqrt(2)) / 2)})
out["normalQuantile"] = []
for p in [1e-300, 1e-200, 1e-100, 1e-40, 1e-20, 1e-12, 1e-11, 1.3e-11, 1e-10, 1e-5, 0.001, 0.025, 0.074, 0.0751, 0.3, 0.499, 0.4999999999, 0.50001, 0.6, 0.925, 0.975, 0.995, 0.9999, 0.99999999]:
    q = mpf(p)
    # log of the tail, so that 1e-300 is no harder than 0.1
    start = -sqrt(-2 * log(q)) if p < 0.5 else sqrt(-2 * log(1 - q))
    if 0.1 < p < 0.9: start = (q - mpf("0.5")) * mpf("2.5")
    f = (lambda z: log(erfc(-z / sqrt(2)) / 2) - log(q)) if p <= 0.5 else (lambda z: log(erfc(z / sqrt(2)) / 2) - log(1 - q))
    out["normalQuantile"].append({"p": p, "z": S(findroot(f, start))})


def t_tail(t, nu):
    """P(T > t), t >= 0, by integrating in s = ln(x) beyond t and linearly below 1."""
    c = exp(loggamma((nu + 1) / 2) - loggamma(nu / 2)) / sqrt(nu * pi)
    f = lambda x: c * (1 + x * x / nu) ** (-(nu + 1) / 2)
    if t < 1:
        return mpf("0.5") - quad(f, [0, t])
    g = lambda s: f(exp(s)) * exp(s)
    a = log(t)
    # breakpoints follow the width of the tail; the last piece runs to where the power law is below 1e-60 of the start
    width = min(mpf(1), 1 / (1 + (nu + 1) * t * t / (nu + t * t)))
    pts = [a]
    step = width
    while True:
        pts.append(pts[-1] + step)
        step *= mpf("1.5")
        if g(pts[-1]) < g(a) * mpf(10) ** (-45) or len(pts) > 200:
            break
    top = g(a)  # mpmath's quad works to an absolute tolerance
    return top * quad(lambda s: g(s) / top, pts)


for nu in [0.5, 1, 1.5, 2, 3, 4.5, 8.25, 16, 30, 100.5, 1234.5, 19999.5, 20001, 1e6, 3e10]:
    for t in [1e-6, 0.03125, 0.5, 0.9, 1.5, 2.5, 6, 12, 25, 1000]:
        n = mpf(nu)
        tail = t_tail(mpf(t), n)
        if tail < mpf(10) ** (-250):
            continue
        if nu < 1e5:  # two routes agree
            assert abs(betainc(n / 2, mpf("0.5"), 0, n / (n + mpf(t) ** 2), regularized=True) / 2 / tail - 1) < mpf(10) ** (-22), (nu, t)
        out["t"].append({"t": t, "nu": nu, "upper": S(tail), "centre": S(mpf("0.5") - tail)})


def chi_parts(x, nu):
    """P and Q by integrating the density, scaled by its largest value, in y = ln(x)."""
    a = nu / 2
    logc = -a * log(mpf(2)) - loggamma(a)
    g = lambda s: exp(logc + a * s - exp(s) / 2)
    s0 = log(x)
    # each side in pieces that double in width away from s0
    def side(direction):
        total, left, step, at = [s0], s0, mpf(1) / (1 + sqrt(a) + abs(a - x / 2)), g(s0)
        peak = max(at, g(log(nu)) if (log(nu) - s0) * direction > 0 else at)
        while True:
            total.append(total[-1] + direction * step)
            past = (total[-1] - log(nu)) * direction > 0
            if past and g(total[-1]) < peak * mpf(10) ** (-45):
                break
            step *= mpf("1.3")
            if len(total) > 400:
                raise Exception("pieces")
        v = peak * quad(lambda s: g(s) / peak, total)
        return v if direction > 0 else -v
    return side(-1), side(1)


for nu, xs in [(0.7, [1e-6, 0.2, 0.9, 3, 40]), (1, [1e-8, 0.3, 1, 1.4, 3.84, 30, 200]), (2.5, [0.01, 1, 2.5, 10, 100]), (7.3, [0.05, 3, 7.3, 15, 60, 300]), (10, [1, 9.3, 18.307, 50]),
               (30, [5, 29, 31, 60, 120]), (99.5, [40, 99, 101, 130, 220]), (1000, [700, 990, 1010, 1200, 1600]), (200001.5, [197000, 200000, 200500, 204000]), (2e7, [19990000, 20000500, 20030000])]:
    for x in xs:
        P, Q = chi_parts(mpf(x), mpf(nu))
        assert abs(P + Q - 1) < mpf(10) ** (-30), (nu, x, P + Q)
        assert abs(gammainc(mpf(nu) / 2, mpf(x) / 2, inf, regularized=True) / Q - 1) < mpf(10) ** (-22), (nu, x)
        out["chiSquare"].append({"x": x, "nu": nu, "lower": S(P), "upper": S(Q)})
print(json.dumps(out, indent=1))
