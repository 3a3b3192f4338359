/** A small validator for the keywords of JSON Schema 2020-12 that the campaign's schema uses; any other keyword is an error,
 *  so that nothing is passed over. @returns the places in `value` that do not fit */
export function violations(value: unknown, schema: Schema, root: Schema = schema, at = ''): string[] {
  const bad: string[] = [];
  for (const [keyword, argument] of Object.entries(schema)) {
    const check = KEYWORDS[keyword];
    if (!check) throw new Error(`keyword ${keyword} at ${at}`);
    bad.push(...check(value, argument as never, { schema, root, at }));
  }
  return bad;
}

export type Schema = { readonly [keyword: string]: unknown };

interface Where {
  readonly schema: Schema;
  readonly root: Schema;
  readonly at: string;
}

type Check = (value: unknown, argument: never, where: Where) => string[];

const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

const isType = (value: unknown, type: string): boolean => {
  if (type === 'object') return isObject(value);
  if (type === 'array') return Array.isArray(value);
  if (type === 'integer') return Number.isInteger(value);
  if (type === 'null') return value === null;
  return typeof value === type;
};

const when = (good: boolean, { at }: Where, words: string): string[] => (good ? [] : [`${at || 'root'}: ${words}`]);
const ignored: Check = () => [];
const number =
  (good: (value: number, limit: number) => boolean, words: string): Check =>
  (value, limit: number, where) =>
    when(typeof value !== 'number' || good(value, limit), where, `${words} ${limit}`);
const fits = (value: unknown, schema: Schema, { root, at }: Where): boolean =>
  violations(value, schema, root, at).length === 0;

const KEYWORDS: Readonly<Record<string, Check>> = {
  $schema: ignored,
  $id: ignored,
  $defs: ignored,
  title: ignored,
  description: ignored,
  examples: ignored,
  $ref: (value, ref: string, { root, at }) => {
    const name = /^#\/\$defs\/([\w-]+)$/.exec(ref)?.[1] ?? '';
    const target = (root['$defs'] as Record<string, Schema>)[name];
    if (!target) throw new Error(`no definition ${ref}`);
    return violations(value, target, root, at);
  },
  type: (value, type: string | string[], where) =>
    when(
      [type].flat().some((t) => isType(value, t)),
      where,
      `not of type ${type}`,
    ),
  const: (value, only: unknown, where) => when(value === only, where, `not ${only}`),
  enum: (value, values: unknown[], where) => when(values.includes(value), where, `none of ${values}`),
  minimum: number((v, limit) => v >= limit, 'below'),
  maximum: number((v, limit) => v <= limit, 'above'),
  exclusiveMinimum: number((v, limit) => v > limit, 'not above'),
  pattern: (value, pattern: string, where) =>
    when(typeof value !== 'string' || new RegExp(pattern, 'u').test(value), where, `does not match ${pattern}`),
  maxLength: (value, n: number, where) => when(typeof value !== 'string' || [...value].length <= n, where, 'too long'),
  minItems: (value, n: number, where) => when(!Array.isArray(value) || value.length >= n, where, 'too short'),
  maxItems: (value, n: number, where) => when(!Array.isArray(value) || value.length <= n, where, 'too long'),
  items: (value, schema: Schema, { root, at }) =>
    Array.isArray(value) ? value.flatMap((v, i) => violations(v, schema, root, `${at}/${i}`)) : [],
  properties: (value, schemas: Record<string, Schema>, { root, at }) =>
    isObject(value)
      ? Object.entries(value).flatMap(([k, v]) =>
          Object.hasOwn(schemas, k) ? violations(v, schemas[k] as Schema, root, `${at}/${k}`) : [],
        )
      : [],
  additionalProperties: (value, _: false, where) =>
    isObject(value)
      ? Object.keys(value).flatMap((k) =>
          when(Object.hasOwn(where.schema['properties'] as object, k), where, `unknown key ${k}`),
        )
      : [],
  required: (value, keys: string[], where) =>
    isObject(value) ? keys.flatMap((k) => when(Object.hasOwn(value, k), where, `lacks ${k}`)) : [],
  dependentRequired: (value, needs: Record<string, string[]>, where) =>
    isObject(value)
      ? Object.entries(needs).flatMap(([k, others]) =>
          Object.hasOwn(value, k) ? others.flatMap((o) => when(Object.hasOwn(value, o), where, `lacks ${o}`)) : [],
        )
      : [],
  not: (value, schema: Schema, where) => when(!fits(value, schema, where), where, 'fits what it must not'),
  allOf: (value, schemas: Schema[], { root, at }) => schemas.flatMap((s) => violations(value, s, root, at)),
  anyOf: (value, schemas: Schema[], where) =>
    when(
      schemas.some((s) => fits(value, s, where)),
      where,
      'fits no form',
    ),
  oneOf: (value, schemas: Schema[], where) =>
    when(schemas.filter((s) => fits(value, s, where)).length === 1, where, 'fits not exactly one form'),
};
