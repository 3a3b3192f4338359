import {
  type JsonArray,
  type JsonMember,
  type JsonNode,
  type JsonObject,
  type JsonString,
  JsonTextError,
  MAX_DEPTH,
  tooDeep,
} from './json-tree.js';

const QUOTE = 34;
const BACKSLASH = 92;
const BYTE_ORDER_MARK = 0xfeff;

const ESCAPES: ReadonlyMap<string, string> = new Map([
  ['"', '"'],
  ['\\', '\\'],
  ['/', '/'],
  ['b', '\b'],
  ['f', '\f'],
  ['n', '\n'],
  ['r', '\r'],
  ['t', '\t'],
]);

/** Reads JSON (RFC 8259, nothing beyond it) and keeps the place of every key and value; JSON.parse keeps none.
 *  A byte order mark at the beginning is passed over. Keys written twice are kept as `duplicates` for the reader to refuse.
 *  @throws {JsonTextError} `empty-file`, `syntax`, `control-character` or `too-deep`, at the first place that cannot be read */
export function parseJsonText(text: string): JsonNode {
  return new JsonTextParser(text).parse();
}

class JsonTextParser {
  private at = 0;

  constructor(private readonly text: string) {}

  parse(): JsonNode {
    if (this.text.charCodeAt(0) === BYTE_ORDER_MARK) this.at = 1;
    this.skipBlanks();
    if (this.at >= this.text.length)
      throw new JsonTextError({
        code: 'empty-file',
        start: 0,
        found: 'an empty file',
        expected: 'a campaign: {"format": "plumbtick-campaign/1", "sites": [ … ]}',
      });
    const root = this.value(0);
    this.skipBlanks();
    if (this.at < this.text.length) throw this.syntax('nothing after the end of the campaign');
    return root;
  }

  private value(depth: number): JsonNode {
    const start = this.at;
    const c = this.text.charCodeAt(start);
    if (c === QUOTE) return this.string();
    if (c === 123 || c === 91) {
      if (depth >= MAX_DEPTH) throw tooDeep(start);
      return c === 123 ? this.object(depth) : this.array(depth);
    }
    if (c === 45 || (c >= 48 && c <= 57)) return { type: 'number', start, value: this.number() };
    if (this.word('true')) return { type: 'boolean', start, value: true };
    if (this.word('false')) return { type: 'boolean', start, value: false };
    if (this.word('null')) return { type: 'null', start };
    throw this.syntax(this.expectedInsteadOf(c));
  }

  private object(depth: number): JsonObject {
    const start = this.at++;
    const members = new Map<string, JsonMember>();
    const duplicates: { key: string; keyStart: number }[] = [];
    this.skipBlanks();
    if (this.text.charCodeAt(this.at) === 125) this.at++;
    else
      for (;;) {
        if (this.text.charCodeAt(this.at) !== QUOTE) throw this.syntax('a key in double quotes');
        const { value: key, start: keyStart } = this.string();
        this.skipBlanks();
        if (this.text.charCodeAt(this.at) !== 58) throw this.syntax(`a colon after the key ${quoted(key)}`);
        this.at++;
        this.skipBlanks();
        const value = this.value(depth + 1);
        if (members.has(key)) duplicates.push({ key, keyStart });
        else members.set(key, { keyStart, value });
        this.skipBlanks();
        const c = this.text.charCodeAt(this.at);
        if (c !== 44 && c !== 125) throw this.syntax('a comma or }');
        this.at++;
        if (c === 125) break;
        this.skipBlanks();
        if (this.text.charCodeAt(this.at) === 125) throw this.syntax('another key: no comma stands before }');
      }
    return { type: 'object', start, members, duplicates };
  }

  private array(depth: number): JsonArray {
    const start = this.at++;
    const items: JsonNode[] = [];
    this.skipBlanks();
    if (this.text.charCodeAt(this.at) === 93) this.at++;
    else
      for (;;) {
        items.push(this.value(depth + 1));
        this.skipBlanks();
        const c = this.text.charCodeAt(this.at);
        if (c !== 44 && c !== 93) throw this.syntax('a comma or ]');
        this.at++;
        if (c === 93) break;
        this.skipBlanks();
        if (this.text.charCodeAt(this.at) === 93) throw this.syntax('another value: no comma stands before ]');
      }
    return { type: 'array', start, items };
  }

  private string(): JsonString {
    const { text } = this;
    const start = this.at;
    let from = start + 1;
    let at = from;
    let value = '';
    for (;;) {
      const c = text.charCodeAt(at);
      if (c === QUOTE) break;
      if (c === BACKSLASH) {
        const escaped = this.escape(at);
        value += text.slice(from, at) + escaped.value;
        at += escaped.length;
        from = at;
      } else if (c >= 32) at++;
      else this.brokenString(start, at);
    }
    this.at = at + 1;
    return { type: 'string', start, value: value + text.slice(from, at) };
  }

