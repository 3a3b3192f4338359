import { closest } from '../../quantity/index.js';
import { quoted } from '../json-text.js';
import type { JsonObject } from '../json-tree.js';
import type { Keys, ObjectDescriptor } from '../schema/descriptor.js';
import { isBuilt } from '../schema/unbuilt.js';
import type { Context } from './context.js';

/** Refuses the keys of an object that are not its own, each in the words that fit.
 * @param name what stands before the key in the list of keys that are not built yet
 * @returns the members left to read */
export function ownMembers(
  node: JsonObject,
  name: string,
  keys: Keys,
  refused: ObjectDescriptor<Keys>['refused'],
  context: Context,
): JsonObject['members'] {
  for (const { key, keyStart } of node.duplicates)
    context
      .member(pathStep(key))
      .refuse(node, 'duplicate-key', 'each key once', `${quoted(key)} a second time`, keyStart);
  let own = node.members;
  for (const [key, { keyStart }] of node.members) {
    let code: string;
    let expected: string;
    const refusal = Object.hasOwn(refused, key) ? refused[key] : undefined;
    if (!isBuilt(name, key)) {
      code = 'not-built';
      expected = `no ${quoted(key)}: it is part of the format, but this version does not compute it yet`;
    } else if (refusal) ({ code, expected } = refusal);
    else if (Object.hasOwn(keys, key)) continue;
    else {
      code = 'unknown-key';
      expected = suggestion(
        key,
        Object.keys(keys).filter((k) => isBuilt(name, k)),
      );
    }
    context.member(pathStep(key)).refuse(node, code, expected, quoted(key), keyStart);
    if (own === node.members) own = new Map(node.members);
    (own as Map<string, unknown>).delete(key);
  }
  return own;
}

/** "did you mean x?" where one is near, else all of them. */
export function suggestion(word: string, candidates: readonly string[]): string {
  const near = closest(word, candidates);
  if (near !== null && near !== word) return `${quoted(near)}: did you mean that?`;
  if (candidates.length === 0) return 'none: there are none';
  const shown = candidates.slice(0, 24).map((c) => quoted(c));
  return `one of ${shown.join(', ')}${candidates.length > shown.length ? ', …' : ''}`;
}

/** A key as a step of a path; any text can be a key. */
const pathStep = (key: string): string => (/^[\w-]{1,40}$/.test(key) ? key : quoted(key, 40));
