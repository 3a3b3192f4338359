import { describe, expect, it } from 'vitest';
import { type QuantityKind, readExact, readMeasured, readStandardUncertainty } from '../../../lib/quantity/index.js';

const good = (input: unknown, kind: QuantityKind = 'length') => {
  const read = readMeasured(input, kind);
  if (!read.ok) throw new Error(JSON.stringify(read.problems));
  return read.value;
};

const problems = (input: unknown, kind: QuantityKind = 'length') => {
  const read = readMeasured(input, kind);
  return read.ok ? [] : read.problems;
};

/** [code, at, position] of every problem. */
const faults = (input: unknown, kind: QuantityKind = 'length') =>
  problems(input, kind).map((p) => [p.code, p.at, p.position]);

describe('a measured number in its four forms', () => {
  it('number: exact, in the default unit', () => {
    expect(good(143.216)).toEqual({
      value: 143.216,
      u: 0,
      parts: [],
      distribution: 'normal',
      dof: null,
      text: null,
    });
  });

  it('text', () => {
    expect(good('143.216(8) m')).toEqual({
      value: 143.216,
      u: 0.008,
      parts: [{ u: 0.008, source: null }],
      distribution: 'normal',
      dof: null,
      text: '143.216(8) m',
    });
  });

  it('object around a text', () => {
    expect(good({ value: '143.216(8) m', source: 'gnss', tide: 'free', distribution: 't', dof: 12 })).toEqual({
      value: 143.216,
      u: 0.008,
      parts: [{ u: 0.008, source: 'gnss' }],
      distribution: 't',
      dof: 12,
      text: '143.216(8) m',
    });
  });

  it('object of numbers says the same as the text', () => {
    const { text, ...numbers } = good('143.216(8) m');
    expect(text).toBe('143.216(8) m');
    for (const input of [
      { value: 143.216, u: 0.008, unit: 'm' },
      { value: 143.216, u: 0.008 },
      { value: 143216, u: 8, unit: 'mm' },
      { value: 143.216, u: '8 mm' },
    ])
      expect(good(input)).toEqual({ ...numbers, text: null });
    for (const value of ['143.216', '143.216 m'])
      expect(good({ value, u: 0.008 })).toEqual({ ...numbers, text: value });
    expect(good({ value: '143216', u: '8', unit: 'mm' })).toEqual({ ...numbers, text: '143216' });
    expect(good({ value: '143.216 m', u: 8, unit: 'mm' })).toEqual({ ...numbers, text: '143.216 m' });
    expect(good({ value: '143.216(8) m', unit: 'm' })).toEqual({ ...numbers, text: '143.216(8) m' });
    expect(good({ value: '143.216(8)', unit: 'm' }).u).toBe(0.008);
  });

  it('converts numbers in decimals, not in doubles', () => {
    // 981255.23 · 1e-5 in doubles is 9.812552300000002.
    expect(good({ value: 981255.23, u: 0.3, unit: 'mGal' }, 'acceleration')).toMatchObject({
      value: 9.8125523,
      u: 3e-6,
    });
  });

  it('an uncertainty of zero is exact', () => {
    expect(good({ value: 5, u: 0, source: 'gnss' })).toMatchObject({ u: 0, parts: [] });
    expect(good('5(0) m').parts).toEqual([]);
  });

  it.each(['normal', 'uniform', 'triangular'])('distribution %s', (distribution) => {
    expect(good({ value: 5, u: 1, distribution }).distribution).toBe(distribution);
  });

  it('leaves the other keys to its caller, inherited ones too', () => {
    expect(good({ value: 5, tide: 7, nonsense: true, note: null }).value).toBe(5);
    expect(faults(Object.create({ value: 5 }))).toEqual([['missing', 'value', null]]);
    expect(good(JSON.parse('{"value": 5, "__proto__": {"u": 3}}')).u).toBe(0);
  });
});

