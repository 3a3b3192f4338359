import { isList, isObject, type JsonValue, valueAt } from '../../lib/campaign/edit/index.js';
import type { ListName, ObjectDescriptor } from '../../lib/campaign/schema/index.js';
import { campaignSchema } from '../../lib/campaign/schema/index.js';
import { fieldText } from './field-texts.js';

/** A table of the desk: one list of the file. */
export interface DeskList {
  readonly list: ListName;
  readonly title: string;
  readonly one: string;
  readonly descriptor: ObjectDescriptor<Record<string, never>>;
}

const TITLES: readonly (readonly [ListName, string, string])[] = [
  ['sites', 'Sites', 'site'],
  ['clocks', 'Clocks', 'clock'],
  ['links', 'Links', 'link'],
  ['measurements', 'Measurements', 'measurement'],
  ['datums', 'Datums', 'datum'],
  ['sources', 'Sources', 'source'],
  ['transitions', 'Transitions', 'transition'],
];

export const DESK_LISTS: readonly DeskList[] = TITLES.map(([list, title, one]) => {
  const key = campaignSchema.keys[list];
  const { item } = key.descriptor as unknown as { item: ObjectDescriptor<Record<string, never>> };
  return { list, title, one, descriptor: item };
});

/** Keys of the file itself, without the lists that have tables of their own. */
export const FILE_SKIP: readonly string[] = ['format', ...TITLES.map(([list]) => list)];

export const itemsOf = (file: JsonValue, list: ListName): readonly JsonValue[] => {
  const items = valueAt(file, [list]);
  return isList(items) ? items : [];
};

/** A row in a line: what it is, without opening it. */
export function rowSummary(list: ListName, item: JsonValue): string {
  if (!isObject(item)) return fieldText(item);
  const text = (key: string) => fieldText(item[key]);
  const count = (key: string, one: string) => {
    const value = item[key];
    const n = isList(value) ? value.length : 0;
    return n === 0 ? '' : `${n} ${one}${n === 1 ? '' : 's'}`;
  };
  const parts: Record<ListName, readonly string[]> = {
    sites: [
      text('name'),
      text('h') && `h ${text('h')}`,
      text('g') && `g ${text('g')}`,
      count('determinations', 'determination'),
    ],
    clocks: [text('name'), text('site'), text('transition'), count('tie', 'tie step')],
    links: [`${text('from')} to ${text('to')}`, text('kind'), text('length')],
    measurements: [text('link'), text('y')],
    datums: [text('name'), text('W0') && `W₀ ${text('W0')}`],
    sources: [
      text('name'),
      text('correlationLength') && `over ${text('correlationLength')}`,
      text('correlation') && `ρ ${text('correlation')}`,
    ],
    transitions: [text('offset') && `offset ${text('offset')}`, text('frequency')],
  };
  return parts[list].filter((p) => p !== '').join(', ');
}

/** What a new item begins with: an id that is free, and nothing invented. */
export function newItem(file: JsonValue, { list, one }: DeskList): JsonValue {
  const taken = new Set(itemsOf(file, list).map((x) => (isObject(x) ? x['id'] : null)));
  let n = taken.size + 1;
  while (taken.has(`${one}-${n}`)) n++;
  const id = `${one}-${n}`;
  if (list === 'sites') return { id, determinations: [] };
  return list === 'measurements' ? { id, link: '' } : { id };
}
