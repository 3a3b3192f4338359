import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { predict } from '../../../lib/answers/predict.js';
import { CampaignError, type Fault } from '../../../lib/campaign/fault.js';
import { gatherCampaignFiles } from '../../../lib/campaign/gather-files.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { writeCampaign } from '../../../lib/campaign/write.js';
import { bytesSource } from '../../../lib/earth/file-bytes/byte-source.js';
import {
  commissionCovariance,
  GravitySynthesis,
  gravityPotential,
  parseIcgem,
} from '../../../lib/earth/gravity-model/index.js';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { normalGravity } from '../../../lib/earth/normal-field.js';
import { buildModel } from '../../../lib/model/build-model.js';
import { degToRad } from '../../../lib/quantity/radians.js';
import { gfcPieces, syntheticModel } from '../../data/gravity-model/synthetic-model.mjs';
import { isg } from '../earth/geoid-grid/grid-fixtures.js';

type Json = Record<string, unknown>;

const campaign = (sites: readonly Json[], more: Json = {}): string =>
  JSON.stringify({ format: 'plumbtick-campaign/1', tide: 'zero', sites, ...more }, null, 1);

/** Reads a campaign with files that are in memory. */
async function read(text: string, files: Readonly<Record<string, Uint8Array>>) {
  const opened: string[] = [];
  const gathered = await gatherCampaignFiles(text, async (name, use) => {
    opened.push(name);
    const bytes = files[name];
    return bytes ? use(bytesSource(name, bytes)) : null;
  });
  return { ...readCampaign(text, { files: gathered }), opened };
}

async function faultsOf(run: () => unknown): Promise<readonly Fault[]> {
  try {
    await run();
  } catch (error) {
    if (error instanceof CampaignError) return error.faults;
    throw error;
  }
  throw new Error('nothing was refused');
}

const gnss = (grid: Json, lat = 50.75, lon = 10.25): Json => ({
  id: 'cellar',
  lat,
  lon,
  h: { value: '143.216(8) m', tide: 'zero' },
  g: 9.81,
  determinations: [{ kind: 'gnss-quasigeoid', datum: 'ihrs', zeta: grid }],
});

