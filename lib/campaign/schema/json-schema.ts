import { KINDS, type QuantityKind } from '../../quantity/index.js';
import { ID_PATTERN, MAX_ID_LENGTH } from '../read/identifier.js';
import { CAMPAIGN_FORMAT, campaignSchema } from './campaign-schema.js';
import type {
  Descriptor,
  Key,
  Keys,
  ObjectDescriptor,
  QuantityDescriptor,
  Range,
  ScalarDescriptor,
} from './descriptor.js';
import { quantityKeys, scalarKeys } from './quantity-form.js';
import { isBuilt, isBuiltKind } from './unbuilt.js';

/** A JSON Schema, draft 2020-12. */
export interface JsonSchema {
  readonly [keyword: string]: unknown;
}

/** The JSON Schema of a campaign file, from the description that the reader works by. It knows keys, forms and limits; what
 *  holds between items (references, distances) and inside the text of a quantity only the reader knows. */
export function campaignJsonSchema(): JsonSchema {
  const definitions = new Map<string, JsonSchema>();
  const root = objectSchema(campaignSchema, definitions);
  return {
    $schema: 'https://json-schema.org/draft/2020-12/schema',
    $id: `urn:${CAMPAIGN_FORMAT.replace('/', ':')}`,
    title: 'Plumbtick campaign',
    ...root,
    $defs: Object.fromEntries(definitions),
  };
}

type Definitions = Map<string, JsonSchema>;

function schemaOf(descriptor: Descriptor, key: string, definitions: Definitions): JsonSchema {
  switch (descriptor.type) {
    case 'text':
      return descriptor.known ? { type: 'string', examples: descriptor.known } : { type: 'string' };
    case 'id':
      return {
        type: 'string',
        pattern: ID_PATTERN,
        maxLength: MAX_ID_LENGTH,
        ...(descriptor.reserved.length > 0 ? { not: { enum: descriptor.reserved } } : {}),
      };
    case 'reference':
      return descriptor.builtIn.length > 0 ? { type: 'string', examples: descriptor.builtIn } : { type: 'string' };
    case 'enum':
      return descriptor.values.length === 1 ? { const: descriptor.values[0] } : { enum: descriptor.values };
    case 'boolean':
      return { type: 'boolean' };
    case 'number':
      return { type: descriptor.integer ? 'integer' : 'number', ...limits(descriptor) };
    case 'scalar':
      if (descriptor.bare) return { type: ['number', 'string'], ...limits(descriptor) };
      return {
        ...reference(`number ${descriptor.kind}`, definitions, () => scalarSchema(descriptor, definitions)),
        ...limits(descriptor),
      };
    case 'quantity':
      return {
        ...reference(nameOfQuantity(descriptor, key), definitions, () => quantitySchema(descriptor, key, definitions)),
        ...limits(descriptor),
      };
    case 'pieces': {
      const piece = schemaOf(descriptor.piece, key, definitions);
      return { anyOf: [schemaOf(descriptor.single, key, definitions), piece, { type: 'array', items: piece }] };
    }
    case 'shorthand':
      return { anyOf: [{ type: 'string' }, schemaOf(descriptor.object, key, definitions)] };
    case 'angle': {
      const [minimum, maximum] = descriptor.axis === 'latitude' ? [-90, 90] : [-180, 360];
      return { type: ['number', 'string'], minimum, maximum };
    }
    case 'instant':
      return {
        type: ['string', 'number'],
        description: 'ISO 8601 with Z or an offset; a number is a Modified Julian Date.',
      };
    case 'list': {
      const { min, max } = descriptor.length;
      return {
        type: 'array',
        items: schemaOf(descriptor.item, key, definitions),
        ...(min > 0 ? { minItems: min } : {}),
        ...(Number.isFinite(max) ? { maxItems: max } : {}),
      };
    }
    case 'object':
      return reference(descriptor.name, definitions, () => objectSchema(descriptor, definitions));
    case 'variant':
      return reference(descriptor.name, definitions, () => ({
        description: descriptor.help,
        oneOf: Object.entries<ObjectDescriptor<Keys>>(descriptor.variants)
          .filter(([kind]) => isBuiltKind(descriptor.name, kind))
          .map(([kind, object]) => withKind(kind, descriptor.by, objectSchema(object, definitions))),
      }));
  }
}

