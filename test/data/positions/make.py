"""Known projected systems and positions in them by PROJ (`projinfo`, `cct`): the table of the code and the answers of its test.

  python3 make.py table > ../../../lib/earth/projected-position/national-systems.ts
  python3 make.py answers > proj.json

Definitions and areas of use come out of PROJ's database (EPSG), datum shifts from the EPSG operations named below.
"""
import json
import math
import re
import subprocess
import sys

# code: EPSG operation to ETRS89 or WGS 84 for systems on a datum of their own, with its accuracy in m; None where the datum is
# a frame of today (ETRS89, WGS 84, JGD2011, …), whose difference, up to 2 m horizontally, changes no potential
SHIFTS = {
    'DHDN': (1776, 3), 'MGI': (1619, 1.5), 'CH1903': (1646, 1.5), 'CH1903+': (1647, 0.1), 'RD': (9281, 0.25), 'BD72': (15928, 0.2),
    'OSGB': (1314, 2), 'LUREF': (5485, 0.1), 'HD72': (1449, 0.4), 'GGRS87': (1272, 1), 'S-JTSK': (1622, 1), 'Pulkovo58': (15994, 3),
}
CODES = {
    3034: None, 3035: None, 4647: None, 5650: None,
    31466: 'DHDN', 31467: 'DHDN', 31468: 'DHDN', 31469: 'DHDN',
    31254: 'MGI', 31255: 'MGI', 31256: 'MGI', 31257: 'MGI', 31258: 'MGI', 31259: 'MGI', 31287: 'MGI', 3416: None,
    21781: 'CH1903', 2056: 'CH1903+', 2154: None, 28992: 'RD', 31370: 'BD72', 3812: None, 2169: 'LUREF', 27700: 'OSGB', 2157: None,
    3006: None, 3067: None, 3301: None, 3059: None, 3346: None, 2180: None, 2176: None, 2177: None, 2178: None, 2179: None,
    5514: 'S-JTSK', 23700: 'HD72', 3794: None, 3765: None, 3844: 'Pulkovo58', 7801: None, 2100: 'GGRS87', 3763: None,
    6707: None, 6708: None, 7791: None, 7792: None, 5325: None,
    **{c: None for c in range(6669, 6688)}, 5185: None, 5186: None, 5187: None, 5188: None, 5179: None, 2193: None,
}


def run(*words):
    return subprocess.run(words, capture_output=True, text=True, check=True).stdout


def definition(code):
    text = run('projinfo', f'EPSG:{code}', '-o', 'PROJ', '--single-line', '-q').strip()
    text = re.sub(r' \+(towgs84=\S+|units=m|no_defs|type=crs)', '', text)
    wkt = run('projinfo', f'EPSG:{code}', '-o', 'WKT2_2019', '--single-line', '-q')
    name = re.match(r'PROJCRS\["([^"]+)"', wkt).group(1)
    south, west, north, east = (float(v) for v in re.search(r'BBOX\[([^\]]+)\]', wkt).group(1).split(','))
    return text, name, (west, south, east, north)


def shift(key):
    op, accuracy = SHIFTS[key]
    text = run('projinfo', f'EPSG:{op}', '-k', 'operation', '-o', 'PROJ', '--single-line', '-q')
    step = re.search(r'\+proj=helmert[^+]*(?:\+(?!step)[^+]*)*', text).group(0)
    v = dict(re.findall(r'\+(\w+)=(\S+)', step))
    sign = -1 if v.get('convention') == 'coordinate_frame' else 1
    seven = [float(v.get(k, 0)) for k in ('x', 'y', 'z')] + [sign * float(v.get(k, 0)) for k in ('rx', 'ry', 'rz')] + [float(v.get('s', 0))]
    return seven, op, accuracy, step.strip()


def table():
    print('''import type { KnownSystem } from './known-system.js';

/** National and continental projected systems, from the EPSG data set as PROJ 9.1.1 carries it. Made by
 *  test/data/positions/make.py, checked against PROJ by the test beside it. Columns: code, name, definition, datum shift to
 *  ETRS89 or WGS 84 (EPSG operation, its accuracy in m) or null, area of use west, south, east, north in degrees. */
type Row = readonly [
  number,
  string,
  string,
  readonly [seven: readonly number[], operation: number, accuracyM: number] | null,
  readonly [number, number, number, number],
];

const SHIFTS = {''')
    for key in SHIFTS:
        seven, op, accuracy, _ = shift(key)
        print(f"  '{key}': [[{', '.join(f'{v:g}' if abs(v) < 1e-3 else repr(v).removesuffix('.0') for v in seven)}], {op}, {accuracy}],")
    print('} as const;\n\nconst ROWS: readonly Row[] = [')
    for code, key in CODES.items():
        text, name, box = definition(code)
        print(f"  [{code}, {name!r}, {text!r}, {'null' if key is None else f'SHIFTS[{key!r}]'}, [{', '.join(f'{v:g}' for v in box)}]],")
    print('''];

export const NATIONAL_SYSTEMS: readonly KnownSystem[] = ROWS.map(([code, name, definition, shift, area]) => ({
  code,
  name,
  definition,
  shift: shift && { parameters: shift[0], source: `EPSG operation ${shift[1]}`, accuracyM: shift[2] },
  area: { west: area[0], south: area[1], east: area[2], north: area[3] },
}));''')


def answers():
    families = [*range(25828, 25839), 32601, 32632, 32633, 32654, 32660, 32701, 32756, 32760]
    cases = []
    for code in [*CODES, *families]:
        text, _, (west, south, east, north) = definition(code)
        pipeline = '+proj=pipeline +step +inv ' + text
        key = CODES.get(code)
        if key is not None:
            ellps = re.search(r'\+ellps=\S+', text).group(0)
            pipeline += f' +step +proj=cart {ellps} +step {shift(key)[3]} +step +inv +proj=cart +ellps=GRS80'
        pipeline += ' +step +proj=unitconvert +xy_in=rad +xy_out=deg'
        for fx, fy in ((0.2, 0.3), (0.55, 0.5), (0.8, 0.75)):
            # a place inside the area, to the centimetre in the system
            lon, lat = west + fx * (east - west), south + fy * (north - south)
            x, y = (round(float(v), 2) for v in run_cct(f'+proj=pipeline +step +proj=unitconvert +xy_in=deg +xy_out=rad +step {text}', lon, lat)[:2])
            out = run_cct(pipeline, x, y)
            cases.append([code, x, y, round(out[1], 11), round(out[0], 11)])
    print('{"made by": "make.py", "program": %s, "columns": ["EPSG", "easting", "northing", "lat", "lon"], "cases": [' % json.dumps(run('cct', '--version').split(',')[0].strip()))
    print(',\n'.join(json.dumps(c) for c in cases))
    print(']}')


def run_cct(pipeline, x, y):
    out = subprocess.run(['cct', '-d', '12', *pipeline.split()], input=f'{x!r} {y!r} 0 0\n', capture_output=True, text=True, check=True).stdout.split()
    values = [float(v) for v in out[:3]]
    assert all(math.isfinite(v) for v in values), (pipeline, x, y, out)
    return values


{'table': table, 'answers': answers}[sys.argv[1]]()
