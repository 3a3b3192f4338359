import type { BudgetGroup, BudgetPart } from '../answers/budget-groups.js';
import { formatLength } from '../quantity/index.js';
import { type BudgetExport, coverageText, uText } from './budget-export.js';
import { tideNote } from './conventions.js';
import { inputUnit } from './input-unit.js';
import { inputText, sourceText } from './input-words.js';
import { fixedText, sizeText } from './numbers.js';
import { printable } from './table.js';

const WIDTH = 760;
const MARGIN = 16;
const BAR = { from: 372, to: 664 };
const ROW = 24;
const HEAD = 96;
/** Characters of a name that fit between margin and u. */
const NAME = 44;
/** Shares below this are summed in one line. */
const SMALL_SHARE = 0.001;
/** Ink on white, as the elements print. */
const INK = '#000000';
const INK_2 = '#333333';
const HAIR = '#BFBFBF';
const CAUTION = '#664700';

interface Row {
  readonly name: string;
  readonly u: string;
  readonly share: number;
  readonly kind: 'source' | 'member' | 'alone';
}

const escaped = (text: string): string =>
  printable(text).replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');
const short = (text: string): string => (text.length > NAME ? `${text.slice(0, NAME - 1)}…` : text);
const n = (value: number): string => String(Number(value.toFixed(1)));

/** The figure of a budget, stated values, as a picture of its own: bars of the shares about one zero, solid an input, outlined a
 *  shared source with its inputs below it, hatched by its outline a negative share; conventions, version and date inside. */
