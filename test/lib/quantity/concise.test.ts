import { describe, expect, it } from 'vitest';
import {
  concise,
  conciseInUnit,
  digitGroups,
  formatConcise,
  formatDays,
  formatDuration,
  formatEstimate,
  formatLength,
  formatPlusMinus,
  formatScaled,
} from '../../../lib/quantity/index.js';
import { refusal } from './refusal.js';

const ascii = { minus: '-' } as const;

describe('concise notation', () => {
  it.each<[number, number, string]>([
    // JCGM 100:2008 (GUM), 7.2.2: 100.021 47(35)
    [100.02147, 0.00035, '100.02147(35)'],
    // the rest by hand
    [-850.012, 0.044, '-850.012(44)'],
    [93783.1, 2.9, '93783.1(2.9)'],
    [62636853.4, 0.5, '62636853.40(50)'],
    [143.216, 0.008, '143.2160(80)'],
    // no digit gained or lost where the u just misses the next power of ten
    [0.0098, 0.00095, '0.00980(95)'],
    [0.0098, 0.0095, '0.0098(95)'],
    [0.0098, 0.095, '0.010(95)'],
    [0.0098, 0.0994, '0.010(99)'],
    [0.0098, 0.0996, '0.01(10)'],
    [5, 0.00996, '5.000(10)'],
    [5, 0.996, '5.0(1.0)'],
    [5, 9.96, '5(10)'],
    [5, 9.94, '5.0(9.9)'],
    [1234, 99.6, '1230(100)'],
    [1234.5, 12.5, '1234(12)'],
    [93800, 1234, '93800(1200)'],
    // ties go to the even digit, in the shortest decimal of the double: 2.675 is below its decimal, 1.005 too
    [2.675, 0.1, '2.68(10)'],
    [2.665, 0.1, '2.66(10)'],
    [1.005, 0.1, '1.00(10)'],
    [1.015, 0.1, '1.02(10)'],
    [1, 0.125, '1.00(12)'],
    [1, 0.135, '1.00(14)'],
    // rounding up through a power of ten
    [9.996, 0.1, '10.00(10)'],
    [-0.001, 0.44, '0.00(44)'],
    [0, 1, '0.0(1.0)'],
    // powers of ten; below 1e-4 and from 1e16, or where zeros would stand for digits
    [9.378306e-14, 2.9e-20, '9.3783060(29)e-14'],
    [4.1e-17, 1.6e-17, '4.1(1.6)e-17'],
    [2e-18, 1.1e-17, '0.2(1.1)e-17'],
    [-9.96e-17, 1.2e-18, '-9.96(12)e-17'],
    [9.996e-17, 1e-18, '1.000(10)e-16'],
    [0.0001234, 1e-7, '0.00012340(10)'],
    [0.00001234, 1e-8, '1.2340(10)e-5'],
    [1.2e6, 3e5, '1.20(30)e6'],
    [1.2e6, 3e4, '1200000(30000)'],
    [1.5e16, 3, '1.50000000000000000(30)e16'],
    [429228004229872.94, 0.08, '429228004229872.940(80)'],
    [5e-324, 5e-324, '5.0(5.0)e-324'],
  ])('%d with u %d', (value, u, text) => {
    expect(formatConcise(value, u, ascii)).toBe(text);
  });
});

