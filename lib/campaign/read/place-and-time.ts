import { parseAngle, parseInstant, parseMjd, QuantityError } from '../../quantity/index.js';
import type { JsonNode } from '../json-tree.js';
import type { AngleDescriptor } from '../schema/descriptor.js';
import type { Context } from './context.js';

/** Degrees. */
export function readAngle({ axis }: AngleDescriptor, node: JsonNode, context: Context): number | undefined {
  if (node.type !== 'number' && node.type !== 'string')
    return context.refuse(node, 'wrong-type', `a ${axis} in degrees, as a number or as text such as 52°17'41.2"`);
  return parsed(() => parseAngle(node.value, axis).degrees, node, context);
}

/** Milliseconds since 1970-01-01T00:00:00Z; a number, or a text of digits alone, is a Modified Julian Date. */
export function readInstant(node: JsonNode, context: Context): number | undefined {
  if (node.type === 'string') {
    const read = /^[\d.,\s]+$/.test(node.value) ? parseMjd : parseInstant;
    return parsed(() => read(node.value), node, context);
  }
  if (node.type === 'number' && Number.isFinite(node.value))
    return parsed(() => parseMjd(node.value.toFixed(12).replace(/\.?0+$/, '')), node, context);
  return context.refuse(
    node,
    'wrong-type',
    'a moment: "2027-05-03T00:00:00Z", or a Modified Julian Date such as 61528.25',
  );
}

function parsed(parse: () => number, node: JsonNode, context: Context): number | undefined {
  try {
    return parse();
  } catch (error) {
    if (!(error instanceof QuantityError)) throw error;
    const { reading, path } = context;
    const start = reading.placeInside(node, error.position);
    reading.add(error.code, path, node, reading.show(node), error.expected, start);
    return undefined;
  }
}
