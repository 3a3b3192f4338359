import type { JsonNode } from '../json-tree.js';
import type { Descriptor, ListName, ReadOf } from '../schema/descriptor.js';
import type { Reading } from './reading.js';

/** An item with an id, as the place in which other things stand. */
export interface Owner {
  readonly list: ListName;
  readonly id: string;
}

/** Reads any descriptor; undefined when the value was refused and the fault noted. */
export type ReadAny = <D extends Descriptor>(descriptor: D, node: JsonNode, context: Context) => ReadOf<D> | undefined;

/** Where in the campaign a value is being read. */
export class Context {
  private constructor(
    readonly reading: Reading,
    readonly read: ReadAny,
    private readonly parent: Context | null,
    private readonly step: string | number,
    /** name of the key, for the list of keys that are not built yet */
    readonly key: string,
    /** whether the value lies at a site */
    readonly atSite: boolean,
    /** innermost item with an id in which the value stands */
    readonly owner: Owner | null,
  ) {}

  static root(reading: Reading, read: ReadAny): Context {
    return new Context(reading, read, null, '', '', false, null);
  }

  /** Dotted path: ids for items of named lists, positions elsewhere. Made when asked for, for most values never are. */
  get path(): string {
    if (this.parent === null) return '';
    const { path } = this.parent;
    return path === '' ? String(this.step) : `${path}.${this.step}`;
  }

  /** The context of a key's value. */
  member(key: string): Context {
    return new Context(this.reading, this.read, this, key, key, this.atSite, this.owner);
  }

  /** The context of a list's item. */
  item(step: string | number, owner: Owner | null = this.owner): Context {
    return new Context(this.reading, this.read, this, step, this.key, this.atSite, owner);
  }

  /** The same place, lying at a site. */
  lyingAtSite(): Context {
    return new Context(this.reading, this.read, this.parent, this.step, this.key, true, this.owner);
  }

  /** Notes a fault at the value that is being read. */
  refuse(
    node: JsonNode,
    code: string,
    expected: string,
    found = this.reading.show(node),
    start = node.start,
  ): undefined {
    this.reading.add(code, this.path, node, found, expected, start);
    return undefined;
  }
}
