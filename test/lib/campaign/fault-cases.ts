/** The parts of a small campaign that is right; a case replaces one of them by something wrong. */
export const PARTS = {
  head: `"format": "plumbtick-campaign/1"`,
  window: `"window": { "start": "2027-05-03T00:00:00Z", "end": "2027-05-17T00:00:00Z" }`,
  target: `"target": "1 cm"`,
  sources: `"sources": [{ "id": "far", "correlationLength": "80 km" }, { "id": "plain" }]`,
  datums: `"datums": [{ "id": "north", "W0": "62636853.4(5) m²/s²" }]`,
  transitions: `"transitions": [{ "id": "171Yb", "offset": "1(6)e-18" }, { "id": "new", "frequency": "4e14 Hz" }]`,
  a: `{ "id": "a", "lat": 52.3, "lon": 10.4, "h": { "value": "143.216(8) m", "source": "far" }, "determinations": [
    { "kind": "gnss-quasigeoid", "datum": "north", "zeta": "43.812(19) m" }] }`,
  b: `{ "id": "b", "lat": 50.9, "lon": 11.7, "determinations": [{ "kind": "levelled-from", "site": "a", "dH": "5(1) m" }] }`,
  k: `{ "id": "k", "site": "a", "transition": "87Sr", "tie": [{ "dH": "1.2(1) m" }], "systematic": "1e-18",
    "stability": { "white": "2e-16" }, "uptime": 0.7 }`,
  l: `{ "id": "l", "site": "b", "transition": "new" }`,
  link: `{ "id": "kl", "from": "k", "to": "l", "stability": { "phase": "1e-15" } }`,
  measurements: `"measurements": [{ "id": "m", "link": "kl", "y": "2.1(2)e-14" }, { "id": "n", "link": "kl", "y": "2.3(2)e-14" }]`,
  correlations: `"correlations": [{ "between": ["m", "n"], "rho": 0.4 }]`,
};

export const file = (changes: Partial<typeof PARTS> = {}): string => {
  const p = { ...PARTS, ...changes };
  const lists = `"sites": [\n  ${p.a},\n  ${p.b}\n],\n"clocks": [\n  ${p.k},\n  ${p.l}\n],\n"links": [\n  ${p.link}\n]`;
  return `{\n${[p.head, p.window, p.target, p.sources, p.datums, p.transitions, lists, p.measurements, p.correlations]
    .filter((part) => part !== '')
    .join(',\n')}\n}`;
};

/** A change that makes the campaign wrong in one way. */
export interface Case {
  readonly code: string;
  readonly path: string;
  /** what stands where line and column point */
  readonly at: string;
  readonly change: Partial<typeof PARTS>;
  readonly expected?: string;
}

export const site = (more: string): Partial<typeof PARTS> => ({ a: PARTS.a.replace('"lat": 52.3', more) });
const h = (value: string): Partial<typeof PARTS> => ({
  a: PARTS.a.replace('{ "value": "143.216(8) m", "source": "far" }', value),
});
const det = (value: string): Partial<typeof PARTS> => ({
  a: PARTS.a.replace('"zeta": "43.812(19) m"', `"zeta": "43.812(19) m" }, ${value.slice(0, -1)}`),
});
const clock = (from: string, to: string): Partial<typeof PARTS> => ({ k: PARTS.k.replace(from, to) });
const link = (more: string): Partial<typeof PARTS> => ({
  link: PARTS.link.replace('"id": "kl"', `"id": "kl", ${more}`),
});

/** A site whose place is stated by a position. */
const position = (value: string): Partial<typeof PARTS> => ({
  a: PARTS.a.replace('"lat": 52.3, "lon": 10.4', `"position": ${value}`),
});

