import { describe, expect, it } from 'vitest';
import { predict } from '../../../../lib/answers/predict.js';
import { type ImportOptions, importLinks, importSites } from '../../../../lib/campaign/import/import-table.js';
import { readCampaign } from '../../../../lib/campaign/read.js';
import { writeCampaign } from '../../../../lib/campaign/write.js';
import { radToDeg } from '../../../../lib/quantity/index.js';
import { expectWithin } from '../../../expect-within.js';
import { faultsOf } from '../faults-of.js';

const SITES = `id,name,lat,lon,"h / m, free",u(h) / mm,"zeta / m, zero",source(zeta),g / mGal,transition,tie / m,systematic,white,uptime
north,"North lab, cellar",52.2961,10.4598,143.2164,6,43.812(17),quasigeoid,981252.3(3),87Sr,1.310(2),1.5e-18,1.2e-16,0.8

south,South,47.4093,8.5406,489.2055,6,48.271(18),quasigeoid,,171Yb,,2e-18,1.5e-16,
summit,,"46°33'05.0""N",7.9872,3462.816,,52.914 ± 0.038,,,,,,,
`;
const LINKS = 'id;from;to;kind;length;phase;systematic;segments\nns;north;south clock;fibre;650 km;5e-15;3e-19;2\n';

const faults = (text: string, options: ImportOptions = {}) =>
  faultsOf(() => importSites(text, options)).map((f) => [f.code, f.path, f.line, f.column]);
const expected = (text: string, options: ImportOptions = {}) => faultsOf(() => importSites(text, options))[0]!.expected;

describe('importSites', () => {
  it('reads numbers, units and uncertainties from cells, head and columns beside', () => {
    const c = importSites(SITES, { sourceEntries: { quasigeoid: { correlationLength: '80 km' } } });
    expect(c.sites.map(({ id, name }) => [id, name])).toEqual([
      ['north', 'North lab, cellar'],
      ['south', 'South'],
      ['summit', undefined],
    ]);
    const [north, south, summit] = c.sites;
    expect(north!.h).toMatchObject({ value: 143.2164, u: 0.006, tide: 'free', text: '143.2164 m' });
    // 1 mGal = 1e-5 m/s²
    expectWithin(north!.g!.value, 9.812523, 1e-15);
    expectWithin(north!.g!.u, 3e-6, 1e-20);
    expect(north!.determinations[0]).toMatchObject({
      kind: 'gnss-quasigeoid',
      zeta: { value: 43.812, u: 0.017, tide: 'zero', parts: [{ u: 0.017, source: 'quasigeoid' }] },
    });
    expect(c.sources).toEqual([{ id: 'quasigeoid', correlationLengthM: 80_000 }]);
    // empty cells say nothing
    expect([south!.g, summit!.h!.u, summit!.determinations[0]]).toMatchObject([
      null,
      0,
      { zeta: { u: 0.038, parts: [{ source: null }] } },
    ]);
    expectWithin(radToDeg(summit!.latitudeRad), 46 + 33 / 60 + 5 / 3600, 1e-12);
    expect(c.clocks).toMatchObject([
      { id: 'north clock', site: 'north', transition: '87Sr', uptime: 0.8, tie: [{ dH: { value: 1.31, u: 0.002 } }] },
      { id: 'south clock', site: 'south', transition: '171Yb', uptime: 1, tie: [], stability: { white: 1.5e-16 } },
    ]);
    expect(c.links).toEqual([]);
  });

  it('gives a file that reads back the same, and predicts', () => {
    const c = importLinks(LINKS, SITES, { title: 'T', target: '3 cm', offsets: { '87Sr': '0', '171Yb': '1(6)e-18' } });
    const { campaign } = readCampaign(writeCampaign(c));
    expect(campaign).toEqual(c);
    expect(campaign).toMatchObject({ title: 'T', targetM: 0.03, transitions: [{ id: '87Sr' }, { id: '171Yb' }] });
    const [link] = predict(campaign).links;
    // H = 99.4044 + 1.310 and 440.9345: what the cells say
    expectWithin(link!.dHNormal!.value, 440.9345 - 100.7144, 0.2);
  });

  it('takes tide, source and datum of a column from the options, the cell first', () => {
    const table = 'id,lat,lon,h,tide(h),C [gpu],datum\na,50,8,100.0(1),,14.03(3),north\nb,50,9,100,mean,15,\n';
    const c = importSites(table, {
      tides: { h: 'free', C: 'zero' },
      sources: { h: 'gnss' },
      datums: { north: '62636853.4(5) m²/s²' },
    });
    expect(c.sites[0]).toMatchObject({
      h: { tide: 'free', parts: [{ u: 0.1, source: 'gnss' }] },
      determinations: [{ kind: 'geopotential-number', datum: 'north', C: { value: 140.3, tide: 'zero' } }],
    });
    expectWithin(c.sites[0]!.h!.u, 0.1, 0);
    expect(c.sites[1]).toMatchObject({ h: { tide: 'mean' }, determinations: [{ datum: 'ihrs', C: { value: 150 } }] });
    expect(faults(table, { tides: { zeta: 'zero' } })).toEqual([['unknown-column', 'zeta', null, null]]);
  });

  it('reads every kind of determination', () => {
    const table =
      'site,latitude,longitude,N,h,W,normal height,orthometric height,H dynamic,levelled from,dH,line length / km,b,k\n' +
      'a,50,8,45,145,62636000,100,100.1,99.9,,,,,\nb,50,8.1,,,,,,,a,12.3,10,1.5 mm/√km,0.1 mm/km\n';
    const c = importSites(table);
    expect(c.sites[0]!.determinations.map((d) => d.kind)).toEqual([
      'gnss-geoid',
      'potential',
      'normal-height',
      'orthometric-height',
      'dynamic-height',
    ]);
    expect(c.sites[1]!.determinations[0]).toMatchObject({
      kind: 'levelled-from',
      site: 'a',
      lengthM: 10_000,
      k: { value: 1e-7 },
    });
  });

  it('an uncertainty in the head holds where the cell states none', () => {
    const table = 'id,lat,lon,h / m ± 8 mm\na,50,8,100\nb,50,9,100.00(3)\nc,50,9.5,99 cm\n';
    const [a, b, c] = importSites(table).sites.map(({ h }) => h!);
    expectWithin(a!.u, 0.008, 1e-18);
    expectWithin(b!.u, 0.03, 1e-17);
    expectWithin(c!.value, 0.99, 1e-16);
    expectWithin(c!.u, 0.008, 1e-18);
  });

  it('makes an id of a name where there is no id', () => {
    const ids = (t: string) => importSites(t).sites.map(({ id }) => id);
    expect(ids('name,lat,lon\n"Sankt Ölberg (2)",50,8\n')).toEqual(['sankt-ölberg-2']);
    expect(ids('lat,lon\n50,8\n')).toEqual(['site-1']);
  });
});

