import { digitGroups } from '../quantity/index.js';
import { type Cell, type Column, headText, printable, type Report, type Table } from './table.js';

/** Characters that plain LaTeX does not know, or knows as commands. Letters of any language pass: the engine reads UTF-8. */
const MARKS: Readonly<Record<string, string>> = {
  '\\': '\\textbackslash{}',
  '{': '\\{',
  '}': '\\}',
  $: '\\$',
  '&': '\\&',
  '#': '\\#',
  '%': '\\%',
  _: '\\_',
  '^': '\\textasciicircum{}',
  '~': '\\textasciitilde{}',
  '<': '\\textless{}',
  '>': '\\textgreater{}',
  '|': '\\textbar{}',
  '"': '\\textquotedbl{}',
  '\u00a0': '~',
  '\u202f': '\\,',
  '\u2009': '\\,',
  '\u2212': '$-$',
  '\u2013': '--',
  '\u2014': '---',
  '\u2018': '`',
  '\u2019': "'",
  '\u201c': '``',
  '\u201d': "''",
  '…': '\\ldots{}',
  '·': '$\\cdot$',
  '×': '$\\times$',
  '±': '$\\pm$',
  '√': '$\\surd$',
  '∂': '$\\partial$',
  Σ: '$\\Sigma$',
  '∞': '$\\infty$',
  '≤': '$\\leq$',
  '≥': '$\\geq$',
  '→': '$\\to$',
  '½': '$\\frac{1}{2}$',
  '°': '$^\\circ$',
  '′': "$'$",
  '″': "$''$",
  ḡ: '$\\bar{g}$',
  Δ: '$\\Delta$',
  Γ: '$\\Gamma$',
  α: '$\\alpha$',
  β: '$\\beta$',
  γ: '$\\gamma$',
  δ: '$\\delta$',
  ζ: '$\\zeta$',
  λ: '$\\lambda$',
  µ: '$\\mu$',
  μ: '$\\mu$',
  ν: '$\\nu$',
  ρ: '$\\rho$',
  σ: '$\\sigma$',
  τ: '$\\tau$',
  φ: '$\\varphi$',
  χ: '$\\chi$',
  ω: '$\\omega$',
  Ω: '$\\Omega$',
};

const RAISED = '⁰¹²³⁴⁵⁶⁷⁸⁹';
const LOWERED = '₀₁₂₃₄₅₆₇₈₉';
const run = (digits: string, from: string): string =>
  [...digits].map((c) => (c === '⁻' ? '-' : String([...from].indexOf(c)))).join('');

const escaped = (text: string): string =>
  printable(text).replace(/[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+|[₀₁₂₃₄₅₆₇₈₉]+|[^\p{L}\p{M}\p{N} ]|[\p{Script=Greek}ḡ∂½]/gu, (c) => {
    if (c[0] === '⁻' || RAISED.includes(c[0]!)) return `$^{${run(c, RAISED)}}$`;
    if (LOWERED.includes(c[0]!)) return `$_{${run(c, LOWERED)}}$`;
    return MARKS[c] ?? c;
  });

/** A printed number in math mode, digits in groups, a power of ten as one. */
const number = (text: string): string => {
  const match = /^([+\u2212-]?)(\d+)(?:\.(\d+))?(\([\d.]+\))?(?:e([+\u2212-]?\d+))?$/.exec(text);
  if (!match) return escaped(text);
  const [, sign = '', whole = '', fraction, bracket = '', power] = match;
  const minus = (s: string) => s.replace('\u2212', '-');
  const digits = `${digitGroups(whole, 'integer').join('\\,')}${fraction === undefined ? '' : `.${digitGroups(fraction, 'fraction').join('\\,')}`}`;
  return `$${minus(sign)}${digits}${bracket}${power === undefined ? '' : ` \\times 10^{${minus(power)}}`}$`;
};

const field = (cell: Cell): string => (cell.kind === 'number' ? number(cell.text) : escaped(cell.text));

/** More rows than this don't fit on a page. */
const PAGE_ROWS = 40;

/** One table: `tabular` in a `table`, or a `longtable` where it is longer than a page. */
export function tableAsLatex(table: Table): string {
  const columns = table.columns.map(({ kind }: Column) => (kind === 'number' ? 'r' : 'l')).join('');
  const line = (cells: readonly string[]) => `${cells.join(' & ')} \\\\`;
  const heads = line(table.columns.map((column) => escaped(headText(column))));
  const rows = table.rows.map((row) => line(row.map(field)));
  const caption = `\\caption{${escaped(table.title)}}`;
  return table.rows.length > PAGE_ROWS
    ? [
        `\\begin{longtable}{${columns}}`,
        `${caption} \\\\`,
        '\\hline',
        heads,
        '\\hline',
        '\\endhead',
        ...rows,
        '\\hline',
        '\\end{longtable}',
      ].join('\n')
    : [
        '\\begin{table}',
        '\\centering',
        caption,
        `\\begin{tabular}{${columns}}`,
        '\\hline',
        heads,
        '\\hline',
        ...rows,
        '\\hline',
        '\\end{tabular}',
        '\\end{table}',
      ].join('\n');
}

/** A report as a section. Needs no package, but `longtable` for tables of more than a page. */
export function reportAsLatex(report: Report): string {
  const long = report.tables.some(({ rows }) => rows.length > PAGE_ROWS);
  const parts: string[] = [
    [
      // a line end would leave the comment
      `% ${printable(report.provenance)}`,
      ...(long ? ['% \\usepackage{longtable}'] : []),
      `\\section*{${escaped(report.title)}}`,
    ].join('\n'),
  ];
  if (report.sentences.length > 0) parts.push(report.sentences.map(escaped).join('\n'));
  for (const table of report.tables) parts.push(tableAsLatex(table), ...table.notes.map(escaped));
  const items = [
    ...report.cautions.map(
      ({ code, path, message }) =>
        `\\emph{Caution:} ${escaped(path === '' ? message : `${path}: ${message}`)} (${escaped(code)})`,
    ),
    ...report.conventions.map(escaped),
    escaped(report.provenance),
  ];
  parts.push(['\\begin{itemize}', ...items.map((item) => `\\item ${item}`), '\\end{itemize}'].join('\n'));
  return `${parts.join('\n\n')}\n`;
}