/** Positions, the tide's keys, and routes. */
const POSITION_CASES: readonly Case[] = [
  {
    code: 'missing-key',
    path: 'sites.a.lon',
    at: '{ "id": "a"',
    change: { a: PARTS.a.replace(', "lon": 10.4', '') },
    expected: 'longitude',
  },
  {
    code: 'missing-key',
    path: 'sites.a.position.crs',
    at: '{ "x": 604000',
    change: position('{ "x": 604000, "y": 5795000 }'),
    expected: 'EPSG:25832',
  },
  {
    code: 'unknown-crs',
    path: 'sites.a.position.crs',
    at: '"EPSG:9999"',
    change: position('{ "crs": "EPSG:9999", "x": 604000, "y": 5795000 }'),
    expected: 'projinfo EPSG:9999',
  },
  {
    code: 'unsupported-definition',
    path: 'sites.a.position.crs',
    at: '"+proj=tmerc',
    change: position('{ "crs": "+proj=tmerc +lon_0=9 +ellps=bessel +nadgrids=BETA2007.gsb", "x": 4, "y": 5 }'),
    expected: '+towgs84',
  },
  {
    code: 'swapped-axes',
    path: 'sites.a.position',
    at: '{ "crs": "EPSG:25832"',
    change: position('{ "crs": "EPSG:25832", "x": 5795000, "y": 604000 }'),
    expected: 'swapped',
  },
  {
    code: 'missing-coordinate',
    path: 'sites.a.position.y',
    at: '{ "crs": "EPSG:25832"',
    change: position('{ "crs": "EPSG:25832", "easting": 604000 }'),
    expected: 'northing',
  },
  {
    code: 'exclusive-keys',
    path: 'sites.a.position.easting',
    at: '"easting"',
    change: position('{ "crs": "EPSG:25832", "x": 604000, "easting": 604000, "y": 5795000 }'),
  },
  {
    code: 'unexpected-coordinate',
    path: 'sites.a.position.easting',
    at: '604000',
    change: position('{ "crs": "EPSG:4326", "easting": 604000, "northing": 5795000 }'),
    expected: 'lat and lon',
  },
  {
    code: 'not-on-earth',
    path: 'sites.a.position',
    at: '{ "crs": "geocentric"',
    change: position('{ "crs": "geocentric", "x": 3771.8, "y": 140.3, "z": 5124.3 }'),
  },
  {
    code: 'wrong-unit',
    path: 'sites.a.position.x',
    at: 's"',
    change: position('{ "crs": "EPSG:25832", "x": "604000 s", "y": 5795000 }'),
  },
  {
    code: 'unknown-name',
    path: 'sites.a.oceanLoading.0.constituent',
    at: '"M5"',
    change: site('"lat": 52.3, "oceanLoading": [{ "constituent": "M5", "amplitude": 0.1, "phase": 3 }]'),
    expected: 'Ssa',
  },
  {
    code: 'duplicate-constituent',
    path: 'sites.a.oceanLoading.1.constituent',
    at: '"m2"',
    change: site(
      '"lat": 52.3, "oceanLoading": [{ "constituent": "M2", "amplitude": 0.1, "phase": 3 }, { "constituent": "m2", "amplitude": 0.1, "phase": 3 }]',
    ),
  },
  {
    code: 'missing-key',
    path: 'pole.1.time',
    at: '{ "x": 0.3',
    change: { target: '"pole": [{ "time": "2027-05-01T00:00:00Z", "x": 0.1, "y": 0.4 }, { "x": 0.3, "y": 0.4 }]' },
  },
  {
    code: 'wrong-order',
    path: 'pole.1.time',
    at: '"2027-05-01T00:00:00Z", "x": 0.3',
    change: {
      target:
        '"pole": [{ "time": "2027-06-01T00:00:00Z", "x": 0.1, "y": 0.4 }, { "time": "2027-05-01T00:00:00Z", "x": 0.3, "y": 0.4 }]',
    },
  },
  {
    code: 'out-of-range',
    path: 'pole.0.x',
    at: '120',
    change: { target: '"pole": [{ "x": 120, "y": 0.44 }]' },
    expected: 'arc-seconds',
  },
  {
    code: 'missing-key',
    path: 'links.kl.route.arrival',
    at: '{ "departure"',
    change: link('"route": { "departure": "2027-05-03T00:00:00Z" }'),
  },
  {
    code: 'missing-key',
    path: 'links.kl.route.via.0.time',
    at: '{ "lat": 51',
    change: link(
      '"route": { "departure": "2027-05-03T00:00:00Z", "arrival": "2027-05-04T00:00:00Z", "via": [{ "lat": 51, "lon": 11 }] }',
    ),
  },
  {
    code: 'wrong-order',
    path: 'links.kl.route.via.0.time',
    at: '"2027-05-05T00:00:00Z"',
    change: link(
      '"route": { "departure": "2027-05-03T00:00:00Z", "arrival": "2027-05-04T00:00:00Z", "via": [{ "lat": 51, "lon": 11, "time": "2027-05-05T00:00:00Z" }] }',
    ),
  },
];

