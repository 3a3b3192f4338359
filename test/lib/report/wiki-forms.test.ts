import { describe, expect, it } from 'vitest';
import {
  estimateCell,
  estimateColumn,
  METRES,
  notComputed,
  numberColumn,
  OFFSET,
  type Report,
  reportAsHtml,
  reportAsLatex,
  reportAsMediaWiki,
  sizeCell,
  type Table,
  tableAsHtml,
  tableAsLatex,
  tableAsMediaWiki,
  textCell,
  textColumn,
} from '../../../lib/report/index.js';

const table = (name: string): Table => ({
  id: 't',
  title: 'Links',
  columns: [
    textColumn('link'),
    estimateColumn('length', 'm'),
    { ...estimateColumn('ΔW', 'm²/s²') },
    numberColumn('c', '1e-18 per unit'),
  ],
  rows: [
    [
      textCell(name),
      estimateCell({ value: -850.012, u: 0.044 }, METRES, 'signed'),
      estimateCell({ value: 93783.06e-18, u: 2.9e-18 }, OFFSET, 'signed'),
      sizeCell(2.93e-14),
    ],
    [textCell('b'), notComputed, notComputed, notComputed],
  ],
  notes: ['length is ΔW/ḡ; s⁻², W₀, −½·Γ.'],
});

const report = (name: string): Report => ({
  title: `About ${name}`,
  sentences: [`Link ${name} is known to 44\u00a0mm.`],
  tables: [table(name)],
  conventions: ['Permanent tide: mean.'],
  cautions: [{ code: 'default-gravity', path: `sites.${name}.g`, message: 'no gravity stated' }],
  provenance: 'Computed by Plumbtick 1.2.3 on 2027-05-03',
});

describe('MediaWiki', () => {
  it('a table: heads with units, numbers right, digits in groups, failed in words', () => {
    expect(tableAsMediaWiki(table('a')).split('\n')).toEqual([
      '{| class="wikitable"',
      '|+ Links',
      '|-',
      '! scope="col" | link',
      '! scope="col" style="text-align:right" | length / m',
      '! scope="col" style="text-align:right" | ΔW / m²/s²',
      '! scope="col" style="text-align:right" | c / 1e-18 per unit',
      '|-',
      '| a',
      '| style="text-align:right" | \u2212850.012(44)',
      '| style="text-align:right" | +93\u00a0783.1(2.9)',
      '| style="text-align:right" | 2.9e-14',
      '|-',
      '| b',
      '| style="text-align:right" | not computed',
      '| style="text-align:right" | not computed',
      '| style="text-align:right" | not computed',
      '|}',
    ]);
  });

  // every piece of markup that a campaign's texts could hold: mediawiki.org, Help:Formatting, Help:Links, Help:Tables
  it.each([
    '[[Secret]]',
    '{{delete}}',
    '|}',
    "'''bold'''",
    '<nowiki>',
    '~~~~',
    '__NOTOC__',
    'https://example.org',
    '&amp;',
  ])('text is text: %s', (name) => {
    const [text = ''] = reportAsMediaWiki(report(name)).split('\n');
    expect(text).not.toContain(name);
    // and a reader sees it unchanged
    expect(text.replace(/&#(\d+);/g, (_, code: string) => String.fromCharCode(Number(code)))).toContain(name);
  });

  it.each(['* item', '# item', ': indented', ' pre', '= head', '----'])('nothing starts a list: %s', (name) => {
    const lines = reportAsMediaWiki({ ...report('a'), sentences: [name] }).split('\n');
    expect(lines).not.toContain(name);
  });

  it('a section with title, cautions, conventions, version and date', () => {
    const lines = reportAsMediaWiki(report('a')).split('\n');
    expect(lines[0]).toBe('== About a ==');
    expect(lines).toContain("* ''Caution:'' sites.a.g: no gravity stated (default-gravity)");
    expect(lines).toContain('* Permanent tide: mean.');
    expect(lines).toContain('* Computed by Plumbtick 1.2.3 on 2027-05-03');
  });
});

describe('HTML', () => {
  it('a table with scopes and a caption, no style and no script', () => {
    const html = tableAsHtml(table('a'));
    expect(html).toContain('<caption>Links</caption>');
    expect(html).toContain('<th scope="col" align="right">length / m</th>');
    expect(html).toContain('<th scope="row" align="left">a</th><td align="right">\u2212850.012(44)</td>');
    expect(html).toContain('<td align="right">not computed</td>');
    expect(html).not.toMatch(/style|script/);
  });

  it('text is text', () => {
    const html = reportAsHtml(report('<img src=x onerror="alert(1)">'));
    expect(html).not.toContain('<img');
    expect(html).toContain('&lt;img src=x onerror=&quot;alert(1)&quot;&gt;');
  });

  it('a section with everything', () => {
    const html = reportAsHtml(report('a'));
    expect(html).toContain('<h2>About a</h2>');
    expect(html).toContain('<li>Computed by Plumbtick 1.2.3 on 2027-05-03</li>');
    expect(html).toContain('<em>Caution:</em> sites.a.g: no gravity stated (default-gravity)');
  });
});

describe('LaTeX', () => {
  it('a table: numbers in math mode, digits in groups, powers of ten as such, symbols as commands', () => {
    expect(tableAsLatex(table('a')).split('\n')).toEqual([
      '\\begin{table}',
      '\\centering',
      '\\caption{Links}',
      '\\begin{tabular}{lrrr}',
      '\\hline',
      'link & length / m & $\\Delta$W / m$^{2}$/s$^{2}$ & c / 1e-18 per unit \\\\',
      '\\hline',
      'a & $-850.012(44)$ & $+93\\,783.1(2.9)$ & $2.9 \\times 10^{-14}$ \\\\',
      'b & not computed & not computed & not computed \\\\',
      '\\hline',
      '\\end{tabular}',
      '\\end{table}',
    ]);
    expect(reportAsLatex(report('a'))).toContain(
      'length is $\\Delta$W/$\\bar{g}$; s$^{-2}$, W$_{0}$, $-$$\\frac{1}{2}$$\\cdot$$\\Gamma$.',
    );
  });

  it('text is text: the ten characters that are commands', () => {
    const text = reportAsLatex(report('\\input{/etc/passwd} $x$ 5% A&B #1 a_b ^ ~'));
    expect(text).not.toContain('\\input');
    expect(text).toContain(
      '\\textbackslash{}input\\{/etc/passwd\\} \\$x\\$ 5\\% A\\&B \\#1 a\\_b \\textasciicircum{} \\textasciitilde{}',
    );
  });

  it('letters of any language pass', () => {
    expect(reportAsLatex(report('Zugspitze ä 山'))).toContain('Zugspitze ä 山');
  });

  it('version and date; a table longer than a page says which package it needs', () => {
    const long = table('a');
    const text = reportAsLatex({
      ...report('a'),
      tables: [{ ...long, rows: Array.from({ length: 60 }, () => long.rows[0]!) }],
    });
    expect(text.split('\n')[0]).toBe('% Computed by Plumbtick 1.2.3 on 2027-05-03');
    expect(text).toContain('% \\usepackage{longtable}');
    expect(text).toContain('\\begin{longtable}{lrrr}');
    expect(text).toContain('\\endhead');
    expect(reportAsLatex(report('a'))).not.toContain('longtable');
  });
});
