import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  FrequencySeriesParser,
  nominal,
  readColumnWords,
  readFrequencySeries,
} from '../../../../lib/clocks/series/index.js';
import { encodeUtf8 } from '../../../../lib/clocks/series/utf8.js';
import { codes, FIRST_DAY, faultsOf, iso, lines, message, mjd, noisy, plain, START_MS, value } from './files.js';

const y = noisy(300);
const expectValues = (found: Float64Array, expected: readonly number[]) => {
  expect(found.length).toBe(expected.length);
  expected.forEach((v, i) => {
    expect(Math.abs(found[i]! - v)).toBeLessThan(1e-26);
  });
};

describe('forms of a frequency file', () => {
  const forms: Record<string, string> = {
    'MJD and y, blanks': plain(y),
    'tabs, Windows line ends': lines(y, (v, i) => `${mjd(i)}\t${value(v)}\r`),
    'CSV with header': `mjd,y\n${lines(y, (v, i) => `${mjd(i)},${value(v)}`)}`,
    'CSV with quotes, blanks after commas and a byte order mark': `\uFEFF"MJD", "y"\n${lines(y, (v, i) => `"${mjd(i)}", "${value(v)}"`)}`,
    'semicolons and comments': `# clock comparison\n\n% remarks\n${lines(y, (v, i) => `${mjd(i)} ; ${value(v)} # ok`)}`,
    'ISO 8601': lines(y, (v, i) => `${iso(i)} ${value(v)}`),
    'ISO 8601 with a blank for T': lines(y, (v, i) => `${iso(i).replace('T', ' ')} ${value(v)}`),
    'ISO 8601 start and stop, header': `start,stop,y\n${lines(y, (v, i) => `${iso(i)},${iso(i + 1)},${value(v)}`)}`,
    'names in the last remark': `# made by hand\n# mjd   y   u_y\n${lines(y, (v, i) => `${mjd(i)} ${value(v)} 1e-16`)}`,
    'y stated in 1e-15': `mjd;y / 1e-15\n${lines(y, (v, i) => `${mjd(i)};${(v * 1e15).toFixed(14)}`)}`,
    'Fortran exponents and U+2212': lines(y, (v, i) => `${mjd(i)} ${value(v).replace('e-', 'D−')}`),
    'remarks between rows': lines(y, (v, i) => `${i % 50 === 7 ? '# lost lock\n\n' : ''}${mjd(i)} ${value(v)}`),
  };
  for (const [name, text] of Object.entries(forms)) {
    it(name, () => {
      const series = readFrequencySeries(text);
      expectValues(series.y, y);
      expect(series.intervalS).toBe(1);
      expect(series.gaps).toEqual([]);
      expect(series.dropped).toBe(0);
      expect(series.runs).toEqual([{ first: 0, count: 300 }]);
      expect(series.originMs! + 1000 * series.startS[0]!).toBe(START_MS);
      expect(series.columns.certainty).toBe('certain');
      expect(codes(series)).toEqual(name.includes('1e-15') ? ['header-scale'] : []);
    });
  }

  it('is the same in pieces of any size, cut anywhere, text or bytes', () => {
    // longer than the beginning that the guess of the columns looks at
    const text = lines(noisy(2500), (v, i) => `${i % 50 === 7 ? '# lost lock −\n\n' : ''}${mjd(i)} ${value(v)}`);
    expect(text.length).toBeGreaterThan(1 << 16);
    const whole = readFrequencySeries(text);
    const bytes = encodeUtf8(text);
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 4000 }), fc.boolean(), (size, asText) => {
        const parser = new FrequencySeriesParser();
        const all = asText ? text : bytes;
        for (let i = 0; i < all.length; i += size) parser.push(all.slice(i, i + size));
        const series = parser.finish();
        expect(series.y).toEqual(whole.y);
        expect(series.startS).toEqual(whole.startS);
        expect(series.lineOf(2499)).toBe(whole.lineOf(2499));
      }),
      { numRuns: 25 },
    );
  });

  it('knows the line of every sample', () => {
    const text = forms['remarks between rows']!;
    const series = readFrequencySeries(text);
    const at = text.split('\n');
    for (const i of [0, 6, 7, 8, 120, 299]) expect(at[series.lineOf(i) - 1]!.startsWith(mjd(i))).toBe(true);
  });

  it('tells how far it has come', () => {
    const parser = new FrequencySeriesParser({ columns: ['mjd', 'y'] });
    const text = plain(noisy(5000));
    parser.push(text.slice(0, 100_000));
    expect(parser.progress.bytes).toBe(100_000);
    expect(parser.progress.rows).toBeGreaterThan(2000);
    parser.push(text.slice(100_000));
    expect(parser.finish().y.length).toBe(5000);
  });

  it('reads u and validity; an invalid row is a gap', () => {
    const text = `mjd y u valid\n${lines(y, (v, i) => `${mjd(i)} ${value(v)} ${i < 3 ? 2e-16 : 1e-16} ${i >= 10 && i < 15 ? 0 : 1}`)}`;
    const series = readFrequencySeries(text);
    expect(series.y.length).toBe(295);
    expect([...series.u!.slice(0, 4)]).toEqual([2e-16, 2e-16, 2e-16, 1e-16]);
    expect(series.dropped).toBe(5);
    expect(series.gaps).toHaveLength(1);
    expect(series.gaps[0]!.startS).toBeCloseTo(10, 5);
    expect(series.gaps[0]!.endS).toBeCloseTo(15, 5);
    expect(series.runs).toEqual([
      { first: 0, count: 10 },
      { first: 10, count: 285 },
    ]);
    expect(message(series, 'invalid-rows')).toMatch(/5 rows marked not valid/);
  });

  it('a missing value is a gap, not a zero', () => {
    for (const nothing of ['', 'NaN', '-', 'n/a']) {
      const text = `mjd,y\n${lines(y, (v, i) => `${mjd(i)},${i === 20 ? nothing : value(v)}`)}`;
      const series = readFrequencySeries(text);
      expect(series.y.length).toBe(299);
      expect(series.gaps).toHaveLength(1);
      expect(message(series, 'missing-values')).toMatch(/line 22 .*line 22/);
    }
  });

  it('a file without dates: rows at the stated interval, or at 1 s with a warning', () => {
    const text = lines(y, value);
    const stated = readFrequencySeries(text, { tauS: 10 });
    expect(stated.intervalS).toBe(10);
    expect(stated.originMs).toBeNull();
    expect(stated.startS[5]).toBe(50);
    expect(codes(stated)).toEqual([]);
    expect(codes(readFrequencySeries(text))).toEqual(['interval-assumed']);
  });

  it('a ratio next to 1, to 1e-18, in twenty digits', () => {
    const text = `mjd ratio\n${lines([0, 1, 2, 3], (_, i) => `${mjd(i)} 1.00000000000000000${i}0`)}`;
    const series = readFrequencySeries(text);
    [0, 1e-18, 2e-18, 3e-18].forEach((v, i) => {
      expect(Math.abs(series.y[i]! - v)).toBeLessThan(1e-33);
    });
    expect(message(series, 'nominal-recognised')).toMatch(/1, the ratio of equal clocks/);
  });

  it('an absolute frequency, compared with the recommended one it lies next to', () => {
    const text = lines([0, 1, 2], (_, i) => `${mjd(i)} 429228004229873.${i}0`);
    const series = readFrequencySeries(text, { columns: ['mjd', 'hz'] });
    // 873.0 − 872.99 and so on, over 4.29e14
    [0.01, 0.11, 0.21].forEach((d, i) => {
      expect(Math.abs(series.y[i]! * 429228004229872.99 - d)).toBeLessThan(1e-15);
    });
    expect(message(series, 'nominal-recognised')).toMatch(/87Sr, 429228004229872.99 Hz/);
  });

  it('the ratio of unlike clocks, recognised either way round', () => {
    const series = readFrequencySeries(`${mjd(0)} 1.207507039343337749\n${mjd(1)} 1.207507039343337849\n`, {
      columns: ['mjd', 'ratio'],
    });
    // 518295836590863.63/429228004229872.99 = 1.2075070393433378… ; the second value lies 1e-16/1.2075 above the first
    expect(Math.abs(series.y[1]! - series.y[0]! - 1e-16 / 1.2075070393433378)).toBeLessThan(1e-29);
    expect(Math.abs(series.y[0]!)).toBeLessThan(1e-15);
    expect(message(series, 'nominal-recognised')).toMatch(/171Yb and 87Sr/);
  });

  it('a beat note against its nominal and its carrier', () => {
    const from = nominal('35e6', '429228004229872.99');
    const series = readFrequencySeries(`${mjd(0)} 35000000.0429228\n${mjd(1)} 34999999.9570772\n`, {
      columns: ['mjd', 'hz'],
      nominal: from,
    });
    expect(Math.abs(series.y[0]! - 1e-16)).toBeLessThan(1e-22);
    expect(Math.abs(series.y[1]! + 1e-16)).toBeLessThan(1e-22);
  });

  it('numbers in forms the quick reader leaves alone', () => {
    const series = readFrequencySeries(`${mjd(0)} 1e-120\n${mjd(1)} 0.5e-90\n`, { columns: ['mjd', 'y'] });
    expect([...series.y]).toEqual([1e-120, 0.5e-90]);
  });
});

