import { KINDS, type QuantityKind, readMeasured } from '../../quantity/index.js';
import { CampaignError, type Fault, faultAt } from '../fault.js';
import { quoted } from '../json-text.js';
import type { JsonMember, JsonNode, JsonObject } from '../json-tree.js';
import { TextPlaces } from '../text-place.js';
import type { Entry, ReadTable, Row } from './table.js';

/** What holds for a column where neither head nor cell says it. */
export interface ColumnDefaults {
  /** permanent-tide system by field */
  readonly tides?: Readonly<Record<string, string>>;
  /** source by field */
  readonly sources?: Readonly<Record<string, string>>;
}

export const NOWHERE = -1;

export const string = (value: string, start = NOWHERE): JsonNode =>
  start < 0 ? { type: 'string', start, value } : { type: 'string', start, value, verbatim: true };

export const object = (start: number, members: readonly (readonly [string, JsonNode | null])[]): JsonObject => ({
  type: 'object',
  start,
  members: new Map(
    members.flatMap(([key, value]): [string, JsonMember][] =>
      value === null ? [] : [[key, { keyStart: value.start, value }]],
    ),
  ),
  duplicates: [],
});

export const list = (items: readonly JsonNode[]): JsonNode | null =>
  items.length === 0 ? null : { type: 'array', start: items[0]!.start, items };

/** Kinds of the values that carry a unit. */
const KIND_OF: Readonly<Record<string, QuantityKind>> = {
  h: 'length',
  zeta: 'length',
  N: 'length',
  C: 'potential',
  W: 'potential',
  'normal-height': 'length',
  'orthometric-height': 'length',
  'dynamic-height': 'length',
  g: 'acceleration',
  gradient: 'gradient',
  variable: 'potential',
  dH: 'length',
  tie: 'length',
};

/** Fields whose value depends on the permanent tide. */
const TIDAL: ReadonlySet<string> = new Set([
  'h',
  'zeta',
  'N',
  'C',
  'W',
  'normal-height',
  'orthometric-height',
  'dynamic-height',
  'dH',
]);

/** Turns rows into the nodes of a campaign, each value standing where its cell stands. */
export class RowNodes {
  readonly #faults: Fault[] = [];
  readonly #places: TextPlaces;

  constructor(
    table: ReadTable,
    private readonly defaults: ColumnDefaults,
    private readonly sources: Map<string, Readonly<Record<string, unknown>>>,
  ) {
    this.#places = new TextPlaces(table.text);
  }

