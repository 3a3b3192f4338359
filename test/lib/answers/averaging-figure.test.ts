import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { averagingFigure } from '../../../lib/answers/averaging-figure.js';
import { plan } from '../../../lib/answers/plan.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { expectWithin } from '../../expect-within.js';

const text = readFileSync(new URL('../../data/examples/three-sites.json', import.meta.url), 'utf8');
const { campaign } = readCampaign(text);

describe('averagingFigure', () => {
  const figure = averagingFigure(campaign);
  const hr = figure.links[0]!;

  it('has the curves of the plan between its points', () => {
    const [one] = plan(campaign).links;
    const at = (T: number) => one!.curve.find((p) => p.T === T)!;
    // 30 points a decade from 864 s: the neighbours of 1e5 s hold it between them
    const next = hr.points.findIndex((p) => p.T > 1e5);
    expect(hr.points[next]!.uH).toBeLessThan(at(1e5).uH);
    expect(hr.points[next - 1]!.uH).toBeGreaterThan(at(1e5).uH);
    expectWithin(hr.points[0]!.T, 864, 1e-9);
    expectWithin(hr.points.at(-1)!.T, 8.64e6, 1e-5);
    expectWithin(at(1e5).uY / at(1e5).uH, hr.yPerM, 1e-12 * hr.yPerM);
  });

  it('says where the largest part changes: there both are equal', () => {
    const limits = hr.limits();
    expect(limits.map(({ part }) => part)).toEqual([
      { kind: 'white', of: 'r1' },
      { kind: 'systematic', of: 'r1' },
    ]);
    // white 4e-16 at 0.4704 of the time against 1.8e-18: the source that both clocks share cancels
    expectWithin(limits[0]!.toS, (4e-16 / 1.8e-18) ** 2 / 0.4704, 150);
    expect(limits[0]!.toS).toBe(limits[1]!.fromS);
    expect([limits[0]!.fromS, limits[1]!.toS]).toEqual([figure.fromS, figure.toS]);
  });

  it('reaches as far as window and targets do', () => {
    expect(figure.toS).toBe(100 * 86_400);
    const long = { ...campaign, window: { startMs: 0, endMs: 1000 * 86_400_000 * 0.3 } };
    expect(averagingFigure(long).toS).toBe(1000 * 86_400);
  });

  it('has nothing to draw for a link that never runs', () => {
    const dead = { ...campaign, links: campaign.links.map((l) => ({ ...l, uptime: 0 })) };
    const [link] = averagingFigure(dead).links;
    expect([link!.points, link!.limits()]).toEqual([[], []]);
  });
});
