import { D, type Decimal, HALF_EVEN } from './decimal.js';
import { QuantityError } from './quantity-error.js';

export interface ConciseOptions {
  /** digits of u, default 2 */
  readonly digits?: 1 | 2;
  /** significant digits of a number whose u is 0 or null; default: the whole number, as short as its double allows */
  readonly significant?: number;
  /** print in units of 10^scale and leave it to a table head to say so ("y / 1e-18": −18) */
  readonly scale?: number;
  /** power of ten to take out and write behind; default: as the size of the number asks for */
  readonly power?: number;
  /** + before positive numbers too; 0 never has a sign */
  readonly sign?: 'negative' | 'always';
}

/** A rounded number in pieces, for renderers that align on the point or group digits by a margin. */
export interface ConciseNumber {
  readonly sign: '' | '-' | '+';
  /** digits before the point */
  readonly integer: string;
  /** digits after the point, may be '' */
  readonly fraction: string;
  /** what stands in the bracket, with a point if it falls inside; null if the number is exact or its u is not known */
  readonly bracket: string | null;
  /** u in the same power as the value, for a ± form */
  readonly u: string | null;
  /** power of ten behind the number */
  readonly power: number | null;
  /** value and u are too many digits apart for a bracket: u by itself, to follow a ± */
  readonly apart: ConciseNumber | null;
}

/** Beyond this many digits from the first of the value to the last of u, a bracket is unreadable. */
const MAX_DIGITS = 30;
/** A number between 1e-4 and 1e16 with at most three zeros that are no digits of it needs no power of ten. */
const PLAIN = { from: -4, below: 16, zeros: 3 };
/** A double has no more digits than this; only a quotient by a unit has. */
const MAX_WHOLE = 17;

const exact = (x: number | Decimal): Decimal => {
  const d = new D(x);
  if (!d.isFinite()) throw new QuantityError('not-finite', String(x), 0, 'a finite number to print');
  return d;
};

const shift = (x: Decimal, by: number): Decimal => x.times(new D(`1e${by}`));

const signOf = (rounded: Decimal, options: ConciseOptions): ConciseNumber['sign'] => {
  if (rounded.isZero()) return '';
  if (rounded.isNegative()) return '-';
  return options.sign === 'always' ? '+' : '';
};

/** Power of ten to write behind a number whose first digit stands at 10^first and last at 10^last; null for none. */
const powerFor = (first: number, last: number, options: ConciseOptions): number | null => {
  if (options.power !== undefined) return options.power;
  if (options.scale !== undefined) return null;
  return first >= PLAIN.from && first < PLAIN.below && last <= PLAIN.zeros ? null : first;
};

const pieces = (rounded: Decimal, last: number, power: number | null, options: ConciseOptions) => {
  const decimals = Math.max(0, (power ?? 0) - last);
  const [integer = '0', fraction = ''] = shift(rounded.abs(), -(power ?? 0))
    .toFixed(decimals, HALF_EVEN)
    .split('.');
  return { sign: signOf(rounded, options), integer, fraction, decimals, power };
};

const withoutU = (value: Decimal, options: ConciseOptions): ConciseNumber => {
  const digits = options.significant;
  const rounded = value.toSignificantDigits(digits ?? MAX_WHOLE, HALF_EVEN);
  const first = rounded.isZero() ? 0 : rounded.e;
  const last = digits === undefined ? first - rounded.precision() + 1 : first - digits + 1;
  // Zeros before the point are digits of a number printed whole.
  const power = powerFor(first, digits === undefined ? Math.min(last, 0) : last, options);
  const { sign, integer, fraction } = pieces(rounded, last, power, options);
  return { sign, integer, fraction, bracket: null, u: null, power, apart: null };
};

/** Rounds a value to the last digit of its standard uncertainty, ties to even, both from the shortest decimal of the double.
 * @param value any finite number
 * @param u standard uncertainty in the same unit; 0: exact, null: not known (both print without bracket)
 * @throws {QuantityError} not-finite, negative-u
 * @see JCGM 100:2008 (GUM), 7.2.2 and 7.2.6 */
