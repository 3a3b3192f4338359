import { quoted } from '../json-text.js';
import type { JsonNode, JsonObject } from '../json-tree.js';
import type {
  Descriptor,
  Keys,
  ListDescriptor,
  ListName,
  ObjectDescriptor,
  ReadOf,
  ShorthandDescriptor,
  VariantDescriptor,
} from '../schema/descriptor.js';
import { isBuilt, isBuiltKind } from '../schema/unbuilt.js';
import type { Context } from './context.js';
import { idFault } from './identifier.js';
import { ownMembers, suggestion } from './keys.js';

/** The keys of an object. What could be read is returned even where other keys were refused, so that checks across the
 *  file see as much as possible; whether the file is good the reading knows. */
export function readObject<K extends Keys>(
  descriptor: ObjectDescriptor<K>,
  node: JsonNode,
  context: Context,
  variantKey?: string,
): ReadOf<ObjectDescriptor<K>> | undefined {
  if (node.type !== 'object')
    return context.refuse(node, 'wrong-type', `a ${descriptor.name}: an object with ${requiredKeys(descriptor)}`);
  const { keys, name } = descriptor;
  const allowed: Keys = variantKey === undefined ? keys : { [variantKey]: keys['note'] as Keys[string], ...keys };
  const members = ownMembers(node, name, allowed, descriptor.refused, context);
  // a key that is not built yet may stand in for others (a position for lat and lon): their lack is no fault beside it
  const isComplete = () => ![...node.members.keys()].some((key) => !isBuilt(name, key));
  const here = descriptor.atSite ? context.lyingAtSite() : context;
  const result: Record<string, unknown> = {};
  for (const key in keys) {
    const { descriptor: inner, required, help } = keys[key] as Keys[string];
    const member = members.get(key);
    if (member !== undefined) {
      const read = here.read(inner, member.value, here.member(key));
      if (read !== undefined) result[key] = read;
    } else if (required && !node.members.has(key) && isComplete())
      context.member(key).refuse(node, 'missing-key', `${quoted(key)}: ${help}`, 'nothing');
  }
  if (isComplete()) checkAlternatives(descriptor, node, context);
  checkPairs(descriptor, node, result, context);
  context.reading.remember(result, { node, context });
  return result as ReadOf<ObjectDescriptor<K>>;
}

/** One of several sets of keys has to stand whole. Of the one that was begun, else of the first, the missing keys are named. */
function checkAlternatives({ alternatives, keys }: ObjectDescriptor<Keys>, node: JsonObject, context: Context): void {
  const isWhole = (set: readonly string[]) => set.every((key) => node.members.has(key));
  const [first] = alternatives;
  if (first === undefined || alternatives.some(isWhole)) return;
  const begun = alternatives.find((set) => set.some((key) => node.members.has(key)));
  const others = alternatives
    .filter((set) => set !== (begun ?? first))
    .map((set) => set.map((k) => quoted(k)).join(', '));
  for (const key of begun ?? first)
    if (!node.members.has(key)) {
      const instead = begun === undefined ? `; or ${others.join('; or ')}` : '';
      context.member(key).refuse(node, 'missing-key', `${quoted(key)}: ${keys[key]?.help}${instead}`, 'nothing');
    }
}

function requiredKeys({ keys, alternatives }: ObjectDescriptor<Keys>): string {
  const needed = [...Object.keys(keys).filter((key) => keys[key]?.required), ...(alternatives[0] ?? [])];
  return (needed.length > 0 ? needed : Object.keys(keys).slice(0, 3)).map((key) => quoted(key)).join(', ');
}

function checkPairs(
  descriptor: ObjectDescriptor<Keys>,
  node: JsonObject,
  result: Readonly<Record<string, unknown>>,
  context: Context,
): void {
  const { reading } = context;
  const at = (key: string): JsonNode => node.members.get(key)?.value ?? node;
  const path = (key: string): string => context.member(key).path;
  for (const [a, b] of descriptor.exclusive)
    if (node.members.has(a) && node.members.has(b)) {
      const order = [...node.members.keys()];
      const second = order.indexOf(a) > order.indexOf(b) ? a : b;
      const start = node.members.get(second)?.keyStart;
      reading.add('exclusive-keys', path(second), node, `${quoted(a)} and ${quoted(b)}`, 'one of them', start);
    }
  for (const [a, b] of descriptor.needs)
    if (node.members.has(a) && !node.members.has(b))
      reading.add('missing-key', path(b), node, 'nothing', `${quoted(b)} beside ${quoted(a)}`);
  for (const [a, b] of descriptor.ordered) {
    const [from, to] = [result[a], result[b]];
    if (typeof from === 'number' && typeof to === 'number' && from >= to)
      reading.add(
        'wrong-order',
        path(b),
        at(b),
        reading.show(at(b)),
        `later than ${quoted(a)}, ${reading.show(at(a))}`,
      );
  }
  for (const [a, b] of descriptor.distinct)
    if (typeof result[a] === 'string' && result[a] === result[b])
      reading.add('self-reference', path(b), at(b), reading.show(at(b)), `another one than ${quoted(a)}`);
}

