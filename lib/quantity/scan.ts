import { QuantityError } from './quantity-error.js';

/** Characters that stand as a space: the plain one, no-break, figure, punctuation, thin, hair, narrow no-break. */
export const isSpace = (c: string | undefined): boolean =>
  c !== undefined && c !== '' && ' \u00a0\u2007\u2008\u2009\u200a\u202f'.includes(c);
export const isDigit = (c: string | undefined): boolean => c !== undefined && c >= '0' && c <= '9';
export const isMinus = (c: string | undefined): boolean => c === '-' || c === '\u2212';
/** Hyphens and dashes that look like a minus but are none. */
export const isDash = (c: string | undefined): boolean =>
  c !== undefined && c !== '' && '\u2010\u2011\u2012\u2013\u2014\ufe63\uff0d'.includes(c);

export const skipSpaces = (text: string, from: number): number => {
  let i = from;
  while (isSpace(text[i])) i++;
  return i;
};

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹';
export const superscriptDigit = (c: string | undefined): number =>
  c === undefined || c === '' ? -1 : SUPERSCRIPTS.indexOf(c);

/** An unsigned or signed decimal as typed. */
export interface DecimalToken {
  readonly start: number;
  /** index after the last character */
  readonly end: number;
  readonly negative: boolean;
  /** all digits, point and spaces taken out */
  readonly digits: string;
  /** how many of them stand after the point */
  readonly decimals: number;
  readonly hasPoint: boolean;
}

/** Digits from `from`, in groups of three where spaces stand between them. After a point the last group may be shorter
 *  (100.021 47), before it the first. */
const scanDigits = (text: string, from: number, fraction: boolean): { digits: string; end: number } => {
  let i = from;
  let digits = '';
  let group = 0;
  const ungrouped = (): never => {
    throw new QuantityError('digit-groups', text, i, 'spaces only between groups of three digits');
  };
  for (;;) {
    while (isDigit(text[i])) {
      digits += text[i];
      group++;
      i++;
    }
    if (group === 0 || !isSpace(text[i]) || !isDigit(text[i + 1])) break;
    let next = 1;
    while (next <= 4 && isDigit(text[i + next])) next++;
    const nextDigits = next - 1;
    if (fraction ? group !== 3 || nextDigits > 3 : group > 3 || nextDigits !== 3) ungrouped();
    i++;
    group = 0;
  }
  return { digits, end: i };
};

/** @throws {QuantityError} not-finite where NaN or infinity is written */
export const refuseNotFinite = (text: string, at: number): void => {
  if (/^(nan|inf|∞)/i.test(text.slice(at, at + 3))) throw new QuantityError('not-finite', text, at, 'a finite number');
};

const scanSign = (text: string, from: number): { negative: boolean; at: number } => {
  const c = text[from];
  if (isDash(c)) throw new QuantityError('dash-for-minus', text, from, 'a minus sign (- or U+2212), not a dash');
  const signed = isMinus(c) || c === '+';
  const at = signed ? from + 1 : from;
  if (signed && (isMinus(text[at]) || text[at] === '+'))
    throw new QuantityError('two-signs', text, at, 'one sign before the number');
  return { negative: isMinus(c), at };
};

/** Reads one decimal at `from`.
 * @param sign whether a sign may stand before it
 * @throws {QuantityError} not-a-number, not-finite, decimal-comma, digit-groups, two-signs, dash-for-minus, stray-text */
export const scanDecimal = (text: string, from: number, sign: boolean): DecimalToken => {
  const { negative, at } = sign ? scanSign(text, from) : { negative: false, at: from };
  const whole = scanDigits(text, at, false);
  let end = whole.end;
  const hasPoint = text[end] === '.';
  let fraction = '';
  if (hasPoint) {
    const f = scanDigits(text, end + 1, true);
    fraction = f.digits;
    end = f.end;
  }
  if (text[end] === ',')
    throw new QuantityError('decimal-comma', text, end, 'a decimal point and no comma between digits');
  if (text[end] === '.') throw new QuantityError('stray-text', text, end, 'one decimal point');
  if (whole.digits === '' && fraction === '') {
    if (/^(nan|inf|∞)/i.test(text.slice(at, at + 3)))
      throw new QuantityError('not-finite', text, at, 'a finite number');
    throw new QuantityError('not-a-number', text, at, 'a digit');
  }
  return { start: from, end, negative, digits: whole.digits + fraction, decimals: fraction.length, hasPoint };
};

/** A power of ten as typed; null where none stands at `from` (spaces before it are skipped). */
export interface PowerToken {
  readonly start: number;
  readonly end: number;
  readonly exponent: number;
}

const FORMS = 'a power such as e-17, ×10^-17 or ×10⁻¹⁷';

const scanPlainInteger = (text: string, from: number): { value: number; end: number } => {
  const negative = isMinus(text[from]);
  let i = negative || text[from] === '+' ? from + 1 : from;
  const first = i;
  let value = 0;
  // Far beyond every double already; the caller refuses it as overflow, so counting on would only lose the digits.
  for (; isDigit(text[i]); i++) value = Math.min(1e6, value * 10 + Number(text[i]));
  if (i === first) throw new QuantityError('bad-power', text, i, `digits in the exponent: ${FORMS}`);
  return { value: negative ? -value : value, end: i };
};

const scanSuperscript = (text: string, from: number): { value: number; end: number } => {
  const negative = text[from] === '⁻';
  let i = negative || text[from] === '⁺' ? from + 1 : from;
  const first = i;
  let value = 0;
  for (; superscriptDigit(text[i]) >= 0; i++) value = Math.min(1e6, value * 10 + superscriptDigit(text[i]));
  if (i === first) throw new QuantityError('bad-power', text, i, `digits in the exponent: ${FORMS}`);
  return { value: negative ? -value : value, end: i };
};

/** Reads e-17, E-17, ×10^-17, ×10⁻¹⁷ (also with x, *, ·) at `from`.
 * @throws {QuantityError} bad-power, lost-superscript, dash-for-minus */
export const scanPower = (text: string, from: number): PowerToken | null => {
  const start = skipSpaces(text, from);
  const c = text[start];
  const refuseDash = (at: number): void => {
    if (isDash(text[at])) throw new QuantityError('dash-for-minus', text, at, 'a minus sign (- or U+2212), not a dash');
  };
  if (c === 'e' || c === 'E') {
    const next = text[start + 1];
    refuseDash(start + 1);
    // A bare E is the eötvös, and Em a length; only a sign or a digit makes it a power.
    if (!isMinus(next) && next !== '+' && !isDigit(next)) return null;
    const { value, end } = scanPlainInteger(text, start + 1);
    return { start, end, exponent: value };
  }
  if (c === undefined || !'×xX*·⋅∙'.includes(c)) return null;
  const ten = skipSpaces(text, start + 1);
  if (text[ten] !== '1' || text[ten + 1] !== '0') return null;
  const at = ten + 2;
  if (text[at] === '^') {
    refuseDash(at + 1);
    const { value, end } = scanPlainInteger(text, at + 1);
    return { start, end, exponent: value };
  }
  if (superscriptDigit(text[at]) >= 0 || text[at] === '⁻' || text[at] === '⁺') {
    const { value, end } = scanSuperscript(text, at);
    return { start, end, exponent: value };
  }
  if (isMinus(text[at]) || isDash(text[at]) || text[at] === '+' || isDigit(text[at]))
    throw new QuantityError('lost-superscript', text, at, `the exponent marked as one: ${FORMS}`);
  throw new QuantityError('bad-power', text, at, `an exponent after the 10: ${FORMS}`);
};