describe('columns', () => {
  it('guesses and says how sure it is', () => {
    const cases: [string, string, string][] = [
      [plain(y), 'mjd y', 'certain'],
      [lines(y, (v, i) => `${mjd(i)} ${value(v)} 1e-16`), 'mjd y u', 'likely'],
      [lines(y, (v, i) => `${mjd(i)} ${mjd(i + 1)} ${value(v)}`), 'mjd stop y', 'likely'],
      [lines(y, (v, i) => `${iso(i)},${value(v)},1`), 'iso y valid', 'likely'],
      [lines(y, (v, i) => `${mjd(i)} ${value(v)} 1e-16 ${i % 2}`), 'mjd y u valid', 'likely'],
      [`time,channel,frequency (Hz)\n${lines(y, (_, i) => `${mjd(i)},4,429228004229872.99`)}`, 'mjd - hz', 'likely'],
    ];
    for (const [text, words, certainty] of cases) {
      const { columns, warnings } = readFrequencySeries(text);
      expect(columns.words.join(' ')).toBe(words);
      expect(columns.certainty).toBe(certainty);
      expect(warnings.some((w) => w.code === 'columns-guessed')).toBe(certainty === 'likely');
    }
  });

  it('refuses an unsure guess and says how to confirm', () => {
    const unsure = {
      'seconds since something': lines(y, (v, i) => `${i} ${value(v)}`),
      'numbers that could be dates but fall and rise': lines(y, (v, i) => `${50000 + ((i * 7919) % 1000)} ${value(v)}`),
      'four columns': lines(y, (v, i) => `${mjd(i)} ${value(v)} -3 12`),
      'two value columns': `mjd,y,ratio\n${lines(y, (v, i) => `${mjd(i)},${value(v)},1.0000000001`)}`.replace(
        'mjd,y,ratio',
        'day,a,b',
      ),
      'a power of ten in the header that belongs to no name': `# values in 1e-15\n${lines(y, (v, i) => `${mjd(i)} ${v * 1e15}`)}`,
    };
    for (const text of Object.values(unsure)) {
      const [fault] = faultsOf(text);
      expect(fault!.code).toBe('columns-unsure');
      expect(fault!.expected).toMatch(/--columns/);
    }
    const confirmed = readFrequencySeries(unsure['seconds since something'], { columns: ['-', 'y'], tauS: 1 });
    expectValues(confirmed.y, y);
  });

  it('reads the words of --columns and refuses others', () => {
    expect(readColumnWords(' mjd  y u ')).toEqual({ words: ['mjd', 'y', 'u'] });
    expect(readColumnWords('mjd mjd y -')).toEqual({ words: ['mjd', 'mjd', 'y', '-'] });
    for (const bad of ['', 'mjd', 'mjd y y', 'mjd y ratio', 'date y', 'y stop', 'mjd stop stop y', 'mjd y u u']) {
      expect(readColumnWords(bad)).toHaveProperty('faults');
    }
  });

  it('refuses another number of words than columns', () => {
    const [fault] = faultsOf(plain(y), { columns: ['mjd', 'y', 'u'] });
    expect(fault).toMatchObject({ code: 'column-count', line: 1 });
  });
});