/** An object, or a text that stands for it. */
export function readShorthand<O extends ObjectDescriptor<Keys>>(
  { key, object }: ShorthandDescriptor<O>,
  node: JsonNode,
  context: Context,
): ReadOf<O> | undefined {
  if (node.type !== 'string') return context.read(object, node, context) as ReadOf<O> | undefined;
  const members = new Map([[key, { value: node, keyStart: node.start }]]);
  const whole: JsonObject = { type: 'object', start: node.start, members, duplicates: [] };
  return context.read(object, whole, context) as ReadOf<O> | undefined;
}

/** One of several kinds of object, told apart by a key. */
export function readVariant<V extends Readonly<Record<string, ObjectDescriptor<Keys>>>>(
  { variants, by, name }: VariantDescriptor<V>,
  node: JsonNode,
  context: Context,
): ReadOf<VariantDescriptor<V>> | undefined {
  const kinds = () => Object.keys(variants).filter((k) => isBuiltKind(name, k));
  if (node.type !== 'object') return context.refuse(node, 'wrong-type', `a ${name}: an object with ${quoted(by)}`);
  const at = context.member(by);
  const kind = node.members.get(by)?.value;
  if (kind === undefined) return at.refuse(node, 'missing-key', `${quoted(by)}, ${suggestion('', kinds())}`, 'nothing');
  if (kind.type !== 'string') return at.refuse(kind, 'wrong-type', suggestion('', kinds()));
  if (!isBuiltKind(name, kind.value))
    return at.refuse(
      kind,
      'not-built',
      `another ${by}: this one is part of the format, but this version does not compute it yet`,
    );
  const variant = Object.hasOwn(variants, kind.value) ? variants[kind.value] : undefined;
  if (variant === undefined) return at.refuse(kind, 'not-one-of', suggestion(kind.value, kinds()));
  const read = readObject(variant, node, context, by);
  if (read === undefined) return undefined;
  const whole = { ...read, [by]: kind.value };
  context.reading.remember(whole, { node, context });
  return whole as unknown as ReadOf<VariantDescriptor<V>>;
}

/** The items of a list. Refused items are left out; the reading knows of them. */
export function readList<D extends Descriptor>(
  { item, pathBy, length }: ListDescriptor<D>,
  node: JsonNode,
  context: Context,
): readonly ReadOf<D>[] | undefined {
  const { min, max } = length;
  const size = min === max ? `a list of ${min}` : min > 0 ? `a list with at least ${min}` : 'a list: [ … ]';
  const id = item.type === 'object' ? item.keys['id'] : undefined;
  const list: ListName | undefined = id?.descriptor.list;
  if (list !== undefined && !(node.type === 'array' && node.items.every((child) => tellsId(child, id.required))))
    context.reading.incomplete.add(list);
  if (node.type !== 'array') return context.refuse(node, 'wrong-type', size);
  if (node.items.length < min || node.items.length > max) return context.refuse(node, 'wrong-length', size);
  const items: ReadOf<D>[] = [];
  const names = new Set<string>();
  for (const [i, child] of node.items.entries()) {
    const name = pathBy === 'id' ? idOf(child) : null;
    // of two items with one id the second is named by its position, so that a path means one place
    const step = name === null || names.has(name) ? i : name;
    if (name !== null) names.add(name);
    const owner = step === name && list !== undefined ? { list, id: name } : context.owner;
    const read = context.read(item, child, context.item(step, owner));
    if (read !== undefined) items.push(read as ReadOf<D>);
  }
  return items;
}

/** Whether the id of an item, if it has or needs one, can be told. */
function tellsId(node: JsonNode, needed: boolean): boolean {
  const id = node.type === 'object' ? node.members.get('id') : undefined;
  return id === undefined ? node.type === 'object' && !needed : id.value.type === 'string';
}

function idOf(node: JsonNode): string | null {
  const id = node.type === 'object' ? node.members.get('id')?.value : undefined;
  return id?.type === 'string' && idFault(id.value) === null ? id.value : null;
}