describe('a geoid grid in a campaign', () => {
  // the grid of 3 × 4 nodes of grid-fixtures: half way between 0, 1 and 10, 11
  const files = { 'zeta.isg': isg() };

  it('gives the value at the site, with the uncertainty stated and the tide system of the file', async () => {
    const text = campaign([gnss({ grid: 'zeta.isg', u: '19 mm', source: 'quasigeoid' })], {
      sources: [{ id: 'quasigeoid' }],
    });
    const { campaign: c, warnings } = await read(text, files);
    const [d] = c.sites[0]!.determinations;
    if (d?.kind !== 'gnss-quasigeoid') throw new Error('kind');
    expect(d.zeta).toMatchObject({ value: 5.5, u: 0.019, parts: [{ u: 0.019, source: 'quasigeoid' }], tide: 'zero' });
    expect(warnings).toEqual([]);
    // the same number written into the file gives the same answer
    const plain = campaign([gnss({ value: 5.5, u: '19 mm', source: 'quasigeoid', tide: 'zero' })], {
      sources: [{ id: 'quasigeoid' }],
    });
    expect(predict(c).sites).toEqual(predict(readCampaign(plain).campaign).sites);
  });

  it('keeps its nodes in the written campaign, which then needs no file', async () => {
    for (const method of ['bilinear', 'bicubic']) {
      const at = method === 'bicubic' ? [50.5, 10.75] : [50.75, 10.25];
      const text = campaign([gnss({ grid: 'zeta.isg', u: 0.019, method }, at[0], at[1])]);
      const { campaign: c } = await read(text, files);
      const written = writeCampaign(c);
      expect(written).toContain('"nodes"');
      const again = readCampaign(written);
      expect(again.campaign).toEqual(c);
      expect(writeCampaign(again.campaign)).toBe(written);
    }
  });

  it('opens each file once and takes names as they stand', async () => {
    const sites = [
      gnss({ grid: 'a/zeta.isg', u: 0.02 }),
      { ...gnss({ grid: 'a/zeta.isg', u: 0.02 }, 50.2, 11.3), id: 'far' },
    ];
    const { campaign: c, opened } = await read(campaign(sites), { 'a/zeta.isg': isg() });
    expect(opened).toEqual(['a/zeta.isg']);
    const values = c.sites.map((s) =>
      s.determinations[0]!.kind === 'gnss-quasigeoid' ? s.determinations[0]!.zeta.value : null,
    );
    expect(values[0]).toBe(5.5);
    // 0.4 of a cell up from 20, 0.6 of a cell over from 2: 22.6 − 4
    expect(values[1]).toBeCloseTo(18.6, 10);
  });

  it('warns of what the file leaves open', async () => {
    const silent = isg({ 'data type': '---', 'tide system': '---', 'height datum': 'SOMEWHERE' });
    const site = gnss({ grid: 'zeta.isg' });
    (site['determinations'] as Json[])[0]!['datum'] = undefined;
    const { warnings } = await read(campaign([site]), { 'zeta.isg': silent });
    expect(warnings.map((w) => w.code)).toEqual(['surface-unknown', 'zero-level-default', 'grid-exact']);
    expect(warnings[1]!.message).toContain('SOMEWHERE');
  });

  it.each<readonly [string, Json, string, string, RegExp]>([
    ['a file that is not at hand', { grid: 'other.isg', u: 0.02 }, 'file-not-at-hand', 'zeta.grid', /other\.isg/],
    [
      'a tide label that contradicts the file',
      { grid: 'zeta.isg', u: 0.02, tide: 'mean' },
      'tide-system-differs',
      'zeta.tide',
      /mean/,
    ],
    ['a value beside it', { grid: 'zeta.isg', value: 5, u: 0.02 }, 'exclusive-keys', 'zeta.grid', /"grid" and "value"/],
    ['a method without a grid', { value: 5, method: 'bicubic' }, 'missing-key', 'zeta.grid', /nothing/],
    ['a method that is none', { grid: 'zeta.isg', u: 0.02, method: 'spline' }, 'not-one-of', 'zeta.method', /spline/],
    [
      'nodes that do not fit',
      { grid: 'zeta.isg', u: 0.02, nodes: { lat: [50, 51], lon: [10, 11], values: [[1, 2]] } },
      'grid-nodes',
      'zeta.nodes',
      /lat/,
    ],
    [
      'nodes unevenly spaced',
      {
        grid: 'zeta.isg',
        u: 0.02,
        nodes: {
          lat: [50, 51, 51.5],
          lon: [10, 11],
          values: [
            [1, 2],
            [1, 2],
            [1, 2],
          ],
        },
      },
      'grid-nodes',
      'zeta.nodes',
      /lat/,
    ],
    [
      'nodes elsewhere',
      {
        grid: 'zeta.isg',
        u: 0.02,
        nodes: {
          lat: [20, 21],
          lon: [10, 11],
          values: [
            [1, 2],
            [1, 2],
          ],
        },
      },
      'outside-grid',
      'zeta.grid',
      /50\.75/,
    ],
    ['an uncertainty of the wrong kind', { grid: 'zeta.isg', u: '19 s' }, 'wrong-unit', 'zeta.u', /19 s/],
  ])('refuses %s', async (_, grid, code, path, found) => {
    const [fault] = await faultsOf(() => read(campaign([gnss(grid)]), files));
    expect(fault).toMatchObject({ code, path: `sites.cellar.determinations.0.${path}` });
    expect(fault!.found).toMatch(found);
    expect(fault!.line).toBeGreaterThan(1);
  });

  it('refuses a geoid where a quasigeoid is wanted, a place outside, a node without a value, a damaged file', async () => {
    const fault = async (bytes: Uint8Array, lat?: number) =>
      (await faultsOf(() => read(campaign([gnss({ grid: 'z', u: 0.02 }, lat)]), { z: bytes })))[0]!;
    expect(await fault(isg({ 'data type': 'geoid' }))).toMatchObject({ code: 'wrong-surface', found: 'z, a geoid' });
    expect(await fault(isg(), 52)).toMatchObject({ code: 'outside-grid' });
    expect(await fault(isg({}, ['0 1 2 3', '10 -9999.0000 12 13', '20 21 22 23']))).toMatchObject({ code: 'nodata' });
    expect((await fault(isg({}, ['0 1 2 3']))).found).toMatch(/^in z \(line \d+\): 4 values/);
    // a page without files
    expect((await faultsOf(() => readCampaign(campaign([gnss({ grid: 'z', u: 0.02 })]))))[0]!.expected).toContain(
      '"nodes"',
    );
  });
});

