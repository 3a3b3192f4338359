import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatInstant, mjdToMs, msToMjd, parseInstant, parseMjd } from '../../../lib/quantity/index.js';
import { refusal } from './refusal.js';

describe('parseInstant', () => {
  it.each([
    ['1970-01-01T00:00:00Z', 0],
    ['2027-05-03T00:00:00Z', 1809302400000],
    ['2027-05-03T02:00+02:00', 1809302400000],
    ['2027-05-02T18:30:00-05:30', 1809302400000],
    ['2027-05-02T18:30:00\u221205:30', 1809302400000],
    ['2027-05-03T00:00:00.250Z', 1809302400250],
    ['2027-05-03T00:00:00.0005Z', 1809302400000.5],
    ['2000-02-29T23:59:59Z', 951868799000],
    [' 2027-05-03T00:00Z ', 1809302400000],
  ])('%s', (text, ms) => {
    expect(parseInstant(text)).toBe(ms);
  });

  it('agrees with the date parser of the language', () => {
    fc.assert(
      fc.property(
        fc.date({ min: new Date('1900-01-01T00:00Z'), max: new Date('2199-12-31T00:00Z'), noInvalidDate: true }),
        (date) => {
          expect(parseInstant(date.toISOString())).toBe(date.getTime());
          expect(parseInstant(formatInstant(date.getTime()))).toBe(date.getTime());
        },
      ),
      { numRuns: 300 },
    );
  });

  it.each([
    ['', 'empty', 0, '2027-05-03T00:00:00Z'],
    ['2027-05-03', 'bad-instant', 10, 'write 2027-05-03T00:00:00Z'],
    ['2027-05-03T00:00:00', 'local-time', 19, 'write 2027-05-03T00:00:00Z if it is UTC'],
    ['2027-05-03T00:00', 'local-time', 16, 'write 2027-05-03T00:00Z if it is UTC'],
    ['2027-05-03 00:00Z', 'bad-instant', 10, 'write 2027-05-03T00:00Z'],
    ['2016-12-31T23:59:60Z', 'leap-second', 17, 'without leap seconds'],
    ['2027-05-03T00:00:61Z', 'out-of-range', 17, 'the second from 0 to 59'],
    ['2027-02-29T00:00Z', 'out-of-range', 8, 'the day from 1 to 28'],
    ['1900-02-29T00:00Z', 'out-of-range', 8, 'the day from 1 to 28'],
    ['2027-13-01T00:00Z', 'out-of-range', 5, 'the month from 1 to 12'],
    ['2027-00-01T00:00Z', 'out-of-range', 5, 'the month'],
    ['2027-05-03T24:00Z', 'out-of-range', 11, 'the hour from 0 to 23'],
    ['2027-05-03T00:60Z', 'out-of-range', 14, 'the minute from 0 to 59'],
    ['2027-05-03T00:00+15:00', 'out-of-range', 17, 'the offset from 0 to 14'],
    ['2027-05-03T00:00+01:75', 'out-of-range', 20, 'the minute'],
    ['1899-12-31T00:00Z', 'out-of-range', 0, 'the year from 1900 to 2199'],
    ['2200-01-01T00:00Z', 'out-of-range', 0, 'the year'],
    ['27-05-03T00:00Z', 'bad-instant', 2, 'the year with 4 digits'],
    ['2027-5-3T00:00Z', 'bad-instant', 6, 'the month with 2 digits'],
    ['2027/05/03T00:00Z', 'bad-instant', 4, '- here'],
    ['2027-05-03T0000Z', 'bad-instant', 13, ': here'],
    ['2027-05-03T00:00:00.Z', 'bad-instant', 20, 'digits after the point'],
    ['2027-05-03T00:00:00,5Z', 'decimal-comma', 19, 'write 2027-05-03T00:00:00.5Z'],
    ['2027-05-03T00:00 CEST', 'bad-instant', 16, 'Z or an offset'],
    ['2027-05-03T00:00Z x', 'stray-text', 18, 'nothing after the offset'],
    ['x'.repeat(201), 'too-long', 200, 'an instant'],
  ])('refuses %s', (text, code, position, expected) => {
    const error = refusal(() => parseInstant(text));
    expect([error.code, error.position]).toEqual([code, position]);
    expect(error.expected).toContain(expected);
  });
});

describe('Modified Julian Date', () => {
  // MJD = JD − 2400000.5 (US Naval Observatory, page "mjd"): JD 2451544.5 is 2000-01-01T00Z; MJD 55197 is 2010-01-01.
  it.each([
    [0, '1858-11-17T00:00:00Z'],
    [40587, '1970-01-01T00:00:00Z'],
    [51544, '2000-01-01T00:00:00Z'],
    [51544.5, '2000-01-01T12:00:00Z'],
    [55197, '2010-01-01T00:00:00Z'],
  ])('%d is %s', (mjd, iso) => {
    expect(formatInstant(mjdToMs(mjd))).toBe(iso);
    expect(msToMjd(mjdToMs(mjd))).toBe(mjd);
    if (mjd > 20000) expect(parseMjd(String(mjd))).toBe(Date.parse(iso));
  });

  it('text is read with more digits than a double of days holds', () => {
    // 1 µs is 1.157e-11 d; a double of 61528 d resolves 7e-12 d.
    expect(parseMjd('61528.00000000001157407407')).toBe(mjdToMs(61528) + 0.001);
  });

  it.each([
    ['', 'empty', 0, '61528.25'],
    ['abc', 'not-a-number', 0, '61528.25'],
    ['-5', 'not-a-number', 0, '61528.25'],
    ['61528,25', 'decimal-comma', 5, 'write 61528.25'],
    ['61528.25 x', 'stray-text', 9, 'a number alone'],
    ['2461528.75', 'out-of-range', 0, 'a Julian Date? then write 61528.25'],
    ['15019.9', 'out-of-range', 0, '15020'],
    ['124594', 'out-of-range', 0, 'to below 124593'],
    ['1'.repeat(201), 'too-long', 200, '61528.25'],
  ])('refuses %s', (text, code, position, expected) => {
    const error = refusal(() => parseMjd(text));
    expect([error.code, error.position]).toEqual([code, position]);
    expect(error.expected).toContain(expected);
  });
});

it('an instant that is none is not printed', () => {
  for (const ms of [Number.NaN, Number.POSITIVE_INFINITY, 9e15])
    expect(refusal(() => formatInstant(ms)).code).toBe('out-of-range');
});
