import {
  type CampaignFile,
  type FilePath,
  type IdList,
  isList,
  isObject,
  type JsonValue,
  pathText,
  valueAt,
} from './campaign-file.js';

/** One change to a campaign file. Everything a person can do is one of these, so that undo, keeping and tests share them. */
export type Edit =
  /** puts a value at a path; a quantity written as text or number becomes an object when one of its keys is set */
  | { readonly kind: 'set'; readonly path: FilePath; readonly value: JsonValue }
  | { readonly kind: 'remove'; readonly path: FilePath }
  /** puts an item into a list (made if it isn't there), at a position or at its end */
  | { readonly kind: 'insert'; readonly path: FilePath; readonly index?: number; readonly value: JsonValue }
  | { readonly kind: 'move'; readonly path: FilePath; readonly from: number; readonly to: number }
  /** changes an id and everything that names it */
  | { readonly kind: 'rename'; readonly list: IdList; readonly from: string; readonly to: string }
  /** the whole file: opened, imported, or edited as JSON */
  | { readonly kind: 'replace'; readonly value: CampaignFile; readonly words?: string };

/** An edit that does not fit the file it is applied to. */
export class EditError extends Error {
  override readonly name = 'EditError';
  readonly code: 'no-such-place' | 'not-a-list' | 'unsafe-key' | 'id-taken' | 'no-such-id';
  constructor(code: EditError['code'], message: string) {
    super(message);
    this.code = code;
  }
}

/** Keys that would reach behind the object. */
const UNSAFE = new Set(['__proto__', 'constructor', 'prototype']);

/** The file with the edit applied; parts that the edit does not touch are the same objects.
 * @throws {EditError} the place is not there, or an id is taken */
export function applyEdit(file: CampaignFile, edit: Edit): CampaignFile {
  switch (edit.kind) {
    case 'set':
      return at(file, edit.path, () => edit.value, true);
    case 'remove':
      return removed(file, edit.path);
    case 'insert':
      return at(
        file,
        edit.path,
        (list) => {
          if (list !== undefined && !isList(list)) throw notAList(file, edit.path);
          const items = list ?? [];
          const index = edit.index ?? items.length;
          if (!(Number.isInteger(index) && index >= 0 && index <= items.length))
            throw new EditError('no-such-place', `${pathText(file, edit.path)} has no position ${index}`);
          return [...items.slice(0, index), edit.value, ...items.slice(index)];
        },
        true,
      );
    case 'move':
      return at(file, edit.path, (list) => moved(file, edit, list), false);
    case 'rename':
      return renamed(file, edit);
    case 'replace':
      return edit.value;
  }
}

const notAList = (file: CampaignFile, path: FilePath) =>
  new EditError('not-a-list', `${pathText(file, path) || 'the file'} is not a list`);

/** Rebuilds the way to a place. `make`: objects on the way that are missing are made, and a bare quantity becomes an object. */
const at = (
  file: CampaignFile,
  path: FilePath,
  change: (old: JsonValue | undefined) => JsonValue,
  make: boolean,
): JsonValue => atDepth(file, path, change, make, 0, file);

function atDepth(
  file: CampaignFile,
  path: FilePath,
  change: (old: JsonValue | undefined) => JsonValue,
  make: boolean,
  depth: number,
  here: JsonValue | undefined,
): JsonValue {
  if (depth === path.length) return change(here);
  const step = path[depth]!;
  const deeper = (old: JsonValue | undefined) => atDepth(file, path, change, make, depth + 1, old);
  if (typeof step === 'number') {
    if (!isList(here)) throw notAList(file, path.slice(0, depth));
    if (!(Number.isInteger(step) && step >= 0 && step < here.length))
      throw new EditError('no-such-place', `${pathText(file, path.slice(0, depth))} has no position ${step}`);
    return here.map((item, i) => (i === step ? deeper(item) : item));
  }
  if (UNSAFE.has(step)) throw new EditError('unsafe-key', `${step} cannot be a key`);
  if (isObject(here)) {
    const old = Object.hasOwn(here, step) ? here[step] : undefined;
    if (old === undefined && !make) throw new EditError('no-such-place', `${pathText(file, path)} is not there`);
    return { ...here, [step]: deeper(old) };
  }
  if (!make || isList(here) || here === null || typeof here === 'boolean')
    throw new EditError('no-such-place', `${pathText(file, path.slice(0, depth)) || 'the file'} holds no key ${step}`);
  // "143.216(8) m" → { "value": "143.216(8) m", … }: what was typed stays
  return here === undefined ? { [step]: deeper(undefined) } : { value: here, [step]: deeper(undefined) };
}

