import { D, type Decimal, MAX_TEXT_LENGTH } from './decimal.js';
import { parseIsoDuration } from './iso-duration.js';
import { KINDS, type QuantityKind } from './kinds.js';
import { QuantityError } from './quantity-error.js';
import { withCorrection } from './repair.js';
import { type DecimalToken, isMinus, isSpace, scanDecimal, scanPower, skipSpaces } from './scan.js';
import { defaultUnit, readUnit, toSi, type Unit } from './units.js';

/** A measured number read from a text, in SI. */
export interface Quantity {
  readonly kind: QuantityKind;
  /** SI, the double nearest to what was written */
  readonly value: number;
  /** standard uncertainty, SI; 0 where none was written */
  readonly u: number;
  /** the same without rounding, `u` null where none was written; the steps are the sizes of their last written digits */
  readonly decimal: {
    readonly value: Decimal;
    readonly step: Decimal;
    readonly u: Decimal | null;
    readonly uStep: Decimal | null;
  };
  /** unit as written, else the default unit */
  readonly unit: string;
  /** whether a unit was written */
  readonly unitWritten: boolean;
  /** the text as given */
  readonly text: string;
}

/** One decimal with its power of ten. */
interface Term {
  readonly token: DecimalToken;
  readonly exponent: number;
  readonly powerAt: number | null;
  readonly end: number;
}

const bad = (code: QuantityError['code'], text: string, at: number, expected: string): never => {
  throw new QuantityError(code, text, at, expected);
};

const decimalOf = (token: DecimalToken, exponent: number): Decimal =>
  new D(`${token.negative ? '-' : ''}${token.digits}e${exponent - token.decimals}`);

/** Size of the last written digit. */
const stepOf = (token: DecimalToken, exponent: number): Decimal => new D(`1e${exponent - token.decimals}`);

const plusMinusLength = (text: string, at: number): number =>
  text[at] === '±'
    ? 1
    : text.startsWith('+/-', at) || text.startsWith('+/\u2212', at)
      ? 3
      : /^\+[-\u2212]/.test(text.slice(at, at + 2))
        ? 2
        : 0;

const findPlusMinus = (text: string, from: number): number => {
  for (let i = from; i < text.length; i++) if (plusMinusLength(text, i) > 0) return i;
  return text.length;
};

const scanTerm = (text: string, from: number): Term => {
  const token = scanDecimal(text, skipSpaces(text, from), true);
  const power = scanPower(text, token.end);
  return { token, exponent: power?.exponent ?? 0, powerAt: power?.start ?? null, end: power?.end ?? token.end };
};

/** What stands in the text before any unit is applied. */
interface Reading {
  readonly value: Decimal;
  readonly step: Decimal;
  readonly u: Decimal | null;
  readonly uStep: Decimal | null;
  readonly valueUnit: Unit | null;
  readonly uUnit: Unit | null;
  /** where each number starts, for messages */
  readonly valueAt: number;
  readonly uAt: number;
}

const NO_U = { u: null, uStep: null, uUnit: null } as const;

/** `143.216(8)e-3 m` from its number on. */
const readConcise = (text: string, kind: QuantityKind, from: number): Reading | { readonly term: Term } => {
  const term = scanTerm(text, from);
  const open = skipSpaces(text, term.end);
  if (text[open] !== '(') return { term };
  if (term.powerAt !== null) bad('bad-bracket', text, open, 'the power of ten after the bracket, as in 4.1(3)e-17');
  const inside = skipSpaces(text, open + 1);
  if (text[inside] === ')') bad('empty-bracket', text, open, 'the standard uncertainty in the bracket, or no bracket');
  if (isMinus(text[inside])) bad('negative-u', text, inside, 'a standard uncertainty, which has no sign');
  if (inside >= text.length) bad('open-bracket', text, open, 'a closing bracket');
  if (plusMinusLength(text, inside) > 0 || text[inside] === '+')
    bad('bad-bracket', text, inside, 'the digits of the standard uncertainty alone in the bracket');
  const bracket = scanDecimal(text, inside, false);
  const close = skipSpaces(text, bracket.end);
  if (close >= text.length) bad('open-bracket', text, open, 'a closing bracket');
  if (text[close] !== ')') bad('bad-bracket', text, close, 'digits alone in the bracket; power and unit come after it');
  const power = scanPower(text, close + 1);
  const exponent = power?.exponent ?? 0;
  const end = power?.end ?? close + 1;
  const next = skipSpaces(text, end);
  if (text[next] === '(') bad('two-uncertainties', text, next, 'one bracket; several pieces of u go into "parts"');
  if (plusMinusLength(text, next) > 0) bad('two-uncertainties', text, next, 'either a bracket or ±, not both');
  // With a point inside, the bracket is in the number's own unit; else it counts the number's last digits (GUM 7.2.2).
  const uExponent = bracket.hasPoint ? exponent : exponent - term.token.decimals;
  return {
    value: decimalOf(term.token, exponent),
    step: stepOf(term.token, exponent),
    u: decimalOf(bracket, uExponent),
    uStep: stepOf(bracket, uExponent),
    valueUnit: next < text.length ? readUnit(text, kind, next) : null,
    uUnit: null,
    valueAt: term.token.start,
    uAt: bracket.start,
  };
};

