"""The reference of tide.bench.mjs: sites and epochs in on standard input, seconds and a few values out. See test/data/tide/make.py."""
import json
import sys
import time

try:
    import erfa
    import numpy as np
except ImportError:
    sys.exit(3)

C2 = 299792458.0**2
GM_MOON = 0.0123000371 * 3.986004418e14
GM_SUN = 1.32712440041e20
AU = 149597870700.0
F2, F3 = 1 + 0.30190 - 0.6078, 1 + 0.093 - 0.292

task = json.load(sys.stdin)
jd0 = erfa.dtf2d('UTC', *[int(task['start'][i:j]) for i, j in ((0, 4), (5, 7), (8, 10), (11, 13), (14, 16))], 0.0)
started = time.perf_counter()
ut2 = jd0[1] + np.arange(task['samples']) / 144
tt2 = ut2 + 69.2 / 86400
moon = erfa.moon98(jd0[0], tt2)['p'] * AU
sun = -erfa.epv00(jd0[0], tt2)[0]['p'] * AU
# the short nutation series: good to 1 mas, ten times faster than the full one
rotation = erfa.rz(erfa.gst00b(jd0[0], ut2), erfa.pnm00b(jd0[0], tt2))
moon = np.einsum('tij,tj->ti', rotation, moon)
sun = np.einsum('tij,tj->ti', rotation, sun)
dm, ds = np.linalg.norm(moon, axis=1), np.linalg.norm(sun, axis=1)
felt = []
for lat, lon in task['sites']:
    r = np.array(erfa.gd2gc(2, np.radians(lon), np.radians(lat), 100.0))
    r2 = r @ r
    am, as_ = moon @ r / dm, sun @ r / ds
    v2 = GM_MOON * (3 * am**2 - r2) / 2 / dm**3 + GM_SUN * (3 * as_**2 - r2) / 2 / ds**3
    v3 = GM_MOON * am * (5 * am**2 - 3 * r2) / 2 / dm**4
    s2 = np.sin(np.radians(lat)) ** 2
    felt.append(F2 * (v2 - (0.9722 - 2.8841 * s2 - 0.0195 * s2 * s2)) + F3 * v3)
links = [(felt[0] - f) / C2 for f in felt[1:]]
seconds = time.perf_counter() - started
check = [[t, l, links[l][t]] for t in range(0, task['samples'], 5000) for l in range(len(links))]
print(json.dumps({'seconds': seconds, 'version': erfa.__version__, 'check': check}))
