import { D, type Decimal } from './decimal.js';
import { type Dimension, KINDS, nameOfDimension, type QuantityKind } from './kinds.js';
import { closest } from './near-match.js';
import { QuantityError } from './quantity-error.js';
import { isMinus, isSpace, skipSpaces, superscriptDigit } from './scan.js';

/** A unit read from a text. SI value = number · numerator / denominator, both exact save for the root of a km. */
export interface Unit {
  readonly numerator: Decimal;
  readonly denominator: Decimal;
  readonly dimension: Dimension;
  readonly text: string;
}

/** Decimal prefixes as powers of ten: SI Brochure, 9th ed. (2019, updated 2022), table 7. u stands for µ. */
const PREFIXES: Readonly<Record<string, number>> = {
  Q: 30,
  R: 27,
  Y: 24,
  Z: 21,
  E: 18,
  P: 15,
  T: 12,
  G: 9,
  M: 6,
  k: 3,
  h: 2,
  da: 1,
  d: -1,
  c: -2,
  m: -3,
  µ: -6,
  u: -6,
  n: -9,
  p: -12,
  f: -15,
  a: -18,
  z: -21,
  y: -24,
  r: -27,
  q: -30,
};

interface UnitSymbol {
  /** in SI, exact, as decimal text */
  readonly factor: string;
  readonly length: number;
  readonly time: number;
  readonly prefixed?: true;
}

/** m, s, Hz: SI Brochure, 9th ed. (2019), tables 2 and 4; min, h, d: table 8; Gal = 1 cm/s²: note beside table 8.
 *  gpu, the geopotential unit: 1 kGal·m (NGS, program DYNAMIC_HT; Heiskanen & Moritz 1967, ch. 4). E, the eötvös: 1e-9 s⁻².
 *  a, yr: the Julian year of 365.25 d, in which rates of stations are given (IAU Style Manual, Wilkins 1989, 5.15). */
const SYMBOLS: Readonly<Record<string, UnitSymbol>> = {
  m: { factor: '1', length: 1, time: 0, prefixed: true },
  s: { factor: '1', length: 0, time: 1, prefixed: true },
  min: { factor: '60', length: 0, time: 1 },
  h: { factor: '3600', length: 0, time: 1 },
  d: { factor: '86400', length: 0, time: 1 },
  a: { factor: '31557600', length: 0, time: 1 },
  yr: { factor: '31557600', length: 0, time: 1 },
  Hz: { factor: '1', length: 0, time: -1, prefixed: true },
  Gal: { factor: '0.01', length: 1, time: -2, prefixed: true },
  gpu: { factor: '10', length: 2, time: -2 },
  E: { factor: '1e-9', length: 0, time: -2 },
};

interface SymbolValue {
  readonly factor: Decimal;
  readonly symbol: UnitSymbol;
}

/** Exact symbols go before prefixed ones: min is the minute, d the day, h the hour, E the eötvös. */
const symbolValue = (word: string): SymbolValue | null => {
  if (Object.hasOwn(SYMBOLS, word)) return { factor: new D(SYMBOLS[word]!.factor), symbol: SYMBOLS[word]! };
  for (const length of [1, 2]) {
    const prefix = word.slice(0, length);
    const rest = word.slice(length);
    if (!Object.hasOwn(PREFIXES, prefix) || !Object.hasOwn(SYMBOLS, rest)) continue;
    const symbol = SYMBOLS[rest]!;
    if (symbol.prefixed) return { factor: new D(`1e${PREFIXES[prefix]}`).times(symbol.factor), symbol };
  }
  return null;
};