export const concise = (
  value: number | Decimal,
  u: number | Decimal | null,
  options: ConciseOptions = {},
): ConciseNumber => {
  const scale = -(options.scale ?? 0);
  const v = shift(exact(value), scale);
  if (u === null) return withoutU(v, options);
  const uExact = shift(exact(u), scale);
  if (uExact.isZero()) return withoutU(v, options);
  if (uExact.isNegative()) throw new QuantityError('negative-u', String(u), 0, 'a standard uncertainty ≥ 0 to print');
  const digits = options.digits ?? 2;
  // 0.0996 rounds up to 0.10: the place of the last digit has to be taken after the rounding.
  const uRounded = uExact.toSignificantDigits(digits, HALF_EVEN);
  const last = uRounded.e - digits + 1;
  const rounded = shift(shift(v, -last).toDecimalPlaces(0, HALF_EVEN), last);
  const first = rounded.isZero() ? uRounded.e : Math.max(rounded.e, uRounded.e);
  if (first - last >= MAX_DIGITS) {
    // Each with a power of its own, taken after the rounding as above.
    const alone = (x: Decimal, significant: number, o: ConciseOptions) => {
      const { e } = x.toSignificantDigits(significant, HALF_EVEN);
      return withoutU(x, { ...o, power: e });
    };
    return { ...alone(v, MAX_WHOLE, options), apart: alone(uExact, digits, { significant: digits }) };
  }
  const power = powerFor(first, last, options);
  const { sign, integer, fraction, decimals } = pieces(rounded, last, power, options);
  const uPrinted = shift(uRounded, -(power ?? 0));
  const pointInside = decimals > 0 && uPrinted.gte(1);
  const bracket = pointInside ? uPrinted.toFixed(decimals) : shift(uPrinted, decimals).toFixed(0);
  return { sign, integer, fraction, bracket, u: uPrinted.toFixed(decimals), power, apart: null };
};

/** Digits in groups of three from five digits up; before the point counted from the right, after it from the left. */
export const digitGroups = (digits: string, side: 'integer' | 'fraction'): readonly string[] => {
  if (digits.length < 5) return digits === '' ? [] : [digits];
  const head = side === 'integer' ? digits.length % 3 : 0;
  const groups = head > 0 ? [digits.slice(0, head)] : [];
  for (let i = head; i < digits.length; i += 3) groups.push(digits.slice(i, i + 3));
  return groups;
};

export interface TextOptions extends ConciseOptions {
  /** default U+2212 */
  readonly minus?: '\u2212' | '-';
  /** put between groups of three digits from five digits up, e.g. U+202F; default none */
  readonly groupSeparator?: string;
  /** how a power of ten is written: e-17 (default) or ×10⁻¹⁷ */
  readonly powerStyle?: 'e' | 'times';
}

const SUPERSCRIPT: Readonly<Record<string, string>> = { '-': '⁻' };

const powerText = (power: number | null, style: TextOptions['powerStyle']): string => {
  if (power === null) return '';
  if (style !== 'times') return `e${power}`;
  return `×10${[...String(power)].map((c) => SUPERSCRIPT[c] ?? '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(c)]).join('')}`;
};

const numberText = (number: string, separator: string): string => {
  const [integer = '', fraction = ''] = number.split('.');
  const whole = digitGroups(integer, 'integer').join(separator);
  return fraction === '' ? whole : `${whole}.${digitGroups(fraction, 'fraction').join(separator)}`;
};

const signText = (sign: ConciseNumber['sign'], options: TextOptions): string =>
  sign === '-' ? (options.minus ?? '\u2212') : sign;

const mantissaText = (n: ConciseNumber, options: TextOptions): string =>
  signText(n.sign, options) +
  numberText(n.fraction === '' ? n.integer : `${n.integer}.${n.fraction}`, options.groupSeparator ?? '');

/** Writes a number cut into pieces by {@link concise}. */
export const conciseText = (n: ConciseNumber, options: TextOptions = {}): string => {
  const bracket = n.bracket === null ? '' : `(${numberText(n.bracket, options.groupSeparator ?? '')})`;
  const alone = mantissaText(n, options) + bracket + powerText(n.power, options.powerStyle);
  return n.apart === null ? alone : `${alone} ± ${conciseText(n.apart, options)}`;
};

/** Value with its standard uncertainty in concise notation: −850.012(44), 93783.1(2.9), 9.378306(29)e-14. Without a bracket if
 *  u is 0 or null. What it writes {@link parseQuantity} reads back to the same digits.
 * @throws {QuantityError} not-finite, negative-u */
export const formatConcise = (value: number | Decimal, u: number | Decimal | null, options: TextOptions = {}): string =>
  conciseText(concise(value, u, options), options);

/** The same in units of 10^power, which a table head or a sentence names: formatScaled(9.4e-17, 1.2e-18, -18) → 94.0(1.2). */
export const formatScaled = (
  value: number | Decimal,
  u: number | Decimal | null,
  power: number,
  options: TextOptions = {},
): string => formatConcise(value, u, { ...options, scale: power });

/** Value ± standard uncertainty, rounded alike: 143.216 ± 0.008, (4.1 ± 1.6)e-17. */
export const formatPlusMinus = (
  value: number | Decimal,
  u: number | Decimal | null,
  options: TextOptions = {},
): string => {
  const n = concise(value, u, options);
  if (n.u === null) return conciseText(n, options);
  const both = `${mantissaText(n, options)} ± ${numberText(n.u, options.groupSeparator ?? '')}`;
  return n.power === null ? both : `(${both})${powerText(n.power, options.powerStyle)}`;
};