describe('a gravity model in a campaign', () => {
  const model = syntheticModel(36);
  const gfc = (options: { sigmas?: boolean; tide?: string } = {}) =>
    new TextEncoder().encode([...gfcPieces(model, options)].join(''));
  const files = { 'field.gfc': gfc({ sigmas: true }), 'silent.gfc': gfc({ tide: 'unknown' }) };
  const site = (
    id: string,
    lat: number,
    lon: number,
    more: Json = {},
    h: unknown = { value: '100.00(2) m', tide: 'zero' },
  ): Json => ({
    id,
    lat,
    lon,
    h,
    g: 9.81,
    determinations: [{ kind: 'gravity-model', model: 'field.gfc', ...more }],
  });
  const w = (degree: number, lat: number, lon: number, heightM: number, tide: 'zero' | 'mean' | 'free' = 'zero') =>
    gravityPotential(
      new GravitySynthesis(parseIcgem(files['field.gfc']), degree),
      { latitudeRad: degToRad(lat), longitudeRad: degToRad(lon), heightM },
      tide,
    );

  it('gives W at the marker in the campaign’s tide system', async () => {
    const { campaign: c, warnings } = await read(campaign([site('a', 52.3, 10.5)]), files);
    const prediction = predict(c);
    expect(prediction.sites[0]!.W!.value).toBeCloseTo(w(36, 52.3, 10.5, 100).potentialM2s2, 6);
    expect(warnings).toEqual([]);
    // h as found by GNSS, tide-free crust, is brought to the zero crust before the sum: −0.1206·P₂ m (IERS 2010, 7.14a)
    const free = predict(
      (await read(campaign([site('a', 52.3, 10.5, {}, { value: 100, tide: 'free' })]), files)).campaign,
    );
    const sin2 = (0.9933056 * Math.tan(degToRad(52.3))) ** 2 / (1 + (0.9933056 * Math.tan(degToRad(52.3))) ** 2);
    const crust = -0.1206 * ((3 * sin2 - 1) / 2);
    expect(free.sites[0]!.W!.value - prediction.sites[0]!.W!.value).toBeCloseTo(-9.8 * crust, 2);
  });

  it('has three inputs: h, the coefficients and what lies beyond the last degree', async () => {
    const text = campaign([site('a', 52.3, 10.5), site('b', 52.29, 10.51), site('c', -33, 151)]);
    const { campaign: c } = await read(text, files);
    const { inputs, covariance, determinations } = buildModel(c);
    const index = (path: string) => inputs.findIndex((x) => x.path === path);
    const places = [
      [52.3, 10.5],
      [52.29, 10.51],
      [-33, 151],
    ].map(([lat, lon]) => ({ latitudeRad: degToRad(lat!), longitudeRad: degToRad(lon!), heightM: 100 }));
    const expected = commissionCovariance(parseIcgem(files['field.gfc']), places);
    for (const [i, a] of ['a', 'b', 'c'].entries())
      for (const [j, b] of ['a', 'b', 'c'].entries()) {
        const found = covariance.between(
          index(`sites.${a}.determinations.0.commission`),
          index(`sites.${b}.determinations.0.commission`),
        );
        expect(Math.abs(found / expected[3 * i + j]! - 1)).toBeLessThan(1e-9);
      }
    // 64 m/36 as a geoid height, alike over 20 000 km/36
    const omission = inputs[index('sites.a.determinations.0.omission')]!;
    expect(omission.u).toBeCloseTo((64 / 36) * normalGravity(GRS80, degToRad(52.3), 0), 9);
    const near = covariance.between(
      index('sites.a.determinations.0.omission'),
      index('sites.b.determinations.0.omission'),
    );
    expect(near / omission.u ** 2).toBeCloseTo(Math.exp(-1.31 / 555.6), 4);
    // and the gradient to h is the model's own
    const [first] = determinations;
    const [perHeight] = first!.f.partials(first!.f.inputs.map((i) => inputs[i]!.value));
    const difference = (w(36, 52.3, 10.5, 150).potentialM2s2 - w(36, 52.3, 10.5, 50).potentialM2s2) / 100;
    expect(Math.abs(perHeight! - difference)).toBeLessThan(3e-5);
  });

  it('cancels what near sites share', async () => {
    const links = {
      clocks: [
        { id: 'x', site: 'a', transition: '87Sr' },
        { id: 'y', site: 'b', transition: '87Sr' },
      ],
      links: [{ id: 'xy', from: 'x', to: 'y' }],
    };
    const { campaign: c } = await read(campaign([site('a', 52.3, 10.5), site('b', 52.29, 10.51)], links), files);
    const { sites, links: predicted } = predict(c);
    expect(sites[0]!.W!.u).toBeGreaterThan(17);
    expect(predicted[0]!.dW!.u).toBeLessThan(2);
    const budget = predicted[0]!.budget.map((row) => row.input);
    expect(budget).toContain('sites.a.determinations.0.omission');
  });

  it('takes a degree, a tide system for a file that is silent, and uncertainties of the user’s own', async () => {
    const text = campaign([
      site('a', 52.3, 10.5, { model: { file: 'field.gfc', maxDegree: 20 } }),
      site('b', 48, 11, { model: { file: 'silent.gfc', tide: 'free' }, commission: '2 cm', omission: '30 mm' }),
    ]);
    const { campaign: c, warnings } = await read(text, files);
    const [a, b] = c.sites.map((s) => s.determinations[0]!);
    if (a?.kind !== 'gravity-model' || b?.kind !== 'gravity-model') throw new Error('kind');
    expect(a.atMarker).toMatchObject({ maxDegree: 20, potentialM2s2: w(20, 52.3, 10.5, 100).potentialM2s2 });
    expect(b.atMarker.commissionM2s2).toBeCloseTo(0.02 * normalGravity(GRS80, degToRad(48), 0), 9);
    expect(b.atMarker.omissionM2s2).toBeCloseTo(0.03 * normalGravity(GRS80, degToRad(48), 0), 9);
    expect(warnings.map((x) => x.code)).toEqual([]);
    expect(
      readCampaign(writeCampaign(c), {
        files: await gatherCampaignFiles(text, async (n, use) => use(bytesSource(n, files[n as keyof typeof files]))),
      }).campaign,
    ).toEqual(c);
  });

  it('warns where W would carry the omission alone', async () => {
    const { warnings } = await read(
      campaign([site('a', 48, 11, { model: { file: 'silent.gfc', tide: 'free' } })]),
      files,
    );
    expect(warnings.map((x) => x.code)).toEqual(['commission-missing']);
  });

  it('refuses a silent tide system, a contradiction, a degree beyond the file, a missing h, a file that is not there', async () => {
    const fault = async (s: Json) => (await faultsOf(() => read(campaign([s]), files)))[0]!;
    expect(await fault(site('a', 48, 11, { model: 'silent.gfc' }))).toMatchObject({
      code: 'tide-system-unknown',
      path: 'sites.a.determinations.0.model',
    });
    expect((await fault(site('a', 48, 11, { model: { file: 'field.gfc', tide: 'mean' } }))).code).toBe(
      'tide-system-differs',
    );
    expect((await fault(site('a', 48, 11, { model: { file: 'field.gfc', maxDegree: 40 } }))).expected).toContain(
      'at most 36',
    );
    const { h: _, ...withoutHeight } = site('a', 48, 11);
    expect((await fault(withoutHeight)).path).toBe('sites.a.determinations.0.h');
    expect(await fault(site('a', 48, 11, { model: 'nowhere.gfc' }))).toMatchObject({
      code: 'file-not-at-hand',
      found: 'nowhere.gfc',
    });
    expect((await fault(site('a', 48, 11, { model: { maxDegree: 40 } }))).path).toBe(
      'sites.a.determinations.0.model.file',
    );
  });

  it('reads the rows of EGM2008 as distributed, to the degree that is there', async () => {
    const egm = readFileSync(new URL('../../data/icgem/EGM2008-first-rows.gfc', import.meta.url));
    const text = campaign([site('a', 52.3, 10.5, { model: { file: 'egm', maxDegree: 4 } })]);
    const { campaign: c } = await read(text, { egm });
    // U at 100 m is 62 635 879.6 m²/s² there; EGM96 (15′ grid, PROJ: test/data/geotiff) has N = 43.2 m, and W = U + γ·N. Degree 4 gives
    // the geoid to 16 m by Kaula's rule
    expect(Math.abs(predict(c).sites[0]!.W!.value - (62_635_879.6 + 9.81 * 43.2))).toBeLessThan(16 * 9.81);
    const [fault] = await faultsOf(() => read(campaign([site('a', 52.3, 10.5, { model: 'egm' })]), { egm }));
    expect(fault!.expected).toContain('maxDegree 4 or less');
  });
});
