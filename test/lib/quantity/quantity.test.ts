import { describe, expect, it } from 'vitest';
import { parseQuantity, type QuantityKind } from '../../../lib/quantity/index.js';
import { refusal } from './refusal.js';

const read = (text: string, kind: QuantityKind = 'length') => {
  const { value, u } = parseQuantity(text, kind);
  return [value, u];
};

describe('forms of one measured number', () => {
  // JCGM 100:2008 (GUM), 7.2.2: four ways to report m_S = 100.02147 g with u_c = 0.35 mg; metres in place of grams.
  it.each([
    '100.021 47(35) m',
    '100.021 47(0.000 35) m',
    '(100.021 47 ± 0.000 35) m',
    '100.021 47 ± 0.000 35 m',
    '100.02147(35)',
    '100.02147 m ± 0.35 mm',
    '100.02147 m +/- 350 µm',
    '100.02147+-0.00035m',
    '100.02147\u00a0(35)\u202fm',
    '10002.147(35) cm',
    '+100.02147(35) m',
  ])('reads %s', (text) => {
    expect(read(text)).toEqual([100.02147, 0.00035]);
  });

  it.each([
    ['143.216(8) m', 143.216, 0.008],
    ['143.2(1.5)', 143.2, 1.5],
    ['143(15) m', 143, 15],
    ['1.5(123) m', 1.5, 12.3],
    ['143.(8) m', 143, 8],
    ['.5(1) cm', 0.005, 0.001],
    ['8 mm', 0.008, 0],
    ['12.348(0) m', 12.348, 0],
    ['0 m', 0, 0],
    ['-0.85(1) m', -0.85, 0.01],
    ['\u2212850.012(44) m', -850.012, 0.044],
    ['93\u00a0783.1(2.9)', 93783.1, 2.9],
    ['62 636 853.4', 62636853.4, 0],
    ['62\u2009636\u2009853.412\u20095', 62636853.4125, 0],
    ['12 345(1 200) m', 12345, 1200],
    [' 5 m ', 5, 0],
  ])('reads %s', (text, value, u) => {
    expect(read(text)).toEqual([value, u]);
  });

  it.each([
    '4.1(1.6)e-17',
    '4.1(16)e-17',
    '(4.1 ± 1.6)e-17',
    '(4.1+/-1.6)E-17',
    '(4.1 +- 1.6) ×10^-17',
    '4.1(1.6)×10⁻¹⁷',
    '4.1(1.6) × 10⁻¹⁷',
    '4.1(1.6)x10^-17',
    '4.1(1.6)X10^\u221217',
    '4.1(1.6)*10^-17',
    '4.1(1.6)·10⁻¹⁷',
    '4.1(1.6)e\u221217',
    '4.1e-17 ± 1.6e-17',
    '(4.1e-17 ± 1.6e-17)',
    '41e-18 ± 0.16e-16',
    '41(16)e-18',
  ])('reads the power in %s', (text) => {
    expect(read(text, 'fraction')).toEqual([4.1e-17, 1.6e-17]);
  });

  it.each([
    ['2.1174(21)e-14', 2.1174e-14, 2.1e-17],
    ['0.2(1.1)e-17', 2e-18, 1.1e-17],
    ['-1.55721(30)e-13', -1.55721e-13, 3e-17],
    ['1(6)e-18', 1e-18, 6e-18],
    ['1e+3', 1000, 0],
    ['1×10⁺³', 1000, 0],
    ['5e-324', 5e-324, 0],
    ['1.7976931348623157e308', Number.MAX_VALUE, 0],
  ])('reads %s', (text, value, u) => {
    expect(read(text, 'fraction')).toEqual([value, u]);
  });

  it('takes a power behind the u alone as it stands, as programs print small ones', () => {
    expect(read('143.216 ± 8e-05 m')).toEqual([143.216, 8e-5]);
    expect(read('0 ± 1e-30', 'fraction')).toEqual([0, 1e-30]);
    // as small as a u can be beside a double that still feels it
    expect(read('62636853.4 ± 1e-8', 'potential')).toEqual([62636853.4, 1e-8]);
  });

  it('keeps apart no uncertainty and an uncertainty of zero', () => {
    expect(parseQuantity('8 mm', 'length').decimal.u).toBeNull();
    expect(parseQuantity('8(0) mm', 'length').decimal.u?.toString()).toBe('0');
  });

  it('gains and loses no digit: 30 of them come back', () => {
    const q = parseQuantity('1.00000000000000000123456789012(35) kHz', 'frequency');
    expect(q.decimal.value.toString()).toBe('1000.00000000000000123456789012');
    expect(q.decimal.u?.toString()).toBe('3.5e-25');
    expect(q.decimal.uStep?.toString()).toBe('1e-26');
  });

  it('rounds to the nearest double only at the end', () => {
    // 0.1 + 0.2 as doubles would give 0.30000000000000004; 1.1 mm times 1e-3 in doubles gives 0.0011000000000000001.
    expect(read('300 mm')).toEqual([0.3, 0]);
    expect(read('1.1 mm')).toEqual([0.0011, 0]);
    expect(read('981255.23(30) mGal', 'acceleration')).toEqual([9.8125523, 3e-6]);
  });

  it('never gives a negative zero', () => {
    expect(Object.is(read('-0.0(1) m')[0], 0)).toBe(true);
    expect(parseQuantity('\u22120 m', 'length').decimal.value.isNegative()).toBe(false);
  });

  it('tells the unit as written, else the default one', () => {
    expect(parseQuantity('8 mm', 'length')).toMatchObject({ unit: 'mm', unitWritten: true, text: '8 mm' });
    expect(parseQuantity('8', 'acceleration')).toMatchObject({ unit: 'm/s²', unitWritten: false });
  });
});

