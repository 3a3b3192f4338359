import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { evaluate } from '../../../lib/answers/evaluate.js';
import { seriesView } from '../../../lib/answers/series-view.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { readFrequencySeries } from '../../../lib/clocks/series/index.js';
import { expectWithin } from '../../expect-within.js';
import { whiteFm } from '../clocks/simulated-noise.js';

const { campaign } = readCampaign(
  readFileSync(new URL('../../../sites/two-institutes-and-a-summit.json', import.meta.url), 'utf8'),
);
const noise = [...whiteFm(200, 1e-17, 7)];
const text = noise.map((n, i) => `${(61655 + i / 144).toFixed(8)} ${(3.6403e-14 + n).toExponential(12)}`).join('\n');
const data = readFrequencySeries(text);
const read = (file: string) =>
  readCampaign(
    JSON.stringify({
      ...JSON.parse(readFileSync(new URL('../../../sites/two-institutes-and-a-summit.json', import.meta.url), 'utf8')),
      measurements: [{ id: 'mo-1', link: 'mo', series: file }],
    }),
    { files: { grid: () => null, gravityModel: () => null, series: () => data } },
  ).campaign;

const VALID = { startMs: Date.UTC(2027, 8, 7, 6), endMs: Date.UTC(2027, 8, 8) };

describe('a series beside its campaign', () => {
  it('is compared as evaluate compares a campaign that names the file', () => {
    const view = seriesView(data, 'run.txt', { campaign, measurement: 'mo-1' });
    expect(view.evaluation).toEqual(evaluate(read('run.txt')).links[0]);
    expectWithin(view.answer.mean.value, view.evaluation!.measured.value, 1e-24);
    expect(view.warnings.map((w) => w.code)).toContain('series-reduced');
  });

  it('has a running mean that ends in the mean, and passes the mean of the first half', () => {
    const view = seriesView(data, 'run.txt', null);
    const last = view.running.at(-1)!;
    expect(last.mean).toBe(view.answer.mean.value);
    expect(last.u).toBe(view.answer.mean.u);
    for (const { endS, mean } of view.running) {
      const count = Math.round(endS / 600);
      const byHand = noise.slice(0, count).reduce((s, v) => s + v, 0) / count + 3.6403e-14;
      expectWithin(mean, byHand, 1e-24);
    }
    expect(view.running.length).toBeGreaterThan(15);
    expect(view.outside).toEqual([]);
  });

  it('keeps apart what lies outside the validity', () => {
    const clocks = campaign.clocks.map((c) => ({
      ...c,
      available: [VALID],
    }));
    const view = seriesView(data, 'run.txt', { campaign: { ...campaign, clocks }, measurement: 'mo-1' });
    const start = (i: number) => data.originMs! + 1000 * data.startS[i]!;
    const inside = noise.filter((_, i) => start(i) >= VALID.startMs - 1 && start(i) + 6e5 <= VALID.endMs + 1);
    expect(inside.length).toBeGreaterThan(10);
    expect(view.used.y.length).toBe(inside.length);
    expect(view.outside.length).toBe(200 - inside.length);
  });

  it('refuses a measurement that the campaign does not have', () => {
    expect(() => seriesView(data, 'run.txt', { campaign, measurement: 'x' })).toThrow(CampaignError);
    expect(() => seriesView(data, 'run.txt', { campaign, measurement: 'x' })).toThrow(/mo-1, ok-1/);
  });
});
