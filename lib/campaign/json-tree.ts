/** A JSON value that still knows where it stood. `start` is the index of its first UTF-16 unit in the text,
 *  −1 where the value was already in memory and no text stands behind it. */
export type JsonNode = JsonObject | JsonArray | JsonString | JsonNumber | JsonBoolean | JsonNull | JsonForeign;

export interface JsonMember {
  readonly keyStart: number;
  readonly value: JsonNode;
}

export interface JsonObject {
  readonly type: 'object';
  readonly start: number;
  /** a Map, so that a key such as `__proto__` is a key like any other; of a key written twice the first stands */
  readonly members: ReadonlyMap<string, JsonMember>;
  /** later occurrences of keys already seen */
  readonly duplicates: readonly { readonly key: string; readonly keyStart: number }[];
}

export interface JsonArray {
  readonly type: 'array';
  readonly start: number;
  readonly items: readonly JsonNode[];
}

export interface JsonString {
  readonly type: 'string';
  readonly start: number;
  readonly value: string;
  /** not from JSON: the characters stand in the text as they are, from `start` on */
  readonly verbatim?: true;
}

export interface JsonNumber {
  readonly type: 'number';
  readonly start: number;
  /** ±Infinity for a number beyond double precision, such as 1e999; NaN only from memory */
  readonly value: number;
}

export interface JsonBoolean {
  readonly type: 'boolean';
  readonly start: number;
  readonly value: boolean;
}

export interface JsonNull {
  readonly type: 'null';
  readonly start: number;
}

/** Something in memory that JSON has no form for: a function, a bigint, a Date. */
export interface JsonForeign {
  readonly type: 'foreign';
  readonly start: -1;
  readonly what: string;
}

/** Objects and lists inside each other, at most. The format itself needs seven. */
export const MAX_DEPTH = 64;

export interface JsonFault {
  readonly code: string;
  readonly start: number;
  readonly found: string;
  readonly expected: string;
}

/** Thrown where the text cannot be read on. */
export class JsonTextError extends Error {
  override readonly name = 'JsonTextError';
  readonly fault: JsonFault;
  constructor(fault: JsonFault) {
    super(`${fault.code}: found ${fault.found}; expected ${fault.expected}`);
    this.fault = fault;
  }
}

export const tooDeep = (start: number): JsonTextError =>
  new JsonTextError({
    code: 'too-deep',
    start,
    found: `more than ${MAX_DEPTH} objects and lists inside each other`,
    expected: `at most ${MAX_DEPTH}`,
  });

/** The tree of a value in memory. Members that are `undefined` count as absent, as in JSON.stringify.
 *  @throws {JsonTextError} `too-deep`, also for a value that contains itself */
export function jsonTreeOf(value: unknown, depth = 0): JsonNode {
  const start = -1;
  switch (typeof value) {
    case 'string':
      return { type: 'string', start, value };
    case 'number':
      return { type: 'number', start, value };
    case 'boolean':
      return { type: 'boolean', start, value };
    case 'object':
      break;
    default:
      return { type: 'foreign', start, what: typeof value };
  }
  if (value === null) return { type: 'null', start };
  if (depth >= MAX_DEPTH) throw tooDeep(start);
  if (Array.isArray(value)) return { type: 'array', start, items: value.map((item) => jsonTreeOf(item, depth + 1)) };
  const prototype: unknown = Object.getPrototypeOf(value);
  // an object of another realm (a frame, a worker) has another Object.prototype, itself without a prototype
  if (prototype !== null && Object.getPrototypeOf(prototype) !== null)
    return { type: 'foreign', start, what: value.constructor?.name || 'object' };
  const members = new Map<string, JsonMember>();
  for (const [key, member] of Object.entries(value))
    if (member !== undefined) members.set(key, { keyStart: start, value: jsonTreeOf(member, depth + 1) });
  return { type: 'object', start, members, duplicates: [] };
}
