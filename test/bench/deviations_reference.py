"""Overlapping Allan deviation at octave averaging factors, vectorised NumPy, for comparison.

Reads the number of samples from the command line and the samples, doubles, from standard input. Prints one JSON object: seconds of the
best of three (phase and all deviations; mean-removed, as ours) and the deviations.
"""

import json
import sys
import time

import numpy as np

n = int(sys.argv[1])
y = np.frombuffer(sys.stdin.buffer.read(8 * n), dtype=np.float64)


def overlapping_allan():
    x = np.zeros(n + 1)
    np.cumsum(y - y.mean(), out=x[1:])
    rows = []
    m = 1
    while 2 * m <= n:
        d = x[2 * m :] - 2 * x[m:-m]
        d += x[: -2 * m]
        rows.append(float(np.sqrt(np.dot(d, d) / (2.0 * m * m * d.size))))
        m *= 2
    return rows


best = float("inf")
for _ in range(3):
    start = time.perf_counter()
    result = overlapping_allan()
    best = min(best, time.perf_counter() - start)
json.dump({"seconds": best, "deviations": result, "numpy": np.__version__}, sys.stdout)