export const CASES: readonly Case[] = [
  // the file and its keys
  {
    code: 'not-one-of',
    path: 'format',
    at: '"plumbtick-campain/1"',
    change: { head: '"format": "plumbtick-campain/1"' },
    expected: '"plumbtick-campaign/1"',
  },
  {
    code: 'newer-format',
    path: 'format',
    at: '"plumbtick-campaign/2"',
    change: { head: '"format": "plumbtick-campaign/2"' },
    expected: 'newer version',
  },
  {
    code: 'wrong-format',
    path: 'format',
    at: '"plumbtick-prediction/1"',
    change: { head: '"format": "plumbtick-prediction/1"' },
    expected: 'this is a prediction',
  },
  { code: 'missing-key', path: 'format', at: '{', change: { head: '"title": "x"' } },
  {
    code: 'unknown-key',
    path: 'tragets',
    at: '"tragets"',
    change: { target: '"tragets": "1 cm"' },
    expected: '"target": did you mean that?',
  },
  { code: 'unknown-key', path: 'sites.a.latt', at: '"latt"', change: site('"lat": 52.3, "latt": 1') },
  { code: 'duplicate-key', path: 'sites.a.lat', at: '"lat": 3', change: site('"lat": 52.3, "lat": 3') },
  { code: 'duplicate-key', path: 'sites.a.h.value', at: '"value": 2', change: h('{ "value": 1, "value": 2 }') },
  { code: 'missing-key', path: 'sites.a.lat', at: '{ "id": "a"', change: site('"name": "A"'), expected: 'latitude' },
  {
    code: 'exclusive-keys',
    path: 'sites.a.lon',
    at: '"lon"',
    change: site('"position": { "crs": "EPSG:25832", "x": 604000, "y": 5795000 }'),
  },
  ...POSITION_CASES,
  { code: 'wrong-type', path: 'target', at: 'null', change: { target: '"target": null' } },
  { code: 'wrong-type', path: 'title', at: '7', change: { target: '"title": 7' }, expected: 'a text' },
  { code: 'lone-surrogate', path: 'title', at: '"\\ud800"', change: { target: '"title": "\\ud800"' } },
  {
    code: 'wrong-type',
    path: 'sites.0',
    at: '"a"',
    change: { a: '"a"' },
    expected: 'a site: an object with "id", "lat", "lon"',
  },
  {
    code: 'wrong-type',
    path: 'datums',
    at: '{',
    change: { datums: '"datums": { "id": "north" }' },
    expected: 'a list',
  },
  {
    code: 'wrong-type',
    path: 'sites.a.candidate',
    at: '"yes"',
    change: site('"lat": 52.3, "candidate": "yes"'),
    expected: 'true or false',
  },
  {
    code: 'not-one-of',
    path: 'tide',
    at: '"Mean"',
    change: { target: '"tide": "Mean"' },
    expected: '"mean": did you mean that?',
  },
  // ids and references
  {
    code: 'bad-id',
    path: 'sources.1.id',
    at: '"pl.ain"',
    change: { sources: PARTS.sources.replace('"plain"', '"pl.ain"') },
    expected: '"pl-ain"',
  },
  {
    code: 'bad-id',
    path: 'sources.1.id',
    at: '""',
    change: { sources: PARTS.sources.replace('"plain"', '""') },
    expected: 'empty',
  },
  {
    code: 'bad-id',
    path: 'sources.1.id',
    at: '"__proto__"',
    change: { sources: PARTS.sources.replace('"plain"', '"__proto__"') },
    expected: 'reserved',
  },
  {
    code: 'bad-id',
    path: 'sources.1.id',
    at: '"a\\u0007"',
    change: { sources: PARTS.sources.replace('"plain"', '"a\\u0007"') },
    expected: 'control',
  },
  {
    code: 'bad-id',
    path: 'sources.1.id',
    at: `"${'x'.repeat(101)}"`,
    change: { sources: PARTS.sources.replace('plain', 'x'.repeat(101)) },
    expected: '100',
  },
  {
    code: 'reserved-id',
    path: 'datums.ihrs.id',
    at: '"ihrs"',
    change: { datums: `${PARTS.datums.slice(0, -1)}, { "id": "ihrs", "W0": 62636853 }]` },
    expected: 'built in',
  },
  {
    code: 'duplicate-id',
    path: 'datums.1.id',
    at: '"north" }',
    change: { datums: '"datums": [{ "id": "north", "W0": 62636853 }, { "W0": 62636853, "id": "north" }]' },
    expected: 'datums.north.id has it already',
  },
  {
    code: 'duplicate-id',
    path: 'measurements.1.id',
    at: '"m", "link": "kl", "y": "2.3',
    change: { measurements: PARTS.measurements.replace('"n"', '"m"'), correlations: '' },
    expected: 'measurements.0.id',
  },
  {
    code: 'unknown-id',
    path: 'clocks.k.site',
    at: '"aa"',
    change: clock('"site": "a"', '"site": "aa"'),
    expected: 'a site: "a": did you mean that?',
  },
  {
    code: 'unknown-id',
    path: 'clocks.k.transition',
    at: '"875r"',
    change: clock('"87Sr"', '"875r"'),
    expected: '"87Sr": did you mean that?',
  },
  {
    code: 'unknown-id',
    path: 'sites.a.determinations.0.datum',
    at: '"nort"',
    change: { a: PARTS.a.replace('"north"', '"nort"') },
    expected: '"north"',
  },
  {
    code: 'unknown-id',
    path: 'sites.a.h.source',
    at: '"fra"',
    change: h('{ "value": "143.216(8) m", "source": "fra" }'),
    expected: '"far": did you mean that?',
  },
  {
    code: 'unknown-id',
    path: 'sites.a.h.parts.1.source',
    at: '"fare"',
    change: h('{ "value": "143.216 m", "parts": [{ "u": "3 mm" }, { "u": "4 mm", "source": "fare" }] }'),
  },
  {
    code: 'unknown-id',
    path: 'links.kl.to',
    at: '"z"',
    change: { link: PARTS.link.replace('"to": "l"', '"to": "z"') },
    expected: 'one of "k", "l"',
  },
  {
    code: 'unknown-id',
    path: 'measurements.0.link',
    at: '"lk"',
    change: { measurements: PARTS.measurements.replace('"kl"', '"lk"') },
    expected: '"kl"',
  },
  {
    code: 'unknown-id',
    path: 'correlations.0.between.1',
    at: '"q"',
    change: { correlations: PARTS.correlations.replace('"n"', '"q"') },
  },
  {
    code: 'self-reference',
    path: 'links.kl.to',
    at: '"k"',
    change: { link: PARTS.link.replace('"to": "l"', '"to": "k"') },
    expected: 'another one than "from"',
  },
  {
    code: 'self-reference',
    path: 'sites.b.determinations.0.site',
    at: '"b"',
    change: { b: PARTS.b.replace('"site": "a"', '"site": "b"') },
  },
  {
    code: 'self-reference',
    path: 'correlations.0.between',
    at: '["m", "m"]',
    change: { correlations: PARTS.correlations.replace('"n"', '"m"') },
  },
  {
    code: 'duplicate-pair',
    path: 'correlations.1.between',
    at: '["n", "m"]',
    change: { correlations: `${PARTS.correlations.slice(0, -1)}, { "between": ["n", "m"], "rho": 0.1 }]` },
  },
  {
    code: 'wrong-length',
    path: 'correlations.0.between',
    at: '["m"]',
    change: { correlations: PARTS.correlations.replace(', "n"', '') },
    expected: 'a list of 2',
  },
  // places and times
  {
    code: 'out-of-range',
    path: 'sites.a.lat',
    at: '139.76',
    change: site('"lat": 139.76'),
    expected: 'lat and lon look swapped',
  },
  { code: 'out-of-range', path: 'sites.a.lat', at: '195', change: site('"lat": 195'), expected: '90°' },
  {
    code: 'out-of-range',
    path: 'sites.a.lon',
    at: '361',
    change: { a: PARTS.a.replace('10.4', '361') },
    expected: '360',
  },
  { code: 'wrong-hemisphere', path: 'sites.a.lat', at: 'E"', change: site('"lat": "52.3 E"') },
  { code: 'wrong-type', path: 'sites.a.lat', at: 'true', change: site('"lat": true') },
  { code: 'not-finite', path: 'sites.a.lat', at: '1e999', change: site('"lat": 1e999') },
  {
    code: 'wrong-order',
    path: 'window.end',
    at: '"2027-05-01T00:00:00Z"',
    change: { window: PARTS.window.replace('05-17', '05-01') },
    expected: 'later than "start"',
  },
  {
    code: 'local-time',
    path: 'window.end',
    at: '"',
    change: { window: PARTS.window.replace('17T00:00:00Z', '17T00:00:00') },
  },
  {
    code: 'wrong-type',
    path: 'window.start',
    at: '[]',
    change: { window: PARTS.window.replace('"2027-05-03T00:00:00Z"', '[]') },
  },
  {
    code: 'missing-key',
    path: 'window.end',
    at: '{',
    change: { window: '"window": { "start": "2027-05-03T00:00:00Z" }' },
  },
  // numbers
  { code: 'not-finite', path: 'sites.a.h.value', at: '1e999', change: h('{ "value": 1e999 }') },
  { code: 'not-finite', path: 'sites.a.h', at: 'NaN m"', change: h('"NaN m"') },
  { code: 'decimal-comma', path: 'sites.a.h', at: ',2 m"', change: h('"143,2 m"'), expected: '143.2 m' },
  { code: 'negative-u', path: 'sites.a.h.u', at: '-0.1', change: h('{ "value": 143.2, "u": -0.1 }') },
  { code: 'negative-u', path: 'clocks.k.systematic', at: '-1e-18', change: clock('"1e-18"', '-1e-18') },
  { code: 'wrong-unit', path: 'sites.a.h', at: 's"', change: h('"143.2 s"') },
  { code: 'missing-key', path: 'sites.a.h.value', at: '{ "u"', change: h('{ "u": 0.1 }') },
  {
    code: 'not-one-of',
    path: 'sites.a.h.tide',
    at: '"fre"',
    change: h('{ "value": 143.2, "tide": "fre" }'),
    expected: '"free"',
  },
  {
    code: 'unknown-name',
    path: 'sites.a.h.frame',
    at: '"ETRS89"',
    change: h('{ "value": 143.2, "frame": "ETRS89" }'),
    expected: 'name the one of your heights, ETRF2000 or ETRF2014',
  },
  {
    code: 'unknown-key',
    path: 'sites.a.h.epoc',
    at: '"epoc"',
    change: h('{ "value": 143.2, "epoc": 2020 }'),
    expected: '"epoch": did you mean that?',
  },
  {
    code: 'out-of-range',
    path: 'sites.a.h.epoch',
    at: '61528',
    change: h('{ "value": 143.2, "epoch": 61528 }'),
    expected: 'decimal years',
  },
  {
    code: 'out-of-range',
    path: 'sites.a.h.rate',
    at: '1.2',
    change: h('{ "value": 143.2, "epoch": 2020, "rate": 1.2 }'),
    expected: 'less than a metre a year',
  },
  {
    code: 'wrong-unit',
    path: 'sites.a.h.rate',
    at: 'mm"',
    change: h('{ "value": 143.2, "epoch": 2020, "rate": "1.2 mm" }'),
  },
  {
    code: 'unknown-name',
    path: 'datums.north.frame',
    at: '"NAD83"',
    change: { datums: PARTS.datums.replace('"id": "north"', '"id": "north", "frame": "NAD83"') },
    expected: 'ITRF2020',
  },
  {
    code: 'unknown-key',
    path: 'sites.a.determinations.1.H.frame',
    at: '"frame"',
    change: det('{ "kind": "normal-height", "H": { "value": 1, "frame": "ITRF2020" } }'),
  },
  {
    code: 'unknown-name',
    path: 'sites.a.determinations.1.field',
    at: '"Bessel"',
    change: det('{ "kind": "normal-height", "H": 1, "field": "Bessel" }'),
    expected: 'International1930',
  },
  {
    code: 'unknown-key',
    path: 'sites.a.h.sorce',
    at: '"sorce"',
    change: h('{ "value": 143.2, "sorce": "far" }'),
    expected: '"source"',
  },
  {
    code: 'unknown-key',
    path: 'sites.a.h.parts.0.sauce',
    at: '"sauce"',
    change: h('{ "value": 1, "parts": [{ "u": 1, "sauce": "far" }] }'),
  },
  {
    code: 'source-twice',
    path: 'sites.a.h.parts.1.source',
    at: '"far"',
    change: h('{ "value": 1, "parts": [{ "u": 1, "source": "far" }, { "u": 2, "source": "far" }] }'),
  },
  {
    code: 'u-disagrees',
    path: 'sites.a.h.value',
    at: '"1.0(3) m"',
    change: h('{ "value": "1.0(3) m", "parts": [{ "u": "1 mm" }] }'),
  },
  {
    code: 'unknown-distribution',
    path: 'sites.a.h.distribution',
    at: '"gauss"',
    change: h('{ "value": 1, "distribution": "gauss" }'),
  },
  { code: 'dof-missing', path: 'sites.a.h.dof', at: '{', change: h('{ "value": 1, "distribution": "t" }') },
  { code: 'wrong-type', path: 'sites.a.h', at: '[1]', change: h('[1]') },
  {
    code: 'tide-not-here',
    path: 'sites.a.g.tide',
    at: '"tide"',
    change: site('"lat": 52.3, "g": { "value": 9.8, "tide": "mean" }'),
  },
  {
    code: 'out-of-range',
    path: 'sites.a.g',
    at: '"98 m/s²"',
    change: site('"lat": 52.3, "g": "98 m/s²"'),
    expected: '9 to 10.5',
  },
  { code: 'uncertainty-not-expected', path: 'target', at: '"1.0(1) cm"', change: { target: '"target": "1.0(1) cm"' } },
  { code: 'out-of-range', path: 'target', at: '0', change: { target: '"target": 0' }, expected: 'more than 0' },
  {
    code: 'unknown-key',
    path: 'target.u',
    at: '"u"',
    change: { target: '"target": { "value": "1 cm", "u": "1 mm" }' },
  },
  // sources
  {
    code: 'exclusive-keys',
    path: 'sources.0.correlation',
    at: '"correlation"',
    change: { sources: PARTS.sources.replace('"80 km"', '"80 km", "correlation": 1') },
    expected: 'one of them',
  },
  {
    code: 'out-of-range',
    path: 'sources.1.correlation',
    at: '1.2',
    change: { sources: PARTS.sources.replace('"plain"', '"plain", "correlation": 1.2') },
    expected: '-1 to 1',
  },
  {
    code: 'out-of-range',
    path: 'sources.0.correlationLength',
    at: '0',
    change: { sources: PARTS.sources.replace('"80 km"', '0') },
  },
  {
    code: 'correlation-length-off-site',
    path: 'datums.north.W0.source',
    at: '"far"',
    change: {
      datums: PARTS.datums.replace('"62636853.4(5) m²/s²"', '{ "value": "62636853.4(5) m²/s²", "source": "far" }'),
    },
  },
  {
    code: 'correlation-length-off-site',
    path: 'transitions.171Yb.offset.source',
    at: '"far"',
    change: { transitions: PARTS.transitions.replace('"1(6)e-18"', '{ "value": "1(6)e-18", "source": "far" }') },
  },
  {
    code: 'correlation-length-off-site',
    path: 'links.kl.systematic.0.source',
    at: '"far"',
    change: { link: PARTS.link.replace('"to": "l"', '"to": "l", "systematic": [{ "u": "1e-19", "source": "far" }]') },
  },
  {
    code: 'correlation-length-off-site',
    path: 'measurements.0.y.source',
    at: '"far"',
    change: { measurements: PARTS.measurements.replace('"2.1(2)e-14"', '{ "value": "2.1(2)e-14", "source": "far" }') },
  },
  // transitions
  {
    code: 'missing-key',
    path: 'transitions.87sr.frequency',
    at: '{ "id": "87sr"',
    change: { transitions: PARTS.transitions.replace('171Yb', '87sr') },
    expected: 'did you mean "87Sr"?',
  },
  {
    code: 'frequency-is-recommended',
    path: 'transitions.171Yb.frequency',
    at: '"5e14 Hz"',
    change: { transitions: PARTS.transitions.replace('"1(6)e-18"', '0, "frequency": "5e14 Hz"') },
  },
  // determinations
  {
    code: 'not-one-of',
    path: 'sites.a.determinations.1.kind',
    at: '"normal-hight"',
    change: det('{ "kind": "normal-hight" }'),
    expected: '"normal-height"',
  },
  {
    code: 'missing-key',
    path: 'sites.a.determinations.1.kind',
    at: '{ "H"',
    change: det('{ "H": 1 }'),
    expected: '"potential"',
  },
  {
    code: 'missing-key',
    path: 'sites.a.determinations.1.model',
    at: '{ "kind": "gravity-model"',
    change: det('{ "kind": "gravity-model" }'),
    expected: '"model"',
  },
  {
    code: 'file-not-at-hand',
    path: 'sites.a.determinations.1.model',
    at: '"field.gfc"',
    change: det('{ "kind": "gravity-model", "model": "field.gfc" }'),
  },
  {
    code: 'file-not-at-hand',
    path: 'sites.a.determinations.1.model',
    at: '{ "file"',
    change: det('{ "kind": "gravity-model", "model": { "file": "field.gfc", "maxDegree": 360 } }'),
  },
  {
    code: 'out-of-range',
    path: 'sites.a.determinations.1.model.maxDegree',
    at: '1',
    change: det('{ "kind": "gravity-model", "model": { "file": "field.gfc", "maxDegree": 1 } }'),
  },
  {
    code: 'unknown-key',
    path: 'sites.a.determinations.1.zeta',
    at: '"zeta"',
    change: det('{ "kind": "normal-height", "H": 1, "zeta": 2 }'),
  },
  {
    code: 'missing-key',
    path: 'sites.a.determinations.0.h',
    at: '{ "kind": "gnss-quasigeoid"',
    change: { a: PARTS.a.replace('"h": { "value": "143.216(8) m", "source": "far" },', '') },
    expected: 'here or at the site',
  },
  {
    code: 'not-one-of',
    path: 'sites.a.determinations.1.use',
    at: '"fit"',
    change: det('{ "kind": "normal-height", "H": 1, "use": "fit" }'),
  },
  {
    code: 'missing-key',
    path: 'sites.b.determinations.0.length',
    at: '{ "kind"',
    change: { b: PARTS.b.replace('"dH": "5(1) m"', '"b": "1 mm/√km", "dH": "5 m"') },
    expected: '"length" beside "b"',
  },
  {
    code: 'file-not-at-hand',
    path: 'sites.a.determinations.0.zeta.grid',
    at: '"file.isg"',
    change: { a: PARTS.a.replace('"43.812(19) m"', '{ "grid": "file.isg", "u": "19 mm" }') },
  },
  // instruments and measurements
  {
    code: 'phase-on-clock',
    path: 'clocks.k.stability.phase',
    at: '"phase"',
    change: clock('"white"', '"phase": 0, "white"'),
    expected: 'link',
  },
  { code: 'out-of-range', path: 'clocks.k.uptime', at: '1.5', change: clock('0.7', '1.5'), expected: '0 to 1' },
  {
    code: 'exclusive-keys',
    path: 'clocks.k.available',
    at: '"available"',
    change: clock('0.7', '0.7, "available": [{ "start": 61528, "end": 61529 }]'),
  },
  {
    code: 'wrong-order',
    path: 'clocks.k.available.0.end',
    at: '61528',
    change: clock('"uptime": 0.7', '"available": [{ "start": 61529, "end": 61528 }]'),
  },
  {
    code: 'source-twice',
    path: 'clocks.k.systematic.1.source',
    at: '"plain"',
    change: clock('"1e-18"', '[{ "u": 1e-18, "source": "plain" }, { "u": 2e-18, "source": "plain" }]'),
  },
  {
    code: 'out-of-range',
    path: 'clocks.k.systematic.0.u',
    at: '1.5',
    change: clock('"1e-18"', '[{ "u": 1.5 }]'),
    expected: 'not a multiple of 1e-18',
  },
  {
    code: 'out-of-range',
    path: 'links.kl.segments',
    at: '1.5',
    change: link('"segments": 1.5'),
    expected: 'a whole number, 1 or more',
  },
  {
    code: 'exclusive-keys',
    path: 'measurements.0.tide',
    at: '"zero"',
    change: {
      measurements: PARTS.measurements.replace(
        '"2.1(2)e-14"',
        '{ "value": "2.1(2)e-14", "tide": "mean" }, "tide": "zero"',
      ),
    },
  },
  {
    code: 'uncertainty-missing',
    path: 'measurements.0.y',
    at: '"2.1e-14"',
    change: { measurements: PARTS.measurements.replace('"2.1(2)e-14"', '"2.1e-14", "includesSystematic": true') },
  },
  {
    code: 'exclusive-keys',
    path: 'measurements.0.series',
    at: '"series"',
    change: { measurements: PARTS.measurements.replace('"y": "2.1(2)e-14"', '"y": "2.1(2)e-14", "series": "run.csv"') },
  },
  {
    code: 'file-not-at-hand',
    path: 'measurements.0.series',
    at: '"run.csv"',
    change: { measurements: PARTS.measurements.replace('"y": "2.1(2)e-14"', '"series": "run.csv"') },
  },
  {
    code: 'exclusive-keys',
    path: 'measurements.0.includesSystematic',
    at: '"includesSystematic"',
    change: {
      measurements: PARTS.measurements.replace('"y": "2.1(2)e-14"', '"series": "run.csv", "includesSystematic": true'),
    },
  },
  {
    code: 'unknown-name',
    path: 'measurements.0.series.columns',
    at: '"mjd z"',
    change: {
      measurements: PARTS.measurements.replace(
        '"y": "2.1(2)e-14"',
        '"series": { "file": "run.csv", "columns": "mjd z" }',
      ),
    },
  },
  {
    code: 'out-of-range',
    path: 'correlations.0.rho',
    at: '-1.01',
    change: { correlations: PARTS.correlations.replace('0.4', '-1.01') },
  },
];