const withKind = (kind: string, by: string, object: JsonSchema): JsonSchema => ({
  ...object,
  properties: { [by]: { const: kind }, ...(object['properties'] as object) },
  required: [by, ...((object['required'] as string[] | undefined) ?? [])],
});

function reference(words: string, definitions: Definitions, make: () => JsonSchema): JsonSchema {
  const name = words.replace(/[^\w-]+/g, '-');
  if (!definitions.has(name)) {
    definitions.set(name, {});
    definitions.set(name, make());
  }
  return { $ref: `#/$defs/${name}` };
}

function objectSchema(descriptor: ObjectDescriptor<Keys>, definitions: Definitions): JsonSchema {
  const { exclusive, needs, alternatives } = descriptor;
  return {
    type: 'object',
    description: descriptor.help,
    ...membersSchema(descriptor.name, descriptor.keys, definitions),
    ...(alternatives.length > 0 ? { anyOf: alternatives.map((keys) => ({ required: keys })) } : {}),
    ...(exclusive.length > 0 ? { allOf: exclusive.map((pair) => ({ not: { required: pair } })) } : {}),
    ...(needs.length > 0 ? { dependentRequired: Object.fromEntries(needs.map(([a, b]) => [a, [b]])) } : {}),
  };
}

function membersSchema(name: string, keys: Keys, definitions: Definitions): JsonSchema {
  const built = Object.entries(keys).filter(([key]) => isBuilt(name, key));
  const required = built.filter(([, key]) => key.required).map(([key]) => key);
  return {
    properties: Object.fromEntries(built.map(([name, key]) => [name, keySchema(name, key, definitions)])),
    ...(required.length > 0 ? { required } : {}),
    additionalProperties: false,
  };
}

const keySchema = (
  name: string,
  { descriptor, label, help }: Key<Descriptor, boolean>,
  definitions: Definitions,
): JsonSchema => ({
  title: label,
  ...schemaOf(descriptor, name, definitions),
  description: help,
});

/** Limits of a number in the default unit; a text may state another unit and is the reader's. */
const limits = ({ min, max, above }: Range): JsonSchema => ({
  ...(min === undefined ? {} : { minimum: min }),
  ...(max === undefined ? {} : { maximum: max }),
  ...(above === undefined ? {} : { exclusiveMinimum: above }),
});

const example = (kind: QuantityKind): string => {
  const { name, unit } = KINDS[kind];
  return unit === '1' ? name : `${name}; default unit ${unit}`;
};

const nameOfQuantity = ({ kind, tide, frame, epoch, grid, sizesError }: QuantityDescriptor, key: string): string =>
  `quantity ${[kind, tide ? 'with tide' : '', sizesError ? 'of an error' : '', epoch ? 'with epoch' : '', frame || grid ? key : ''].filter(Boolean).join(' ')}`;

const quantitySchema = (descriptor: QuantityDescriptor, key: string, definitions: Definitions): JsonSchema => ({
  description: `A measured quantity: ${example(descriptor.kind)}. Text: ${JSON.stringify(KINDS[descriptor.kind].example)}.`,
  anyOf: [
    { type: 'number' },
    { type: 'string' },
    {
      type: 'object',
      ...membersSchema(key, quantityKeys(descriptor), definitions),
      ...(descriptor.sizesError ? {} : { not: { required: ['source', 'parts'] } }),
      ...(descriptor.grid ? { oneOf: [{ required: ['value'] }, { required: ['grid'] }] } : {}),
    },
  ],
});

const scalarSchema = (descriptor: ScalarDescriptor, definitions: Definitions): JsonSchema => ({
  description: `A number without uncertainty: ${example(descriptor.kind)}.`,
  anyOf: [
    { type: 'number' },
    { type: 'string' },
    { type: 'object', ...membersSchema('', scalarKeys(descriptor), definitions) },
  ],
});
