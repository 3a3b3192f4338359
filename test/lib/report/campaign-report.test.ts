import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { evaluationOf } from '../../../lib/answers/evaluate.js';
import { planOf } from '../../../lib/answers/plan.js';
import { predictionOf } from '../../../lib/answers/predict.js';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import { tide } from '../../../lib/answers/tide.js';
import type { Campaign } from '../../../lib/campaign/campaign.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { campaignReport } from '../../../lib/report/campaign-report.js';
import { CARE_NOTES } from '../../../lib/report/care.js';
import { reportAsHtml, reportAsLatex, reportAsMarkdown, reportAsMediaWiki } from '../../../lib/report/index.js';

const text = (name: string) => readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8');
function reported(campaign: Campaign) {
  const solved = solveCampaign(campaign);
  return campaignReport(
    {
      solved,
      prediction: predictionOf(solved),
      evaluation: campaign.measurements.length > 0 ? evaluationOf(solved) : null,
      plan: planOf(solved),
      tide: campaign.window ? tide(campaign, 3600) : null,
    },
    { title: 'untitled', provenance: 'computed by hand' },
  );
}
const three = readCampaign(text('three-sites')).campaign;

describe('the whole campaign as a report', () => {
  it('asks, answers, and says what limits', () => {
    const report = reported(three);
    expect(report.question).toBe(
      'Do the clocks agree with the heights, and would a discrepancy of 200\u00a0mm have shown?',
    );
    // three-sites.evaluate.json: u(residual) of hr 4.898e-18, of rp 9.828e-18; times 2.801585·c²/ḡ: 126 mm and 252 mm
    expect(report.sentences).toEqual([
      'hr agrees with its prediction; a discrepancy of 130\u00a0mm would have shown.',
      'rp is inconclusive: only 250\u00a0mm or more would have shown, 200\u00a0mm is asked about.',
    ]);
    const rp = report.limits.find(({ link }) => link === 'rp')!;
    expect(rp.shares[0]).toMatch(/^datum north, W₀ 48\u00a0%$/);
    expect(rp.shares.length).toBeLessThanOrEqual(3);
  });

  it('holds every input with its uncertainty and where its error comes from', () => {
    const inputs = reported(three).tables.find(({ id }) => id === 'inputs')!;
    const { model } = solveCampaign(three);
    expect(inputs.rows).toHaveLength(model.inputs.length);
    const row = inputs.rows.find((cells) => cells[1]!.text === 'sites.ridge.determinations.0.zeta')!;
    expect(row[5]!.text).toMatch(/quasigeoid/);
    expect(inputs.rows.map((cells) => cells[1]!.text)).toContain('datums.north.W0');
  });

  it('asks another question where nothing is measured, and leaves out what the file does not hold', () => {
    const { question, sentences, chapters } = reported({ ...three, measurements: [], correlations: [], window: null });
    expect(question).toBe('Which offset does gravity make between the clocks, and is it known to 30\u00a0mm?');
    expect(sentences).toEqual([
      'hr is predicted to 27\u00a0mm, rp is predicted to 44\u00a0mm and ph is predicted to 36\u00a0mm.',
    ]);
    expect(chapters.map(({ id }) => id)).toEqual(['uncertainty', 'averaging', 'potentials', 'inputs']);
    expect(chapters.flatMap(({ tables }) => tables).every(({ rows }) => rows.length > 0)).toBe(true);
  });

  it('carries the cautions into every export, with provenance and W₀', () => {
    const report = reported(three);
    for (const [form, write] of Object.entries({ reportAsHtml, reportAsMarkdown, reportAsMediaWiki, reportAsLatex })) {
      const written = write(report);
      const plain = written.replace(/[\\{}~]/g, ' ').replace(/\s+/g, ' ');
      expect(plain, form).toContain('Not a legal height');
      expect(plain, form).toContain('laser safety officer');
      expect(plain, form).toContain('computed by hand');
      expect(plain, form).toContain('sites.ridge.determinations.0.zeta');
    }
    expect(report.conventions).toEqual(expect.arrayContaining([...CARE_NOTES]));
  });

  it('is whole for every example', () => {
    for (const name of ['other-kinds', 'triangle']) {
      const { tables, sentences } = reported(readCampaign(text(name)).campaign);
      expect(JSON.stringify({ tables, sentences })).not.toMatch(/NaN|undefined|Infinity/);
      expect(sentences.length).toBeGreaterThan(0);
    }
  });
});
