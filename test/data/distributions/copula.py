"""Product-moment correlation of two deviates whose normal scores have correlation r, by direct two-dimensional Gauss-Legendre
integration over the bivariate normal density (numpy, scipy 1.17): another route than the Hermite series of the program.
Prints the values of test/lib/uncertainty/monte-carlo/copula-correlation.test.ts.

Run: python3 copula.py
"""
import numpy as np
from scipy import special, stats


def deviate(kind):
    if kind[0] == "normal":
        return lambda z: z
    if kind[0] == "uniform":
        return lambda z: np.sqrt(3) * (2 * special.ndtr(z) - 1)
    if kind[0] == "triangular":
        return lambda z: np.sqrt(6) * np.sign(z) * (1 - np.sqrt(2 * special.ndtr(-abs(z))))
    nu = kind[1]
    return lambda z: np.sign(z) * stats.t.isf(special.ndtr(-abs(z)), nu) * np.sqrt((nu - 2) / nu)


def correlation(a, b, r):
    x, w = np.polynomial.legendre.leggauss(30)

    def panels(lo, hi, n):
        e = np.linspace(lo, hi, n + 1)
        m, d = (e[1:] + e[:-1]) / 2, (e[1:] - e[:-1]) / 2
        return (m[:, None] + d[:, None] * x).ravel(), (d[:, None] * w).ravel()

    end = 16 if "t" in (a[0], b[0]) else 12
    z1, w1 = panels(0, end, 2 * end)
    z2, w2 = panels(0, end, 4 * end)
    s = np.sqrt(1 - r * r)
    phi = lambda u: np.exp(-0.5 * u * u) / np.sqrt(2 * np.pi)
    kernel = (phi((z2[None, :] - r * z1[:, None]) / s) - phi((-z2[None, :] - r * z1[:, None]) / s)) / s
    return 2 * np.sum(w1 * phi(z1) * deviate(a)(z1) * (kernel @ (w2 * deviate(b)(z2))))


U, TRI, N = ("uniform",), ("triangular",), ("normal",)
for a, b, r in [(U, U, 0.9), (TRI, TRI, 0.9), (TRI, U, -0.6), (("t", 5), ("t", 5), 0.8), (("t", 3), U, 0.7),
                (("t", 3), ("t", 12.5), 0.5), (TRI, ("t", 4), 0.3), (N, TRI, 0.5), (N, ("t", 3), 0.5)]:
    print(a, b, r, float(correlation(a, b, r)))
