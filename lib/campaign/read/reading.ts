import type { Fault } from '../fault.js';
import { placeInString, quoted } from '../json-text.js';
import type { JsonNode } from '../json-tree.js';
import type { ListName } from '../schema/descriptor.js';
import { TextPlaces } from '../text-place.js';
import type { Context } from './context.js';

/** More faults than this are of no use to anybody; the last one says that there are more. */
const MAX_FAULTS = 1000;

/** Ends a reading that has MAX_FAULTS. */
export class TooManyFaults extends Error {}

/** An item that has an id. */
export interface Definition {
  readonly id: string;
  readonly context: Context;
}

/** A place that names an item. */
export interface Use {
  readonly list: ListName;
  readonly id: string;
  readonly builtIn: readonly string[];
  readonly node: JsonNode;
  readonly context: Context;
}

/** Where an object that was read came from. */
export interface Origin {
  readonly node: JsonNode;
  readonly context: Context;
}

interface PlacedFault {
  readonly fault: Fault;
  readonly start: number;
}

/** What one reading collects on its way through the tree: faults, definitions of ids, and names of other items. */
export class Reading {
  readonly definitions = new Map<ListName, Map<string, Definition>>();
  readonly uses: Use[] = [];
  /** lists with items whose id could not be read: that a name is missing there says nothing */
  readonly incomplete = new Set<ListName>();
  private readonly origins = new Map<object, Origin>();
  private readonly placed: PlacedFault[] = [];
  private places: TextPlaces | null = null;

  /** @param text the file, or null when the value came from memory */
  constructor(private readonly text: string | null) {}

  get hasFaults(): boolean {
    return this.placed.length > 0;
  }

  /** A fault at a node, or at the key of a member if `start` says so. */
  add(code: string, path: string, node: JsonNode, found: string, expected: string, start = node.start): void {
    if (this.placed.length === MAX_FAULTS - 1) {
      code = 'too-many-faults';
      found = `${MAX_FAULTS} faults and perhaps more`;
      expected = 'these mended first';
    }
    const place = this.text === null || start < 0 ? null : this.placesOf(this.text).at(start);
    const fault = { code, path, line: place?.line ?? null, column: place?.column ?? null, found, expected };
    this.placed.push({ fault, start });
    if (this.placed.length >= MAX_FAULTS) throw new TooManyFaults();
  }

  /** Adds words to what the fault of a path expects: a likely reason that only shows beside other keys. */
  explain(path: string, words: string): void {
    const i = this.placed.findIndex((p) => p.fault.path === path);
    const at = this.placed[i];
    if (at) this.placed[i] = { ...at, fault: { ...at.fault, expected: `${at.fault.expected}; ${words}` } };
  }

  /** Index in the file of a character inside a text value. */
  placeInside(node: JsonNode, position: number): number {
    if (this.text === null || node.start < 0 || node.type !== 'string') return node.start;
    return node.verbatim ? node.start + position : placeInString(this.text, node.start, position);
  }

  /** The faults, by their place in the file; those without a text in the order in which they were found. */
  faults(): Fault[] {
    return this.placed.sort((a, b) => a.start - b.start).map(({ fault }) => fault);
  }

  /** What stands at a node, for a message. */
  show(node: JsonNode): string {
    switch (node.type) {
      case 'string':
        return quoted(node.value);
      case 'number':
        if (Number.isFinite(node.value) || this.text === null || node.start < 0) return String(node.value);
        return /^[-+.\de]{1,40}/i.exec(this.text.slice(node.start, node.start + 40))?.[0] ?? String(node.value);
      case 'boolean':
        return String(node.value);
      case 'null':
        return 'null';
      case 'foreign':
        return `a ${node.what}`;
      case 'array':
        return node.items.length === 0 ? 'an empty list' : `a list of ${node.items.length}`;
      case 'object': {
        const keys = [...node.members.keys()].slice(0, 4).map((key) => quoted(key, 20));
        if (keys.length === 0) return 'an empty object';
        return `an object with ${keys.join(', ')}${node.members.size > keys.length ? ', …' : ''}`;
      }
    }
  }

  define(list: ListName, definition: Definition): void {
    const items = this.definitions.get(list) ?? new Map<string, Definition>();
    this.definitions.set(list, items);
    if (!items.has(definition.id)) items.set(definition.id, definition);
  }

  defined(list: ListName, id: string): Definition | undefined {
    return this.definitions.get(list)?.get(id);
  }

  /** Remembers where an object came from, for checks that look at the finished value. */
  remember(value: object, origin: Origin): void {
    this.origins.set(value, origin);
  }

  originOf(value: object): Origin {
    const origin = this.origins.get(value);
    if (!origin) throw new Error('an object that this reading has not made');
    return origin;
  }

  private placesOf(text: string): TextPlaces {
    this.places ??= new TextPlaces(text);
    return this.places;
  }
}