describe('faults, with line and column', () => {
  const row = (i: number, v = '1.5e-15') => `${mjd(i)} ${v}`;
  const file = (third: string) => [row(0), row(1), third, row(3)].join('\n');
  const cases: [string, string, number, number][] = [
    ['bad-number', row(2, 'abc'), 3, 18],
    ['bad-number', row(2, '1.2.3'), 3, 18],
    ['bad-number', row(2, '1.5e-15x'), 3, 18],
    ['bad-number', row(2, 'Infinity'), 3, 18],
    ['decimal-comma', row(2, '1,5e-15'), 3, 18],
    ['missing-column', mjd(2), 3, 17],
    ['extra-column', `${row(2)} 7`, 3, 26],
    ['bad-time', 'yesterday 1.5e-15', 3, 1],
  ];
  for (const [code, third, line, column] of cases) {
    it(`${code}: ${third}`, () => {
      expect(faultsOf(file(third), { columns: ['mjd', 'y'] })).toMatchObject([{ code, line, column }]);
    });
  }

  it('local time, a date that does not exist, bad validity, negative u, stop before start', () => {
    const fault = (text: string, ...columns: ('iso' | 'stop' | 'y' | 'u' | 'valid')[]) =>
      faultsOf(text, { columns })[0]!;
    expect(fault(`${iso(0).slice(0, 19)} 1e-15\n`, 'iso', 'y')).toMatchObject({
      code: 'local-time',
      line: 1,
      column: 1,
    });
    expect(fault('2027-05-03T02:00:00+02:00 1e-15\n', 'iso', 'y').code).toBe('local-time');
    expect(fault('2027-02-30T00:00:00Z 1e-15\n', 'iso', 'y').code).toBe('no-such-time');
    expect(fault(`${iso(0)} 1e-15 maybe\n`, 'iso', 'y', 'valid').code).toBe('bad-validity');
    expect(fault(`${iso(0)} 1e-15 -1e-16\n`, 'iso', 'y', 'u').code).toBe('bad-number');
    expect(fault(`${iso(1)} ${iso(0)} 1e-15\n`, 'iso', 'stop', 'y').code).toBe('stop-before-start');
  });

  it('refuses local stamps of a file without a word about columns', () => {
    expect(faultsOf(lines(y, (v, i) => `${iso(i).slice(0, 19)},${value(v)}`))[0]!.code).toBe('local-time');
  });

  it('takes stamps without a zone where the column is named UTC', () => {
    const series = readFrequencySeries(`time_utc,y\n${lines(y, (v, i) => `${iso(i).slice(0, 19)},${value(v)}`)}`);
    expectValues(series.y, y);
  });

  it('gathers twenty faults and stops', () => {
    const faults = faultsOf(
      lines(y, (_, i) => `${mjd(i)} x`),
      { columns: ['mjd', 'y'] },
    );
    expect(faults).toHaveLength(20);
    expect(faults[19]!.line).toBe(20);
  });

  it('decimal commas throughout', () => {
    const comma = (text: string) => text.replaceAll('.', ',');
    expect(faultsOf(comma(plain(y)))[0]!.code).toBe('decimal-comma');
    expect(faultsOf(comma(lines(y, (v, i) => `${mjd(i)};${value(v)}`)))[0]!.code).toBe('decimal-comma');
  });

  it('nothing to read: empty, comments alone, no valid row, a date alone', () => {
    expect(faultsOf('')[0]!.code).toBe('no-data');
    expect(faultsOf('# nothing\n')[0]!.code).toBe('no-data');
    expect(faultsOf(`mjd y valid\n${mjd(0)} 1e-15 0\n`)[0]!.code).toBe('no-data');
    expect(faultsOf(`${mjd(0)} 1e-15\n`)[0]!.code).toBe('interval-unknown');
    expect(faultsOf('names names\nmore names\n1 2\n')[0]!.code).toBe('header-twice');
  });

  it('an interval that the dates do not have; a ratio or frequency next to nothing known', () => {
    expect(faultsOf(plain(y), { tauS: 10 })[0]!.code).toBe('interval-mismatch');
    expect(faultsOf(`${mjd(0)} 35000000.25\n`, { columns: ['mjd', 'hz'] })[0]!.code).toBe('nominal-unknown');
    expect(faultsOf(`${mjd(0)} 1.5\n`, { columns: ['mjd', 'ratio'] })[0]!.code).toBe('nominal-unknown');
  });
});

describe('any text', () => {
  it('is read or refused, never more', () => {
    const word = fc.oneof(
      fc.constantFrom(
        'mjd',
        'y',
        '#',
        ',',
        ';',
        '\t',
        ' ',
        '\n',
        '\r\n',
        'nan',
        '1e-15',
        '−3',
        'Z',
        '"',
        '2027-05-03T00:00:00Z',
        `${FIRST_DAY}.5`,
        '1.0000000000001',
      ),
      fc.string({ maxLength: 5 }),
    );
    fc.assert(
      fc.property(fc.array(word, { maxLength: 40 }), (words) => {
        try {
          const series = readFrequencySeries(words.join(''));
          expect(series.y.every(Number.isFinite)).toBe(true);
        } catch (error) {
          expect(error).toHaveProperty('faults');
        }
      }),
      { numRuns: 1500 },
    );
  });
});
