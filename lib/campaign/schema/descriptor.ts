import type { QuantityKind } from '../../quantity/kinds.js';
import type { Measured } from '../campaign.js';

declare const reads: unique symbol;

/** Names the type that reading a descriptor gives; never present at run time. */
interface Reads<T> {
  readonly [reads]?: T;
}

/** What reading `D` gives. */
export type ReadOf<D> = D extends Reads<infer T> ? T : never;

/** Lists whose items have ids that other parts of the file name. */
export type ListName = 'sources' | 'datums' | 'transitions' | 'sites' | 'clocks' | 'links' | 'measurements';

/** Free text. */
export interface TextDescriptor extends Reads<string> {
  readonly type: 'text';
  /** words with a meaning of their own; any other text is kept too, unless `check` refuses it */
  readonly known?: readonly string[];
  /** what would be right, or null for a good text */
  readonly check?: (text: string) => string | null;
}

/** The name of an item of `list`. */
export interface IdDescriptor extends Reads<string> {
  readonly type: 'id';
  readonly list: ListName;
  /** names that are built in and cannot be defined again */
  readonly reserved: readonly string[];
}

/** The id of an item of `list`, or one of the names that are built in. */
export interface ReferenceDescriptor extends Reads<string> {
  readonly type: 'reference';
  readonly list: ListName;
  readonly builtIn: readonly string[];
}

export interface EnumDescriptor<V extends string> extends Reads<V> {
  readonly type: 'enum';
  readonly values: readonly V[];
}

export interface BooleanDescriptor extends Reads<boolean> {
  readonly type: 'boolean';
}

/** Inclusive limits in SI unless `above`, which the value has to exceed. */
export interface Range {
  readonly min?: number;
  readonly max?: number;
  readonly above?: number;
  /** the value is a standard uncertainty: below 0 it is negative rather than out of range */
  readonly uncertainty?: true;
  /** why the limits are where they are, for the message */
  readonly because?: string;
}

/** A pure number without unit, uncertainty or text form. */
export interface NumberDescriptor extends Reads<number>, Range {
  readonly type: 'number';
  readonly integer: boolean;
}

/** A stated number with a unit but without uncertainty of its own. */
export interface ScalarDescriptor extends Reads<number>, Range {
  readonly type: 'scalar';
  readonly kind: QuantityKind;
  /** a number or a text, not the object form; for the pieces of a quantity */
  readonly bare: boolean;
}

/** A measured number in any of its forms (number, text, object). */
export interface QuantityDescriptor extends Reads<Measured>, Range {
  readonly type: 'quantity';
  readonly kind: QuantityKind;
  /** whether the value depends on the permanent-tide system, so that a label may stand on it */
  readonly tide: boolean;
  /** whether a terrestrial frame may stand on it, beside epoch and vertical rate */
  readonly frame: boolean;
  /** whether epoch and vertical rate may stand on it */
  readonly epoch: boolean;
  /** whether a grid file may stand in place of the value */
  readonly grid: boolean;
  /** the value is itself a standard uncertainty: it has none of its own, and its source is that of the error it sizes */
  readonly sizesError: boolean;
}

/** Pieces of one standard uncertainty: one number, one piece, or a list of pieces. Those with u = 0 are left out. */
export interface PiecesDescriptor<P extends ObjectDescriptor<Keys>> extends Reads<readonly PieceOf<P>[]> {
  readonly type: 'pieces';
  readonly single: ScalarDescriptor;
  readonly piece: P;
}

/** An object for which a text may stand that is the value of one of its keys, where the others are not needed. */
export interface ShorthandDescriptor<O extends ObjectDescriptor<Keys>> extends Reads<ReadOf<O>> {
  readonly type: 'shorthand';
  readonly key: string;
  readonly object: O;
}

export type PieceOf<P> = Omit<ReadOf<P>, 'source'> & { readonly u: number; readonly source: string | null };

