import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatConcise, formatPlusMinus, parseQuantity, type TextOptions } from '../../../lib/quantity/index.js';

/** Doubles of every size, not only of the sizes that a uniform draw of bits would favour. */
const magnitude = fc
  .tuple(fc.double({ min: 1, max: 10, noNaN: true, maxExcluded: true }), fc.integer({ min: -300, max: 300 }))
  .map(([mantissa, exponent]) => Number(`${mantissa}e${exponent}`));
const value = fc.oneof(
  { weight: 8, arbitrary: fc.tuple(magnitude, fc.boolean()).map(([x, negative]) => (negative ? -x : x)) },
  { weight: 1, arbitrary: fc.constantFrom(0, -0, 0.0098, 62636853.4, 9.995, 0.5, 5e-324, 1e300) },
);
/** A u related to the value, and one of any size. */
const pair = fc.oneof(
  fc.tuple(value, magnitude),
  fc
    .tuple(value, fc.double({ min: 1, max: 10, noNaN: true }), fc.integer({ min: -20, max: 4 }))
    .map(([x, m, e]) => [x, Math.abs(x) * m * 10 ** e] as const)
    .filter(([, u]) => u > 1e-305 && u < 1e305),
  fc.tuple(value, fc.constantFrom(0.00095, 0.0095, 0.0996, 0.996, 9.96, 99.6, 0.25, 1e-17)),
);
const options: fc.Arbitrary<TextOptions> = fc.record(
  {
    digits: fc.constantFrom(1 as const, 2 as const),
    sign: fc.constantFrom('negative' as const, 'always' as const),
    minus: fc.constantFrom('-' as const, '\u2212' as const),
    groupSeparator: fc.constantFrom('', ' ', '\u202f', '\u2009', '\u00a0'),
    powerStyle: fc.constantFrom('e' as const, 'times' as const),
  },
  { requiredKeys: [] },
);

/** A decimal text as an integer of units of 10^-places; an arithmetic of its own, so that the check does not lean on the
 *  one under test. */
const scaled = (x: number, places: number): { integer: bigint; rest: number } => {
  const [mantissa = '', exponent = '0'] = Math.abs(x).toExponential().split('e');
  const [whole = '', fraction = ''] = mantissa.split('.');
  const digits = BigInt(whole + fraction);
  const shift = Number(exponent) - fraction.length + places;
  if (shift >= 0) return { integer: digits * 10n ** BigInt(shift), rest: 0 };
  const unit = 10n ** BigInt(-shift);
  const twice = 2n * (digits % unit);
  return { integer: digits / unit, rest: twice < unit ? -1 : twice > unit ? 1 : 0.5 };
};

/** Nearest integer of units of 10^-places, ties to even. */
const rounded = (x: number, places: number): bigint => {
  const { integer, rest } = scaled(x, places);
  const up = rest === 1 || (rest === 0.5 && integer % 2n === 1n);
  return integer + (up ? 1n : 0n);
};

/** Exponent of the last printed digit, by u's digits. */
const lastPlace = (u: number, digits: number): number => {
  const first = Number(u.toExponential().split('e')[1]);
  const last = first - digits + 1;
  return rounded(u, -last) >= 10n ** BigInt(digits) ? last + 1 : last;
};

const expectRounded = (read: { toFixed(): string; isNegative(): boolean }, x: number, last: number): void => {
  const [whole = '0', fraction = ''] = read.toFixed().replace('-', '').split('.');
  const places = Math.max(0, -last);
  expect(fraction.length).toBeLessThanOrEqual(places);
  const integer = BigInt(whole + fraction.padEnd(places, '0'));
  expect(integer).toBe(rounded(x, -last) * (last > 0 ? 10n ** BigInt(last) : 1n));
  if (integer !== 0n) expect(read.isNegative()).toBe(x < 0);
};

describe('parse(print(q)) = q', () => {
  it.each([
    ['concise', formatConcise],
    ['±', formatPlusMinus],
  ] as const)('%s: value and u rounded to the printed digits, no other change', (_, print) => {
    fc.assert(
      fc.property(pair, options, ([x, u], o) => {
        const text = print(x, u, o);
        const q = parseQuantity(text, 'fraction');
        const digits = o.digits ?? 2;
        const last = lastPlace(u, digits);
        expect(q.decimal.u).not.toBeNull();
        expectRounded(q.decimal.u!, u, last);
        // Too far apart for a bracket: the value stands whole.
        if (text.includes('±') && print === formatConcise) expect(q.value).toBe(x === 0 ? 0 : x);
        else if (!/^\S+e-?\d+ ±/.test(text)) expectRounded(q.decimal.value, x, last);
        else expect(q.value).toBe(x === 0 ? 0 : x);
        // And the doubles are those nearest to the printed decimals.
        expect(q.value).toBe(Number(q.decimal.value.toString()));
        expect(q.u).toBe(Number(q.decimal.u!.toString()));
        // Printing what was read gives the same text again.
        expect(print(q.value, q.u, o)).toBe(text);
      }),
      { numRuns: 500 },
    );
  });

  it('exact numbers come back to the last bit', () => {
    fc.assert(
      fc.property(fc.oneof(value, fc.double({ noNaN: true, noDefaultInfinity: true })), options, (x, o) => {
        for (const u of [0, null]) {
          const q = parseQuantity(formatConcise(x, u, o), 'fraction');
          expect(q.value).toBe(x === 0 ? 0 : x);
          expect(q.decimal.u).toBeNull();
        }
      }),
      { numRuns: 500 },
    );
  });

  it('keeps the unit’s digits, too', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 10 ** 9 }),
        fc.integer({ min: 1, max: 99 }),
        fc.constantFrom(['mm', -3], ['km', 3], ['µm', -6], ['cm', -2]),
        (n, u, [unit, exponent]) => {
          const q = parseQuantity(`${n}(${u}) ${unit}`, 'length');
          expect(q.value).toBe(Number(`${n}e${exponent}`));
          expect(q.u).toBe(Number(`${u}e${exponent}`));
        },
      ),
      { numRuns: 200 },
    );
  });
});
