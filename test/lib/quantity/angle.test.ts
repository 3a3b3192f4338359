import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type AngleAxis, parseAngle } from '../../../lib/quantity/index.js';
import { refusal } from './refusal.js';

const deg = (input: string | number, axis: AngleAxis = 'latitude') => parseAngle(input, axis).degrees;

describe('parseAngle', () => {
  // 52 + 17/60 + 41.2/3600 = 1882612/36000, one rounding
  it.each([
    `52°17'41.2"N`,
    `52°17′41.2″ N`,
    `52° 17’ 41.2” N`,
    `N 52°17'41.2''`,
    `N52°17′41.2′′`,
    `52°17'41.2"`,
    `+52º17ʹ41.2ʺ`,
    `52deg17'41.2"`,
  ])('%s', (text) => {
    expect(deg(text)).toBe(1882612 / 36000);
  });

  it.each<[string | number, AngleAxis, number]>([
    [52.2961, 'latitude', 52.2961],
    ['52.2961', 'latitude', 52.2961],
    ['52.2961°', 'latitude', 52.2961],
    ['52.2961° N', 'latitude', 52.2961],
    ['52.2961S', 'latitude', -52.2961],
    ['S 52.2961', 'latitude', -52.2961],
    ["-0°30'", 'latitude', -0.5],
    ["\u22120°30'", 'latitude', -0.5],
    ["0°30'S", 'latitude', -0.5],
    [`0°0'36"W`, 'longitude', -0.01],
    ["52°17.25'N", 'latitude', 52.2875],
    [`10°27'36"E`, 'longitude', 10.46],
    ['105.2601 W', 'longitude', -105.2601],
    [-180, 'longitude', -180],
    [359.5, 'longitude', 359.5],
    ['90', 'latitude', 90],
    ['-90°', 'latitude', -90],
    [`90°0'0"S`, 'latitude', -90],
    ['.5', 'latitude', 0.5],
  ])('%s as %s', (input, axis, degrees) => {
    const angle = parseAngle(input, axis);
    expect(angle.degrees).toBe(degrees);
    expect(angle.radians).toBe((degrees * Math.PI) / 180);
    expect(angle.text).toBe(typeof input === 'string' ? input : null);
  });

  it('never gives a negative zero', () => {
    for (const text of ['-0', `0°0'0"S`]) expect(Object.is(deg(text), 0)).toBe(true);
  });

  it('degrees, minutes and seconds are the nearest double, whatever they are', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 89 }),
        fc.integer({ min: 0, max: 59 }),
        fc.integer({ min: 0, max: 59999 }),
        fc.boolean(),
        (d, m, ms, south) => {
          const text = `${d}°${m}'${(ms / 1000).toFixed(3)}"${south ? 'S' : 'N'}`;
          // Both numerator and denominator are whole, so this division is the correctly rounded one.
          const expected = ((d * 60 + m) * 60000 + ms) / 3600000;
          expect(deg(text)).toBe(south && expected !== 0 ? -expected : expected);
        },
      ),
      { numRuns: 500 },
    );
  });

  it.each<[string | number, AngleAxis, string, number, string]>([
    ['', 'latitude', 'empty', 0, '52.2961'],
    ['abc', 'latitude', 'not-a-number', 0, '52.2961'],
    ['.', 'latitude', 'not-a-number', 0, 'a digit'],
    ['-', 'latitude', 'not-a-number', 1, 'a digit'],
    ['-inf', 'latitude', 'not-finite', 1, 'a finite number'],
    ['nan', 'longitude', 'not-finite', 0, 'a finite number'],
    [Number.NaN, 'latitude', 'not-finite', 0, 'a finite number'],
    [Number.POSITIVE_INFINITY, 'longitude', 'not-finite', 0, 'a finite number'],
    ['52,2961 N', 'latitude', 'decimal-comma', 2, 'write 52.2961 N'],
    [`52°17'41,2"N`, 'latitude', 'decimal-comma', 8, `write 52°17'41.2"N`],
    ['52.3 E', 'latitude', 'wrong-hemisphere', 5, 'N or S: this is a latitude'],
    ['N 10.4', 'longitude', 'wrong-hemisphere', 0, 'E or W: this is a longitude'],
    ['52.3 n', 'latitude', 'wrong-hemisphere', 5, 'write 52.3 N'],
    ['10.4 O', 'longitude', 'wrong-hemisphere', 5, 'E or W'],
    ['-52.3 S', 'latitude', 'two-signs', 0, 'either a sign or N/S'],
    ['S -52.3', 'latitude', 'two-signs', 2, 'either a sign or N/S'],
    ['N 52.3 N', 'latitude', 'two-signs', 7, 'one hemisphere letter'],
    ['--52', 'latitude', 'two-signs', 1, 'one sign'],
    ['\u201352.3', 'latitude', 'dash-for-minus', 0, 'write -52.3'],
    [95, 'latitude', 'out-of-range', 0, '-90° to 90°'],
    ['95', 'latitude', 'out-of-range', 0, '-90° to 90°'],
    [`90°0'0.001"N`, 'latitude', 'out-of-range', 0, '-90° to 90°'],
    ['361', 'longitude', 'out-of-range', 0, '-180° to 360°'],
    ['-180.5', 'longitude', 'out-of-range', 0, '-180° to 360°'],
    ["52°61'", 'latitude', 'out-of-range', 3, 'below 60'],
    [`52°17'60"`, 'latitude', 'out-of-range', 6, 'below 60'],
    ["52.5°30'", 'latitude', 'stray-text', 2, 'decimals in the last'],
    [`52°17.5'30"`, 'latitude', 'stray-text', 5, 'decimals in the last'],
    ['1.5.2', 'latitude', 'stray-text', 3, '52.2961'],
    ['52 17 41 N', 'latitude', 'stray-text', 3, 'marks between the numbers'],
    ['52:17:41', 'latitude', 'stray-text', 2, '52.2961'],
    [`52"17'`, 'latitude', 'stray-text', 2, '°'],
    [`52°17"`, 'latitude', 'stray-text', 5, "'"],
    ['52° x', 'latitude', 'stray-text', 4, '52.2961'],
    ['52°17 N', 'latitude', 'unit-missing', 5, `' or "`],
    ["52°17'41 N", 'latitude', 'unit-missing', 8, '" after the number'],
    [`1${'0'.repeat(300)}`, 'latitude', 'too-long', 200, 'at most 200'],
  ])('refuses %s as %s', (input, axis, code, position, expected) => {
    const error = refusal(() => parseAngle(input, axis));
    expect([error.code, error.position]).toEqual([code, position]);
    expect(error.expected).toContain(expected);
  });
});
