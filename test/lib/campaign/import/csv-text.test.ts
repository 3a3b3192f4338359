import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CsvError, parseCsv, SEPARATORS, separatorOf } from '../../../../lib/campaign/csv-text.js';

const texts = (text: string, separator = separatorOf(text)) =>
  parseCsv(text, separator).map(({ cells }) => cells.map((c) => c.text));

const faultOf = (text: string) => {
  try {
    parseCsv(text, ',');
  } catch (error) {
    if (error instanceof CsvError) return [error.fault.code, error.fault.start];
  }
  return null;
};

describe('parseCsv', () => {
  it('splits records and fields: RFC 4180, section 2', () => {
    // the examples of the RFC: line ends, the last one optional, quotes, a line end and a doubled quote inside quotes
    expect(texts('aaa,bbb,ccc\r\nzzz,yyy,xxx\r\n')).toEqual([
      ['aaa', 'bbb', 'ccc'],
      ['zzz', 'yyy', 'xxx'],
    ]);
    expect(texts('"aaa","b\r\nbb","ccc"\r\nzzz,yyy,xxx')).toEqual([
      ['aaa', 'b\r\nbb', 'ccc'],
      ['zzz', 'yyy', 'xxx'],
    ]);
    expect(texts('"aaa","b""bb","ccc"')).toEqual([['aaa', 'b"bb', 'ccc']]);
  });

  it('keeps spaces, leaves out lines without text, passes over a byte order mark', () => {
    expect(texts('\ufeffa, b ,\n\n,,\n"",x,')).toEqual([
      ['a', ' b ', ''],
      ['', 'x', ''],
    ]);
    expect(texts('a,b\rc,d')).toEqual([
      ['a', 'b'],
      ['c', 'd'],
    ]);
    expect(texts('')).toEqual([]);
  });

  it('knows where each field stands', () => {
    const text = 'a,"b""c"\r\nd,"e"';
    for (const { cells } of parseCsv(text, ','))
      for (const cell of cells) expect(text.startsWith(cell.text[0]!, cell.start)).toBe(true);
    expect(parseCsv(text, ',')[1]!.cells.map((c) => c.start)).toEqual([10, 13]);
  });

  it('refuses quotes that are not as they should be', () => {
    expect(faultOf('a,"b')).toEqual(['open-quote', 2]);
    expect(faultOf('a,5" pipe')).toEqual(['quote-inside', 3]);
    expect(faultOf('"a"b,c')).toEqual(['text-after-quote', 3]);
  });

  it('reads back whatever is written by the RFC', () => {
    const field = fc.string({ unit: fc.constantFrom('a', ',', '"', '\n', '\r', ';', '\t', ' ', 'ζ') });
    const table = fc.array(fc.array(field, { minLength: 1, maxLength: 4 }), { minLength: 1, maxLength: 5 });
    fc.assert(
      fc.property(
        table,
        fc.constantFrom(...SEPARATORS),
        fc.constantFrom('\n', '\r\n', '\r'),
        (rows, separator, end) => {
          const text = rows.map((r) => r.map((f) => `"${f.replaceAll('"', '""')}"`).join(separator)).join(end);
          const expected = rows.filter((r) => r.some((f) => f.trim() !== ''));
          expect(texts(text, separator)).toEqual(expected);
        },
      ),
    );
  });
});

describe('separatorOf', () => {
  it.each([
    ['id,lat,lon', ','],
    ['id;lat;"h, m"', ';'],
    ['\r\nid\tlat', '\t'],
    ['"a;b;c;d",x', ','],
    ['id', ','],
  ])('%s', (text, expected) => expect(separatorOf(text)).toBe(expected));
});
