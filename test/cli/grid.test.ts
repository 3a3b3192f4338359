import { copyFileSync, mkdirSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { gfcPieces, syntheticModel } from '../data/gravity-model/synthetic-model.mjs';
import { file, folder, plumbtick } from './run-cli.js';

const data = (name: string) => fileURLToPath(new URL(`../data/${name}`, import.meta.url));

describe('plumbtick grid', () => {
  it('prints what was understood, the nodes and the value as one object', () => {
    const { status, stdout } = plumbtick(['grid', data('isg/example-1.isg'), '--at', '40.75,120.5', '--json']);
    expect(status).toBe(0);
    const answer = JSON.parse(stdout) as Record<string, unknown> & { nodes: object[]; warnings: { code: string }[] };
    expect(answer).toMatchObject({
      format: 'isg-2.0',
      registration: 'edges',
      surface: 'geoid',
      tide: 'mean',
      heightDatum: null,
      nodes: [
        { lat: 40.666666666667, lon: 120.333333333333, value: 42.2345 },
        { lat: 40.666666666667, lon: 120.666666666667, value: 43.3333 },
        { lat: 41, lon: 120.333333333333, value: 31.2222 },
        { lat: 41, lon: 120.666666666667, value: 32.3456 },
      ],
    });
    // a quarter of a cell up, half a cell over: by hand
    const byHand = 0.75 * ((42.2345 + 43.3333) / 2) + 0.25 * ((31.2222 + 32.3456) / 2);
    expect(answer['value']).toBeCloseTo(byHand, 9);
    expect(answer.warnings.map((w) => w.code)).toEqual(['zero-level-unknown']);
  });

  it('reads GTX and GeoTIFF, by both methods, and places in degrees, minutes and seconds', () => {
    const at = `52°17'45.96"N, 10°27'35.28"E`;
    const value = (words: string[]) => (JSON.parse(plumbtick([...words, '--json']).stdout) as { value: number }).value;
    // PROJ's cct in the whole grid: test/data/geotiff/reference.json
    expect(Math.abs(value(['grid', data('geotiff/egm96-window.gtx'), '--at', at]) - 43.153475216)).toBeLessThan(2e-5);
    const cubic = value([
      'grid',
      data('geotiff/deflate-predictor3-tiles.tif'),
      '--at',
      '52.2961,10.4598',
      '--method',
      'bicubic',
    ]);
    expect(Math.abs(cubic - 43.153475216)).toBeGreaterThan(1e-3);
    expect(Math.abs(cubic - 43.1475)).toBeLessThan(1e-2);
  });

  it('says in words what it read and what the file leaves open', () => {
    const { status, stdout } = plumbtick(['grid', data('geotiff/egm96-window.gtx'), '--at', '52.2961,10.4598']);
    expect(status).toBe(0);
    const words = stdout.replace(/\s+/g, ' ');
    expect(words).toMatch(/43\.1535 m, by bilinear interpolation\. Bicubic interpolation gives 43\.\d+ m\./);
    for (const code of ['surface-unknown', 'tide-unknown', 'zero-level-unknown']) expect(words).toContain(code);
    expect(words).toContain('17 × 25, from 50, 8 to 54, 14, every 0.25, 0.25°');
  });

  it('refuses a place outside, a node without a value, and a file that is no grid (1)', () => {
    const fault = (words: string[]) => {
      const { status, stdout } = plumbtick(['grid', ...words, '--json']);
      expect(status).toBe(1);
      return (
        JSON.parse(stdout) as { faults: { code: string; found: string; expected: string; line: number | null }[] }
      ).faults[0]!;
    };
    expect(fault([data('isg/example-1.isg'), '--at', '41.1,120.5'])).toMatchObject({ code: 'outside-grid' });
    expect(fault([data('isg/example-1.isg'), '--at', '40.2,121.5'])).toMatchObject({ code: 'nodata' });
    expect(fault([data('isg/example-3.isg'), '--at', '40.2,121.5'])).toMatchObject({ code: 'header-value', line: 23 });
    expect(fault([file('not-a-grid.isg', '{"sites": []}'), '--at', '40,120'])).toMatchObject({ code: 'not-isg' });
    expect(fault([file('empty.gtx', ''), '--at', '40,120'])).toMatchObject({
      code: 'not-a-grid',
      found: 'an empty file',
    });
    expect(fault(['nowhere.tif', '--at', '40,120'])).toMatchObject({ code: 'no-such-file' });
    expect(fault([folder, '--at', '40,120'])).toMatchObject({ code: 'not-a-file' });
    const { stderr } = plumbtick(['grid', data('isg/example-1.isg'), '--at', '41.1,120.5']);
    expect(stderr.replace(/\s+/g, ' ')).toContain('beyond them nothing is extrapolated');
  });

  it('refuses a call without a place, or with one that is none (2)', () => {
    const grid = data('isg/example-1.isg');
    for (const words of [
      [grid],
      [grid, '--at', '40'],
      [grid, '--at', '40,5,120,2'],
      [grid, '--at', '95,10'],
      [grid, '--at', 'north,east'],
      [grid, '--at', '40.5,120.5', '--method', 'spline'],
      ['-', '--at', '40.5,120.5'],
      ['--at', '40.5,120.5'],
    ])
      expect(plumbtick(['grid', ...words])).toMatchObject({ status: 2, stdout: '' });
  });
});

describe('files beside a campaign', () => {
  const gfc = [...gfcPieces(syntheticModel(36), { sigmas: true })].join('');
  const site = (id: string, determination: object) => ({
    id,
    lat: 52.2961,
    lon: id === 'b' ? 10.47 : 10.4598,
    h: { value: '143.216(8) m', tide: 'free' },
    g: '9.8125(1) m/s²',
    determinations: [determination],
  });
  const campaign = (a: object, b: object) => ({
    format: 'plumbtick-campaign/1',
    sites: [site('a', a), site('b', b)],
    clocks: [
      { id: 'x', site: 'a', transition: '87Sr' },
      { id: 'y', site: 'b', transition: '87Sr' },
    ],
    links: [{ id: 'xy', from: 'x', to: 'y' }],
  });
  interface Prediction {
    sites: { W: { value: number; u: number } }[];
    links: { dW: { value: number; u: number }; monteCarlo?: { u: number; validated: boolean } }[];
    warnings: { code: string; path: string }[];
  }

  it('reads a grid and a gravity model from the folder of the campaign, with trials of the same errors', () => {
    mkdirSync(path.join(folder, 'deep'), { recursive: true });
    file('deep/field.gfc', gfc);
    copyFileSync(data('geotiff/deflate-predictor3-tiles.tif'), path.join(folder, 'deep', 'geoid.tif'));
    const N = { grid: 'geoid.tif', u: '0.3 m', tide: 'free', method: 'bicubic' };
    const geoid = { kind: 'gnss-geoid', N, datum: 'ihrs' };
    const model = { kind: 'gravity-model', model: { file: 'field.gfc', maxDegree: 30 } };
    file('deep/mixed.json', campaign(geoid, model));
    file('deep/models.json', campaign(model, model));
    const predict = (name: string) => {
      const run = plumbtick(['predict', `deep/${name}`, '--json', '--monte-carlo', '20000', '--seed', '1']);
      expect(run.stderr).toBe('');
      return JSON.parse(run.stdout) as Prediction;
    };
    const mixed = predict('mixed.json');
    // W = W0 − γ̄·(h − N) with N = 43.1485 m, bicubic
    expect(Math.abs(mixed.sites[0]!.W.value - (62_636_853.4 - 9.8126 * (143.216 - 43.1485)))).toBeLessThan(1.5);
    const models = predict('models.json');
    // what the model leaves out, 64 m/30, is nearly the same at both ends of 700 m
    expect(models.sites[0]!.W.u).toBeGreaterThan(20);
    expect(models.links[0]!.dW.u).toBeLessThan(1);
    for (const { links } of [mixed, models]) expect(links[0]!.monteCarlo).toMatchObject({ validated: true });
  });

  it('keeps the nodes of a grid in a campaign that then stands alone', () => {
    copyFileSync(data('geotiff/egm96-window.gtx'), path.join(folder, 'window.gtx'));
    const { stdout } = plumbtick(['grid', 'window.gtx', '--at', '52.2961,10.4598', '--json']);
    const { value, keep } = JSON.parse(stdout) as { value: number; keep: object };
    const withNodes = {
      kind: 'gnss-geoid',
      datum: 'ihrs',
      N: { grid: 'gone.gtx', u: '0.3 m', tide: 'free', nodes: keep },
    };
    const withValue = { kind: 'gnss-geoid', datum: 'ihrs', N: { value, u: '0.3 m', tide: 'free' } };
    const predict = (determination: object) =>
      JSON.parse(
        plumbtick(
          ['predict', '-', '--json'],
          JSON.stringify({ format: 'plumbtick-campaign/1', sites: [site('a', determination)] }),
        ).stdout,
      ) as Prediction;
    expect(predict(withNodes).sites).toEqual(predict(withValue).sites);
  });

  it('refuses a file that is not there or not good, at the place that names it', () => {
    const check = (determination: object) => {
      const { status, stdout } = plumbtick([
        'check',
        file('refused.json', campaign(determination, determination)),
        '--json',
      ]);
      expect(status).toBe(1);
      return (JSON.parse(stdout) as { faults: { code: string; path: string; found: string; line: number }[] }).faults;
    };
    const faults = check({ kind: 'gravity-model', model: 'gone.gfc' });
    expect(faults.map((f) => [f.code, f.path])).toEqual([
      ['file-not-at-hand', 'sites.a.determinations.0.model'],
      ['file-not-at-hand', 'sites.b.determinations.0.model'],
    ]);
    file('cut.gfc', gfc.slice(0, gfc.indexOf('gfc   30    0')));
    expect(check({ kind: 'gravity-model', model: 'cut.gfc' })[0]).toMatchObject({
      code: 'coefficients-missing',
      path: 'sites.a.determinations.0.model',
    });
    expect(check({ kind: 'gnss-quasigeoid', zeta: { grid: 'cut.gfc', u: 0.1 } })[0]).toMatchObject({ code: 'not-isg' });
  });
});
