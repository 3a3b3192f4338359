import { closest } from '../../quantity/index.js';
import { quoted } from '../json-text.js';
import type { JsonNode } from '../json-tree.js';
import type {
  EnumDescriptor,
  IdDescriptor,
  NumberDescriptor,
  ReferenceDescriptor,
  TextDescriptor,
} from '../schema/descriptor.js';
import type { Context } from './context.js';
import { idFault } from './identifier.js';
import { suggestion } from './keys.js';
import { isInRange, rangeInWords } from './range.js';

export function readText({ known, check }: TextDescriptor, node: JsonNode, context: Context): string | undefined {
  if (node.type !== 'string')
    return context.refuse(node, 'wrong-type', known ? `a text such as ${quoted(known[0] as string)}` : 'a text');
  // I-JSON, RFC 7493 section 2.1: half a character cannot be written to a file again
  if (/\p{Surrogate}/u.test(node.value)) return context.refuse(node, 'lone-surrogate', 'whole characters');
  const expected = check?.(node.value) ?? null;
  return expected === null ? node.value : context.refuse(node, 'unknown-name', expected);
}

export function readId({ list, reserved }: IdDescriptor, node: JsonNode, context: Context): string | undefined {
  if (node.type !== 'string') return context.refuse(node, 'wrong-type', 'a name as text');
  const { reading } = context;
  const first = reading.defined(list, node.value);
  // a name with a fault is known all the same: that others use it is no second fault
  reading.define(list, { id: node.value, context });
  const fault = idFault(node.value);
  if (fault !== null) return context.refuse(node, 'bad-id', fault);
  if (reserved.includes(node.value))
    return context.refuse(
      node,
      'reserved-id',
      `another name: ${reserved.join(', ')} are built in and stay as they are`,
    );
  if (first) return context.refuse(node, 'duplicate-id', `another name: ${first.context.path} has it already`);
  return node.value;
}

export function readReference(
  { list, builtIn }: ReferenceDescriptor,
  node: JsonNode,
  context: Context,
): string | undefined {
  if (node.type !== 'string') return context.refuse(node, 'wrong-type', `the id of an entry of "${list}"`);
  context.reading.uses.push({ list, builtIn, id: node.value, node, context });
  return node.value;
}

export function readEnum<V extends string>(
  { values }: EnumDescriptor<V>,
  node: JsonNode,
  context: Context,
): V | undefined {
  const value = node.type === 'string' ? values.find((v) => v === node.value) : undefined;
  if (value !== undefined) return value;
  const only = values.length === 1 ? quoted(values[0] as string) : `one of ${values.map((v) => quoted(v)).join(', ')}`;
  if (node.type !== 'string') return context.refuse(node, 'wrong-type', only);
  const near = closest(node.value, values);
  return context.refuse(
    node,
    'not-one-of',
    near === null || values.length === 1 ? only : suggestion(node.value, values),
  );
}

export function readBoolean(node: JsonNode, context: Context): boolean | undefined {
  return node.type === 'boolean' ? node.value : context.refuse(node, 'wrong-type', 'true or false, without quotes');
}

export function readNumber(descriptor: NumberDescriptor, node: JsonNode, context: Context): number | undefined {
  const range = rangeInWords(descriptor);
  const what = `${descriptor.integer ? 'a whole number' : 'a number'}${range === null ? '' : `, ${range}`}`;
  if (node.type !== 'number') return context.refuse(node, 'wrong-type', what);
  if (!Number.isFinite(node.value)) return context.refuse(node, 'not-finite', what);
  if (descriptor.integer && !Number.isSafeInteger(node.value)) return context.refuse(node, 'out-of-range', what);
  return isInRange(node.value, descriptor) ? node.value : context.refuse(node, 'out-of-range', what);
}
