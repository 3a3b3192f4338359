"""Tidal potential at clocks fixed to the crust, by ERFA's ephemerides and Earth rotation (Debian: python3-erfa, python3-numpy).

Run `/usr/bin/python3 make.py > erfa.json`. Independent of lib/: Moon by moon98 (Meeus), Sun by epv00 (VSOP2000 abridged), rotation by
pnm06a and gst06a, geodetic to geocentric by gd2gc. The formula of the felt potential and its numbers are those of the campaign
file's description of `tide`. UT1 = UTC; TT - UTC by a straight line through 63.8 s (2000) and 69.2 s (2024), held after that.
"""
import json
import random
import erfa
import numpy as np

C2 = 299792458.0**2
GM_MOON = 0.0123000371 * 3.986004418e14
GM_SUN = 1.32712440041e20
K2, H2, K3, H3 = 0.30190, 0.6078, 0.093, 0.292
AU = 149597870700.0


def earth_fixed(jd_utc):
    """Moon and Sun, Earth-fixed, m"""
    year = 2000 + (jd_utc - 2451545.0) / 365.25
    dt = 63.8 + (69.2 - 63.8) / 24 * (min(year, 2024) - 2000)
    tt1, tt2 = jd_utc, dt / 86400
    moon = np.array(erfa.moon98(tt1, tt2)['p']) * AU
    pvh, _ = erfa.epv00(tt1, tt2)
    sun = -np.array(pvh['p']) * AU
    rotation = erfa.rz(erfa.gst06a(jd_utc, 0.0, tt1, tt2), np.eye(3)) @ erfa.pnm06a(tt1, tt2)
    return rotation @ moon, rotation @ sun


def felt(lat, lon, h, jd_utc):
    r = np.array(erfa.gd2gc(2, np.radians(lon), np.radians(lat), h))  # 2: GRS80
    moon, sun = earth_fixed(jd_utc)

    def degree(gm, body, n):
        d = np.linalg.norm(body)
        rr = np.linalg.norm(r)
        x = r @ body / (d * rr)
        p = {2: (3 * x * x - 1) / 2, 3: (5 * x**3 - 3 * x) / 2}[n]
        return gm / d * (rr / d) ** n * p

    s2 = np.sin(np.radians(lat)) ** 2
    wt = 0.9722 - 2.8841 * s2 - 0.0195 * s2 * s2
    v2 = degree(GM_MOON, moon, 2) + degree(GM_SUN, sun, 2)
    v3 = degree(GM_MOON, moon, 3)
    return float((1 + K2 - H2) * (v2 - wt) + (1 + K3 - H3) * v3)


PLACES = [(52.2961, 10.4598, 143.2), (50.91, 11.72, 341.2), (39.9912, -105.2601, 1632.4), (35.71, 139.76, 40.0),
          (-39.5021, 176.9, 212.4), (-33.77, 151.11, 60.0), (0.0, 32.6, 1200.0), (67.9, 23.5, 420.0), (-24.6, -70.4, 2640.0),
          (89.99, 12.0, 0.0), (-77.8, 166.7, 10.0)]
random.seed(20270503)
rows = []
for _ in range(400):
    ms = round(random.uniform(946684800000, 2556057600000) / 60000) * 60000  # 2000 … 2050, whole minutes
    jd = 2440587.5 + ms / 86400000
    rows.append([ms] + [round(felt(*p, jd), 9) for p in PLACES])
positions = []
for _ in range(40):
    ms = round(random.uniform(946684800000, 2556057600000) / 60000) * 60000
    moon, sun = earth_fixed(2440587.5 + ms / 86400000)
    positions.append([ms] + [round(float(v)) for v in (*moon, *sun)])
print(json.dumps({'made by': 'make.py', 'erfa': erfa.__version__}).rstrip('}') + ', "places [lat, lon, h]": ' + json.dumps(PLACES) + ',')
print('"bodies [ms, moon xyz m, sun xyz m]": [\n' + ',\n'.join(json.dumps(p) for p in positions) + '\n],')
print('"felt [ms, m2/s2 at each place]": [\n' + ',\n'.join(json.dumps(r) for r in rows) + '\n]}')
