import { describe, expect, it } from 'vitest';
import {
  decimalCell,
  estimateCell,
  estimateColumn,
  METRES,
  none,
  notComputed,
  numberColumn,
  OFFSET,
  type Report,
  reportAsMarkdown,
  reportAsText,
  type Table,
  tableAsCsv,
  tableAsMarkdown,
  tableAsText,
  textCell,
  textColumn,
} from '../../../lib/report/index.js';

const lengths = (...estimates: ({ value: number; u: number } | null)[]): Table => ({
  id: 't',
  title: 'Table',
  columns: [textColumn('link'), estimateColumn('length', 'm')],
  rows: estimates.map((estimate, i) => [textCell(`l${i}`), estimateCell(estimate, METRES, 'signed')]),
  notes: [],
});

describe('a table for a terminal', () => {
  it('aligns on the decimal point, integer part right, rest left, the unit in the head', () => {
    const text = tableAsText(
      lengths(
        { value: 858.539314, u: 0.02655 },
        { value: -8.663, u: 0.036 },
        { value: 93783.06, u: 2.9 },
        { value: 1428, u: 12 },
      ),
    );
    expect(text.split('\n')).toEqual([
      'link       length / m',
      '────  ───────────────',
      'l0       +858.539(27)',
      'l1         \u22128.663(36)',
      'l2    +93\u00a0783.1(2.9)',
      'l3      +1428(12)',
    ]);
  });

  it('never aligns on the point inside a bracket', () => {
    const [, , first, second] = tableAsText(lengths({ value: 94.5, u: 1.5 }, { value: 94.55, u: 0.15 })).split('\n');
    expect(first!.indexOf('.')).toBe(second!.indexOf('.'));
    const whole = tableAsText(lengths({ value: 1428, u: 12 }, { value: 3.5, u: 0.1 })).split('\n');
    expect(whole[2]!.indexOf('(')).toBe(whole[3]!.indexOf('.'));
  });

  it('says none and not computed, never blank or NaN', () => {
    const table = { ...lengths({ value: 1.5, u: 0.1 }, null), notes: [] };
    expect(tableAsText(table)).toContain('not computed');
    expect(tableAsText({ ...table, rows: [[textCell('x'), none]] })).toContain('none');
  });

  it('counts marks and wide letters by the columns they take', () => {
    const table: Table = {
      id: 't',
      title: '',
      columns: [textColumn('site'), numberColumn('n')],
      rows: ['γ\u0304', '東京', 'ab'].map((name) => [textCell(name), decimalCell(1, 0)]),
      notes: [],
    };
    expect(tableAsText(table).split('\n').slice(2)).toEqual(['γ\u0304     1', '東京  1', 'ab    1']);
  });

  it('shows control characters and turned directions by number', () => {
    const text = tableAsText({ ...lengths(), rows: [[textCell('a\u001b[2Jb\u202ec\n'), notComputed]] });
    expect(text).toContain('a\\u{001b}[2Jb\\u{202e}c\\u{000a}');
  });
});

describe('numbers on their scales', () => {
  it('rounds each on its own u; zero has no sign, a difference shows its plus', () => {
    const text = (value: number, u: number, scale = METRES) => estimateCell({ value, u }, scale, 'signed').text;
    expect(text(-850.0123, 0.0441)).toBe('\u2212850.012(44)');
    expect(text(9.378306072e-14, 2.9e-18, OFFSET)).toBe('+93783.1(2.9)');
    expect(text(0, 0.01)).toBe('0.000(10)');
    expect(text(0, 0)).toBe('0');
    expect(text(0.0099, 0.00995)).toBe('+0.010(10)');
  });

  it('prints an exact number to the resolution of its scale and no further', () => {
    const cell = estimateCell({ value: 1.34813704110495e-15, u: 0 }, OFFSET, 'signed');
    expect(cell.text).toBe('+1348.137');
    expect(cell.kind === 'number' && cell.u).toBe(0);
  });

  it('keeps the digits of a plain number in a column and never prints \u22120', () => {
    expect(decimalCell(-0.0004, 2).text).toBe('0.00');
    expect(decimalCell(-0.479, 2, 'signed').text).toBe('\u22120.48');
    expect(decimalCell(0.5, 3, 'signed').text).toBe('+0.500');
  });
});

describe('CSV', () => {
  it('is unrounded, u in its own column, quoted where it must be (RFC 4180)', () => {
    const table = lengths({ value: -850.0123456789, u: 0.044123 }, null);
    const named = { ...table, rows: [[textCell('a,"b"\nc'), table.rows[0]![1]!], table.rows[1]!] };
    expect(tableAsCsv(named)).toBe(
      'link,length / m,u(length) / m\r\n"a,""b""\nc",-850.0123456789,0.044123\r\nl1,not computed,\r\n',
    );
  });
});

describe('Markdown', () => {
  it('shows the texts of a campaign as they are, never as markup', () => {
    const table = { ...lengths(), rows: [[textCell('a|b <img src=x> *c* `d`'), none]] };
    expect(tableAsMarkdown(table).split('\n')[2]).toBe('| a\\|b \\<img src=x\\> \\*c\\* \\`d\\` | none |');
  });
});

describe('a report', () => {
  const report: Report = {
    title: 'Title',
    sentences: ['The finding.'],
    tables: [{ ...lengths({ value: 1.5, u: 0.1 }), notes: ['A note.'] }],
    conventions: ['Sign: y > 0 fast.'],
    cautions: [{ code: 'some-code', path: 'sites.a', message: 'a message' }],
    provenance: 'Computed by hand',
  };

  it('has the finding first and conventions, cautions and provenance under the tables, in both readable forms', () => {
    for (const text of [reportAsText(report), reportAsMarkdown(report)]) {
      const order = [
        'Title',
        'The finding',
        'length / m',
        '+1.50(10)',
        'A note',
        'sites.a: a message',
        'Sign: y',
        'Computed by hand',
      ];
      const places = order.map((words) => text.indexOf(words));
      expect(
        places.every((place) => place >= 0),
        JSON.stringify(places),
      ).toBe(true);
      expect(places).toEqual([...places].sort((a, b) => a - b));
      expect(text).toContain('some-code');
    }
  });
});