const refuseNegative = (text: string, term: Term): void => {
  if (term.token.negative) bad('negative-u', text, term.token.start, 'a standard uncertainty, which has no sign');
};

/** A u far below the value's last bit, with a power that the value lacks, is (4.1 ± 1.6)e-17 with its brackets lost. */
const refuseLostBrackets = (text: string, value: Term, u: Term): void => {
  if (value.powerAt !== null || u.powerAt === null) return;
  const v = decimalOf(value.token, 0).abs();
  const uDecimal = decimalOf(u.token, u.exponent);
  if (v.isZero() || uDecimal.isZero() || uDecimal.gte(v.times('1e-16'))) return;
  bad('ambiguous-power', text, u.powerAt, 'the power for both, (4.1 ± 1.6)e-17, or one at each number');
};

/** `143.216 ± 0.008 m` or `143.216 m ± 8 mm` from the end of the value on. */
const readPlusMinus = (text: string, kind: QuantityKind, term: Term): Reading => {
  const next = skipSpaces(text, term.end);
  const sign = findPlusMinus(text, next);
  const valueUnit = next < sign ? readUnit(text, kind, next, sign) : null;
  const value = decimalOf(term.token, term.exponent);
  const step = stepOf(term.token, term.exponent);
  if (sign === text.length) {
    const { start } = term.token;
    return { ...NO_U, value, step, valueUnit, valueAt: start, uAt: start };
  }
  const uTerm = scanTerm(text, sign + plusMinusLength(text, sign));
  refuseNegative(text, uTerm);
  refuseLostBrackets(text, term, uTerm);
  const end = skipSpaces(text, uTerm.end);
  const again = findPlusMinus(text, end);
  if (again < text.length) bad('two-uncertainties', text, again, 'one ±; several pieces of u go into "parts"');
  if (text[end] === '(') bad('two-uncertainties', text, end, 'either a bracket or ±, not both');
  const uUnit = end < text.length ? readUnit(text, kind, end) : null;
  if (valueUnit !== null && uUnit === null)
    bad('unit-missing', text, text.length, `a unit after the uncertainty too, or only there (${valueUnit.text})`);
  return {
    value,
    step,
    u: decimalOf(uTerm.token, uTerm.exponent),
    uStep: stepOf(uTerm.token, uTerm.exponent),
    valueUnit: valueUnit ?? uUnit,
    uUnit,
    valueAt: term.token.start,
    uAt: uTerm.token.start,
  };
};

