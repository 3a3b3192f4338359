import type { JsonNode } from '../json-tree.js';
import type { Descriptor, ListName, ReadOf } from '../schema/descriptor.js';
import type { Reading } from './reading.js';

/** Where in the campaign a value is being read. */
export interface Context {
  readonly reading: Reading;
  /** dotted path of the value: ids for items of named lists, positions elsewhere */
  readonly path: string;
  /** name of the key, for the list of keys that are not built yet */
  readonly key: string;
  /** whether the value lies at a site */
  readonly atSite: boolean;
  /** innermost item with an id in which the value stands */
  readonly owner: { readonly list: ListName; readonly id: string } | null;
  /** reads any descriptor; undefined when the value was refused and the fault noted */
  readonly read: <D extends Descriptor>(descriptor: D, node: JsonNode, context: Context) => ReadOf<D> | undefined;
}

/** Context of a member or item. */
export const inside = (context: Context, step: string | number): Context => ({
  ...context,
  path: context.path === '' ? String(step) : `${context.path}.${step}`,
  key: typeof step === 'string' ? step : context.key,
});

/** Notes a fault at the value that is being read. */
export const refuse = (context: Context, node: JsonNode, code: string, expected: string, found?: string): undefined => {
  context.reading.add(code, context.path, node, found ?? context.reading.show(node), expected);
  return undefined;
};