  private brokenString(start: number, at: number): never {
    if (at >= this.text.length) {
      this.at = start;
      throw this.syntax('a closing double quote', 'a text without its end');
    }
    const code = this.text.charCodeAt(at);
    const name = `U+${code.toString(16).toUpperCase().padStart(4, '0')}`;
    throw new JsonTextError({
      code: 'control-character',
      start: at,
      found: code === 10 || code === 13 ? `a line break (${name}) inside a text` : `the control character ${name}`,
      expected: 'a closing double quote, or the character written as an escape such as \\n',
    });
  }

  private escape(at: number): { value: string; length: number } {
    const c = this.text[at + 1] ?? '';
    const simple = ESCAPES.get(c);
    if (simple !== undefined) return { value: simple, length: 2 };
    const hex = this.text.slice(at + 2, at + 6);
    if (c === 'u' && /^[0-9a-f]{4}$/i.test(hex))
      return { value: String.fromCharCode(Number.parseInt(hex, 16)), length: 6 };
    this.at = at;
    throw this.syntax('one of \\" \\\\ \\/ \\b \\f \\n \\r \\t \\uXXXX', quoted(`\\${c}`));
  }

  private number(): number {
    const start = this.at;
    const first = this.text.charCodeAt(start) === 45 ? start + 1 : start;
    let at = this.afterDigits(first);
    let good = at > first && (this.text.charCodeAt(first) !== 48 || at === first + 1);
    if (this.text.charCodeAt(at) === 46) {
      const fraction = at + 1;
      at = this.afterDigits(fraction);
      good &&= at > fraction;
    }
    if ((this.text.charCodeAt(at) | 32) === 101) {
      const sign = this.text.charCodeAt(at + 1);
      const exponent = sign === 43 || sign === 45 ? at + 2 : at + 1;
      at = this.afterDigits(exponent);
      good &&= at > exponent;
    }
    // 12abc, 0x1F, 1_000, 1.2.3: one wrong number rather than a missing comma
    if (!good || continuesNumber(this.text.charCodeAt(at))) throw this.wrongNumber();
    this.at = at;
    return Number(this.text.slice(start, at));
  }

  private afterDigits(at: number): number {
    for (let c = this.text.charCodeAt(at); c >= 48 && c <= 57; c = this.text.charCodeAt(at)) at++;
    return at;
  }

  private wrongNumber(): JsonTextError {
    const written = /^[\w.+-]{1,40}/.exec(this.text.slice(this.at, this.at + 40))?.[0] ?? '';
    const named = /^-(Infinity|NaN)/i.test(written);
    return this.syntax(
      named
        ? 'a finite number'
        : 'a number as JSON writes it, such as -0.5 or 1.2e-18; anything else as text in quotes',
      written,
    );
  }

  private word(word: string): boolean {
    if (!this.text.startsWith(word, this.at) || /\w/.test(this.text[this.at + word.length] ?? '')) return false;
    this.at += word.length;
    return true;
  }

  private expectedInsteadOf(c: number): string {
    const rest = this.text.slice(this.at, this.at + 12);
    if (/^(NaN|[+]?Infinity)/i.test(rest)) return 'a finite number';
    if (c === 39 || c === 0x201c || c === 0x201d || c === 0x201e) return 'a text in straight double quotes';
    if (c === 47 || c === 35) return 'a value: JSON has no comments, a "note" may stand on any object';
    if (c === 43 || c === 46) return 'a number as JSON writes it, such as 0.5';
    if (/^[\p{L}_]/u.test(rest)) return 'a value: text stands in double quotes';
    return 'a value: a number, a text in double quotes, true, false, { or [';
  }

  private skipBlanks(): void {
    for (;;) {
      const c = this.text.charCodeAt(this.at);
      if (c !== 32 && c !== 10 && c !== 13 && c !== 9) return;
      this.at++;
    }
  }

  private syntax(expected: string, found = this.foundHere()): JsonTextError {
    return new JsonTextError({ code: 'syntax', start: this.at, found, expected });
  }

  private foundHere(): string {
    if (this.at >= this.text.length) return 'the end of the file';
    const rest = this.text.slice(this.at, this.at + 24);
    return quoted(/^[\p{L}\p{N}_]+/u.exec(rest)?.[0] ?? String.fromCodePoint(rest.codePointAt(0) ?? 0));
  }
}

/** Letters, digits, `_`, `.`, `+`, `-`. */
const continuesNumber = (c: number): boolean =>
  (c >= 48 && c <= 57) || ((c | 32) >= 97 && (c | 32) <= 122) || c === 95 || c === 46 || c === 43 || c === 45;

/** A text in double quotes for a message: escapes instead of control characters and broken surrogates, shortened. */
export function quoted(text: string, longest = 60): string {
  const short = text.length > longest ? `${text.slice(0, longest)}…` : text;
  return JSON.stringify(short);
}

/** Where in the file the `index`-th UTF-16 unit of a text value stands, escapes counted. @param start of its opening quote */
export function placeInString(text: string, start: number, index: number): number {
  let at = start + 1;
  for (let i = 0; i < index && at < text.length && text.charCodeAt(at) !== QUOTE; i++)
    at += text.charCodeAt(at) !== BACKSLASH ? 1 : text[at + 1] === 'u' ? 6 : 2;
  return at;
}
