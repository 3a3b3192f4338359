import { D, MAX_TEXT_LENGTH } from './decimal.js';
import { QuantityError, type QuantityFaultCode } from './quantity-error.js';
import { withCorrection } from './repair.js';
import { isDigit, isMinus, skipSpaces } from './scan.js';

const MS_PER_DAY = 86_400_000;
/** MJD of 1970-01-01T00:00Z. MJD = JD − 2 400 000.5 (IAU 1997, resolution B1). */
const MJD_OF_1970 = 40_587;
const FIRST_YEAR = 1900;
const LAST_YEAR = 2199;
const EXAMPLE = '2027-05-03T00:00:00Z';

const bad = (code: QuantityFaultCode, text: string, at: number, expected: string): never => {
  throw new QuantityError(code, text, at, expected);
};

const daysInMonth = (year: number, month: number): number => new Date(Date.UTC(year, month, 0)).getUTCDate();

const parseStrictly = (text: string): number => {
  if (text.length > MAX_TEXT_LENGTH) bad('too-long', text, MAX_TEXT_LENGTH, `an instant such as ${EXAMPLE}`);
  let i = skipSpaces(text, 0);
  if (i === text.length) bad('empty', text, i, `an instant such as ${EXAMPLE}`);
  const digits = (count: number, what: string): number => {
    for (let k = 0; k < count; k++)
      if (!isDigit(text[i + k])) bad('bad-instant', text, i + k, `${what} with ${count} digits, as in ${EXAMPLE}`);
    i += count;
    return Number(text.slice(i - count, i));
  };
  const mark = (c: string): void => {
    if (text[i] !== c) bad('bad-instant', text, i, `${c} here, as in ${EXAMPLE}`);
    i++;
  };
  const within = (at: number, x: number, from: number, to: number, what: string): void => {
    if (x < from || x > to) bad('out-of-range', text, at, `${what} from ${from} to ${to}`);
  };

  const dateAt = i;
  const year = digits(4, 'the year');
  mark('-');
  const month = digits(2, 'the month');
  mark('-');
  const day = digits(2, 'the day');
  within(dateAt, year, FIRST_YEAR, LAST_YEAR, 'the year');
  within(dateAt + 5, month, 1, 12, 'the month');
  within(dateAt + 8, day, 1, daysInMonth(year, month), 'the day');
  const date = text.slice(dateAt, i);
  if (skipSpaces(text, i) === text.length) bad('bad-instant', text, i, `a time of day too: write ${date}T00:00:00Z`);
  mark('T');
  const timeAt = i;
  const hour = digits(2, 'the hour');
  mark(':');
  const minute = digits(2, 'the minute');
  within(timeAt, hour, 0, 23, 'the hour');
  within(timeAt + 3, minute, 0, 59, 'the minute');
  let second = 0;
  let ms = 0;
  if (text[i] === ':') {
    i++;
    const secondAt = i;
    second = digits(2, 'the second');
    if (second === 60)
      bad(
        'leap-second',
        text,
        secondAt,
        'a second from 00 to 59: times here run without leap seconds, use the next minute',
      );
    within(secondAt, second, 0, 59, 'the second');
    if (text[i] === ',') bad('decimal-comma', text, i, 'a decimal point');
    if (text[i] === '.') {
      const pointAt = i;
      i++;
      while (isDigit(text[i])) i++;
      if (i === pointAt + 1) bad('bad-instant', text, i, 'digits after the point');
      ms = new D(`0${text.slice(pointAt, i)}`).times(1000).toNumber();
    }
  }
  let offsetMinutes = 0;
  if (text[i] === 'Z') i++;
  else if (text[i] === '+' || isMinus(text[i])) {
    const sign = text[i] === '+' ? 1 : -1;
    i++;
    const offsetAt = i;
    const hours = digits(2, 'the hours of the offset');
    mark(':');
    const minutes = digits(2, 'the minutes of the offset');
    within(offsetAt, hours, 0, 14, 'the offset');
    within(offsetAt + 3, minutes, 0, 59, 'the minute');
    offsetMinutes = sign * (60 * hours + minutes);
  } else if (skipSpaces(text, i) === text.length)
    bad('local-time', text, i, `UTC or a stated offset: write ${text.trim()}Z if it is UTC`);
  else bad('bad-instant', text, i, `Z or an offset such as +02:00, as in ${EXAMPLE}`);
  const rest = skipSpaces(text, i);
  if (rest < text.length) bad('stray-text', text, rest, 'nothing after the offset');
  return Date.UTC(year, month - 1, day, hour, minute - offsetMinutes, second) + ms;
};

