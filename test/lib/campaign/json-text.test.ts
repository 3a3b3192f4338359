import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseJsonText, placeInString, quoted } from '../../../lib/campaign/json-text.js';
import { type JsonNode, JsonTextError, jsonTreeOf } from '../../../lib/campaign/json-tree.js';
import { TextPlaces } from '../../../lib/campaign/text-place.js';

import { cpuSeconds } from './cpu-seconds.js';

/** The plain value of a tree, for comparison with JSON.parse; defineProperty because a key may be `__proto__`. */
function plain(node: JsonNode): unknown {
  if (node.type === 'object') {
    const o = {};
    for (const [key, { value }] of node.members)
      Object.defineProperty(o, key, { value: plain(value), enumerable: true, configurable: true, writable: true });
    return o;
  }
  if (node.type === 'array') return node.items.map(plain);
  if (node.type === 'null') return null;
  if (node.type === 'foreign') throw new Error('not JSON');
  return node.value;
}

function fault(text: string) {
  try {
    parseJsonText(text);
  } catch (error) {
    if (!(error instanceof JsonTextError)) throw error;
    return { ...error.fault, ...new TextPlaces(text).at(error.fault.start) };
  }
  throw new Error('was read');
}

describe('parseJsonText', () => {
  it('reads what JSON.parse reads', () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 6 }), fc.constantFrom(undefined, 1, '\t', '\r\n'), (value, indent) => {
        const text = JSON.stringify(value, null, indent);
        expect(plain(parseJsonText(text))).toEqual(JSON.parse(text));
      }),
    );
  });

  it('refuses what JSON.parse refuses', () => {
    const pieces = [
      '{',
      '}',
      '[',
      ']',
      ',',
      ':',
      '"a"',
      '"\\u00e9"',
      '"\\x"',
      '0',
      '01',
      '-',
      '-0',
      '1.5',
      '1.',
      '.5',
      '+1',
    ];
    pieces.push(
      '1e5',
      '1e',
      'true',
      'nul',
      'NaN',
      '-Infinity',
      ' ',
      '\n',
      '\u0001',
      "'a'",
      '"a',
      '/*',
      '\ufeff',
      '\u00a0',
    );
    let refused = 0;
    fc.assert(
      fc.property(fc.array(fc.constantFrom(...pieces), { minLength: 1, maxLength: 7 }), (parts) => {
        const text = `0${parts.join('')}`.slice(1);
        let expected: unknown;
        let good = true;
        try {
          expected = JSON.parse(text.replace(/^\ufeff/, ''));
        } catch {
          good = false;
        }
        if (good) expect(plain(parseJsonText(text))).toEqual(expected);
        else {
          refused++;
          expect(() => parseJsonText(text)).toThrow(JsonTextError);
        }
      }),
      { numRuns: 3000, seed: 1 },
    );
    expect(refused).toBeGreaterThan(1000);
  });

  it('knows where every key and value stands', () => {
    const text = '\ufeff{\n  "a": 1,\r\n  "b\\u0022": [true, {"c": null}],\r  "d": "é"\n}';
    const places = new TextPlaces(text);
    const root = parseJsonText(text);
    if (root.type !== 'object') throw new Error(root.type);
    expect(places.at(root.start)).toEqual({ line: 1, column: 1 });
    const a = root.members.get('a');
    expect(places.at(a?.keyStart ?? -1)).toEqual({ line: 2, column: 3 });
    expect(places.at(a?.value.start ?? -1)).toEqual({ line: 2, column: 8 });
    const b = root.members.get('b"')?.value;
    if (b?.type !== 'array') throw new Error('b');
    expect(places.at(b.items[1]?.start ?? -1)).toEqual({ line: 3, column: 21 });
    expect(places.at(root.members.get('d')?.keyStart ?? -1)).toEqual({ line: 4, column: 3 });
  });

  it('finds a character inside a text through its escapes', () => {
    const text = '  "a\\n\\u00e9bc"';
    const node = parseJsonText(text);
    for (let i = 0; i < 5; i++) {
      const at = placeInString(text, node.start, i);
      expect([at, text[at]]).toEqual(
        [
          [3, 'a'],
          [4, '\\'],
          [6, '\\'],
          [12, 'b'],
          [13, 'c'],
        ][i],
      );
    }
  });

  it('keeps the first of two equal keys and reports the second', () => {
    const root = parseJsonText('{"a": 1, "b": 2, "a": 3}');
    if (root.type !== 'object') throw new Error(root.type);
    expect(plain(root)).toEqual({ a: 1, b: 2 });
    expect(root.duplicates).toEqual([{ key: 'a', keyStart: 17 }]);
  });

  it.each([
    ['', 'empty-file', 1, 1, 'an empty file', 'a campaign'],
    [' \n\t', 'empty-file', 1, 1, 'an empty file', 'a campaign'],
    ['{\n "a" 1}', 'syntax', 2, 6, '"1"', 'a colon after the key "a"'],
    ['{"a": 1 "b": 2}', 'syntax', 1, 9, '"\\""', 'a comma or }'],
    ['{"a": 1,}', 'syntax', 1, 9, '"}"', 'no comma stands before }'],
    ['[1,\n]', 'syntax', 2, 1, '"]"', 'no comma stands before ]'],
    ['[1 2]', 'syntax', 1, 4, '"2"', 'a comma or ]'],
    ['{"a": 1', 'syntax', 1, 8, 'the end of the file', 'a comma or }'],
    ['{a: 1}', 'syntax', 1, 2, '"a"', 'a key in double quotes'],
    ["{'a': 1}", 'syntax', 1, 2, '"\'"', 'a key in double quotes'],
    ['{"a": cellar}', 'syntax', 1, 7, '"cellar"', 'text stands in double quotes'],
    ["['a']", 'syntax', 1, 2, '"\'"', 'straight double quotes'],
    ['[“a”]', 'syntax', 1, 2, '"“"', 'straight double quotes'],
    ['[NaN]', 'syntax', 1, 2, '"NaN"', 'a finite number'],
    ['[-Infinity]', 'syntax', 1, 2, '-Infinity', 'a finite number'],
    ['[.5]', 'syntax', 1, 2, '"."', 'such as 0.5'],
    ['[+5]', 'syntax', 1, 2, '"+"', 'such as 0.5'],
    ['[007]', 'syntax', 1, 2, '007', 'a number as JSON writes it'],
    ['[1.]', 'syntax', 1, 2, '1.', 'a number as JSON writes it'],
    ['[0x1F]', 'syntax', 1, 2, '0x1F', 'a number as JSON writes it'],
    ['// a\n{}', 'syntax', 1, 1, '"/"', 'no comments'],
    ['["a\nb"]', 'control-character', 1, 4, 'a line break (U+000A) inside a text', 'a closing double quote'],
    ['["a\u0000b"]', 'control-character', 1, 4, 'the control character U+0000', 'an escape'],
    ['["a', 'syntax', 1, 2, 'a text without its end', 'a closing double quote'],
    ['["\\q"]', 'syntax', 1, 3, '"\\\\q"', 'one of \\"'],
    ['["\\u12g4"]', 'syntax', 1, 3, '"\\\\u"', '\\uXXXX'],
    ['{} {}', 'syntax', 1, 4, '"{"', 'nothing after the end'],
    ['null', undefined, 0, 0, '', ''],
  ])('%j: %s', (text, code, line, column, found, expected) => {
    if (code === undefined) {
      expect(plain(parseJsonText(text))).toBeNull();
      return;
    }
    const f = fault(text);
    expect({ code: f.code, line: f.line, column: f.column, found: f.found }).toEqual({ code, line, column, found });
    expect(f.expected).toContain(expected);
  });

  it('refuses 100 000 lists inside each other without overflowing', () => {
    for (const open of ['[', '{"a":']) {
      const f = fault(open.repeat(100_000));
      expect(f.code).toBe('too-deep');
      expect(f.column).toBe(64 * open.length + 1);
    }
    expect(parseJsonText('['.repeat(64) + ']'.repeat(64)).type).toBe('array');
  });

  it('treats __proto__ and constructor as keys like any other', () => {
    const root = parseJsonText('{"__proto__": {"polluted": true}, "constructor": {"prototype": 1}}');
    if (root.type !== 'object') throw new Error(root.type);
    expect([...root.members.keys()]).toEqual(['__proto__', 'constructor']);
    expect(({} as Record<string, unknown>)['polluted']).toBeUndefined();
  });

  it('reads 10 MB in well under a second: not many times slower than JSON.parse, which keeps no places', () => {
    const records = `{"id": "cellar", "lat": 52.2961, "list": [1, 2, 3], "h": "143.216(8) m"},`.repeat(140_000);
    const text = `[${records.slice(0, -1)}]`;
    expect(text.length).toBeGreaterThan(10_000_000);
    // measured against the engine's own parser, so that a busy machine slows both; about 6 here
    const native = cpuSeconds(() => JSON.parse(text));
    expect(cpuSeconds(() => parseJsonText(text))).toBeLessThan(40 * native);
  });
});