function removed(file: CampaignFile, path: FilePath): CampaignFile {
  if (path.length === 0) throw new EditError('no-such-place', 'the file itself cannot be removed');
  const last = path.at(-1)!;
  if (valueAt(file, path) === undefined) throw new EditError('no-such-place', `${pathText(file, path)} is not there`);
  return at(
    file,
    path.slice(0, -1),
    (parent) => {
      if (isList(parent)) return parent.filter((_, i) => i !== last);
      const { [String(last)]: _, ...rest } = parent as { readonly [key: string]: JsonValue };
      return rest;
    },
    false,
  );
}

function moved(file: CampaignFile, edit: Extract<Edit, { kind: 'move' }>, list: JsonValue | undefined): JsonValue {
  if (!isList(list)) throw notAList(file, edit.path);
  const inside = (i: number) => Number.isInteger(i) && i >= 0 && i < list.length;
  if (!inside(edit.from) || !inside(edit.to))
    throw new EditError(
      'no-such-place',
      `${pathText(file, edit.path)} has no position ${inside(edit.from) ? edit.to : edit.from}`,
    );
  const rest = list.filter((_, i) => i !== edit.from);
  return [...rest.slice(0, edit.to), list[edit.from]!, ...rest.slice(edit.to)];
}

/** Which keys name items of which list, wherever they stand. */
const REFERENCES: Readonly<Record<string, IdList>> = {
  site: 'sites',
  from: 'clocks',
  to: 'clocks',
  source: 'sources',
  datum: 'datums',
  transition: 'transitions',
  link: 'links',
  between: 'measurements',
};

function renamed(file: CampaignFile, { list, from, to }: Extract<Edit, { kind: 'rename' }>): CampaignFile {
  const items = valueAt(file, [list]);
  const ids = isList(items) ? items.map((x) => (isObject(x) ? x['id'] : undefined)) : [];
  if (!ids.includes(from)) throw new EditError('no-such-id', `${list} has no ${from}`);
  if (from !== to && ids.includes(to)) throw new EditError('id-taken', `${list} has a ${to} already`);
  const rename = (value: JsonValue, key: string | null, top: boolean): JsonValue => {
    if (isList(value)) {
      if (top && key === list)
        return value.map((item) => {
          const inner = rename(item, null, false);
          return isObject(inner) && inner['id'] === from ? { ...inner, id: to } : inner;
        });
      if (key === 'between' && list === 'measurements') return value.map((x) => (x === from ? to : x));
      return value.map((x) => rename(x, key, false));
    }
    if (isObject(value))
      return Object.fromEntries(Object.entries(value).map(([k, v]) => [k, rename(v, k, value === file)]));
    return value === from &&
      key !== null &&
      Object.hasOwn(REFERENCES, key) &&
      REFERENCES[key] === list &&
      key !== 'between'
      ? to
      : value;
  };
  return rename(file, null, false);
}

/** The edit in words, for the list of changes and the button that undoes it. @param before the file it is applied to */
export function editWords(before: CampaignFile, edit: Edit): string {
  const short = (v: JsonValue | undefined) => {
    const text =
      typeof v === 'string' ? v : isObject(v) && typeof v['value'] === 'string' ? v['value'] : JSON.stringify(v);
    return text === undefined ? 'nothing' : text.length > 40 ? `${text.slice(0, 39)}…` : text;
  };
  switch (edit.kind) {
    case 'set': {
      const old = valueAt(before, edit.path);
      return `${pathText(before, edit.path)}: ${old === undefined ? short(edit.value) : `${short(old)} → ${short(edit.value)}`}`;
    }
    case 'remove':
      return `${pathText(before, edit.path)} removed`;
    case 'insert': {
      const id = isObject(edit.value) && typeof edit.value['id'] === 'string' ? ` ${edit.value['id']}` : '';
      return `${pathText(before, edit.path)}:${id} added`;
    }
    case 'move':
      return `${pathText(before, [...edit.path, edit.from])} moved to position ${edit.to}`;
    case 'rename':
      return `${edit.list}: ${edit.from} renamed ${edit.to}`;
    case 'replace':
      return edit.words ?? 'whole file replaced';
  }
}
