import {
  type MeasuredNumbers,
  type QuantityProblem,
  readExact,
  readMeasured,
  readStandardUncertainty,
} from '../../quantity/index.js';
import type { GridUse, Measured, UncertaintyPart } from '../campaign.js';
import type { JsonNode, JsonObject } from '../json-tree.js';
import {
  type Keys,
  type ObjectDescriptor,
  type PieceOf,
  type PiecesDescriptor,
  type QuantityDescriptor,
  type Range,
  type ReadOf,
  remarks,
  type ScalarDescriptor,
} from '../schema/descriptor.js';
import { quantityKeys, READ_TOGETHER, scalarKeys } from '../schema/quantity-form.js';
import { isBuilt } from '../schema/unbuilt.js';
import type { Context } from './context.js';
import { ownMembers } from './keys.js';
import { isInRange, rangeInWords } from './range.js';

/** A measured number in any of its forms; null-free: undefined when refused. */
export function readQuantity(descriptor: QuantityDescriptor, node: JsonNode, context: Context): Measured | undefined {
  const extras = node.type === 'object' ? readExtras(descriptor, node, context) : NO_EXTRAS;
  if (extras === undefined) return undefined;
  const read = readMeasured(measuredInput(node), descriptor.kind);
  if (!read.ok) return refuseAll(read.problems, node, context);
  const { value } = read;
  if (descriptor.sizesError && value.u > 0)
    return context.refuse(node, 'uncertainty-not-expected', 'a number without an uncertainty: it is one itself');
  const { grid, ...rest } = gridUseOf(extras);
  if (!grid && !inRange(value.value, descriptor, node, context)) return undefined;
  const text = grid ? null : textWithUnit(value, descriptor, node);
  const parts = withRemarks(value.parts, descriptor, node);
  const { source, ...others } = rest;
  // an exact value has no piece that could carry the source: it is kept beside
  const kept = source !== undefined && parts.length === 0 ? { source } : {};
  const measured = { ...value, text, parts, tide: null, ...others, ...kept };
  // what the grid gives at the site is put in before the campaign leaves the reader
  return grid ? { ...measured, value: Number.NaN, grid } : measured;
}

/** What lib/quantity reads of a node. A grid stands in place of the value. */
function measuredInput(node: JsonNode): unknown {
  const input = plain(node, READ_TOGETHER);
  const byGrid = node.type === 'object' && node.members.has('grid') && !node.members.has('value');
  return byGrid ? { ...(input as object), value: 0 } : input;
}

function gridUseOf({ grid: file, method, nodes, ...rest }: GridExtras): Extras & { readonly grid?: GridUse } {
  if (file === undefined) return rest;
  const grid: GridUse = {
    file,
    method: method ?? 'bilinear',
    nodes: nodes ? { latitudesDeg: nodes.lat, longitudesDeg: nodes.lon, valuesM: nodes.values } : null,
  };
  return { ...rest, grid };
}

/** The value as typed, with the unit that stood beside it: "43.812" alone would be shown as metres. */
function textWithUnit({ text, value }: MeasuredNumbers, { kind }: QuantityDescriptor, node: JsonNode): string | null {
  const unit = node.type === 'object' ? node.members.get('unit')?.value : undefined;
  if (text === null || unit?.type !== 'string') return text;
  const whole = `${text} ${unit.value}`;
  const read = readMeasured(whole, kind);
  return read.ok && read.value.value === value ? whole : text;
}

const VALUE_AND_UNIT: ReadonlySet<string> = new Set(['value', 'unit']);

/** A number with a unit and without uncertainty. */
export function readScalar(descriptor: ScalarDescriptor, node: JsonNode, context: Context): number | undefined {
  let value: number;
  if (node.type === 'object' && !descriptor.bare) {
    const own = ownMembers(node, context.key, scalarKeys(descriptor), {}, context);
    const whole = own.size === node.members.size && readRemarkKeys(own, context);
    const read = readMeasured(plain(node, VALUE_AND_UNIT), descriptor.kind);
    if (!read.ok) return refuseAll(read.problems, node, context);
    if (read.value.u > 0) return context.refuse(node, 'uncertainty-not-expected', 'a number without an uncertainty');
    if (!whole) return undefined;
    ({ value } = read.value);
  } else {
    const read = readExact(plain(node), descriptor.kind);
    if (!read.ok) return refuseAll(read.problems, node, context);
    ({ value } = read);
  }
  return inRange(value, descriptor, node, context) ? value : undefined;
}

