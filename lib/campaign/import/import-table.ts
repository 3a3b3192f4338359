import { closest } from '../../quantity/index.js';
import type { Campaign } from '../campaign.js';
import type { Separator } from '../csv-text.js';
import { CampaignError, faultAt } from '../fault.js';
import { quoted } from '../json-text.js';
import { type JsonNode, type JsonObject, jsonTreeOf } from '../json-tree.js';
import { readCampaignTree } from '../read.js';
import { CAMPAIGN_FORMAT } from '../schema/campaign-schema.js';
import { type ColumnDefaults, list, NOWHERE, object, RowNodes, string } from './row-nodes.js';
import { LINK_FIELDS, SITE_FIELDS } from './site-columns.js';
import { type ReadTable, readTable } from './table.js';

/** What a table does not hold. */
export interface ImportOptions extends ColumnDefaults {
  readonly separator?: Separator;
  /** names of columns to pass over, as they stand in the head */
  readonly ignored?: readonly string[];
  readonly title?: string;
  readonly target?: string;
  readonly window?: { readonly start: string; readonly end: string };
  /** entries of `sources` in the file, by id */
  readonly sourceEntries?: Readonly<Record<string, Readonly<Record<string, unknown>>>>;
  /** W0 of datums, by id */
  readonly datums?: Readonly<Record<string, string>>;
  /** measured offsets of transitions from their recommended frequencies, by id */
  readonly offsets?: Readonly<Record<string, string>>;
}

/** A campaign from a table of sites: each row a site, with its determinations, and its clock where a transition stands.
 * @throws {CampaignError} with line and column of the table */
export function importSites(text: string, options: ImportOptions = {}): Campaign {
  const table = readTable(text, SITE_FIELDS, options.separator ?? null, options.ignored ?? []);
  const sources = new Map(Object.entries(options.sourceEntries ?? {}));
  const builder = new RowNodes(table, options, sources);
  checkColumns(table, options);
  const sites = table.rows.map((row, i) => builder.site(row, i));
  const clocks = table.rows.flatMap((row, i) => builder.clock(row, i));
  builder.stopAtFaults();
  return readCampaignTree(text, tree(options, sources, sites, clocks, [])).campaign;
}

/** The campaign with the links of a second table. `from` and `to` name clocks, or sites with one clock.
 * @throws {CampaignError} with line and column of the second table */
export function importLinks(text: string, sitesText: string, options: ImportOptions = {}): Campaign {
  const sitesTable = readTable(sitesText, SITE_FIELDS, options.separator ?? null, options.ignored ?? []);
  const sources = new Map(Object.entries(options.sourceEntries ?? {}));
  const sitesBuilder = new RowNodes(sitesTable, options, sources);
  const sites = sitesTable.rows.map((row, i) => withoutPlace(sitesBuilder.site(row, i)));
  const clocks = sitesTable.rows.flatMap((row, i) => sitesBuilder.clock(row, i).map(withoutPlace));
  const table = readTable(text, LINK_FIELDS, options.separator ?? null, options.ignored ?? []);
  const builder = new RowNodes(table, { ...options, tides: {}, sources: {} }, sources);
  const clockOf = new Map(
    clocks.flatMap((c) => {
      const [id, site] = [textOf(c, 'id'), textOf(c, 'site')];
      return id !== null && site !== null ? [[site, id] as const] : [];
    }),
  );
  const ids = new Set(clocks.map((c) => textOf(c, 'id')));
  const links = table.rows.map((row, i) =>
    builder.link(row, i, (name) => (ids.has(name) ? name : (clockOf.get(name) ?? name))),
  );
  builder.stopAtFaults();
  return readCampaignTree(text, tree(options, sources, sites, clocks, links)).campaign;
}

/** Column names in options have to be columns. */
function checkColumns({ heads }: ReadTable, { tides = {}, sources = {} }: ImportOptions): void {
  const fields = heads.filter(({ role }) => role === 'value').map(({ field }) => field);
  const faults = [...Object.keys(tides), ...Object.keys(sources)]
    .filter((field) => !fields.includes(field))
    .map((field) => {
      const near = closest(field, fields);
      return faultAt(
        'unknown-column',
        field,
        quoted(field),
        `a column of the table${near === null ? '' : `: did you mean ${quoted(near)}?`}`,
      );
    });
  if (faults.length > 0) throw new CampaignError(faults);
}

const textOf = (node: JsonNode, key: string): string | null => {
  const value = node.type === 'object' ? node.members.get(key)?.value : undefined;
  return value?.type === 'string' ? value.value : null;
};

function withoutPlace(node: JsonNode): JsonNode {
  if (node.type === 'array') return { ...node, start: NOWHERE, items: node.items.map(withoutPlace) };
  if (node.type === 'object')
    return object(
      NOWHERE,
      [...node.members].map(([key, { value }]) => [key, withoutPlace(value)] as const),
    );
  if (node.type === 'string') return string(node.value);
  return node.type === 'foreign' ? node : { ...node, start: NOWHERE };
}

function tree(
  { title, target, window, datums = {}, offsets = {} }: ImportOptions,
  sources: ReadonlyMap<string, Readonly<Record<string, unknown>>>,
  sites: readonly JsonNode[],
  clocks: readonly JsonNode[],
  links: readonly JsonNode[],
): JsonObject {
  const plain = (value: unknown) => (value === undefined ? null : jsonTreeOf(value));
  return object(NOWHERE, [
    ['format', string(CAMPAIGN_FORMAT)],
    ['title', plain(title)],
    ['window', plain(window)],
    ['target', plain(target)],
    ['sources', sources.size > 0 ? jsonTreeOf([...sources].map(([id, more]) => ({ id, ...more }))) : null],
    ['datums', entries(datums, (id, W0) => ({ id, W0 }))],
    ['transitions', entries(offsets, (id, offset) => ({ id, offset }))],
    ['sites', { type: 'array', start: NOWHERE, items: sites }],
    ['clocks', list(clocks)],
    ['links', list(links)],
  ]);
}

const entries = (
  from: Readonly<Record<string, string>>,
  entry: (id: string, value: string) => Readonly<Record<string, string>>,
): JsonNode | null =>
  Object.keys(from).length === 0 ? null : jsonTreeOf(Object.entries(from).map(([id, value]) => entry(id, value)));
