/** The description of the campaign file as data, for forms and documentation. */
export { BUILT_IN_DATUMS, CAMPAIGN_FORMAT, campaignSchema } from './campaign-schema.js';
export type {
  Descriptor,
  Key,
  Keys,
  ListName,
  ObjectDescriptor,
  Range,
  ReadOf,
  VariantDescriptor,
} from './descriptor.js';
export { LINK_KINDS } from './instruments.js';
export { campaignJsonSchema, type JsonSchema } from './json-schema.js';
export { quantityKeys } from './quantity-form.js';
export { isBuilt, isBuiltKind } from './unbuilt.js';