/** Pieces of one standard uncertainty. */
export function readPieces<P extends ObjectDescriptor<Keys>>(
  { single, piece }: PiecesDescriptor<P>,
  node: JsonNode,
  context: Context,
): readonly PieceOf<P>[] | undefined {
  type Piece = PieceOf<P>;
  const whole = (read: ReadOf<P>): Piece => ({ source: null, ...read }) as unknown as Piece;
  if (node.type === 'object') {
    const read = context.read(piece, node, context) as ReadOf<P> | undefined;
    return read === undefined ? undefined : [whole(read)].filter((p) => p.u > 0);
  }
  if (node.type !== 'array') {
    const u = readScalar(single, node, context);
    return u === undefined ? undefined : u === 0 ? [] : [{ u, source: null } as unknown as Piece];
  }
  const pieces: Piece[] = [];
  const firstWith = new Map<string, number>();
  for (const [i, item] of node.items.entries()) {
    const at = context.item(i);
    const read = context.read(piece, item, at) as ReadOf<P> | undefined;
    if (read === undefined) continue;
    const p = whole(read);
    const first = p.source === null ? undefined : firstWith.get(p.source);
    if (p.source !== null && first !== undefined) {
      const source = item.type === 'object' ? item.members.get('source')?.value : undefined;
      at.member('source').refuse(
        source ?? item,
        'source-twice',
        `each source once: piece ${first} names it too, and pieces are independent of each other`,
      );
    }
    if (p.source !== null) firstWith.set(p.source, i);
    if (p.u > 0) pieces.push(p);
  }
  return pieces;
}

type Extras = Partial<
  Pick<Measured, 'tide' | 'frame' | 'epochYear' | 'rate' | 'source' | 'note' | 'reference' | 'date'>
>;

interface GridExtras extends Extras {
  readonly grid?: string;
  readonly method?: GridUse['method'];
  readonly nodes?: {
    readonly lat: readonly number[];
    readonly lon: readonly number[];
    readonly values: readonly (readonly number[])[];
  };
}

const NO_EXTRAS: Extras = {};

/** The keys that lib/quantity leaves alone, and the sources named. */
function readExtras(descriptor: QuantityDescriptor, node: JsonObject, context: Context): GridExtras | undefined {
  const keys = quantityKeys(descriptor);
  const refused = descriptor.tide ? {} : NO_TIDE;
  const own = ownMembers(node, context.key, keys, refused, context);
  // a grid stands in place of the value: that the value is missing would be a false complaint
  if (node.members.has('grid') && !isBuilt(context.key, 'grid')) return undefined;
  let good = own.size === node.members.size && node.duplicates.length === 0;
  if (descriptor.grid) good = checkGrid(node, context) && good;
  const extras: Record<string, unknown> = {};
  for (const [key, { value }] of own) {
    const at = context.member(key);
    if (key === 'source') {
      noteSource(value, at);
      if (value.type === 'string') extras['source'] = value.value;
    } else if (key === 'parts' && value.type === 'array') good = checkParts(value.items, at) && good;
    else if (!READ_TOGETHER.has(key)) {
      const read = context.read(keys[key]!.descriptor, value, at);
      if (read === undefined) good = false;
      else extras[NAMES[key] ?? key] = read;
    }
  }
  // faults of the numbers stand beside those of the keys, so that both are seen at once
  if (!good) {
    const read = readMeasured(measuredInput(node), descriptor.kind);
    if (!read.ok) refuseAll(read.problems, node, context);
    return undefined;
  }
  return extras as GridExtras;
}

/** A grid and a value say the same thing twice; how to interpolate and what the nodes are belong to a grid. */
function checkGrid({ members }: JsonObject, context: Context): boolean {
  const value = members.get('value')?.value;
  if (members.has('grid')) {
    if (value) context.member('grid').refuse(value, 'exclusive-keys', 'one of them', '"grid" and "value"');
    return value === undefined && nodesAgree(members.get('nodes')?.value, context.member('nodes'));
  }
  const alone = ['method', 'nodes'].find((key) => members.has(key));
  if (alone === undefined) return true;
  const at = members.get(alone)!;
  context.member('grid').refuse(at.value, 'missing-key', `"grid" beside "${alone}"`, 'nothing', at.keyStart);
  return false;
}

/** As many rows and columns of values as latitudes and longitudes, evenly spaced from the south-west. */
function nodesAgree(node: JsonNode | undefined, context: Context): boolean {
  if (node?.type !== 'object') return true;
  const numbers = (key: string): readonly number[] | null => {
    const list = node.members.get(key)?.value;
    if (list?.type !== 'array') return null;
    return list.items.map((item) => (item.type === 'number' ? item.value : Number.NaN));
  };
  const [lat, lon] = [numbers('lat'), numbers('lon')];
  const values = node.members.get('values')?.value;
  if (!lat || !lon || values?.type !== 'array') return true;
  const even = (list: readonly number[]) =>
    list.every((x, i) => i === 0 || x > list[i - 1]!) &&
    list.every((x, i) => Math.abs(x - list[0]! - (i * (list.at(-1)! - list[0]!)) / (list.length - 1)) < 1e-9);
  const rectangular =
    values.items.length === lat.length &&
    values.items.every((row) => row.type === 'array' && row.items.length === lon.length);
  if (even(lat) && even(lon) && rectangular) return true;
  context.refuse(
    node,
    'grid-nodes',
    'rising, evenly spaced "lat" and "lon", and "values" with a list per latitude of as many numbers as longitudes',
  );
  return false;
}