/** `(4.1 ± 1.6)e-17 unit` from its bracket on. */
const readGrouped = (text: string, kind: QuantityKind, open: number): Reading => {
  const value = scanTerm(text, open + 1);
  const sign = skipSpaces(text, value.end);
  const length = plusMinusLength(text, sign);
  if (length === 0)
    bad('bad-bracket', text, sign, 'value ± standard uncertainty in the bracket, as in (4.1 ± 1.6)e-17');
  const u = scanTerm(text, sign + length);
  refuseNegative(text, u);
  const close = skipSpaces(text, u.end);
  if (close >= text.length) bad('open-bracket', text, open, 'a closing bracket');
  if (text[close] !== ')')
    bad('bad-bracket', text, close, 'numbers alone in the bracket; power and unit come after it');
  const power = scanPower(text, close + 1);
  if (power !== null && (value.powerAt ?? u.powerAt) !== null)
    bad('bad-power', text, power.start, 'the power either inside the bracket or after it');
  if (power === null) refuseLostBrackets(text, value, u);
  const shift = power?.exponent ?? 0;
  const next = skipSpaces(text, power?.end ?? close + 1);
  return {
    value: decimalOf(value.token, value.exponent + shift),
    step: stepOf(value.token, value.exponent + shift),
    u: decimalOf(u.token, u.exponent + shift),
    uStep: stepOf(u.token, u.exponent + shift),
    valueUnit: next < text.length ? readUnit(text, kind, next) : null,
    uUnit: null,
    valueAt: value.token.start,
    uAt: u.token.start,
  };
};

/** An exact SI number as a double.
 * @throws {QuantityError} overflow, underflow */
const toDouble = (exact: Decimal, text: string, at: number): number => {
  const x = exact.toNumber();
  if (!Number.isFinite(x)) bad('overflow', text, at, 'a magnitude below 1.8e308');
  if (x === 0 && !exact.isZero()) bad('underflow', text, at, 'a magnitude above 5e-324, or 0');
  return x === 0 ? 0 : x;
};

const parseStrictly = (text: string, kind: QuantityKind, ambient: Unit | null): Quantity => {
  if (text.length > MAX_TEXT_LENGTH) bad('too-long', text, MAX_TEXT_LENGTH, `at most ${MAX_TEXT_LENGTH} characters`);
  const start = skipSpaces(text, 0);
  let end = text.length;
  while (end > start && isSpace(text[end - 1])) end--;
  if (start === end) bad('empty', text, start, `${KINDS[kind].name} such as ${KINDS[kind].example}`);
  const trimmed = text.slice(0, end);
  let reading: Reading;
  if (kind === 'duration' && text[start] === 'P') {
    const value = parseIsoDuration(trimmed, start);
    reading = {
      ...NO_U,
      value,
      step: new D(`1e${-value.decimalPlaces()}`),
      valueUnit: defaultUnit(kind),
      valueAt: start,
      uAt: start,
    };
  } else if (text[start] === '(') {
    reading = readGrouped(trimmed, kind, start);
  } else {
    const concise = readConcise(trimmed, kind, start);
    reading = 'term' in concise ? readPlusMinus(trimmed, kind, concise.term) : concise;
  }
  const valueUnit = reading.valueUnit ?? ambient ?? defaultUnit(kind);
  const uUnit = reading.uUnit ?? valueUnit;
  const value = toSi(reading.value, valueUnit);
  const u = reading.u === null ? null : toSi(reading.u, uUnit);
  return {
    kind,
    value: toDouble(value, text, reading.valueAt),
    u: u === null ? 0 : toDouble(u, text, reading.uAt),
    decimal: {
      value: value.isZero() ? new D(0) : value,
      step: toSi(reading.step, valueUnit),
      u,
      uStep: reading.uStep === null ? null : toSi(reading.uStep, uUnit),
    },
    unit: valueUnit.text,
    unitWritten: reading.valueUnit !== null,
    text,
  };
};

/** Reads a measured number in any of the written forms: `143.216(8) m`, `143.2(1.5) m`, `143.216 ± 0.008 m`,
 *  `(4.1 ± 1.6)e-17`, `4.1(1.6)×10⁻¹⁷`, `8 mm`; an ISO 8601 duration where a duration stands. Linear in the text's length.
 * @param kind fixes the default unit and the units that may stand there
 * @param ambient unit of a number without one, if not the kind's default
 * @throws {QuantityError} with code, position and, where it can be told, the corrected text
 * @see JCGM 100:2008 (GUM), 7.2.2, for the bracket */
export const parseQuantity = (text: string, kind: QuantityKind, ambient: Unit | null = null): Quantity => {
  try {
    return parseStrictly(text, kind, ambient);
  } catch (error) {
    if (!(error instanceof QuantityError)) throw error;
    throw withCorrection(error, (candidate) => parseStrictly(candidate, kind, ambient));
  }
};