/** Latitude or longitude in degrees; reading gives degrees. */
export interface AngleDescriptor extends Reads<number> {
  readonly type: 'angle';
  readonly axis: 'latitude' | 'longitude';
}

/** A moment in UTC; reading gives milliseconds since 1970-01-01T00:00:00Z. */
export interface InstantDescriptor extends Reads<number> {
  readonly type: 'instant';
}

export interface ListDescriptor<D extends Descriptor> extends Reads<readonly ReadOf<D>[]> {
  readonly type: 'list';
  readonly item: D;
  /** whether a path names an item by its id (`sites.cellar`) or by its position (`measurements.0`) */
  readonly pathBy: 'id' | 'position';
  readonly length: { readonly min: number; readonly max: number };
}

/** One key of an object: the words stand in the JSON Schema, in forms and in messages. */
export interface Key<D extends Descriptor, R extends boolean> {
  readonly descriptor: D;
  readonly required: R;
  /** a few words for a form, with the symbol */
  readonly label: string;
  /** a sentence on meaning, sign and default */
  readonly help: string;
}

export type Keys = Readonly<Record<string, Key<Descriptor, boolean>>>;

type ReadKeys<K extends Keys> = {
  readonly [P in keyof K as K[P]['required'] extends true ? P : never]: ReadOf<K[P]['descriptor']>;
} & {
  readonly [P in keyof K as K[P]['required'] extends true ? never : P]?: ReadOf<K[P]['descriptor']>;
};

export interface ObjectDescriptor<K extends Keys> extends Reads<ReadKeys<K>> {
  readonly type: 'object';
  /** name of the kind of object, in the singular, for messages and the JSON Schema */
  readonly name: string;
  readonly help: string;
  readonly keys: K;
  /** sets of keys of which one has to stand whole */
  readonly alternatives: readonly (readonly string[])[];
  /** pairs of keys of which at most one may stand */
  readonly exclusive: readonly (readonly [string, string])[];
  /** pairs [a, b]: a may stand only beside b */
  readonly needs: readonly (readonly [string, string])[];
  /** pairs [a, b] of which a has to be less than b */
  readonly ordered: readonly (readonly [string, string])[];
  /** pairs of references that must not name the same item */
  readonly distinct: readonly (readonly [string, string])[];
  /** whether the quantities inside lie at a site, so that a distance to other sites exists */
  readonly atSite: boolean;
  /** keys people reach for that do not belong here, and why */
  readonly refused: Readonly<Record<string, { readonly code: string; readonly expected: string }>>;
}

/** An object whose key `by` says which keys it has. */
export interface VariantDescriptor<V extends Readonly<Record<string, ObjectDescriptor<Keys>>>>
  extends Reads<{ readonly [P in keyof V]: { readonly kind: P } & ReadOf<V[P]> }[keyof V]> {
  readonly type: 'variant';
  readonly name: string;
  readonly by: 'kind';
  readonly label: string;
  readonly help: string;
  readonly variants: V;
}

// biome-ignore lint/suspicious/noExplicitAny: the general case of a generic whose parameter is both read and written
type AnyOf = any;

export type Descriptor =
  | TextDescriptor
  | IdDescriptor
  | ReferenceDescriptor
  | EnumDescriptor<AnyOf>
  | BooleanDescriptor
  | NumberDescriptor
  | ScalarDescriptor
  | QuantityDescriptor
  | PiecesDescriptor<AnyOf>
  | ShorthandDescriptor<AnyOf>
  | AngleDescriptor
  | InstantDescriptor
  | ListDescriptor<AnyOf>
  | ObjectDescriptor<AnyOf>
  | VariantDescriptor<AnyOf>;

