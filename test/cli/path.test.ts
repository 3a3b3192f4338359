import { describe, expect, it } from 'vitest';
import { file, plumbtick } from './run-cli.js';

const campaign = (route: object) => ({
  format: 'plumbtick-campaign/1',
  window: { start: '2027-05-03T00:00:00Z', end: '2027-05-05T00:00:00Z' },
  pole: [{ x: 0.2, y: 0.1 }],
  sites: [
    { id: 'a', position: { crs: 'EPSG:25832', x: 604_000, y: 5_795_000 }, h: { value: 143.2, tide: 'free' } },
    {
      id: 'b',
      lat: 48.8,
      lon: 2.3,
      h: { value: 80, tide: 'free' },
      oceanLoading: [{ constituent: 'S2', amplitude: 0.5, phase: 0 }],
    },
  ],
  clocks: [
    { id: 'ca', site: 'a', transition: '87Sr' },
    { id: 'cb', site: 'b', transition: '87Sr' },
  ],
  links: [{ id: 'ab', from: 'ca', to: 'cb', kind: 'fibre', ...route }],
});

describe('plumbtick path', () => {
  it('gives delays in seconds as one object, and in ns for people', () => {
    const name = file('path.json', campaign({}));
    const json = plumbtick(['path', name, '--json']);
    expect([json.status, json.stderr]).toEqual([0, '']);
    const answer = JSON.parse(json.stdout);
    expect(answer.format).toBe('plumbtick-path/1');
    // westwards: the signal comes earlier, by nanoseconds
    expect(answer.links[0].sagnac.oneWay).toBeLessThan(-1e-9);
    expect(answer.links[0].sagnac.oneWay).toBeGreaterThan(-3e-9);
    const text = plumbtick(['path', name]);
    expect(text.stdout).toMatch(/delayed by rotation by −\d\.\d{3} ns/);
    expect(plumbtick(['path', name, '--csv', '--table', 'signals']).stdout).toMatch(/^link,way/);
  });

  it('refuses an impossible way at its line', () => {
    const route = { route: { departure: '2027-05-03T00:00:00Z', arrival: '2027-05-03T00:00:10Z' } };
    const { status, stdout } = plumbtick(['path', file('fast.json', campaign(route)), '--json']);
    expect(status).toBe(1);
    expect(JSON.parse(stdout).faults).toEqual([
      expect.objectContaining({ code: 'impossible-way', path: 'links.ab.route', line: 1 }),
    ]);
  });
});

describe('plumbtick tide with ocean loading and pole', () => {
  it('adds what the file states: half a m²/s² of S2 and a pole 0.4″ off', () => {
    const series = (content: object) =>
      JSON.parse(plumbtick(['tide', file('tide.json', content), '--step', '1h', '--json']).stdout).series.links[0]
        .y as number[];
    const { pole, ...poleless } = campaign({});
    const loaded = series(poleless);
    const bare = series({ ...poleless, sites: poleless.sites.map((s) => ({ ...s, oceanLoading: [] })) });
    // S2 with phase 0 is highest at 0 h UT: the load at b is taken off y of a → b
    const change = loaded.map((y, i) => (y - bare[i]!) * 299_792_458 ** 2);
    expect(Math.abs(change[0]! + 0.5)).toBeLessThan(1e-6);
    expect(Math.abs(change[6]! - 0.5)).toBeLessThan(1e-6);
    const poled = series(campaign({}));
    const shift = poled.map((y, i) => (y - loaded[i]!) * 299_792_458 ** 2);
    expect(pole).toHaveLength(1);
    // nearly constant, a fraction of 0.11·|sin 2φ| between two sites of like latitude
    expect(Math.abs(shift[0]!)).toBeGreaterThan(1e-3);
    expect(Math.max(...shift) - Math.min(...shift)).toBeLessThan(1e-4);
  });
});
