import type { JsonNode } from '../json-tree.js';
import type { Descriptor } from '../schema/descriptor.js';
import { Context, type ReadAny } from './context.js';
import { readList, readObject, readShorthand, readVariant } from './object.js';
import { readAngle, readInstant } from './place-and-time.js';
import { readBoolean, readEnum, readId, readNumber, readReference, readText } from './plain-value.js';
import { readPieces, readQuantity, readScalar } from './quantity.js';
import type { Reading } from './reading.js';

function readAny(descriptor: Descriptor, node: JsonNode, context: Context): unknown {
  switch (descriptor.type) {
    case 'text':
      return readText(descriptor, node, context);
    case 'id':
      return readId(descriptor, node, context);
    case 'reference':
      return readReference(descriptor, node, context);
    case 'enum':
      return readEnum(descriptor, node, context);
    case 'boolean':
      return readBoolean(node, context);
    case 'number':
      return readNumber(descriptor, node, context);
    case 'scalar':
      return readScalar(descriptor, node, context);
    case 'quantity':
      return readQuantity(descriptor, node, context);
    case 'pieces':
      return readPieces(descriptor, node, context);
    case 'shorthand':
      return readShorthand(descriptor, node, context);
    case 'angle':
      return readAngle(descriptor, node, context);
    case 'instant':
      return readInstant(node, context);
    case 'list':
      return readList(descriptor, node, context);
    case 'object':
      return readObject(descriptor, node, context);
    case 'variant':
      return readVariant(descriptor, node, context);
  }
}

/** The context at the root of a file. */
export const rootContext = (reading: Reading): Context =>
  // each reader returns what its descriptor says; the switch cannot tell the compiler so
  Context.root(reading, readAny as ReadAny);
