import { html, nothing, type TemplateResult } from 'lit';

/** Digits of a run in groups of three, from the decimal point outwards; runs of up to four stay whole. */
function groups(run: string, fromRight: boolean): readonly string[] {
  if (run.length < 5) return [run];
  const parts: string[] = [];
  if (fromRight) for (let end = run.length; end > 0; end -= 3) parts.unshift(run.slice(Math.max(0, end - 3), end));
  else for (let start = 0; start < run.length; start += 3) parts.push(run.slice(start, start + 3));
  return parts;
}

interface NumberParts {
  /** sign and digits before the decimal point */
  readonly integer: string;
  readonly sign: string;
  /** digits after the point, without it */
  readonly fraction: string;
  readonly point: boolean;
  /** bracket, power, unit */
  readonly rest: string;
}

function split(text: string): NumberParts | null {
  const match = /^([+\u2212-]?)(\d+)(\.?)(\d*)(.*)$/su.exec(text);
  if (!match) return null;
  const [, sign = '', integer = '', point = '', fraction = '', rest = ''] = match;
  return { sign, integer, point: point !== '', fraction, rest };
}

/** The groups as spans with a margin between: not a character, so that copied text can be read back. */
const spaced = (parts: readonly string[]): readonly (TemplateResult | string)[] =>
  parts.map((part, i) => (i < parts.length - 1 ? html`<span class="g">${part}</span>` : part));

const integerPart = ({ sign, integer }: NumberParts) => html`${sign}${spaced(groups(integer, true))}`;
const restPart = ({ point, fraction, rest }: NumberParts) =>
  html`${point ? '.' : nothing}${spaced(groups(fraction, false))}${rest}`;

/** A formatted number, `−92836.8(4.8)` or `1.34898(33)e-15 m`, its digits grouped from five on. Never broken over lines.
 *  What isn't a number (*none*, *not computed*) passes unchanged. */
export function quantityText(text: string): TemplateResult {
  const parts = split(text);
  return parts ? html`<span class="q">${integerPart(parts)}${restPart(parts)}</span>` : html`${text}`;
}

/** Widths in tenths of an em of the figure face: good enough to line columns up on the point. */
function width(text: string): number {
  let sum = 0;
  for (const char of text)
    sum += char === '.' || char === ',' ? 2.8 : char === '(' || char === ')' ? 3.3 : char === ' ' ? 2.8 : 5.6;
  return sum;
}

function restWidth(text: string): number {
  const parts = split(text);
  if (!parts) return 0;
  const gaps = groups(parts.fraction, false).length - 1;
  return width((parts.point ? '.' : '') + parts.fraction + parts.rest) + 1.6 * gaps;
}

/** Class that gives a column's numbers one width right of the decimal point. */
export const pointColumn = (texts: readonly string[]): string =>
  `e${Math.min(89, Math.ceil(Math.max(0, ...texts.map(restWidth)) + 0.4))}`;

/** A number in a column, aligned on its decimal point. @param column from {@link pointColumn} */
export function alignedNumber(text: string, column: string): TemplateResult {
  const parts = split(text);
  if (!parts) return html`<span class="n ${column}"><span class="i">${text}</span><span class="r"></span></span>`;
  return html`<span class="n ${column}"
    ><span class="i">${integerPart(parts)}</span><span class="r">${restPart(parts)}</span></span
  >`;
}