const isLetter = (c: string | undefined): boolean => c !== undefined && /^[A-Za-zµμ°%'"′″Ω]$/.test(c);

/** So many are named in a message; the others are there to be guessed at. */
const SHOWN_UNITS = 4;

const expectation = (kind: QuantityKind): string => {
  const k = KINDS[kind];
  return k.units.length === 0
    ? 'no unit: the field is a plain number'
    : `a unit of ${k.name.replace(/^an? /, '')}: ${k.units.slice(0, SHOWN_UNITS).join(', ')}`;
};

/** Exponent after a symbol, doubled: ², ^2, ^-2, ⁻², ½, ^½, ^0.5, ^(1/2), or a bare digit as in s-2. */
const scanExponent = (text: string, from: number, refuse: (at: number) => never): { twice: number; end: number } => {
  let i = from;
  for (const half of ['^(1/2)', '^0.5', '^½', '½'])
    if (text.startsWith(half, i)) return { twice: 1, end: i + half.length };
  const caret = text[i] === '^';
  if (caret) i++;
  const negative = isMinus(text[i]) || text[i] === '⁻';
  if (negative) i++;
  const digit =
    superscriptDigit(text[i]) >= 0 ? superscriptDigit(text[i]) : /^\d$/.test(text[i] ?? '') ? Number(text[i]) : -1;
  if (digit < 0) return caret || negative ? refuse(from) : { twice: 2, end: i };
  if (digit === 0 || superscriptDigit(text[i + 1]) >= 0 || /^[\d.]$/.test(text[i + 1] ?? '')) refuse(from);
  return { twice: (negative ? -2 : 2) * digit, end: i + 1 };
};

/** By multiplication: a general power would bring logarithms of a thousand digits into every page. */
const power = (factor: Decimal, twice: number): Decimal => {
  const n = Math.abs(twice);
  if (n % 2 === 1) return factor.sqrt();
  let product = factor;
  for (let i = 1; i < n / 2; i++) product = product.times(factor);
  return product;
};

/** Reads the unit that fills text[from, to) and checks that it measures `kind`.
 * @throws {QuantityError} unknown-unit, wrong-unit, stray-text */
export const readUnit = (text: string, kind: QuantityKind, from = 0, to = text.length): Unit => {
  const start = skipSpaces(text, from);
  let end = to;
  while (end > start && isSpace(text[end - 1])) end--;
  const unitText = text.slice(start, end);
  const { dimension: wanted, units } = KINDS[kind];
  const unknown = (at: number): never => {
    const near = at === start || text[at] === '/' ? closest(unitText, units) : null;
    const hint = near === null ? '' : `; did you mean ${near}?`;
    throw new QuantityError('unknown-unit', text, at, expectation(kind) + hint);
  };
  if (unitText === '1' && wanted.length2 === 0 && wanted.time2 === 0) return defaultUnit(kind);
  let numerator = new D(1);
  let denominator = new D(1);
  let length2 = 0;
  let time2 = 0;
  let under = false;
  let read = 0;
  let i = start;
  while (i < end) {
    const at = i;
    // 1/s² is the one place where a unit starts with a digit.
    if (read === 0 && text[i] === '1' && text[skipSpaces(text, i + 1)] === '/') {
      i++;
    } else {
      const root = text[i] === '√' ? 1 : text.startsWith('sqrt(', i) ? 5 : 0;
      i += root;
      const first = i;
      while (i < end && isLetter(text[i])) i++;
      const word = text.slice(first, i).replaceAll('μ', 'µ');
      const value = symbolValue(word);
      if (value === null) {
        if (read > 0 && !under && isSpace(text[first - 1]))
          throw new QuantityError('stray-text', text, first, `nothing after ${text.slice(start, first).trimEnd()}`);
        if (word === '') throw new QuantityError('stray-text', text, first, 'nothing but a unit after the number');
        return unknown(first);
      }
      if (root === 5) {
        if (text[i] !== ')') unknown(at);
        i++;
      }
      const exponent = root > 0 ? { twice: 1, end: i } : scanExponent(text, i, unknown);
      i = exponent.end;
      const twice = under ? -exponent.twice : exponent.twice;
      if (twice > 0) numerator = numerator.times(power(value.factor, twice));
      else denominator = denominator.times(power(value.factor, twice));
      length2 += value.symbol.length * twice;
      time2 += value.symbol.time * twice;
    }
    read++;
    const gap = skipSpaces(text, i);
    if (gap >= end) break;
    if (text[gap] === '/') {
      // SI Brochure 5.4.6: no second solidus without brackets.
      if (under) unknown(gap);
      under = true;
      i = skipSpaces(text, gap + 1);
      if (i >= end) unknown(gap);
    } else {
      const dot = '·⋅*'.includes(text[gap]!);
      // m/s·m could mean two things.
      if (under || (!dot && gap === i)) {
        if (!dot && (gap > i || !isLetter(text[gap])))
          throw new QuantityError('stray-text', text, gap, `nothing after ${text.slice(start, i)}`);
        unknown(gap);
      }
      i = dot ? skipSpaces(text, gap + 1) : gap;
      if (i >= end) unknown(gap);
    }
  }
  if (read === 0) unknown(start);
  const dimension: Dimension = { length2, time2 };
  if (kind === 'fraction' || length2 !== wanted.length2 || time2 !== wanted.time2) {
    const other = nameOfDimension(dimension);
    const what = other === null || kind === 'fraction' ? '' : `; ${unitText} measures ${other}`;
    throw new QuantityError('wrong-unit', text, start, expectation(kind) + what);
  }
  return { numerator, denominator, dimension, text: unitText };
};

/** Whether a number in this unit is the SI number. */
export const isSi = (unit: Unit): boolean => unit.numerator.eq(1) && unit.denominator.eq(1);

/** The unit a number without one has. */
export const defaultUnit = (kind: QuantityKind): Unit => ({
  numerator: new D(1),
  denominator: new D(1),
  dimension: KINDS[kind].dimension,
  text: KINDS[kind].unit,
});

const over = (value: Decimal, by: Decimal): Decimal => (by.eq(1) ? value : value.div(by));

/** An exact number in a unit → SI. */
export const toSi = (value: Decimal, unit: Unit): Decimal => over(value.times(unit.numerator), unit.denominator);

/** An SI number → the unit. */
export const fromSi = (value: Decimal, unit: Unit): Decimal => over(value.times(unit.denominator), unit.numerator);
