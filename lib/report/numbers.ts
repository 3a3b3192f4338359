import type { Estimate } from '../answers/prediction.js';
import { formatConcise } from '../quantity/index.js';
import { type Cell, notComputed } from './table.js';

/** A unit in which a column is printed. */
export interface Scale {
  readonly unit: string;
  /** the unit is 10^power of the SI unit */
  readonly power: number;
  /** digits after the point where a number is exact; finer than the method is good for */
  readonly decimals: number;
}

/** The three scales of every difference, always in this order. */
export const METRES: Scale = { unit: 'm', power: 0, decimals: 6 };
export const POTENTIAL: Scale = { unit: 'm²/s²', power: 0, decimals: 5 };
export const OFFSET: Scale = { unit: '1e-18', power: -18, decimals: 3 };
export const HERTZ: Scale = { unit: 'Hz', power: 0, decimals: 6 };

const inUnit = (value: number, { power }: Scale) => (power === 0 ? value : value * Number(`1e${-power}`));

/** Differences, offsets and corrections show their sign even if it is a plus. */
export type SignStyle = 'signed' | 'unsigned';

const sign = (style: SignStyle) => ({ sign: style === 'signed' ? 'always' : 'negative' }) as const;

/** value(u) in the unit of the scale, without digit groups; without a bracket if exact. */
export const estimateText = ({ value, u }: Estimate, scale: Scale, style: SignStyle = 'unsigned'): string =>
  u > 0
    ? formatConcise(value, u, { scale: scale.power, ...sign(style) })
    : decimalText(inUnit(value, scale), scale.decimals, style);

/** A number without uncertainty, to at most so many digits after the point. */
export const decimalText = (value: number, decimals: number, style: SignStyle = 'unsigned'): string =>
  formatConcise(Number(value.toFixed(decimals)), null, sign(style));

/** A size to so many significant digits: `0.56`, `27`, `2.9e-18`. */
export const sizeText = (value: number, significant = 2): string => formatConcise(value, null, { significant });

/** Cell of an estimate in a column of that scale. */
export const estimateCell = (estimate: Estimate | null, scale: Scale, style: SignStyle = 'unsigned'): Cell =>
  estimate === null
    ? notComputed
    : {
        kind: 'number',
        text: estimateText(estimate, scale, style),
        value: inUnit(estimate.value, scale),
        u: inUnit(estimate.u, scale),
      };

/** Cell of an input as stated, in SI, all its digits. */
export const statedCell = ({ value, u }: Estimate): Cell => ({
  kind: 'number',
  text: formatConcise(value, u),
  value,
  u,
});

/** Cell of a number that has no uncertainty of its own, to so many digits after the point. */
export const decimalCell = (value: number, decimals: number, style: SignStyle = 'unsigned'): Cell => ({
  kind: 'number',
  text: fixedText(value, decimals, style),
  value,
  u: null,
});

/** So many digits after the point, trailing zeros kept: in a column they say how far the number is known. */
export function fixedText(value: number, decimals: number, style: SignStyle): string {
  const text = value.toFixed(decimals);
  if (Number(text) === 0) return text.replace('-', '');
  return value < 0 ? text.replace('-', '\u2212') : style === 'signed' ? `+${text}` : text;
}

/** Cell of a size, to so many significant digits. */
export const sizeCell = (value: number, significant = 2): Cell => ({
  kind: 'number',
  text: sizeText(value, significant),
  value,
  u: null,
});
