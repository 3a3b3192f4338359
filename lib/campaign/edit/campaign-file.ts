/** A campaign as it stands in a file or under a person's hands: any JSON, right or wrong. What can't be read stays as typed. */
export type CampaignFile = JsonValue;

export type JsonValue = null | boolean | number | string | readonly JsonValue[] | { readonly [key: string]: JsonValue };

/** Way to a value in the file: keys and list positions from the top. */
export type FilePath = readonly (string | number)[];

export const isList = (v: JsonValue | undefined): v is readonly JsonValue[] => Array.isArray(v);

export const isObject = (v: JsonValue | undefined): v is { readonly [key: string]: JsonValue } =>
  typeof v === 'object' && v !== null && !Array.isArray(v);

/** The value at a path; undefined where there is none. */
export function valueAt(file: JsonValue, path: FilePath): JsonValue | undefined {
  let at: JsonValue | undefined = file;
  for (const step of path) {
    if (isList(at)) at = typeof step === 'number' ? at[step] : undefined;
    else if (isObject(at)) at = Object.hasOwn(at, step) ? at[step] : undefined;
    else return undefined;
  }
  return at;
}

/** Lists whose items are known by their id. */
export const ID_LISTS = ['sources', 'datums', 'transitions', 'sites', 'clocks', 'links', 'measurements'] as const;
export type IdList = (typeof ID_LISTS)[number];

/** Path as messages and faults write it: ids where the list has them, positions elsewhere (`sites.cellar.h`). */
export function pathText(file: JsonValue, path: FilePath): string {
  return path
    .map((step, i) => {
      if (typeof step !== 'number' || i !== 1 || !(ID_LISTS as readonly (string | number)[]).includes(path[0]!))
        return String(step);
      if (path[0] === 'measurements') return String(step);
      const id = valueAt(file, [...path.slice(0, 2), 'id']);
      return typeof id === 'string' ? id : String(step);
    })
    .join('.');
}