export const text = (known?: readonly string[], check?: TextDescriptor['check']): TextDescriptor => ({
  type: 'text',
  ...(known ? { known } : {}),
  ...(check ? { check } : {}),
});
export const id = (list: ListName, reserved: readonly string[] = []): IdDescriptor => ({ type: 'id', list, reserved });
export const reference = (list: ListName, builtIn: readonly string[] = []): ReferenceDescriptor => ({
  type: 'reference',
  list,
  builtIn,
});
export const oneOf = <const V extends string>(...values: V[]): EnumDescriptor<V> => ({ type: 'enum', values });
export const boolean = (): BooleanDescriptor => ({ type: 'boolean' });
export const number = (range: Range & { integer?: boolean } = {}): NumberDescriptor => ({
  type: 'number',
  integer: false,
  ...range,
});
export const scalar = (kind: QuantityKind, more: Range & { bare?: boolean } = {}): ScalarDescriptor => ({
  type: 'scalar',
  kind,
  bare: false,
  ...more,
});
export const quantity = (
  kind: QuantityKind,
  more: Range & { tide?: boolean; frame?: boolean; epoch?: boolean; grid?: boolean; sizesError?: boolean } = {},
): QuantityDescriptor => ({
  type: 'quantity',
  kind,
  tide: false,
  frame: false,
  epoch: false,
  grid: false,
  sizesError: false,
  ...more,
});
export const pieces = <P extends ObjectDescriptor<Keys>>(single: ScalarDescriptor, piece: P): PiecesDescriptor<P> => ({
  type: 'pieces',
  single,
  piece,
});
export const shorthand = <O extends ObjectDescriptor<Keys>>(object: O, key: string): ShorthandDescriptor<O> => ({
  type: 'shorthand',
  key,
  object,
});
export const angle = (axis: AngleDescriptor['axis']): AngleDescriptor => ({ type: 'angle', axis });
export const instant = (): InstantDescriptor => ({ type: 'instant' });
export const list = <D extends Descriptor>(
  item: D,
  more: { pathBy?: 'id' | 'position'; min?: number; max?: number } = {},
): ListDescriptor<D> => ({
  type: 'list',
  item,
  pathBy: more.pathBy ?? 'position',
  length: { min: more.min ?? 0, max: more.max ?? Number.POSITIVE_INFINITY },
});

export const required = <D extends Descriptor>(descriptor: D, label: string, help: string): Key<D, true> => ({
  descriptor,
  required: true,
  label,
  help,
});
export const optional = <D extends Descriptor>(descriptor: D, label: string, help: string): Key<D, false> => ({
  descriptor,
  required: false,
  label,
  help,
});

/** Keys that may stand on any object; kept and shown, never computed with. */
export const remarks = {
  note: optional(text(), 'Note', 'Free text, kept and shown.'),
  reference: optional(
    text(),
    'Reference',
    'Where the statement comes from: report, publication, file. Kept and shown.',
  ),
  date: optional(text(), 'Date', 'When it was measured or stated, as text. Kept and shown.'),
} as const;

type WithRemarks<K extends Keys> = K & typeof remarks;

type Pairs<K extends Keys> = readonly (readonly [keyof K & string, keyof K & string])[];

interface ObjectOptions<K extends Keys> extends Partial<Pick<ObjectDescriptor<K>, 'atSite' | 'refused'>> {
  readonly alternatives?: readonly (readonly (keyof K & string)[])[];
  readonly exclusive?: Pairs<K>;
  readonly needs?: Pairs<K>;
  readonly ordered?: Pairs<K>;
  readonly distinct?: Pairs<K>;
}

/** An object with these keys and the remarks. */
export const object = <const K extends Keys>(
  name: string,
  help: string,
  keys: K,
  options: ObjectOptions<K> = {},
): ObjectDescriptor<WithRemarks<K>> => ({
  type: 'object',
  name,
  help,
  keys: { ...keys, ...remarks },
  alternatives: [],
  exclusive: [],
  needs: [],
  ordered: [],
  distinct: [],
  atSite: false,
  refused: {},
  ...options,
});

export const variant = <const V extends Readonly<Record<string, ObjectDescriptor<AnyOf>>>>(
  name: string,
  label: string,
  help: string,
  variants: V,
): VariantDescriptor<V> => ({ type: 'variant', name, by: 'kind', label, help, variants });
