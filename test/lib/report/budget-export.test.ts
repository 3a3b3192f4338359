import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import { linkUncertainty, type WhatIfChange, whatIf } from '../../../lib/answers/what-if.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import {
  type BudgetExport,
  budgetCsv,
  budgetReport,
  budgetSvg,
  reportAsHtml,
  reportAsLatex,
  reportAsMarkdown,
  reportAsMediaWiki,
} from '../../../lib/report/index.js';

const { campaign } = readCampaign(
  readFileSync(new URL('../../data/examples/three-sites.json', import.meta.url), 'utf8'),
);
const solved = solveCampaign(campaign);
const link = campaign.links.findIndex(({ id }) => id === 'rp');
const uncertainty = linkUncertainty(solved, link)!;
const provenance = 'Computed by Plumbtick 1.2.3 on 2027-05-03';
const stated: BudgetExport = { campaign, uncertainty, whatIf: null, trials: null, provenance };

const changes: WhatIfChange[] = [
  { kind: 'part', input: 'clocks.r1.tie.1.dH', source: null, amount: { u: 0.01 } },
  { kind: 'source', source: 'quasigeoid', amount: { factor: 0.5 } },
];
const changed: BudgetExport = { ...stated, whatIf: { changes, uncertainty: whatIf(solved, link, changes)! } };

const cells = (line: string): string[] => line.split(',');

describe('the budget of a link, exported', () => {
  it('as a report: three scales with u and U, k and degrees of freedom, every input under its source', () => {
    const report = budgetReport(stated);
    const [scales, budget, comparison] = report.tables;
    // three-sites.predict.json: dH −850.01190(4434), dW −8343.75507(43521), y −9.283680(484)e-14; U = 1.96·u
    expect(scales!.rows[0]!.map(({ text }) => text)).toEqual([
      'predicted',
      '\u2212850.012(44)',
      '\u22128343.76(44)',
      '\u221292836.8(4.8)',
    ]);
    expect(scales!.rows[2]!.map(({ text }) => text)).toEqual(['U', '0.087', '0.85', '9.5']);
    expect(scales!.notes[0]).toBe('U with k = 1.96, 95\u00a0%, normal.');
    expect(budget!.rows.map((row) => row[0]!.text)).toContain('source');
    const shares = budget!.rows
      .filter((row) => row[0]!.text !== 'in source')
      .map((row) => row[6]!)
      .reduce((sum, cell) => sum + (cell.kind === 'number' ? cell.value : Number.NaN), 0);
    expect(Math.abs(shares - 100)).toBeLessThan(1e-9);
    const tie = budget!.rows.find((row) => row[1]!.text === 'clock r1, tie door to atoms')!;
    expect(tie.map(({ text }) => text)).toEqual([
      'alone',
      tie[1]!.text,
      '0.020',
      'm',
      '\u2212109.2',
      '\u22122.18',
      '20.4',
    ]);
    expect(comparison!.rows.map((row) => row[1]!.text)).toContain('offset of 171Yb');
  });

  it('CSV holds conventions, units, version and date too', () => {
    const lines = budgetCsv(stated).split('\r\n');
    expect(lines[0]).toBe('quantity,length / m,u(length) / m,ΔW / m²/s²,u(ΔW) / m²/s²,y / 1e-18,u(y) / 1e-18');
    const head = lines.findIndex((line) => line.startsWith('row,input,path,source,u,unit'));
    expect(cells(lines[head]!)).toEqual([
      'row',
      'input',
      'path',
      'source',
      'u',
      'unit',
      'c / 1e-18 per unit',
      'c·u / 1e-18',
      'share / %',
    ]);
    expect(lines.some((line) => line.includes('sites.ridge.determinations.0.zeta'))).toBe(true);
    expect(lines).toContain(`computed,${provenance}`);
    expect(lines.some((line) => line.startsWith('convention,"Permanent tide: mean'))).toBe(true);
    expect(lines.some((line) => line.startsWith('note,"U with k = 1.96'))).toBe(true);
  });

  it.each([
    ['Markdown', reportAsMarkdown],
    ['MediaWiki', reportAsMediaWiki],
    ['LaTeX', reportAsLatex],
    ['HTML', reportAsHtml],
  ] as const)('%s: units, conventions, version and date', (_, as) => {
    const text = as(budgetReport(stated));
    expect(text).toContain(provenance);
    expect(text).toContain('Permanent tide: mean');
    expect(text).toMatch(/1e-18/);
    expect(text).toMatch(/k (=|&#61;) 1\.96/);
  });

  it('a changed budget says what was changed and that it is not as stated, with both numbers', () => {
    const report = budgetReport(changed);
    expect(report.sentences[1]).toMatch(
      /^What if, not as stated: clock r1, tie door to atoms: u = 10\u00a0mm; .*: u times 0\.5\. u\(y\) = \d\.\de-18 instead of 4\.8e-18\.$/,
    );
    expect(report.tables[1]!.columns.map(({ head }) => head)).toContain('share, what if');
    expect(report.tables[0]!.rows.map((row) => row[0]!.text)).toContain('what if: predicted');
  });
});

describe('the figure of a budget', () => {
  const svg = budgetSvg(stated);

  it('is a picture of its own: no class, no style, nothing from outside', () => {
    expect(svg.startsWith('<svg xmlns="http://www.w3.org/2000/svg"')).toBe(true);
    expect(svg).not.toMatch(/class=|style=|href|url\(/);
  });

  it('has title, sentence, conventions, version and date inside', () => {
    expect(svg).toContain('<title>Uncertainty of link rp</title>');
    expect(svg).toContain('44\u00a0mm');
    expect(svg).toContain('k = 1.96');
    expect(svg).toContain('Permanent tide: mean');
    expect(svg).toContain(provenance);
  });

  it('bars begin at one zero, their lengths go as the shares, a negative one to its left', () => {
    const bars = [
      ...svg.matchAll(/<rect x="([\d.]+)" y="\d+" width="([\d.]+)" height="11" fill="([^"]+)"( stroke="([^"]+)")?/g),
    ].map(([, x, width, fill, , stroke]) => ({ x: Number(x), width: Number(width), fill, stroke }));
    const rows = uncertainty.budget.groups
      .flatMap((group) => (group.parts.length > 1 ? [group.share, ...group.parts.map((p) => p.share)] : [group.share]))
      .slice(0, bars.length);
    const zero = bars[0]!.x;
    const scale = bars[0]!.width / rows[0]!;
    expect(rows.some((share) => share < 0)).toBe(true);
    bars.forEach((bar, i) => {
      const share = rows[i]!;
      expect(Math.abs(bar.width - Math.abs(share) * scale)).toBeLessThan(0.2);
      expect(Math.abs((share < 0 ? bar.x + bar.width : bar.x) - zero)).toBeLessThan(0.2);
      if (share < 0) expect(bar.stroke).toBe('#664700');
    });
  });

  it('is well-formed, whatever the names hold', () => {
    const hostile = {
      ...campaign,
      sites: campaign.sites.map((site) => ({ ...site, name: `</text><script>&"'` })),
    };
    const text = budgetSvg({ ...stated, campaign: hostile });
    expect(text).not.toContain('<script');
    expect(text.match(/<text/g)!.length).toBe(text.match(/<\/text>/g)!.length);
  });
});