describe('jsonTreeOf', () => {
  it('reads values in memory like their text', () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 5 }), (value) => {
        // JSON.stringify takes the sign off -0
        const text = JSON.stringify(value);
        expect(plain(jsonTreeOf(JSON.parse(text)))).toEqual(plain(parseJsonText(text)));
      }),
    );
  });

  it('takes undefined as absent, names what JSON has no form for, and refuses a value that contains itself', () => {
    expect(plain(jsonTreeOf({ a: undefined, b: 1 }))).toEqual({ b: 1 });
    expect(jsonTreeOf(new Date(0))).toEqual({ type: 'foreign', start: -1, what: 'Date' });
    expect(jsonTreeOf(1n)).toEqual({ type: 'foreign', start: -1, what: 'bigint' });
    expect(jsonTreeOf(Object.create(null)).type).toBe('object');
    const loop: unknown[] = [];
    loop.push(loop);
    expect(() => jsonTreeOf(loop)).toThrow(JsonTextError);
  });
});

describe('quoted', () => {
  it('shortens and escapes', () => {
    expect(quoted('a\u0001\ud800"')).toBe('"a\\u0001\\ud800\\""');
    expect(quoted('x'.repeat(100))).toBe(`"${'x'.repeat(60)}…"`);
  });
});