export function budgetSvg({ campaign, uncertainty, provenance }: BudgetExport): string {
  const { groups } = uncertainty.budget;
  const large = groups.filter(
    ({ share, parts }) => share >= SMALL_SHARE || parts.some((p) => Math.abs(p.share) >= SMALL_SHARE),
  );
  const rows = large.flatMap((group) => rowsOf(group));
  const shares = rows.map(({ share }) => share);
  const step = roundStep(Math.max(0.05, ...shares) - Math.min(0, ...shares));
  const low = Math.min(0, Math.floor(Math.min(0, ...shares) / step) * step);
  const high = Math.max(step, Math.ceil(Math.max(...shares, 0) / step - 1e-9) * step);
  const x = (share: number): number => BAR.from + ((share - low) / (high - low)) * (BAR.to - BAR.from);
  const body = rows.length * ROW;
  const rest = groups.length - large.length;
  const ticks = Array.from({ length: Math.round((high - low) / step) + 1 }, (_, i) => low + i * step);
  const notes = [
    `${coverageText(uncertainty)}. Solid: one input; outlined: a shared source, its inputs below it.`,
    'Share: part of the variance u²(y), correlations included; a negative one takes part of the others’ away.',
    ...(rest > 0 ? [`${rest} more below 0.1 %, not drawn.`] : []),
    `${tideNote(campaign.tide)} ${provenance}.`,
  ];
  const height = HEAD + body + 30 + notes.length * 16 + MARGIN;
  const text = (at: number, y: number, words: string, more = '') =>
    `<text x="${n(at)}" y="${n(y)}"${more}>${escaped(words)}</text>`;
  const end = ' text-anchor="end"';
  const grey = ` fill="${INK_2}"`;
  const title = `Uncertainty of link ${uncertainty.id}`;
  const sentence = `u = ${formatLength(uncertainty.dH.u, 2)}, ${sizeText(uncertainty.dW.u)}\u00a0m²/s², ${sizeText(uncertainty.y.u * 1e18)}e-18; U = ${formatLength(uncertainty.expanded.dH, 2)}, ${sizeText(uncertainty.expanded.y * 1e18)}e-18`;
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${WIDTH}" height="${height}" viewBox="0 0 ${WIDTH} ${height}" role="img" font-family="Helvetica Neue, Helvetica, Arial, sans-serif" font-size="12" fill="${INK}">`,
    `<title>${escaped(title)}</title>`,
    `<desc>${escaped([sentence, ...rows.map((row) => `${row.name}: ${percent(row.share)} %`), ...notes].join(' '))}</desc>`,
    `<rect width="${WIDTH}" height="${height}" fill="#FFFFFF"/>`,
    text(MARGIN, 30, title, ' font-size="17" font-weight="700"'),
    text(MARGIN, 52, sentence, ' font-size="13"'),
    text(MARGIN, HEAD - 14, 'input', grey),
    text(BAR.from - 14, HEAD - 14, 'u', `${grey}${end}`),
    text(BAR.from, HEAD - 14, 'share of the variance', grey),
    text(WIDTH - MARGIN, HEAD - 14, '%', `${grey}${end}`),
    ...ticks.map(
      (tick) =>
        `<line x1="${n(x(tick))}" x2="${n(x(tick))}" y1="${HEAD}" y2="${HEAD + body}" stroke="${Math.abs(tick) < step / 2 ? INK : HAIR}" stroke-width="${Math.abs(tick) < step / 2 ? 1 : 0.75}"/>`,
    ),
    ...rows.flatMap((row, i) => {
      const y = HEAD + i * ROW;
      const indent = row.kind === 'member' ? 18 : 0;
      const weight = row.kind === 'source' ? ' font-weight="700"' : '';
      return [
        text(MARGIN + indent, y + 16, short(row.name), weight),
        text(BAR.from - 14, y + 16, row.u, end),
        bar(row, x(Math.min(0, row.share)), Math.abs(x(row.share) - x(0)), y),
        text(WIDTH - MARGIN, y + 16, percent(row.share), end),
      ];
    }),
    `<line x1="${MARGIN}" x2="${WIDTH - MARGIN}" y1="${HEAD}" y2="${HEAD}" stroke="${INK}"/>`,
    `<line x1="${MARGIN}" x2="${WIDTH - MARGIN}" y1="${HEAD + body}" y2="${HEAD + body}" stroke="${INK}"/>`,
    ...ticks.map((tick) =>
      text(x(tick), HEAD + body + 16, percentTick(tick), `${grey} text-anchor="middle" font-size="11"`),
    ),
    ...notes.map((note, i) => text(MARGIN, HEAD + body + 42 + 16 * i, note, `${grey} font-size="11"`)),
    '</svg>',
    '',
  ].join('\n');

  function rowsOf(group: BudgetGroup): Row[] {
    const member = (part: BudgetPart, kind: Row['kind']): Row => ({
      name: `${inputText(campaign, part.input)}${part.isWhole ? '' : part.source === null ? ', own part' : ', shared part'}`,
      u: uText(part.u, inputUnit(part.input)),
      share: part.share,
      kind,
    });
    const [first] = group.parts;
    if (!first) return [];
    if (group.source === null || group.parts.length === 1) return [member(first, 'alone')];
    return [
      { name: sourceText(campaign, group.source), u: '', share: group.share, kind: 'source' },
      ...group.parts.map((part) => member(part, 'member')),
    ];
  }
}

function bar({ share, kind }: Row, left: number, width: number, y: number): string {
  const look =
    share < 0
      ? `fill="#FFFFFF" stroke="${CAUTION}" stroke-width="2"`
      : kind === 'source'
        ? `fill="#FFFFFF" stroke="${INK}" stroke-width="1.25"`
        : `fill="${INK}"`;
  return `<rect x="${n(left)}" y="${y + 6}" width="${n(width)}" height="11" ${look}/>`;
}

const percent = (share: number): string => fixedText(100 * share, 1, 'unsigned');
const percentTick = (share: number): string => fixedText(100 * share, 0, 'unsigned');

/** A step that gives four to ten lines over the span of shares. */
function roundStep(span: number): number {
  for (const step of [0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10]) if (span / step <= 10) return step;
  return span / 10;
}
