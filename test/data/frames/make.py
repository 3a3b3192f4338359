"""Ellipsoidal coordinates in every pair of frames by PROJ (`cct`), with the parameters of its own database.

Run with Debian's python3, proj-bin and sqlite3-free: `python3 make.py > proj.json`. The pipelines are put together from the
operations that `projinfo` prints, so none of the numbers of lib/earth/frames/ goes in.
"""
import itertools
import json
import re
import subprocess

# EPSG operation, from, to: all "position vector", as stored
OPERATIONS = [
    (9991, 'ITRF2014', 'ITRF2020'), (9992, 'ITRF2008', 'ITRF2020'), (9993, 'ITRF2005', 'ITRF2020'),
    (9994, 'ITRF2000', 'ITRF2020'), (7790, 'ITRF2008', 'ITRF2014'), (8079, 'ITRF2005', 'ITRF2014'),
    (8078, 'ITRF2000', 'ITRF2014'), (6389, 'ITRF2005', 'ITRF2008'), (6300, 'ITRF2000', 'ITRF2008'),
    (6302, 'ITRF2000', 'ITRF2005'), (7940, 'ITRF2000', 'ETRF2000'), (7950, 'ITRF2005', 'ETRF2000'),
    (7951, 'ITRF2008', 'ETRF2000'), (8405, 'ITRF2014', 'ETRF2000'), (8366, 'ITRF2014', 'ETRF2014'),
]
FRAMES = ['ITRF2020', 'ITRF2014', 'ITRF2008', 'ITRF2005', 'ITRF2000', 'ETRF2014', 'ETRF2000']
# longitude, latitude, height: a clock site's neighbourhood on every continent, a pole, the date line
POINTS = [(10.4598, 52.2961, 143.216), (23.5, 67.9, 420.0), (7.66, 45.014, 240.5), (-105.2601, 39.9912, 1632.412),
          (139.76, 35.71, 40.0), (176.9, -39.5021, 212.447), (12.0, 89.99, 30.0), (-70.4, -24.6, 2640.0)]
EPOCHS = [1997.5, 2010.35, 2027.36]


def proj_string(code):
    out = subprocess.run(['projinfo', f'EPSG:{code}', '-k', 'operation', '-o', 'PROJ', '--single-line'],
                         capture_output=True, text=True, check=True).stdout
    return re.search(r'\+proj=helmert[^\n]*', out).group(0).strip()


STEPS = {}
for code, a, b in OPERATIONS:
    text = proj_string(code)
    STEPS[a, b] = '+step ' + text
    STEPS[b, a] = '+step +inv ' + text


def pipeline(a, b):
    if (a, b) in STEPS:
        middle = STEPS[a, b]
    else:
        middle = STEPS[a, 'ITRF2014'] + ' ' + STEPS['ITRF2014', b]
    return ('+proj=pipeline +step +proj=unitconvert +xy_in=deg +xy_out=rad +step +proj=cart +ellps=GRS80 ' + middle +
            ' +step +inv +proj=cart +ellps=GRS80 +step +proj=unitconvert +xy_in=rad +xy_out=deg')


cases = []
for a, b in itertools.permutations(FRAMES, 2):
    rows = [(lon, lat, h, t) for lon, lat, h in POINTS for t in EPOCHS]
    text = ''.join(f'{lon!r} {lat!r} {h!r} {t!r}\n' for lon, lat, h, t in rows)
    out = subprocess.run(['cct', '-d', '12', *pipeline(a, b).split()], input=text, capture_output=True, text=True, check=True).stdout
    for row, line in zip(rows, out.strip().splitlines()):
        lon, lat, h, _ = (float(w) for w in line.split())
        cases.append([a, b, *row, lon, lat, h])

version = subprocess.run(['cct', '--version'], capture_output=True, text=True).stdout.split(',')[0].strip()
print('{"made by": "make.py", "program": %s, "columns": ["from", "to", "lon", "lat", "h", "epoch", "lon", "lat", "h"], "cases": [' % json.dumps(version))
print(',\n'.join(json.dumps(c) for c in cases))
print(']}')
