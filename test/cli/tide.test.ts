import { describe, expect, it } from 'vitest';
import { example, plumbtick } from './run-cli.js';

interface Tide {
  format: string;
  series: { times: string[]; links: { id: string; y: number[] }[] };
  links: { id: string; min: number; max: number; mean: number; rms: number; omitted: number }[];
  warnings: object[];
}

describe('plumbtick tide', () => {
  const { status, stdout, stderr } = plumbtick(['tide', example('three-sites.json'), '--step', '1h', '--json']);
  const tide = JSON.parse(stdout) as Tide;

  it('prints series and statistics as one object', () => {
    expect([status, stderr, tide.format]).toEqual([0, '', 'plumbtick-tide/1']);
    expect(tide.series.times).toHaveLength(20 * 24 + 1);
    expect([tide.series.times[0], tide.series.times.at(-1)]).toEqual(['2027-06-01T00:00:00Z', '2027-06-21T00:00:00Z']);
    for (const [i, link] of tide.links.entries()) {
      const { id, y } = tide.series.links[i]!;
      expect(id).toBe(link.id);
      expect(y).toHaveLength(tide.series.times.length);
      expect([link.min, link.max]).toEqual([Math.min(...y), Math.max(...y)]);
      expect(Math.abs(link.mean - y.reduce((s, v) => s + v, 0) / y.length)).toBeLessThan(1e-30);
      expect(Math.abs(link.rms - Math.sqrt(y.reduce((s, v) => s + v * v, 0) / y.length))).toBeLessThan(1e-30);
      expect(link.omitted).toBeGreaterThan(1e-18);
    }
  });

  it('closes round a triangle of links at every instant', () => {
    const [hr, rp, ph] = tide.series.links;
    for (const [i, y] of hr!.y.entries()) expect(Math.abs(y + rp!.y[i]! + ph!.y[i]!)).toBeLessThan(1e-32);
    expect(Math.max(...hr!.y)).toBeGreaterThan(1e-19);
  });

  it('says in words whether the average needs correcting, and gives the series as CSV', () => {
    const text = plumbtick(['tide', example('three-sites.json')]);
    expect(text.status).toBe(0);
    expect(text.stdout.replace(/\s+/g, ' ')).toMatch(/Link rp: the tide moves y between .* does not need correcting\./);
    const csv = plumbtick(['tide', example('three-sites.json'), '--step', '12h', '--csv', '--table', 'series']);
    expect(csv.stdout.trim().split(/\r?\n/)).toHaveLength(41 + 1);
  });

  it('refuses a step that is none (2) and a campaign without a window (1)', () => {
    for (const step of ['0s', '-5min', '3 m', 'often'])
      expect(plumbtick(['tide', example('three-sites.json'), '--step', step])).toMatchObject({ status: 2 });
    const windowless = plumbtick(
      ['tide', '-', '--json'],
      JSON.stringify({ format: 'plumbtick-campaign/1', sites: [] }),
    );
    expect(windowless.status).toBe(1);
    expect(JSON.parse(windowless.stdout)).toMatchObject({ faults: [{ code: 'missing', path: 'window' }] });
  });
});
