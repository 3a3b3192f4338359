import { isList, isObject, type JsonValue } from '../../lib/campaign/edit/index.js';
import type { Descriptor } from '../../lib/campaign/schema/index.js';

/** What stands in a field for a value of the file, as typed. */
export function fieldText(value: JsonValue | undefined): string {
  if (value === undefined || value === null) return '';
  if (typeof value === 'string') return value;
  if (isObject(value) && 'value' in value) return fieldText(value['value']);
  if (isObject(value) || isList(value)) return JSON.stringify(value);
  return String(value);
}

/** A JSON number that reads back as it was typed. */
const PLAIN_NUMBER = /^-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?$/;

/** The value a typed text stands for: a number where the file wants a bare one and the text is one; else the text as it is,
 *  right or wrong. */
export function typedValue(text: string, descriptor: Descriptor): JsonValue {
  const trimmed = text.trim();
  if (descriptor.type === 'boolean') return trimmed === 'true' ? true : trimmed === 'false' ? false : trimmed;
  if ((descriptor.type === 'number' || descriptor.type === 'angle') && PLAIN_NUMBER.test(trimmed))
    return Number(trimmed);
  return trimmed;
}

/** What a key begins with when it is added. */
export function emptyValue(descriptor: Descriptor): JsonValue | null {
  switch (descriptor.type) {
    case 'object':
      return {};
    case 'list':
      return [];
    case 'variant':
      return { kind: Object.keys(descriptor.variants)[0]! };
    case 'boolean':
      return true;
    default:
      return null; // a field, nothing in the file until something is typed
  }
}