const NAMES: Readonly<Record<string, string>> = { epoch: 'epochYear' };

const NO_TIDE = {
  tide: { code: 'tide-not-here', expected: 'no tide label: the permanent tide does not enter this value' },
};

const PART_FORM: Keys = { u: remarks.note, source: remarks.note, ...remarks };

function checkParts(items: readonly JsonNode[], context: Context): boolean {
  let good = true;
  for (const [i, item] of items.entries()) {
    if (item.type !== 'object') continue;
    const at = context.item(i);
    const own = ownMembers(item, 'part', PART_FORM, {}, at);
    if (own.size !== item.members.size || item.duplicates.length > 0) good = false;
    const source = own.get('source');
    if (source) noteSource(source.value, at.member('source'));
    if (!readRemarkKeys(own, at)) good = false;
  }
  return good;
}

function noteSource(node: JsonNode, context: Context): void {
  // anything but a text is refused by lib/quantity
  if (node.type !== 'string' || node.value === '') return;
  context.reading.uses.push({ list: 'sources', builtIn: [], id: node.value, node, context });
}

const REMARKS = Object.keys(remarks) as (keyof typeof remarks)[];

function readRemarkKeys(members: JsonObject['members'], context: Context): boolean {
  let good = true;
  for (const key of REMARKS) {
    const member = members.get(key);
    if (member && context.read(remarks[key].descriptor, member.value, context.member(key)) === undefined) good = false;
  }
  return good;
}

/** Puts the remarks of the pieces back on them; pieces with u = 0 were left out. */
function withRemarks(
  parts: readonly UncertaintyPart[],
  { kind }: QuantityDescriptor,
  node: JsonNode,
): readonly UncertaintyPart[] {
  const list = node.type === 'object' ? node.members.get('parts')?.value : undefined;
  if (list?.type !== 'array') return parts;
  const stated = list.items.filter((item) => {
    const u = item.type === 'object' ? item.members.get('u') : undefined;
    const read = u && readStandardUncertainty(plain(u.value), kind);
    return read?.ok && read.value > 0;
  });
  return parts.map((part, i) => {
    const item = stated[i];
    if (item?.type !== 'object' || !REMARKS.some((key) => item.members.has(key))) return part;
    const texts = REMARKS.flatMap((key) => {
      const member = item.members.get(key);
      return member?.value.type === 'string' ? [[key, member.value.value]] : [];
    });
    return { ...part, ...Object.fromEntries(texts) };
  });
}

function inRange(value: number, range: Range, node: JsonNode, context: Context): boolean {
  if (isInRange(value, range)) return true;
  const at = node.type === 'object' ? (node.members.get('value')?.value ?? node) : node;
  const place = node.type === 'object' ? context.member('value') : context;
  const negative = range.uncertainty && value < 0;
  place.refuse(at, negative ? 'negative-u' : 'out-of-range', rangeInWords(range) ?? '');
  return false;
}

function refuseAll(problems: readonly QuantityProblem[], node: JsonNode, context: Context): undefined {
  for (const problem of problems) {
    let at = node;
    for (const step of problem.at === '' ? [] : problem.at.split('.')) {
      const next: JsonNode | undefined =
        at.type === 'object' ? at.members.get(step)?.value : at.type === 'array' ? at.items[Number(step)] : undefined;
      if (next === undefined) break;
      at = next;
    }
    const { reading } = context;
    const path = problem.at === '' ? context.path : `${context.path}.${problem.at}`;
    const start = problem.position === null ? at.start : reading.placeInside(at, problem.position);
    const found = problem.code === 'missing' ? 'nothing' : reading.show(at);
    reading.add(problem.code === 'missing' ? 'missing-key' : problem.code, path, at, found, problem.expected, start);
  }
  return undefined;
}

/** The value behind a node as lib/quantity takes it; of the outer object only the keys in `only`. */
function plain(node: JsonNode, only?: ReadonlySet<string>): unknown {
  switch (node.type) {
    case 'string':
    case 'number':
    case 'boolean':
      return node.value;
    case 'null':
      return null;
    case 'foreign':
      return Symbol(node.what);
    case 'array':
      return node.items.map((item) => plain(item));
    case 'object': {
      // no prototype: a key such as __proto__ is a key like any other
      const object: Record<string, unknown> = Object.create(null);
      for (const [key, { value }] of node.members) if (!only || only.has(key)) object[key] = plain(value);
      return object;
    }
  }
}
