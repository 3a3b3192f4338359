import { readConstituent } from '../../earth/earth-tide/astronomical-arguments.js';
import { quoted } from '../json-text.js';
import type { JsonNode } from '../json-tree.js';
import { readSitePosition, toSitePosition } from '../places.js';
import type { site } from '../schema/campaign-schema.js';
import type { ReadOf } from '../schema/descriptor.js';
import type { pole, route } from '../schema/places.js';
import type { Reading } from './reading.js';

type Readable<T> = Partial<T>;

const memberOf = (node: JsonNode, key: string): JsonNode =>
  (node.type === 'object' ? node.members.get(key)?.value : undefined) ?? node;

/** A latitude beyond 90° beside a longitude that could be one: only the swap makes sense. */
export function explainSwappedAxes(s: Readable<ReadOf<typeof site>>, reading: Reading): void {
  const { node, context } = reading.originOf(s);
  const lat = memberOf(node, 'lat');
  const lon = memberOf(node, 'lon');
  if (s.lat !== undefined || lat.type !== 'number' || lon.type !== 'number') return;
  if (Math.abs(lat.value) > 90 && Math.abs(lat.value) <= 180 && Math.abs(lon.value) <= 90)
    reading.explain(`${context.path}.lat`, 'lat and lon look swapped');
}

/** A position has to name a place. What could not be read is refused already. */
export function checkPosition(s: Readable<ReadOf<typeof site>>, reading: Reading): void {
  if (s.position?.crs === undefined) return;
  const { node, context } = reading.originOf(s.position);
  // a coordinate that was refused is missing here: one fault for it is enough
  const unread = ['x', 'y', 'z', 'easting', 'northing', 'lat', 'lon'].some(
    (key) => memberOf(node, key) !== node && (s.position as Record<string, unknown>)[key] === undefined,
  );
  if (unread) return;
  const read = readSitePosition(toSitePosition(s.position));
  if (read.ok) return;
  const key = read.at === 'x' && memberOf(node, 'easting') !== node ? 'easting' : read.at;
  const at = key === '' ? node : memberOf(node, key);
  const found = at === node && key !== '' ? 'nothing' : reading.show(at);
  reading.add(read.code, key === '' ? context.path : `${context.path}.${key}`, at, found, read.expected);
}

/** Each constituent once: two of them would be added. */
export function checkOceanLoading(s: Readable<ReadOf<typeof site>>, reading: Reading): void {
  const seen = new Set<string>();
  for (const o of s.oceanLoading ?? []) {
    const name = o.constituent === undefined ? null : readConstituent(o.constituent);
    if (name === null) continue;
    if (seen.has(name)) {
      const { node, context } = reading.originOf(o);
      reading.add(
        'duplicate-constituent',
        `${context.path}.constituent`,
        memberOf(node, 'constituent'),
        `${quoted(name)} again`,
        'each constituent once',
      );
    }
    seen.add(name);
  }
}

/** One position for all times, or several in order of time. */
export function checkPole(positions: readonly Readable<ReadOf<typeof pole>>[], reading: Reading): void {
  let before: number | null = null;
  for (const p of positions) {
    const { node, context } = reading.originOf(p);
    const path = `${context.path}.time`;
    if (p.time === undefined) {
      if (positions.length > 1 && memberOf(node, 'time') === node)
        reading.add('missing-key', path, node, 'nothing', '"time" beside every one of several positions of the pole');
      continue;
    }
    if (before !== null && p.time <= before) {
      const at = memberOf(node, 'time');
      reading.add('wrong-order', path, at, reading.show(at), 'later than the position before');
    }
    before = p.time;
  }
}

/** The way points of a moved clock have times, and they rise from departure to arrival. */
export function checkRoute(r: Readable<ReadOf<typeof route>>, reading: Reading): void {
  if (r.departure === undefined || r.arrival === undefined) return;
  let before = r.departure;
  for (const p of r.via ?? []) {
    const { node, context } = reading.originOf(p);
    const at = memberOf(node, 'time');
    const path = `${context.path}.time`;
    if (at === node) reading.add('missing-key', path, node, 'nothing', '"time": when the moved clock passes here');
    else if (p.time !== undefined && (p.time <= before || p.time >= r.arrival))
      reading.add(
        'wrong-order',
        path,
        at,
        reading.show(at),
        'later than the point before and earlier than the arrival',
      );
    if (p.time !== undefined) before = Math.max(before, p.time);
  }
}