describe('parts', () => {
  const parts = [{ u: '18 mm', source: 'quasigeoid' }, { u: '6 mm' }];

  it('add as squares', () => {
    const read = good({ value: '43.812 m', parts });
    expect(read.parts).toEqual([
      { u: 0.018, source: 'quasigeoid' },
      { u: 0.006, source: null },
    ]);
    // √(18² + 6²) = √360 = 6√10
    expect(Math.abs(read.u - 0.006 * Math.sqrt(10))).toBeLessThan(1e-17);
  });

  it('numbers are in the default unit', () => {
    expect(good({ value: 43.812, parts: [{ u: 0.018, source: 'a' }, { u: 0.006 }] }).parts).toEqual([
      { u: 0.018, source: 'a' },
      { u: 0.006, source: null },
    ]);
  });

  it('small ones do not vanish in their squares', () => {
    expect(good({ value: 0, parts: [{ u: 3e-200 }, { u: 4e-200 }] }, 'fraction').u / 5e-200 - 1).toBeLessThan(3e-16);
    expect(good({ value: 0, parts: [{ u: 3e-200 }, { u: 4e-200 }] }, 'fraction').u / 5e-200 - 1).toBeGreaterThan(
      -3e-16,
    );
  });

  it('those of zero are left out; one alone is taken to the last bit', () => {
    expect(good({ value: 1, parts: [{ u: 0, source: 'a' }, { u: '0.1' }] })).toMatchObject({
      u: 0.1,
      parts: [{ u: 0.1, source: null }],
    });
    expect(good({ value: 1, parts: [{ u: 0 }] })).toMatchObject({ u: 0, parts: [] });
  });

  it('must agree with a bracket to its last digit: √360 = 18.974 mm', () => {
    for (const value of ['43.812(19) m', '43.8120(190) m', '43.812 ± 0.018974 m', '43.81(2) m'])
      expect(good({ value, parts }).u).toBe(good({ value: '43.812 m', parts }).u);
    for (const u of ['19 mm', 0.019, '18.974 mm', '0.02', 0.02])
      expect(good({ value: 43.812, u, parts }).parts).toHaveLength(2);
    for (const value of [
      '43.812(18) m',
      '43.8120(189) m',
      '43.812 ± 0.018973 m',
      '43.812(20) m',
      '43.81(3) m',
      '43.812(0) m',
    ])
      expect(faults({ value, parts })).toEqual([['u-disagrees', 'value', null]]);
    for (const u of ['18 mm', 0.018, '18.973 mm', 0.03, 0])
      expect(faults({ value: 43.812, u, parts })).toEqual([['u-disagrees', 'u', null]]);
    expect(problems({ value: '43.812(18) m', parts })[0]?.expected).toContain('0.019 m');
  });

  it('a tie may be rounded either way', () => {
    const tie = [{ u: '2.5 mm' }];
    expect(good({ value: '1.000(2) m', parts: tie }).u).toBe(0.0025);
    expect(good({ value: '1.000(3) m', parts: tie }).u).toBe(0.0025);
  });

  it('refused', () => {
    expect(faults({ value: 1, parts: [{ u: 1, source: 'a' }, { u: 2 }, { u: 1, source: 'a' }] })).toEqual([
      ['source-twice', 'parts.2.source', null],
    ]);
    expect(faults({ value: 1, parts: [{ u: 1 }, { u: 2 }] })).toEqual([]);
    expect(faults({ value: 1, source: 'a', parts: [{ u: 1 }] })).toEqual([['source-beside-parts', 'source', null]]);
    expect(faults({ value: 1, parts: [{ u: -1 }, { u: '\u22122 mm' }] })).toEqual([
      ['negative-u', 'parts.0.u', null],
      ['negative-u', 'parts.1.u', null],
    ]);
    expect(faults({ value: 1, parts: [] })).toEqual([['wrong-type', 'parts', null]]);
    expect(faults({ value: 1, parts: { u: 1 } })).toEqual([['wrong-type', 'parts', null]]);
    expect(faults({ value: 1, parts: ['18 mm', null] })).toEqual([
      ['wrong-type', 'parts.0', null],
      ['wrong-type', 'parts.1', null],
    ]);
    expect(faults({ value: 1, parts: [{ source: 'a' }] })).toEqual([['missing', 'parts.0.u', null]]);
    expect(faults({ value: 1, parts: [{ u: '18 mGal' }] })).toEqual([['wrong-unit', 'parts.0.u', 3]]);
    expect(faults({ value: 1, parts: [{ u: '18(1) mm' }] })).toEqual([['two-uncertainties', 'parts.0.u', null]]);
    expect(faults({ value: 1, parts: [{ u: 1, source: '' }] })).toEqual([['wrong-type', 'parts.0.source', null]]);
  });

  it('more than a call takes arguments do not break the stack', () => {
    const many = Array.from({ length: 100_000 }, () => ({ u: 0.01 }));
    expect(Math.abs(good({ value: 1, parts: many }).u - Math.sqrt(10))).toBeLessThan(1e-9);
  });
});

