"""The reference of monte-carlo.bench.mjs: 1e6 trials of a chain of sites with GNSS heights, quasigeoid and a tie, in vectorised NumPy.

Written as one would for speed: trials in chunks that stay in the cache, correlated inputs by one matrix product, the geopotential of a
normal height as a polynomial, order statistics by one sort. Reads the campaign's numbers as JSON from standard input, prints
processor seconds (best of the runs) and u of every link. Needs numpy alone.
"""
import json
import sys
import time

import numpy as np

A, F, GE, K, M = 6378137.0, 0.00335281068118, 9.7803267715, 0.001931851353, 0.00344978600308
E2 = 2 * F - F * F
C2 = 299792458.0**2
CHUNK = 20_000


def gravity(lat, h):
    s2 = np.sin(lat) ** 2
    g0 = GE * (1 + K * s2) / np.sqrt(1 - E2 * s2)
    return g0 * (1 - 2 * (1 + F + M - 2 * F * s2) * h / A + 3 * h * h / A**2)


def factor(n, rho):
    return np.linalg.cholesky(np.full((n, n), rho) + (1 - rho) * np.eye(n))


def run(spec, rng):
    n, trials = len(spec["lat"]), spec["trials"]
    lat, h = np.radians(spec["lat"])[:, None], np.array(spec["normalHeight"])[:, None]
    slope = gravity(lat, h)
    bend = (gravity(lat, h + 10) - gravity(lat, h - 10)) / 20
    lh = spec["uh"] * factor(n, spec["rhoGnss"])
    lz = spec["uzeta"] * factor(n, spec["rhoGeoid"])
    g, G, d = spec["g"], spec["gradient"], spec["tie"]
    tie0 = -(g - 0.5 * G * d) * d
    a, b = np.array(spec["from"]), np.array(spec["to"])
    y = np.empty((len(a), trials))
    for start in range(0, trials, CHUNK):
        m = min(CHUNK, trials - start)
        dH = lh @ rng.standard_normal((n, m)) - lz @ rng.standard_normal((n, m))
        gravity_drawn = g + spec["ug"] * rng.standard_normal((n, m))
        gradient_drawn = G + 0.1 * G * rng.standard_normal((n, m))
        tie = d + spec["utie"] * rng.standard_normal((n, m))
        w = -(slope + 0.5 * bend * dH) * dH - (gravity_drawn - 0.5 * gradient_drawn * tie) * tie - tie0
        y[:, start : start + m] = (w[a] - w[b]) / C2
    mean, u = y.mean(axis=1), y.std(axis=1, ddof=1)
    y.sort(axis=1)
    q = int(0.95 * trials)
    r = (trials - q) // 2
    symmetric = y[:, r], y[:, r + q]
    best = (y[:, q:] - y[:, : trials - q]).argmin(axis=1)
    shortest = y[np.arange(len(a)), best], y[np.arange(len(a)), best + q]
    return mean, u, symmetric, shortest


spec = json.load(sys.stdin)
seconds = []
for k in range(spec["runs"]):
    started = time.process_time()
    mean, u, symmetric, shortest = run(spec, np.random.default_rng(k))
    seconds.append(time.process_time() - started)
print(json.dumps({"seconds": min(seconds), "u": list(u), "numpy": np.__version__}))