  stopAtFaults(): void {
    if (this.#faults.length > 0) throw new CampaignError(this.#faults);
  }

  #refuse(code: string, entry: Entry, expected: string): void {
    this.#faults.push({
      ...faultAt(code, entry.head.field, quoted(entry.cell.text), expected),
      ...this.#places.at(entry.cell.start),
    });
  }

  /** A text as it stands; a unit in the head has nothing to do there. */
  #text(row: Row, field: string): JsonNode | null {
    const entry = row.entries.get(field);
    return entry ? string(entry.cell.text, entry.cell.start) : null;
  }

  /** A measured number: the cell's text, with unit, uncertainty, source and tide from head, neighbours or options. */
  #measured(row: Row, field: string): JsonNode | null {
    const entry = row.entries.get(field);
    if (!entry) return null;
    const { cell, head } = entry;
    const kind = KIND_OF[field]!;
    const value = string(cell.text, cell.start);
    const alone = readMeasured(head.unit === null ? cell.text : { value: cell.text, unit: head.unit }, kind);
    // the cell states a unit of its own: that of the head is for the others
    const own = !alone.ok && alone.problems.every(({ code }) => code === 'unit-twice');
    const states = own ? readMeasured(cell.text, kind) : alone;
    const hasU = states.ok && states.value.u > 0;
    const source = entry.source?.text ?? this.defaults.sources?.[field] ?? null;
    if (source !== null && !this.sources.has(source)) this.sources.set(source, {});
    const tide = entry.tide ?? (head.tide === null ? null : { text: head.tide, start: head.cell.start });
    const tideText = tide?.text ?? this.defaults.tides?.[field] ?? null;
    if (tideText !== null && !TIDAL.has(field))
      this.#refuse('tide-not-here', entry, 'no tide label: the permanent tide does not enter this value');
    const unit = own || head.unit === null ? null : head.unit;
    const u = entry.u
      ? string(withUnit(entry.u.cell.text, entry.u.unit, kind), entry.u.cell.start)
      : head.u !== null && !hasU
        ? string(withUnit(head.u, null, kind), head.cell.start)
        : null;
    if (unit === null && u === null && source === null && tideText === null) return value;
    return object(cell.start, [
      ['value', value],
      ['unit', unit === null ? null : string(unit, head.cell.start)],
      ['u', u],
      ['source', source === null ? null : string(source, entry.source?.start ?? NOWHERE)],
      ['tide', tideText === null ? null : string(tideText, tide?.start ?? NOWHERE)],
    ]);
  }

  /** A number without uncertainty. */
  #scalar(row: Row, field: string): JsonNode | null {
    const entry = row.entries.get(field);
    if (!entry) return null;
    const { cell, head } = entry;
    const text =
      head.unit !== null && /^[\d.,eE+\-\u2212\s]+$/.test(cell.text) ? `${cell.text} ${head.unit}` : cell.text;
    return string(text, cell.start);
  }

  #number(row: Row, field: string): JsonNode | null {
    const entry = row.entries.get(field);
    if (!entry) return null;
    const value = Number(entry.cell.text);
    if (!/^\d+$/.test(entry.cell.text)) {
      this.#refuse('not-a-number', entry, 'a whole number');
      return null;
    }
    return { type: 'number', start: entry.cell.start, value };
  }

  site(row: Row, index: number): JsonObject {
    const id = this.#text(row, 'id') ?? this.#idFromName(row, index);
    return object(row.start, [
      ['id', id],
      ['name', this.#text(row, 'name')],
      ['note', this.#text(row, 'note')],
      ['lat', this.#text(row, 'lat')],
      ['lon', this.#text(row, 'lon')],
      ['h', this.#measured(row, 'h')],
      ['g', this.#measured(row, 'g')],
      ['gradient', this.#measured(row, 'gradient')],
      ['variable', this.#measured(row, 'variable')],
      ['determinations', list(this.#determinations(row))],
    ]);
  }

  #idFromName(row: Row, index: number): JsonNode {
    const name = row.entries.get('name')?.cell;
    const slug = name?.text
      .toLowerCase()
      .replace(/[^\p{L}\p{N}]+/gu, '-')
      .replace(/^-+|-+$/g, '');
    return slug ? string(slug, name!.start) : string(`site-${index + 1}`);
  }

  #determinations(row: Row): JsonNode[] {
    const found: JsonNode[] = [];
    const datum = this.#text(row, 'datum');
    const geoidDatum = this.#text(row, 'geoid-datum');
    const add = (field: string, kind: string, key: string, more: readonly (readonly [string, JsonNode | null])[]) => {
      const value = this.#measured(row, field);
      if (value !== null) found.push(object(value.start, [['kind', string(kind)], [key, value], ...more]));
    };
    add('zeta', 'gnss-quasigeoid', 'zeta', [['datum', geoidDatum]]);
    add('N', 'gnss-geoid', 'N', [['datum', geoidDatum]]);
    add('C', 'geopotential-number', 'C', [['datum', datum]]);
    add('W', 'potential', 'W', []);
    for (const kind of ['normal-height', 'orthometric-height', 'dynamic-height'])
      add(kind, kind, 'H', [['datum', datum]]);
    const from = row.entries.get('levelled-from');
    if (from && !row.entries.has('dH')) this.#refuse('missing-column', from, 'a height difference dH in the same row');
    if (from)
      add('dH', 'levelled-from', 'dH', [
        ['site', string(from.cell.text, from.cell.start)],
        ['length', this.#scalar(row, 'line-length')],
        ['b', this.#scalar(row, 'b')],
        ['k', this.#scalar(row, 'k')],
      ]);
    return found;
  }

  /** The clock of a row: where a transition stands. */
  clock(row: Row, index: number): JsonObject[] {
    const transition = this.#text(row, 'transition');
    if (transition === null) {
      const entry = ['clock', 'tie', 'systematic', 'white', 'flicker', 'uptime'].flatMap(
        (f) => row.entries.get(f) ?? [],
      )[0];
      if (entry) this.#refuse('missing-column', entry, 'the transition of the clock in the same row, such as 87Sr');
      return [];
    }
    const siteId = this.#text(row, 'id') ?? this.#idFromName(row, index);
    const site = siteId.type === 'string' ? siteId.value : '';
    const tie = this.#measured(row, 'tie');
    return [
      object(row.start, [
        ['id', this.#text(row, 'clock') ?? string(`${site} clock`)],
        ['site', string(site)],
        ['transition', transition],
        ['tie', tie && list([object(tie.start, [['dH', tie]])])],
        ...this.#instrument(row, ['white', 'flicker']),
      ]),
    ];
  }

  link(row: Row, index: number, clockOf: (name: string) => string): JsonObject {
    const end = (field: 'from' | 'to') => {
      const entry = row.entries.get(field);
      return entry ? string(clockOf(entry.cell.text), entry.cell.start) : null;
    };
    return object(row.start, [
      ['id', this.#text(row, 'id') ?? string(`link-${index + 1}`)],
      ['name', this.#text(row, 'name')],
      ['note', this.#text(row, 'note')],
      ['from', end('from')],
      ['to', end('to')],
      ['kind', this.#text(row, 'kind')],
      ['length', this.#scalar(row, 'length')],
      ['segments', this.#number(row, 'segments')],
      ...this.#instrument(row, ['white', 'flicker', 'phase']),
    ]);
  }

  #instrument(row: Row, terms: readonly string[]): [string, JsonNode | null][] {
    const noise = terms.map((term) => [term, this.#scalar(row, term)] as const).filter(([, node]) => node !== null);
    return [
      ['systematic', this.#scalar(row, 'systematic')],
      ['stability', noise.length > 0 ? object(noise[0]![1]!.start, noise) : null],
      ['uptime', this.#scalar(row, 'uptime')],
    ];
  }
}

/** A bare uncertainty with the unit of its column; the default unit is said outright, so that it can stand beside any value. */
function withUnit(text: string, unit: string | null, kind: QuantityKind): string {
  if (!/^[\d.,eE+\-\s]+$/.test(text)) return text;
  const given = unit ?? KINDS[kind].unit;
  return given === '1' ? text : `${text} ${given}`;
}
