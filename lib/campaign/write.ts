import { formatInstant, KINDS, type QuantityKind, readMeasured } from '../quantity/index.js';
import type { Campaign, GridUse, Measured } from './campaign.js';
import { fromCampaign } from './from-campaign.js';
import { campaignSchema } from './schema/campaign-schema.js';
import type { Descriptor, Keys, ObjectDescriptor, PieceOf } from './schema/descriptor.js';

/** The file of a campaign, so that reading it gives the campaign again. Values keep the text they were typed in; what the
 *  reader puts in by itself is left out, save the tide system and the Love numbers, which a reader of the file should see. */
export const writeCampaign = (campaign: Campaign): string =>
  `${layOut(jsonOf(campaignSchema, fromCampaign(campaign)), '')}\n`;

type Json = string | number | boolean | readonly Json[] | { readonly [key: string]: Json };

/** What was read by a descriptor, as the file says it. */
function jsonOf(descriptor: Descriptor, read: unknown): Json {
  switch (descriptor.type) {
    case 'quantity':
      return quantityOf(descriptor.kind, read as Measured);
    case 'instant':
      return formatInstant(read as number);
    case 'pieces': {
      const pieces = read as readonly (PieceOf<unknown> & { readonly source: string | null })[];
      return pieces.map((piece) => {
        const { source, ...rest } = piece;
        return objectOf(descriptor.piece, source === null ? rest : piece);
      });
    }
    case 'shorthand': {
      const object = objectOf(descriptor.object, read as object);
      const text = object[descriptor.key];
      return Object.keys(object).length === 1 && text !== undefined ? text : object;
    }
    case 'list':
      return (read as readonly unknown[]).map((item) => jsonOf(descriptor.item, item));
    case 'object':
      return objectOf(descriptor, read as object);
    case 'variant': {
      const { kind } = read as { readonly kind: string };
      return { [descriptor.by]: kind, ...objectOf(descriptor.variants[kind], read as object) };
    }
    default:
      return read as Json;
  }
}

const objectOf = ({ keys }: ObjectDescriptor<Keys>, read: object): { readonly [key: string]: Json } =>
  Object.fromEntries(
    Object.entries(read).flatMap(([key, value]) => {
      const descriptor = keys[key]?.descriptor;
      return descriptor && value !== undefined ? [[key, jsonOf(descriptor, value)]] : [];
    }),
  );

function quantityOf(kind: QuantityKind, m: Measured): Json {
  const alone = m.text === null ? null : readMeasured(m.text, kind);
  // a text that stood beside a unit of its own may say something else when it stands alone
  const keepsText = alone?.ok === true && alone.value.value === m.value;
  const value = keepsText ? (m.text as string) : m.value;
  const [first, second] = m.parts;
  const uncertainty = second
    ? { parts: m.parts.map((part) => withoutNull(part)) }
    : {
        ...(m.u > 0 && !(keepsText && alone.value.u === m.u) ? { u: keepsText ? withUnit(m.u, kind) : m.u } : {}),
        ...(first?.source != null ? { source: first.source } : {}),
      };
  const rest: Record<string, Json> = {
    ...uncertainty,
    ...(m.tide === null ? {} : { tide: m.tide }),
    ...(m.distribution === 'normal' ? {} : { distribution: m.distribution }),
    ...(m.dof === null ? {} : { dof: m.dof }),
    ...(m.frame === undefined ? {} : { frame: m.frame }),
    ...(m.epochYear === undefined ? {} : { epoch: m.epochYear }),
    ...(m.rate === undefined ? {} : { rate: quantityOf('speed', m.rate) }),
    ...(m.source === undefined ? {} : { source: m.source }),
    ...(m.note === undefined ? {} : { note: m.note }),
    ...(m.reference === undefined ? {} : { reference: m.reference }),
    ...(m.date === undefined ? {} : { date: m.date }),
  };
  if (m.grid) return { ...gridOf(m.grid), ...rest };
  return Object.keys(rest).length === 0 ? value : { value, ...rest };
}

/** The file, and with the nodes at hand everything that is needed of it. */
const gridOf = ({ file, method, nodes }: GridUse): { readonly [key: string]: Json } => ({
  grid: file,
  ...(method === 'bilinear' ? {} : { method }),
  ...(nodes === null
    ? {}
    : { nodes: { lat: nodes.latitudesDeg, lon: nodes.longitudesDeg, values: nodes.valuesM as readonly number[][] } }),
});

/** A bare number beside a text with a unit could be meant in either unit. */
const withUnit = (value: number, kind: QuantityKind): Json =>
  KINDS[kind].unit === '1' ? value : `${value} ${KINDS[kind].unit}`;

const withoutNull = (part: object): { readonly [key: string]: Json } =>
  Object.fromEntries(Object.entries(part).filter(([, v]) => v !== null));

const WIDTH = 110;

/** JSON with short objects and lists on one line. */
function layOut(value: Json, indent: string): string {
  const line = oneLine(value);
  if (typeof value !== 'object' || indent.length + line.length <= WIDTH) return line;
  const deeper = `${indent}  `;
  if (Array.isArray(value)) return `[\n${value.map((v) => deeper + layOut(v, deeper)).join(',\n')}\n${indent}]`;
  const members = Object.entries(value).map(([k, v]) => `${deeper}${JSON.stringify(k)}: ${layOut(v, deeper)}`);
  return `{\n${members.join(',\n')}\n${indent}}`;
}

function oneLine(value: Json): string {
  if (typeof value !== 'object') return JSON.stringify(value);
  if (Array.isArray(value)) return value.length === 0 ? '[]' : `[${value.map(oneLine).join(', ')}]`;
  const members = Object.entries(value).map(([k, v]) => `${JSON.stringify(k)}: ${oneLine(v)}`);
  return members.length === 0 ? '{}' : `{ ${members.join(', ')} }`;
}
