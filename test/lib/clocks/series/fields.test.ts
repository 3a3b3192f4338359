import { Decimal } from 'decimal.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fractionFromPieces, fractionFromText, nominal, ratioNominal } from '../../../../lib/clocks/series/nominal.js';
import { readDecimalPieces, readNumber } from '../../../../lib/clocks/series/number-field.js';
import {
  daysFromCivil,
  MJD_OF_1970,
  readIsoInstant,
  readModifiedJulianDate,
  TIME_LOCAL,
  TIME_NOT_A_STAMP,
  TIME_OUT_OF_RANGE,
} from '../../../../lib/clocks/series/time-field.js';
import { decodeUtf8, encodeUtf8 } from '../../../../lib/clocks/series/utf8.js';

const out = new Float64Array(4);
const number = (text: string): number | null => {
  const bytes = encodeUtf8(text);
  return readNumber(bytes, 0, bytes.length, out, 0) === bytes.length ? out[0]! : null;
};

describe('numbers from bytes', () => {
  it.each([
    ['0', 0],
    ['-0.0', 0],
    ['+12.5', 12.5],
    ['.5', 0.5],
    ['5.', 5],
    ['−2.1174e−14', -2.1174e-14],
    ['1.5D-15', 1.5e-15],
    ['1E3', 1000],
    ['000123456789012345678901234567890', 123456789012345678901234567890],
    ['12345678901234567890123456789012345', 12345678901234567890123456789012345],
    ['0.000000000000000000000123456789012345678', 1.23456789012345678e-22],
  ])('%s', (text, value) => {
    expect(number(text)).toBe(value);
  });

  it.each(['', '-', 'e5', '1e', '1e+', '.', '--1', 'nan', '1e81', '1e-200'])('not by the quick way: %j', (text) => {
    expect(number(text)).toBeNull();
  });

  it('stops where the number ends', () => {
    const bytes = encodeUtf8('12.5,7');
    expect(readNumber(bytes, 0, bytes.length, out, 0)).toBe(4);
    expect(readNumber(bytes, 5, bytes.length, out, 0)).toBe(6);
  });

  it('rounds as the language does, for any number of digits', () => {
    const texts = fc.oneof(
      fc
        .tuple(fc.integer({ min: -60, max: 60 }), fc.bigInt({ min: 0n, max: 10n ** 30n - 1n }))
        .map(([e, m]) => `${m}e${e}`),
      fc.double({ min: 1e-40, max: 1e20, noNaN: true }).map((x) => x.toExponential(17)),
      fc.double({ min: 1e-30, max: 1e3, noNaN: true }).map(String),
    );
    fc.assert(
      fc.property(texts, (text) => {
        expect(number(text)).toBe(Number(text));
      }),
      { numRuns: 5000 },
    );
  });
});

describe('values too long for a double', () => {
  const y = (text: string, from: ReturnType<typeof nominal>): number => {
    const bytes = encodeUtf8(text);
    const end = readDecimalPieces(bytes, 0, bytes.length, out, 0);
    return end === bytes.length ? fractionFromPieces(out[0]!, out[1]!, out[2]!, from) : fractionFromText(text, from)!;
  };

  it('1 + 1e-18 survives, and 1 − 1e-18, and 1 + 1e-25', () => {
    const one = nominal('1', '1');
    // half a unit of the last bit, for the factor 1e-15 or 1e-30 is rounded
    const close = (text: string, value: number) => expect(Math.abs(y(text, one) / value - 1)).toBeLessThan(3e-16);
    close('1.000000000000000001', 1e-18);
    close('0.999999999999999999', -1e-18);
    close('1.0000000000000000000000001', 1e-25);
    close('0.9999999999999999999999999', -1e-25);
    close('+1.000000000000000001', 1e-18);
    close('1000000000000000001e-18', 1e-18);
    expect(y('1', one)).toBe(0);
  });

  it('an absolute frequency of twenty digits: 1e-5 Hz of strontium is 2.3e-20', () => {
    const sr = nominal('429228004229872.99', '429228004229872.99');
    expect(Math.abs(y('429228004229872.99001', sr) / (1e-5 / 429228004229872.99) - 1)).toBeLessThan(1e-14);
    expect(y('429228004229872.99', sr)).toBe(0);
  });

  it('a beat note over its optical frequency, turned round where the beat falls as the clock rises', () => {
    const beat = nominal('35 000 000', '-429228004229872.99');
    expect(Math.abs(y('35000000.25', beat) / (-0.25 / 429228004229872.99) - 1)).toBeLessThan(1e-14);
  });

  it('a ratio of unlike clocks, against exact decimals', () => {
    const Wide = Decimal.clone({ precision: 60 });
    const yb = '518295836590863.63';
    const sr = '429228004229872.99';
    const from = ratioNominal(yb, sr);
    fc.assert(
      fc.property(fc.integer({ min: -900000, max: 900000 }), fc.integer({ min: 18, max: 24 }), (k, digits) => {
        const text = new Wide(yb).div(sr).times(new Wide(k).times('1e-19').plus(1)).toFixed(digits);
        const exact = new Wide(text).div(new Wide(yb).div(sr)).minus(1).toNumber();
        expect(Math.abs(y(text, from) - exact)).toBeLessThan(1e-29 + 1e-15 * Math.abs(exact));
      }),
      { numRuns: 300 },
    );
  });

  it('refuses what is no number', () => {
    expect(() => nominal('abc', '1')).toThrow(/decimal number/);
    expect(() => nominal('1', '0')).toThrow(/divisor 0/);
    expect(fractionFromText('1.2.3', nominal('1', '1'))).toBeNull();
    expect(fractionFromText('Infinity', nominal('1', '1'))).toBeNull();
  });
});

