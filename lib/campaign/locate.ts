import type { Fault } from './fault.js';
import { parseJsonText } from './json-text.js';
import type { JsonNode } from './json-tree.js';
import { TextPlaces } from './text-place.js';

/** The item of a list that a step of a path names: by its id, else by its position. */
function item(items: readonly JsonNode[], step: string): JsonNode | undefined {
  for (const candidate of items) {
    const id = candidate.type === 'object' ? candidate.members.get('id')?.value : undefined;
    if (id?.type === 'string' && id.value === step) return candidate;
  }
  return /^\d+$/.test(step) ? items[Number(step)] : undefined;
}

/** The value at a path; where the file does not hold it (a default), the innermost object round it that it does hold. */
function nodeAt(root: JsonNode, path: string): JsonNode {
  let node = root;
  if (path === '') return node;
  for (const step of path.split('.')) {
    const next: JsonNode | undefined =
      node.type === 'object'
        ? node.members.get(step)?.value
        : node.type === 'array'
          ? item(node.items, step)
          : undefined;
    if (next === undefined) return node;
    node = next;
  }
  return node;
}

/** Gives line and column to faults that were found after reading, from their paths.
 * @param text the file; it has been read, so it is JSON */
export function withPlaces(text: string, faults: readonly Fault[]): Fault[] {
  if (faults.every(({ line }) => line !== null)) return [...faults];
  const root = parseJsonText(text);
  const places = new TextPlaces(text);
  return faults.map((fault) => {
    const { line, column } = fault.line === null ? places.at(nodeAt(root, fault.path).start) : fault;
    return { ...fault, line, column };
  });
}
