/** Days from 1970-01-01 of a date of the Gregorian calendar (H. Hinnant, days_from_civil). */
export function daysFromCivil(year: number, month: number, day: number): number {
  const y = month <= 2 ? year - 1 : year;
  const era = Math.floor(y / 400);
  const yoe = y - era * 400;
  const doy = Math.floor((153 * (month + (month > 2 ? -3 : 9)) + 2) / 5) + day - 1;
  return era * 146097 + yoe * 365 + Math.floor(yoe / 4) - Math.floor(yoe / 100) + doy - 719468;
}

/** MJD of 1970-01-01. */
export const MJD_OF_1970 = 40587;

/** Why a time stamp was not read. */
export const TIME_NOT_A_STAMP = -1;
export const TIME_LOCAL = -2;
export const TIME_OUT_OF_RANGE = -3;

const ZERO = 48;

/** Reads a modified Julian date in UTC: out[slot] its whole days, out[slot + 1] the seconds of the day, kept apart so that a
 *  five-digit day number does not eat the digits of the fraction.
 * @returns position after it, or TIME_NOT_A_STAMP */
export function readModifiedJulianDate(
  b: Uint8Array,
  from: number,
  end: number,
  out: Float64Array,
  slot: number,
): number {
  let i = from;
  let day = 0;
  let digits = 0;
  for (; i < end; i++) {
    const c = b[i]! - ZERO;
    if (!(c >= 0 && c <= 9)) break;
    day = day * 10 + c;
    digits++;
  }
  if (digits === 0 || digits > 7) return TIME_NOT_A_STAMP;
  let fraction = 0;
  let scale = 1;
  if (i < end && b[i] === 46) {
    for (i++; i < end; i++) {
      const c = b[i]! - ZERO;
      if (!(c >= 0 && c <= 9)) break;
      if (scale < 1e15) {
        fraction = fraction * 10 + c;
        scale *= 10;
      }
    }
  }
  out[slot] = day;
  // A factor of 86400 first would lose a digit of a 15-digit fraction.
  out[slot + 1] = (fraction / scale) * 86400;
  return i;
}

/** Two digits, or NaN. */
const two = (b: Uint8Array, i: number): number => {
  const p = b[i]! - ZERO;
  const q = b[i + 1]! - ZERO;
  return p >= 0 && p <= 9 && q >= 0 && q <= 9 ? p * 10 + q : Number.NaN;
};

/** Reads an ISO 8601 instant in UTC, YYYY-MM-DDThh:mm[:ss[.f…]]Z, a blank allowed for T and +00:00 for Z: out[slot] the MJD,
 *  out[slot + 1] the seconds of the day (60 and more in a leap second, which then coincides with the next day's first).
 * @param zoneStated the column's name says UTC, so a stamp without a zone is taken as UTC
 * @returns position after it, TIME_LOCAL for a stamp in another zone or without one, TIME_OUT_OF_RANGE for month 13,
 *   TIME_NOT_A_STAMP else */
export function readIsoInstant(
  b: Uint8Array,
  from: number,
  end: number,
  out: Float64Array,
  slot: number,
  zoneStated: boolean,
): number {
  if (end - from < 16 || b[from + 4] !== 45 || b[from + 7] !== 45) return TIME_NOT_A_STAMP;
  const year = two(b, from) * 100 + two(b, from + 2);
  const month = two(b, from + 5);
  const day = two(b, from + 8);
  const separator = b[from + 10]!;
  const hour = two(b, from + 11);
  const minute = two(b, from + 14);
  if ((separator !== 84 && separator !== 116 && separator !== 32) || b[from + 13] !== 58) return TIME_NOT_A_STAMP;
  if (Number.isNaN(year + month + day + hour + minute)) return TIME_NOT_A_STAMP;
  let i = from + 16;
  let second = 0;
  if (i < end && b[i] === 58) {
    second = i + 2 < end ? two(b, i + 1) : Number.NaN;
    if (Number.isNaN(second)) return TIME_NOT_A_STAMP;
    i += 3;
    if (i + 1 < end && (b[i] === 46 || b[i] === 44) && b[i + 1]! >= ZERO && b[i + 1]! <= 57) {
      let fraction = 0;
      let scale = 1;
      let k = i + 1;
      for (; k < end; k++) {
        const c = b[k]! - ZERO;
        if (!(c >= 0 && c <= 9)) break;
        if (scale < 1e15) {
          fraction = fraction * 10 + c;
          scale *= 10;
        }
      }
      // ISO 8601 has a comma too; but in a CSV file it parts fields, so it is one of ours only before a Z.
      if (b[i] === 46 || (k < end && (b[k]! | 32) === 122)) {
        second += fraction / scale;
        i = k;
      }
    }
  }
  if (month < 1 || month > 12 || day < 1 || hour > 23 || minute > 59 || second >= 61) return TIME_OUT_OF_RANGE;
  const days = daysFromCivil(year, month, day);
  const nextMonth = month === 12 ? daysFromCivil(year + 1, 1, 1) : daysFromCivil(year, month + 1, 1);
  if (days >= nextMonth) return TIME_OUT_OF_RANGE;
  out[slot] = days + MJD_OF_1970;
  out[slot + 1] = hour * 3600 + minute * 60 + second;
  if (b[i] === 90 || b[i] === 122) return i + 1;
  if (b[i] === 43 || b[i] === 45) {
    const hours = two(b, i + 1);
    const colon = b[i + 3] === 58 ? 1 : 0;
    const minutes = i + 4 + colon < end ? two(b, i + 3 + colon) : Number.NaN;
    return hours === 0 && minutes === 0 && b[i] === 43 ? i + 5 + colon : TIME_LOCAL;
  }
  return zoneStated ? i : TIME_LOCAL;
}