describe('refusals', () => {
  it.each<[string, unknown, string, string, number | null]>([
    ['null', null, 'wrong-type', '', null],
    ['nothing', undefined, 'missing', '', null],
    ['true', true, 'wrong-type', '', null],
    ['a list', [1], 'wrong-type', '', null],
    ['NaN', Number.NaN, 'not-finite', '', null],
    ['1e999 as JSON reads it', JSON.parse('1e999'), 'not-finite', '', null],
    ['a comma', '12,348(3) m', 'decimal-comma', '', 2],
    ['a comma inside', { value: '12,348(3) m' }, 'decimal-comma', 'value', 2],
    ['no value', { u: 1 }, 'missing', 'value', null],
    ['value null', { value: null }, 'wrong-type', 'value', null],
    ['value an object', { value: { value: 1 } }, 'wrong-type', 'value', null],
    ['u null', { value: 1, u: null }, 'wrong-type', 'u', null],
    ['negative u', { value: 1, u: -1 }, 'negative-u', 'u', null],
    ['negative u as text', { value: 1, u: '-1 mm' }, 'negative-u', 'u', null],
    ['u of another kind', { value: 1, u: '1 mGal' }, 'wrong-unit', 'u', 2],
    ['u with u', { value: 1, u: '8(1) mm' }, 'two-uncertainties', 'u', null],
    ['u against the bracket', { value: '1.000(8) m', u: '9 mm' }, 'u-disagrees', 'u', null],
    ['unknown unit', { value: 1, unit: 'mn' }, 'unknown-unit', 'unit', 0],
    ['unit of another kind', { value: 1, unit: 'mGal' }, 'wrong-unit', 'unit', 0],
    ['unit a number', { value: 1, unit: 3 }, 'wrong-type', 'unit', null],
    ['unit that nothing uses', { value: '1 m', unit: 'mm' }, 'unit-twice', 'unit', null],
    ['u without unit, value in mm', { value: '1000 mm', u: 8 }, 'ambiguous-unit', 'u', null],
    ['u as text without unit, value in mm', { value: '1000 mm', u: '8' }, 'ambiguous-unit', 'u', null],
    ['piece without unit, value in mm', { value: '1000 mm', parts: [{ u: 8 }] }, 'ambiguous-unit', 'parts.0.u', null],
    [
      'piece without unit beside a unit',
      { value: 1000, unit: 'mm', parts: [{ u: '8' }] },
      'ambiguous-unit',
      'parts.0.u',
      null,
    ],
    ['overflow by the unit', { value: 1e305, unit: 'Mm' }, 'overflow', 'value', null],
    ['underflow by the unit', { value: 1e-305, unit: 'qm' }, 'underflow', 'value', null],
    ['empty source', { value: 1, u: 1, source: '' }, 'wrong-type', 'source', null],
    ['source a number', { value: 1, u: 1, source: 3 }, 'wrong-type', 'source', null],
    [
      'unknown distribution',
      { value: 1, u: 1, distribution: 'gaussian' },
      'unknown-distribution',
      'distribution',
      null,
    ],
    ['distribution a number', { value: 1, u: 1, distribution: 1 }, 'unknown-distribution', 'distribution', null],
    ['t without dof', { value: 1, u: 1, distribution: 't' }, 'dof-missing', 'dof', null],
    ['t with dof 0', { value: 1, u: 1, distribution: 't', dof: 0 }, 'bad-dof', 'dof', null],
    ['dof text', { value: 1, u: 1, dof: '12' }, 'bad-dof', 'dof', null],
    ['dof infinite', { value: 1, u: 1, dof: Number.POSITIVE_INFINITY }, 'bad-dof', 'dof', null],
  ])('%s', (_, input, code, at, position) => {
    expect(faults(input)).toEqual([[code, at, position]]);
  });

  it('all at once', () => {
    expect(faults({ value: 'x', u: -1, distribution: 'norml', dof: -1, source: 1 }).map(([, at]) => at)).toEqual([
      'value',
      'u',
      'source',
      'distribution',
      'dof',
    ]);
  });

  it('tell what was found and what would be right', () => {
    expect(problems({ value: 1, u: 1, distribution: 'norml' })).toEqual([
      {
        code: 'unknown-distribution',
        at: 'distribution',
        position: null,
        found: '"norml"',
        expected: 'one of normal, uniform, triangular, t; did you mean normal?',
      },
    ]);
    expect(problems({ value: '1000 mm', u: 8 })[0]?.expected).toBe('a text with its unit: "8 mm" or "8 m"');
    expect(problems(`1${'0'.repeat(500)}`)[0]?.found).toHaveLength(82);
  });

  it('units that a number alone may have', () => {
    expect(good({ value: 3, unit: '1' }, 'fraction').value).toBe(3);
    expect(good({ value: 8, unit: 'm', parts: [{ u: 0.1 }] }).u).toBe(0.1);
    expect(good({ value: 8, unit: 'mm', parts: [{ u: '1 mm' }] }).u).toBe(0.001);
  });
});

describe('numbers without an uncertainty', () => {
  it('are read', () => {
    expect(readExact('420 km', 'length')).toEqual({ ok: true, value: 420000 });
    expect(readExact(3600, 'duration')).toEqual({ ok: true, value: 3600 });
    expect(readExact('-0.4', 'fraction')).toEqual({ ok: true, value: -0.4 });
    expect(readStandardUncertainty('1.2e-18', 'fraction')).toEqual({ ok: true, value: 1.2e-18 });
    expect(readStandardUncertainty(0, 'fraction')).toEqual({ ok: true, value: 0 });
  });

  it('refuse an uncertainty, and a standard uncertainty a sign', () => {
    expect(readExact('420(1) km', 'length')).toMatchObject({
      problems: [{ code: 'uncertainty-not-expected', at: '' }],
    });
    expect(readExact({ value: 1 }, 'length')).toMatchObject({ problems: [{ code: 'wrong-type' }] });
    expect(readExact('1,5 km', 'length')).toMatchObject({ problems: [{ code: 'decimal-comma', position: 1 }] });
    expect(readStandardUncertainty('-1e-18', 'fraction')).toMatchObject({ problems: [{ code: 'negative-u' }] });
    expect(readStandardUncertainty('1(1)e-18', 'fraction')).toMatchObject({
      problems: [{ code: 'two-uncertainties' }],
    });
  });
});