describe('faults by line and column', () => {
  it('explains a decimal comma', () => {
    const table = 'id;lat;lon;h / m\na;50.1;8,25;143,2164\n';
    expect(faults(table)).toEqual([
      ['decimal-comma', 'sites.a.lon', 2, 9],
      ['decimal-comma', 'sites.a.h.value', 2, 16],
    ]);
    expect(expected(table)).toContain('write 8.25');
    const split = 'id,lat,lon\na,50,1,8,25\n';
    expect(faults(split)).toEqual([['field-count', '', 2, 6]]);
    expect(expected(split)).toContain('decimal comma');
  });

  it.each([
    ['an unknown column', 'id,lat,lon,hight\na,50,8,1\n', ['unknown-column', 'head', 1, 12]],
    ['a height of no kind', 'id,lat,lon,H\na,50,8,1\n', ['unknown-column', 'head', 1, 12]],
    ['a column twice', 'id,lat,lon,lat\na,50,8,1\n', ['duplicate-column', 'head', 1, 12]],
    ['an uncertainty of nothing', 'id,lat,lon,u(h)\na,50,8,1\n', ['column-alone', 'head', 1, 12]],
    ['a row too short', 'id,lat,lon\na,50\n', ['field-count', '', 2, 3]],
    ['an open quote', 'id,lat,lon\n"a,50,8\n', ['open-quote', '', 2, 1]],
    ['a head alone', 'id,lat,lon\n', ['empty-table', '', 1, 1]],
    ['nothing', '', ['empty-table', '', 1, 1]],
    ['a latitude out of range', 'id,lat,lon\na,95,8\n', ['out-of-range', 'sites.a.lat', 2, 3]],
    ['a unit of another kind', 'id,lat,lon,h / mGal\na,50,8,1\n', ['wrong-unit', 'sites.a.h.unit', 1, 12]],
    ['a broken number', 'id,lat,lon,h\na,50,8,1x3\n', ['unknown-unit', 'sites.a.h', 2, 9]],
    ['a site without longitude', 'id,lat,lon\na,50,\n', ['missing-key', 'sites.a.lon', 2, 1]],
    ['an id twice', 'id,lat,lon\na,50,8\na,51,8\n', ['duplicate-id', 'sites.1.id', 3, 1]],
    [
      'a transition nobody knows',
      'id,lat,lon,transition\na,50,8,88Sr9\n',
      ['unknown-id', 'clocks.a clock.transition', 2, 8],
    ],
    ['a clock without a transition', 'id,lat,lon,transition,white\na,50,8,,1e-16\n', ['missing-column', 'white', 2, 9]],
    ['ζ without h', 'id,lat,lon,zeta\na,50,8,45\n', ['missing-key', 'sites.a.determinations.0.h', 2, 8]],
  ])('%s', (_, table, fault) => {
    expect(faults(table)).toEqual([fault]);
  });

  it('passes over columns that are named', () => {
    expect(importSites('id,lat,lon,surveyor\na,50,8,x\n', { ignored: ['surveyor'] }).sites).toHaveLength(1);
  });

  it('of the table of links stand in that table', () => {
    const at = (links: string) =>
      faultsOf(() => importLinks(links, SITES)).map((f) => [f.code, f.path, f.line, f.column]);
    expect(at('id,from,to\nns,north,nowhere\n')).toEqual([['unknown-id', 'links.ns.to', 2, 10]]);
    expect(at('id,from,to,segments\nns,north,south,two\n')).toEqual([['not-a-number', 'segments', 2, 16]]);
  });
});