describe('options', () => {
  it('one digit of u', () => {
    expect(formatConcise(143.216, 0.008, { digits: 1 })).toBe('143.216(8)');
    expect(formatConcise(5.5, 0.096, { digits: 1 })).toBe('5.5(1)');
    expect(formatConcise(2.5, 3, { digits: 1 })).toBe('2(3)');
    expect(formatConcise(9.995, 0.01, { digits: 1 })).toBe('10.00(1)');
    expect(formatConcise(1, 0.25, { digits: 1 })).toBe('1.0(2)');
  });

  it('minus and plus', () => {
    expect(formatConcise(-850.012, 0.044)).toBe('\u2212850.012(44)');
    expect(formatConcise(5.5, 0.3, { sign: 'always' })).toBe('+5.50(30)');
    expect(formatConcise(-5.5, 0.3, { sign: 'always', minus: '-' })).toBe('-5.50(30)');
    // A sign on a rounded zero would be a claim.
    expect(formatConcise(-0.01, 3, { sign: 'always' })).toBe('0.0(3.0)');
    expect(formatConcise(-0, 0, { sign: 'always' })).toBe('0');
  });

  it('digit groups from five digits up, on either side of the point', () => {
    const grouped = { groupSeparator: '\u202f' };
    expect(formatConcise(93783.1, 2.9, grouped)).toBe('93\u202f783.1(2.9)');
    expect(formatConcise(9378.1, 2.9, grouped)).toBe('9378.1(2.9)');
    expect(formatConcise(100.02147, 0.00035, grouped)).toBe('100.021\u202f47(35)');
    expect(formatConcise(1.2345, 0.0012, grouped)).toBe('1.2345(12)');
    expect(formatConcise(1250000, 34000, grouped)).toBe('1\u202f250\u202f000(34\u202f000)');
    expect(digitGroups('1234567', 'integer')).toEqual(['1', '234', '567']);
    expect(digitGroups('123456', 'integer')).toEqual(['123', '456']);
    expect(digitGroups('1234', 'integer')).toEqual(['1234']);
    expect(digitGroups('1234567', 'fraction')).toEqual(['123', '456', '7']);
    expect(digitGroups('', 'fraction')).toEqual([]);
  });

  it('in units of a power of ten that the head names', () => {
    expect(formatScaled(9.4e-17, 1.2e-18, -18)).toBe('94.0(1.2)');
    expect(formatScaled(9.378306e-14, 2.9e-20, -18)).toBe('93783.060(29)');
    expect(formatConcise(9.4e-17, 1.2e-18, { scale: -18, minus: '-' })).toBe('94.0(1.2)');
    expect(formatScaled(3e-25, 1e-26, -18)).toBe('0.000000300(10)');
  });

  it('a power of ten by order', () => {
    expect(formatConcise(9.4e-17, 1.2e-18, { power: -18 })).toBe('94.0(1.2)e-18');
    expect(formatConcise(9.4e-17, 1.2e-18, { power: -16 })).toBe('0.940(12)e-16');
    expect(formatConcise(9.4e-17, 1.2e-18, { power: -20 })).toBe('9400(120)e-20');
    expect(formatConcise(4.1e-17, 1.6e-17, { powerStyle: 'times' })).toBe('4.1(1.6)×10⁻¹⁷');
  });

  it('exact numbers whole, unknown u too, on request rounded', () => {
    expect(formatConcise(62636853.4, 0)).toBe('62636853.4');
    expect(formatConcise(62636853.4, null)).toBe('62636853.4');
    expect(formatConcise(0.1, 0)).toBe('0.1');
    expect(formatConcise(0, 0)).toBe('0');
    expect(formatConcise(6.969290134e-10, 0)).toBe('6.969290134e-10');
    expect(formatConcise(120000, 0)).toBe('120000');
    expect(formatConcise(429228004229873, 0)).toBe('429228004229873');
    expect(formatConcise(1e16, 0)).toBe('1e16');
    expect(formatConcise(0.47236, null, { significant: 2 })).toBe('0.47');
    expect(formatConcise(0.996, null, { significant: 2 })).toBe('1.0');
    expect(formatConcise(12.5, null, { significant: 2 })).toBe('12');
  });

  it('value and u too far apart for a bracket', () => {
    expect(formatConcise(1e300, 1e-300)).toBe('1e300 ± 1.0e-300');
    expect(formatConcise(-1.5, 1e-40, ascii)).toBe('-1.5e0 ± 1.0e-40');
    expect(formatConcise(1e-300, 1e300)).toBe('0.0(1.0)e300');
  });

  it('±', () => {
    expect(formatPlusMinus(143.216, 0.008)).toBe('143.2160 ± 0.0080');
    expect(formatPlusMinus(93783.1, 2.9)).toBe('93783.1 ± 2.9');
    expect(formatPlusMinus(4.1e-17, 1.6e-17)).toBe('(4.1 ± 1.6)e-17');
    expect(formatPlusMinus(5, 0)).toBe('5');
    expect(formatPlusMinus(1e300, 1e-300)).toBe('1e300 ± 1.0e-300');
  });

  it('pieces for a renderer', () => {
    expect(concise(-93783.1, 2.9)).toEqual({
      sign: '-',
      integer: '93783',
      fraction: '1',
      bracket: '2.9',
      u: '2.9',
      power: null,
      apart: null,
    });
    expect(concise(9.4e-17, 1.2e-18)).toMatchObject({
      integer: '9',
      fraction: '40',
      bracket: '12',
      u: '0.12',
      power: -17,
    });
  });

  it('refuses what is no number', () => {
    for (const [value, u, code] of [
      [Number.NaN, 1, 'not-finite'],
      [1, Number.NaN, 'not-finite'],
      [Number.POSITIVE_INFINITY, 0, 'not-finite'],
      [1, Number.NEGATIVE_INFINITY, 'not-finite'],
      [1, -1, 'negative-u'],
    ] as const)
      expect(refusal(() => formatConcise(value, u)).code).toBe(code);
  });
});