describe('refusals', () => {
  const cases: [text: string, code: string, position: number, expected: string, kind?: QuantityKind][] = [
    ['', 'empty', 0, 'a length such as 143.216(8) m'],
    [' \u00a0 ', 'empty', 3, 'a length such as 143.216(8) m'],
    ['m', 'not-a-number', 0, 'a digit'],
    ['abc', 'not-a-number', 0, 'a digit'],
    ['.', 'not-a-number', 0, 'a digit'],
    ['± 8 mm', 'not-a-number', 0, 'a digit'],
    ['- 5 m', 'not-a-number', 1, 'write -5 m'],
    ['NaN m', 'not-finite', 0, 'a finite number'],
    ['-nan', 'not-finite', 1, 'a finite number'],
    ['Infinity', 'not-finite', 0, 'a finite number'],
    ['-∞ m', 'not-finite', 1, 'a finite number'],
    ['3 ± inf m', 'not-finite', 4, 'a finite number'],
    ['12,348(3) m', 'decimal-comma', 2, 'write 12.348(3) m'],
    ['143,216 ± 0,008 m', 'decimal-comma', 3, 'write 143.216 ± 0.008 m'],
    ['143.216 ± 0,008 m', 'decimal-comma', 11, 'write 143.216 ± 0.008 m'],
    ['12.3(1,5) m', 'decimal-comma', 6, 'write 12.3(1.5) m'],
    ['1.234,5 m', 'decimal-comma', 5, 'write 1234.5 m'],
    ['1,234.5 m', 'decimal-comma', 1, 'write 1234.5 m'],
    ['62,636,853.4', 'decimal-comma', 2, 'write 62636853.4'],
    ['1,2,34.5x', 'decimal-comma', 1, 'a decimal point and no comma between digits'],
    ['--5 m', 'two-signs', 1, 'one sign'],
    ['+\u22125 m', 'two-signs', 1, 'one sign'],
    ['5 ± -+1 m', 'two-signs', 5, 'one sign'],
    ['\u20135 m', 'dash-for-minus', 0, 'write -5 m'],
    ['4.1e\u201317', 'dash-for-minus', 4, 'write 4.1e-17', 'fraction'],
    ['4.1×10^\u201317', 'dash-for-minus', 7, 'write 4.1×10^-17', 'fraction'],
    ['5 3 m', 'digit-groups', 1, 'spaces only between groups of three digits'],
    ['1 2345 m', 'digit-groups', 1, 'groups of three'],
    ['12 34 m', 'digit-groups', 2, 'groups of three'],
    ['62636 853.4', 'digit-groups', 5, 'write 62636853.4'],
    ['0.0214 7 m', 'digit-groups', 6, 'write 0.02147 m'],
    ['0.021 4785 m', 'digit-groups', 5, 'groups of three'],
    ['143.216() m', 'empty-bracket', 7, 'write 143.216 m'],
    ['143.216( ) m', 'empty-bracket', 7, 'the standard uncertainty in the bracket, or no bracket'],
    ['143.216(8', 'open-bracket', 7, 'a closing bracket'],
    ['143.216(', 'open-bracket', 7, 'a closing bracket'],
    ['(4.1 ± 1.6', 'open-bracket', 0, 'a closing bracket'],
    ['143.216(8 mm)', 'bad-bracket', 10, 'digits alone in the bracket'],
    ['143.216(±8) m', 'bad-bracket', 8, 'the digits of the standard uncertainty alone'],
    ['143.216(+8) m', 'bad-bracket', 8, 'the digits of the standard uncertainty alone'],
    ['4.1(3e-2)', 'bad-bracket', 5, 'digits alone in the bracket', 'fraction'],
    ['4.1e-17(3)', 'bad-bracket', 7, 'write 4.1(3)e-17', 'fraction'],
    ['(4.1)e-17', 'bad-bracket', 4, 'value ± standard uncertainty in the bracket', 'fraction'],
    ['(4.1 m ± 1 m)', 'bad-bracket', 5, 'value ± standard uncertainty in the bracket'],
    ['(4.1 ± 1 m)', 'bad-bracket', 9, 'numbers alone in the bracket'],
    ['143.216(abc) m', 'not-a-number', 8, 'a digit'],
    ['143.216(\u22128) m', 'negative-u', 8, 'which has no sign'],
    ['143.216 ± -0.008 m', 'negative-u', 10, 'which has no sign'],
    ['(4.1 ± -1.6)e-17', 'negative-u', 7, 'which has no sign', 'fraction'],
    ['143.216(8)(3) m', 'two-uncertainties', 10, 'several pieces of u go into "parts"'],
    ['143.216(8) ± 0.1 m', 'two-uncertainties', 11, 'either a bracket or ±'],
    ['143.2 ± 0.1 ± 0.2 m', 'two-uncertainties', 12, 'several pieces of u go into "parts"'],
    ['143.2 ± 0.1(3) m', 'two-uncertainties', 11, 'either a bracket or ±'],
    ['4.1×10', 'bad-power', 6, 'an exponent after the 10', 'fraction'],
    ['4.1×10^', 'bad-power', 7, 'digits in the exponent', 'fraction'],
    ['4.1×10⁻', 'bad-power', 7, 'digits in the exponent', 'fraction'],
    ['4.1e-', 'bad-power', 5, 'digits in the exponent', 'fraction'],
    ['(4.1e-3 ± 1e-3)e-17', 'bad-power', 15, 'either inside the bracket or after it', 'fraction'],
    ['4.1×10-17', 'lost-superscript', 6, 'write 4.1×10^-17', 'fraction'],
    ['4.1(1.6) × 10\u201317', 'lost-superscript', 13, 'write 4.1(1.6) × 10^-17', 'fraction'],
    ['4.1 ± 1.6e-17', 'ambiguous-power', 9, 'write (4.1 ± 1.6)e-17', 'fraction'],
    ['(4.1 ± 1.6e-17)', 'ambiguous-power', 10, 'write (4.1 ± 1.6)e-17', 'fraction'],
    ['1e999 m', 'overflow', 0, 'a magnitude below 1.8e308'],
    ['3(1)e999999999999999999999 m', 'overflow', 0, 'a magnitude below'],
    ['0(1)e400 m', 'overflow', 2, 'a magnitude below'],
    ['1e305 Qm', 'overflow', 0, 'a magnitude below'],
    ['1e-999 m', 'underflow', 0, 'a magnitude above 5e-324, or 0'],
    ['1 ± 0e5 m ± 1', 'two-uncertainties', 10, 'one ±'],
    ['0 m ± 1e-400 m', 'underflow', 6, 'a magnitude above 5e-324, or 0'],
    ['143.216 m ± 0.008', 'unit-missing', 17, 'write 143.216 m ± 0.008 m'],
    ['5 + 3', 'stray-text', 2, 'nothing but a unit'],
    ['5.3.2', 'stray-text', 3, 'one decimal point'],
    ['143.216 m approx', 'stray-text', 10, 'nothing after m'],
    ['143.216 m 5', 'stray-text', 10, 'nothing after m'],
    ['143.216 m)', 'stray-text', 9, 'nothing after m'],
    ['9.8 m/s² or so', 'stray-text', 9, 'nothing after m/s²', 'acceleration'],
    ['5\tm', 'stray-text', 1, 'nothing but a unit'],
  ];
  it.each(cases)('%j: %s at %i', (text, code, position, expected, kind = 'length') => {
    const error = refusal(() => parseQuantity(text, kind));
    expect([error.code, error.position, error.text]).toEqual([code, position, text]);
    expect(error.expected).toContain(expected);
  });

  it('says everything in its message', () => {
    expect(refusal(() => parseQuantity('12,348(3) m', 'length')).message).toBe(
      'decimal-comma at character 3 of "12,348(3) m": expected a decimal point and no comma between digits: write 12.348(3) m',
    );
  });

  it('offers only corrections that can be read', () => {
    // The comma could be mended, the unit not.
    expect(refusal(() => parseQuantity('12,348(3) mGal', 'length')).expected).not.toContain('write');
  });

  it('guesses no number where the groups could mean anything', () => {
    expect(refusal(() => parseQuantity('5 3 m', 'length')).expected).not.toContain('write');
  });

  it('refuses a long text before reading it', () => {
    const error = refusal(() => parseQuantity(`${'1'.repeat(201)} m`, 'length'));
    expect([error.code, error.position]).toEqual(['too-long', 200]);
    expect(parseQuantity(`0.${'1'.repeat(196)} m`, 'length').value).toBe(1 / 9);
  });

  it('takes no time over hostile texts', () => {
    const texts = ['(', '±', '1 ', '1,', '+/-', '-', 'e', '1e', '√', '10^', '1±', 'm ', 'm·', '^', '(1±'].flatMap(
      (s) => [s.repeat(200 / s.length), `1 ${s}`.repeat(200 / (s.length + 2)), s.repeat(1e6)],
    );
    const start = performance.now();
    for (const text of texts) refusal(() => parseQuantity(text, 'length'));
    // Some microseconds each; a backtracking pattern would need seconds.
    expect(performance.now() - start).toBeLessThan(1000);
  });
});
