import { D, type Decimal } from './decimal.js';
import { QuantityError } from './quantity-error.js';
import { isDigit, skipSpaces } from './scan.js';

/** Designators in the order they must come, with seconds. */
const DATE_PART: readonly (readonly [string, number])[] = [
  ['W', 604800],
  ['D', 86400],
];
const TIME_PART: readonly (readonly [string, number])[] = [
  ['H', 3600],
  ['M', 60],
  ['S', 1],
];
const EXAMPLE = 'a duration such as P14D, PT12H30M or P1DT6H';

/** Reads an ISO 8601 duration (P…T…) of weeks, days, hours, minutes and seconds; a day is 86 400 s. Only the last number
 *  may have a fraction.
 * @param at index of the P
 * @returns seconds, exact
 * @throws {QuantityError} calendar-duration for years and months, bad-duration, decimal-comma, stray-text */
export const parseIsoDuration = (text: string, at: number): Decimal => {
  let i = at + 1;
  let seconds = new D(0);
  let designators = DATE_PART;
  let order = -1;
  let parts = 0;
  let fractionAt = -1;
  const bad = (position: number): never => {
    throw new QuantityError('bad-duration', text, position, EXAMPLE);
  };
  while (i < text.length) {
    if (text[i] === 'T' && designators === DATE_PART) {
      designators = TIME_PART;
      order = -1;
      i++;
      if (!isDigit(text[i])) bad(i);
      continue;
    }
    const start = i;
    while (isDigit(text[i])) i++;
    if (text[i] === ',') throw new QuantityError('decimal-comma', text, i, 'a decimal point');
    if (i === start) {
      if (parts > 0 && skipSpaces(text, i) === text.length) break;
      bad(i);
    }
    if (fractionAt >= 0) bad(fractionAt);
    if (text[i] === '.') {
      fractionAt = i;
      i++;
      if (!isDigit(text[i])) bad(i);
      while (isDigit(text[i])) i++;
    }
    const letter = text[i] ?? '';
    const index = designators.findIndex(([name]) => name === letter);
    if (designators === DATE_PART && (letter === 'Y' || letter === 'M'))
      throw new QuantityError(
        'calendar-duration',
        text,
        i,
        letter === 'Y'
          ? 'days: a year has no fixed length (P365D)'
          : 'days (P30D), or minutes after a T (PT30M): a month has no fixed length',
      );
    if (index <= order) bad(i);
    seconds = seconds.plus(new D(text.slice(start, i)).times(designators[index]![1]));
    order = index;
    parts++;
    i++;
  }
  if (parts === 0) bad(text.length);
  return seconds;
};