describe('time stamps', () => {
  const iso = (text: string, stated = false) => {
    const bytes = encodeUtf8(text);
    return readIsoInstant(bytes, 0, bytes.length, out, 0, stated);
  };
  const seconds = () => (out[0]! - MJD_OF_1970) * 86400 + out[1]!;

  it('ISO 8601 in UTC, against Date', () => {
    fc.assert(
      fc.property(
        fc.date({ min: new Date('1970-01-01'), max: new Date('2100-01-01'), noInvalidDate: true }),
        (date) => {
          expect(iso(date.toISOString())).toBe(24);
          expect(Math.abs(seconds() - date.getTime() / 1000)).toBeLessThan(1e-6);
        },
      ),
    );
  });

  it.each([
    ['2027-05-03T00:00Z', 17],
    ['2027-05-03 00:00:00Z', 20],
    ['2027-05-03T00:00:00,25Z', 23],
    ['2027-05-03T00:00:00+00:00', 25],
    ['2027-05-03T00:00:00+0000', 24],
  ])('reads %s', (text, end) => {
    expect(iso(text)).toBe(end);
  });

  it.each(['2027-05-03T00:00:00', '2027-05-03T02:00:00+02:00', '2027-05-03T00:00:00-00:30', '2027-05-03 00:00'])(
    'local: %s',
    (text) => {
      expect(iso(text)).toBe(TIME_LOCAL);
    },
  );

  it('takes a stamp without a zone where the column says UTC, but no other zone', () => {
    expect(iso('2027-05-03T00:00:00', true)).toBe(19);
    expect(iso('2027-05-03T00:00:00+02:00', true)).toBe(TIME_LOCAL);
  });

  it.each([
    '2027-13-01T00:00:00Z',
    '2027-02-29T00:00:00Z',
    '2027-05-03T24:00:00Z',
    '2027-05-03T00:60:00Z',
    '2027-05-00T00:00:00Z',
  ])('no such time: %s', (text) => {
    expect(iso(text)).toBe(TIME_OUT_OF_RANGE);
  });

  it.each(['03.05.2027 00:00:00Z', '2027-05-03', '2027-05-03T0x:00:00Z', '2027/05/03T00:00:00Z'])(
    'no stamp: %s',
    (text) => {
      expect(iso(text)).toBe(TIME_NOT_A_STAMP);
    },
  );

  it('leap second: the sixtieth second is read, as the next day', () => {
    expect(iso('2016-12-31T23:59:60Z')).toBe(20);
    expect(seconds()).toBe(Date.UTC(2017, 0, 1) / 1000);
  });

  it('a modified Julian date to a nanosecond of the day', () => {
    const bytes = encodeUtf8('61163.000011574074074');
    expect(readModifiedJulianDate(bytes, 0, bytes.length, out, 0)).toBe(bytes.length);
    expect(out[0]).toBe(61163);
    expect(Math.abs(out[1]! - 1)).toBeLessThan(1e-9);
    // 2027-05-03 is MJD 61528
    expect(daysFromCivil(2027, 5, 3) + MJD_OF_1970).toBe(61528);
  });
});

describe('UTF-8 without TextEncoder', () => {
  it('agrees with it, there and back', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme', maxLength: 40 }), (text) => {
        expect([...encodeUtf8(text)]).toEqual([...new TextEncoder().encode(text)]);
        expect(decodeUtf8(encodeUtf8(text))).toBe(text);
      }),
    );
  });

  it('marks bytes that are no UTF-8', () => {
    expect(decodeUtf8(Uint8Array.of(65, 0xff, 66, 0xe2, 0x88))).toBe('A\uFFFDB\uFFFD\uFFFD');
  });
});
