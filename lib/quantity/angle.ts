import { D, type Decimal, MAX_TEXT_LENGTH } from './decimal.js';
import { QuantityError } from './quantity-error.js';
import { degToRad, type Radians } from './radians.js';
import { withCorrection } from './repair.js';
import { isDash, isDigit, isMinus, refuseNotFinite, skipSpaces } from './scan.js';

export type AngleAxis = 'latitude' | 'longitude';

/** A geodetic latitude (north positive) or longitude (east positive). */
export interface Angle {
  /** the double nearest to what was written */
  readonly degrees: number;
  readonly radians: Radians;
  /** degrees; exact where no minutes or seconds were written, else to 250 digits */
  readonly decimal: Decimal;
  /** as typed; null for a bare number */
  readonly text: string | null;
}

const AXES = {
  latitude: { positive: 'N', negative: 'S', from: -90, to: 90, example: `52.2961, 52.2961 N or 52°17'46.0"N` },
  longitude: { positive: 'E', negative: 'W', from: -180, to: 360, example: `10.4598, 10.4598 E or 10°27'35.3"E` },
} as const;

/** Signs of degrees, minutes and seconds; the longer ones first, so that '' is not taken for two '. */
const MARKS: readonly (readonly string[])[] = [
  ['°', 'º', '˚', 'deg'],
  ["'", '′', '’', '‘', 'ʹ', '´'],
  ["''", '′′', '’’', '"', '″', '”', '“', 'ʺ'],
];
const MARK_NAMES = ['°', "'", '"'];

const markAt = (text: string, at: number): { unit: number; end: number } | null => {
  for (const unit of [2, 1, 0])
    for (const mark of MARKS[unit]!) if (text.startsWith(mark, at)) return { unit, end: at + mark.length };
  return null;
};

const refuse = (code: QuantityError['code'], text: string, at: number, expected: string): never => {
  throw new QuantityError(code, text, at, expected);
};

const hemisphereAt = (text: string, at: number, axis: AngleAxis): -1 | 0 | 1 => {
  const c = text[at] ?? '';
  const { positive, negative } = AXES[axis];
  if (c === positive) return 1;
  if (c === negative) return -1;
  if (/^[NSEW]$/.test(c)) refuse('wrong-hemisphere', text, at, `${positive} or ${negative}: this is a ${axis}`);
  if (/^[nsewo]$/i.test(c)) refuse('wrong-hemisphere', text, at, `${positive} or ${negative}, in capitals`);
  return 0;
};

const parseStrictly = (text: string, axis: AngleAxis): Decimal => {
  const { example, positive, negative } = AXES[axis];
  if (text.length > MAX_TEXT_LENGTH) refuse('too-long', text, MAX_TEXT_LENGTH, `at most ${MAX_TEXT_LENGTH} characters`);
  let i = skipSpaces(text, 0);
  if (i === text.length) refuse('empty', text, i, `a ${axis} such as ${example}`);
  refuseNotFinite(text, isMinus(text[i]) || text[i] === '+' ? i + 1 : i);
  let hemisphere = hemisphereAt(text, i, axis);
  if (hemisphere !== 0) i = skipSpaces(text, i + 1);
  const signAt = i;
  if (isDash(text[i])) refuse('dash-for-minus', text, i, 'a minus sign (- or U+2212), not a dash');
  const signed = isMinus(text[i]) || text[i] === '+';
  const minus = isMinus(text[i]);
  if (signed) i++;
  if (isMinus(text[i]) || text[i] === '+') refuse('two-signs', text, i, 'one sign before the number');
  let degrees = new D(0);
  let fine = -1; // finest unit read so far: 0 degrees, 1 minutes, 2 seconds
  let fractionAt = -1;
  for (;;) {
    const start = i;
    while (isDigit(text[i])) i++;
    const whole = i - start;
    if (text[i] === ',') refuse('decimal-comma', text, i, 'a decimal point');
    if (text[i] === '.') {
      if (fractionAt >= 0) refuse('stray-text', text, i, 'decimals in the last of degrees, minutes and seconds only');
      fractionAt = i;
      i++;
      while (isDigit(text[i])) i++;
    }
    if (i === start || (whole === 0 && i === start + 1)) {
      refuse('not-a-number', text, start, `a digit: a ${axis} such as ${example}`);
    }
    if (fractionAt >= 0 && fractionAt < start)
      refuse('stray-text', text, fractionAt, 'decimals in the last of degrees, minutes and seconds only');
    const number = new D(text.slice(start, i));
    const mark = markAt(text, skipSpaces(text, i));
    if (mark === null) {
      if (fine >= 0) refuse('unit-missing', text, i, `${MARK_NAMES.slice(fine + 1).join(' or ')} after the number`);
      degrees = number;
      fine = 0;
    } else {
      if (mark.unit !== fine + 1)
        refuse('stray-text', text, i, `${MARK_NAMES[fine + 1] ?? 'nothing'} here, in the order ° ' "`);
      if (mark.unit > 0 && number.gte(60)) refuse('out-of-range', text, start, 'minutes and seconds below 60');
      degrees = degrees.plus(number.div([1, 60, 3600][mark.unit]!));
      fine = mark.unit;
      i = mark.end;
    }
    const next = skipSpaces(text, i);
    if (mark === null || fine === 2 || !isDigit(text[next])) {
      i = next;
      break;
    }
    i = next;
  }
  if (i < text.length) {
    const after = hemisphereAt(text, i, axis);
    if (after !== 0 && hemisphere !== 0) refuse('two-signs', text, i, 'one hemisphere letter');
    if (after !== 0) {
      hemisphere = after;
      i = skipSpaces(text, i + 1);
    }
  }
  if (i < text.length) {
    if (isDigit(text[i])) refuse('stray-text', text, i, `marks between the numbers: ${example}`);
    refuse('stray-text', text, i, `a ${axis} such as ${example}`);
  }
  if (hemisphere !== 0 && signed) refuse('two-signs', text, signAt, `either a sign or ${positive}/${negative}`);
  return minus || hemisphere < 0 ? degrees.neg() : degrees;
};

const inRange = (degrees: Decimal, axis: AngleAxis, text: string): void => {
  const { from, to } = AXES[axis];
  if (degrees.lt(from) || degrees.gt(to))
    throw new QuantityError('out-of-range', text, 0, `a ${axis} from ${from}° to ${to}°`);
};

/** Reads a geodetic latitude or longitude: decimal degrees as number or text, or degrees, minutes and seconds (52°17'41.2"N,
 *  with ′ ″ ’ too), a sign or a hemisphere letter before or behind. `-0°30'` is −0.5°. Longitudes from −180° to 360° stay as typed.
 * @throws {QuantityError} with code, position and, where it can be told, the corrected text */
export const parseAngle = (input: string | number, axis: AngleAxis): Angle => {
  if (typeof input === 'number') {
    if (!Number.isFinite(input)) throw new QuantityError('not-finite', String(input), 0, 'a finite number of degrees');
    const decimal = new D(input);
    inRange(decimal, axis, String(input));
    return { degrees: input, radians: degToRad(input), decimal, text: null };
  }
  try {
    const decimal = parseStrictly(input, axis);
    inRange(decimal, axis, input);
    const degrees = decimal.isZero() ? 0 : decimal.toNumber();
    return { degrees, radians: degToRad(degrees), decimal, text: input };
  } catch (error) {
    if (!(error instanceof QuantityError)) throw error;
    throw withCorrection(error, (candidate) => inRange(parseStrictly(candidate, axis), axis, candidate));
  }
};