/** Reads an ISO 8601 instant with a stated offset: 2027-05-03T00:00:00Z, 2027-05-03T02:00+02:00. Years 1900 to 2199.
 * @returns milliseconds since 1970-01-01T00:00Z, without leap seconds; fractions of a ms are kept
 * @throws {QuantityError} bad-instant, out-of-range, local-time (no offset), leap-second (second 60), too-long, empty */
export const parseInstant = (text: string): number => {
  try {
    return parseStrictly(text);
  } catch (error) {
    throw error instanceof QuantityError ? withCorrection(error, parseStrictly) : error;
  }
};

/** Modified Julian Date (UTC) → milliseconds since 1970-01-01T00:00Z. */
export const mjdToMs = (mjd: number): number => (mjd - MJD_OF_1970) * MS_PER_DAY;

/** Milliseconds since 1970-01-01T00:00Z → Modified Julian Date (UTC). */
export const msToMjd = (ms: number): number => ms / MS_PER_DAY + MJD_OF_1970;

const parseMjdStrictly = (text: string): number => {
  if (text.length > MAX_TEXT_LENGTH) bad('too-long', text, MAX_TEXT_LENGTH, 'a Modified Julian Date such as 61528.25');
  const start = skipSpaces(text, 0);
  if (start === text.length) bad('empty', text, start, 'a Modified Julian Date such as 61528.25');
  let i = start;
  while (isDigit(text[i])) i++;
  if (i === start) bad('not-a-number', text, i, 'a Modified Julian Date such as 61528.25');
  if (text[i] === ',') bad('decimal-comma', text, i, 'a decimal point');
  if (text[i] === '.') {
    i++;
    while (isDigit(text[i])) i++;
  }
  const rest = skipSpaces(text, i);
  if (rest < text.length) bad('stray-text', text, rest, 'a number alone');
  const mjd = new D(text.slice(start, i));
  const first = msToMjd(Date.UTC(FIRST_YEAR, 0, 1));
  const last = msToMjd(Date.UTC(LAST_YEAR + 1, 0, 1));
  if (mjd.lt(first) || mjd.gte(last)) {
    const fromJulian = mjd.minus('2400000.5');
    const hint = fromJulian.gte(first) && fromJulian.lt(last) ? `; a Julian Date? then write ${fromJulian}` : '';
    bad('out-of-range', text, start, `a Modified Julian Date from ${first} to below ${last}${hint}`);
  }
  return mjd.minus(MJD_OF_1970).times(MS_PER_DAY).toNumber();
};

/** Reads a Modified Julian Date from decimal text (61528.25), exactly, years 1900 to 2199.
 * @returns milliseconds since 1970-01-01T00:00Z
 * @throws {QuantityError} not-a-number, decimal-comma, out-of-range, stray-text, too-long, empty */
export const parseMjd = (text: string): number => {
  try {
    return parseMjdStrictly(text);
  } catch (error) {
    throw error instanceof QuantityError ? withCorrection(error, parseMjdStrictly) : error;
  }
};

/** Milliseconds since 1970-01-01T00:00Z → ISO 8601 in UTC, without fraction if the second is whole. */
export const formatInstant = (ms: number): string => {
  // The range of dates of ECMAScript, ±1e8 days.
  if (!(Math.abs(ms) <= 8.64e15))
    throw new QuantityError('out-of-range', String(ms), 0, 'an instant within 8.64e15 ms of 1970');
  return new Date(ms).toISOString().replace('.000Z', 'Z');
};