describe('with a unit', () => {
  it('behind a no-break space', () => {
    expect(formatEstimate({ value: -850.012, u: 0.044 }, 'length', 'm')).toBe('\u2212850.012(44)\u00a0m');
    expect(formatEstimate({ value: 9.8125523, u: 3e-6 }, 'acceleration', 'mGal')).toBe('981255.23(30)\u00a0mGal');
    expect(formatEstimate({ value: 12, u: 0 }, 'potential', 'kGal·m')).toBe('1.2\u00a0kGal·m');
    expect(formatEstimate({ value: 4.1e-17, u: 1.6e-17 }, 'fraction', '')).toBe('4.1(1.6)e-17');
    expect(formatEstimate({ value: 4.1e-17, u: 1.6e-17 }, 'fraction', '1')).toBe('4.1(1.6)e-17');
    expect(formatEstimate({ value: 5, u: null }, 'length', 'cm')).toBe('500\u00a0cm');
    expect(refusal(() => formatEstimate({ value: 5, u: 1 }, 'length', 'mGal')).code).toBe('wrong-unit');
  });

  it('in pieces', () => {
    expect(conciseInUnit({ value: 0.044, u: 0.0012 }, 'length', 'mm')).toMatchObject({
      integer: '44',
      fraction: '0',
      bracket: '1.2',
    });
  });

  it('an irrational factor leaves at most a double’s digits', () => {
    expect(formatEstimate({ value: 1, u: 0 }, 'root-length', 'mm/√km')).toBe('31622.776601683793\u00a0mm/√km');
  });
});

describe('in sentences', () => {
  it.each([
    [0.044, '44\u00a0mm'],
    [0.126, '126\u00a0mm'],
    [1.4, '1.4\u00a0m'],
    [-0.33, '\u2212330\u00a0mm'],
    [457123, '457\u00a0km'],
    [999.4, '999\u00a0m'],
    [999.6, '1\u00a0km'],
    [0.9996, '1\u00a0m'],
    [3e-5, '30\u00a0µm'],
    [0, '0\u00a0m'],
    [1e-12, '1e-12\u00a0m'],
  ])('length %d m', (lengthM, text) => {
    expect(formatLength(lengthM)).toBe(text);
  });

  it('length to two digits', () => {
    expect(formatLength(0.0883, 2)).toBe('88\u00a0mm');
  });

  it.each([
    [0.002, '0.002\u00a0s'],
    [30, '30\u00a0s'],
    [59.99, '1\u00a0min'],
    [5400, '1.5\u00a0h'],
    [86399.9, '1\u00a0d'],
    [277948.8, '3.22\u00a0d'],
  ])('duration %d s', (durationS, text) => {
    expect(formatDuration(durationS)).toBe(text);
  });

  it('days whatever the size', () => {
    expect(formatDays(14 * 86400)).toBe('14\u00a0d');
    expect(formatDays(21600)).toBe('0.25\u00a0d');
  });

  it('refuse NaN', () => {
    expect(refusal(() => formatLength(Number.NaN)).code).toBe('not-finite');
    expect(refusal(() => formatDuration(Number.POSITIVE_INFINITY)).code).toBe('not-finite');
  });
});
