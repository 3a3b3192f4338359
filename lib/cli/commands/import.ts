import type { Campaign } from '../../campaign/campaign.js';
import type { Separator } from '../../campaign/csv-text.js';
import { CampaignError } from '../../campaign/fault.js';
import { type ImportOptions, importLinks, importSites } from '../../campaign/import/import-table.js';
import { SITE_FIELDS } from '../../campaign/import/site-columns.js';
import { readHead } from '../../campaign/import/table-head.js';
import { writeCampaign } from '../../campaign/write.js';
import { readExact } from '../../quantity/index.js';
import { type Call, type Command, UsageError } from '../command.js';
import { readFileText } from '../read-file.js';
import { writeNewFile } from '../write-new-file.js';

const NAME = 'import';

const SEPARATOR_WORDS: Readonly<Record<string, Separator>> = { comma: ',', semicolon: ';', tab: '\t' };

export const importTable: Command = {
  name: NAME,
  summary: 'a campaign from a table of sites (CSV), and one of links',
  synopsis: 'FILE.csv [--links FILE.csv] [--out FILE.json [--overwrite]] [more options]',
  takesFile: true,
  description: [
    `The first line names the columns, each with its unit: ${SITE_FIELDS.slice(0, 12)
      .map(({ names: [first] }) => first)
      .join(
        ', ',
      )} and more. A cell holds a number or a quantity as in a campaign file, "143.216(8)", "8 mm". Uncertainties stand in the cells, in a column "u(h) / mm", or for all cells in the head, "h / m ± 8 mm"; a tide system likewise, "zeta / m, zero" or a column "tide(h)", a source in a column "source(zeta)". An empty cell says nothing.`,
    'Fields are parted by commas, semicolons or tabs, whichever the first line shows (RFC 4180). The decimal point is a point: a decimal comma is refused with its place.',
    'A row with a transition also gets a clock, with the columns clock, tie, systematic, white, flicker, uptime. --links names a second table: id, from, to, kind, length, white, flicker, phase, systematic, uptime, segments; from and to are clocks, or sites with one clock.',
    'Nothing is put in that the tables or the options do not say.',
  ],
  options: {
    links: { value: 'FILE', help: 'table of links' },
    title: { value: 'TEXT', help: 'title of the campaign' },
    window: { value: 'START/END', help: 'time of the campaign: 2027-05-03T00:00:00Z/2027-05-24T00:00:00Z, or dates' },
    target: { value: 'LENGTH', help: 'wanted standard uncertainty: "3 cm"' },
    tide: { value: 'COLUMN=SYSTEM', help: 'permanent tide of a column: h=free, zeta=zero', repeatable: true },
    source: {
      value: 'COLUMN=ID[:REACH]',
      help: 'source of a column; REACH its correlation length or correlation: zeta=quasigeoid:80km, h=gnss:0.4',
      repeatable: true,
    },
    datum: {
      value: 'ID=W0',
      help: 'a datum that the column datum names: "north=62636853.4(5) m²/s²"',
      repeatable: true,
    },
    offset: {
      value: 'TRANSITION=Y',
      help: 'measured offset of a transition from its recommended frequency: 87Sr=0, 171Yb="1(6)e-18"',
      repeatable: true,
    },
    ignore: { value: 'COLUMN', help: 'a column to pass over', repeatable: true },
    separator: {
      value: 'WORD',
      help: `${Object.keys(SEPARATOR_WORDS).join(', ')}; told from the first line if not given`,
    },
    out: { value: 'FILE', help: 'where to write the campaign; standard output if not given' },
    overwrite: { help: 'replace the file if it exists' },
  },
  examples: [
    'plumbtick import sites.csv --tide h=free --tide zeta=zero --source zeta=quasigeoid:80km --out plan.json',
    'plumbtick import sites.csv --links links.csv --window 2027-05-03/2027-05-24 --target "3 cm" --out plan.json',
  ],
  async run(call) {
    const { file } = call;
    if (file === null) throw new TypeError('import takes a file');
    const options = optionsOf(call);
    const campaign = importSites(file.text, options);
    const linksName = call.option('links');
    const whole = linksName === null ? campaign : await withLinks(file.text, linksName, options);
    const text = writeCampaign(whole);
    const out = call.option('out');
    if (out === null) {
      if (call.has('overwrite')) throw new UsageError(`${NAME}: --overwrite goes with --out FILE`);
      return { kind: 'plain', text };
    }
    const replaced = writeNewFile(NAME, out, text, call.has('overwrite'));
    return {
      kind: 'plain',
      text: `${replaced ? 'Replaced' : 'Wrote'} ${out}: ${contents(whole)}. ${nextStep(whole, out)}\n`,
    };
  },
};

/** Faults of the second table carry its name, since a call has one file that faults are said of. */
async function withLinks(sites: string, name: string, options: ImportOptions): Promise<Campaign> {
  const text = await readFileText(name);
  try {
    return importLinks(text, sites, options);
  } catch (error) {
    if (!(error instanceof CampaignError)) throw error;
    throw new CampaignError(error.faults.map((f) => ({ ...f, path: f.path === '' ? name : `${name}: ${f.path}` })));
  }
}

const counted = (count: number, one: string) => `${count} ${count === 1 ? one : `${one}s`}`;

const contents = ({ sites, clocks, links }: Campaign): string =>
  [counted(sites.length, 'site'), counted(clocks.length, 'clock'), counted(links.length, 'link')].join(', ');

const nextStep = ({ clocks, links, window }: Campaign, out: string): string => {
  const name = /\s/.test(out) ? JSON.stringify(out) : out;
  if (clocks.length === 0) return 'Next: add clocks and links, or import a table with a column transition';
  if (links.length === 0) return 'Next: add links, or import with --links';
  return `Next: plumbtick ${window ? 'plan' : 'predict'} ${name}`;
};

function optionsOf(call: Call): ImportOptions {
  const tides: Record<string, string> = {};
  const sources: Record<string, string> = {};
  const sourceEntries: Record<string, Record<string, unknown>> = {};
  const datums: Record<string, string> = {};
  for (const word of call.values('tide')) {
    const [column, system] = parted('tide', word, 'COLUMN=SYSTEM');
    tides[fieldOf(column)] = system;
  }
  for (const word of call.values('source')) {
    const [column, rest] = parted('source', word, 'COLUMN=ID[:REACH]');
    const at = rest.lastIndexOf(':');
    const id = at < 0 ? rest : rest.slice(0, at);
    sources[fieldOf(column)] = id;
    const reach = at < 0 ? {} : reachOf(rest.slice(at + 1));
    sourceEntries[id] = { ...sourceEntries[id], ...reach };
  }
  for (const word of call.values('datum')) {
    const [id, W0] = parted('datum', word, 'ID=W0');
    datums[id] = W0;
  }
  const offsets: Record<string, string> = {};
  for (const word of call.values('offset')) {
    const [id, y] = parted('offset', word, 'TRANSITION=Y');
    offsets[id] = y;
  }
  const window = call.option('window');
  const [start, end, ...more] = window?.split('/') ?? [];
  if (window !== null && (start === undefined || end === undefined || more.length > 0))
    throw new UsageError(`${NAME}: --window START/END: two instants with a solidus between`);
  const separator = call.option('separator');
  if (separator !== null && !Object.hasOwn(SEPARATOR_WORDS, separator))
    throw new UsageError(`${NAME}: --separator is one of ${Object.keys(SEPARATOR_WORDS).join(', ')}`);
  const title = call.option('title');
  const target = call.option('target');
  return {
    tides,
    sources,
    sourceEntries,
    datums,
    offsets,
    ignored: call.values('ignore'),
    ...(separator === null ? {} : { separator: SEPARATOR_WORDS[separator]! }),
    ...(title === null ? {} : { title }),
    ...(target === null ? {} : { target }),
    ...(window === null ? {} : { window: { start: instant(start!), end: instant(end!) } }),
  };
}

/** A day alone means its beginning in UTC. */
const instant = (text: string): string =>
  /^\d{4}-\d\d-\d\d$/.test(text.trim()) ? `${text.trim()}T00:00:00Z` : text.trim();

function parted(name: string, word: string, form: string): [string, string] {
  const at = word.indexOf('=');
  if (at < 1 || at === word.length - 1)
    throw new UsageError(`${NAME}: --${name} ${form}, but was given ${JSON.stringify(word)}`);
  return [word.slice(0, at).trim(), word.slice(at + 1).trim()];
}

function fieldOf(column: string): string {
  const head = readHead({ text: column, start: 0 }, SITE_FIELDS);
  if ('role' in head) return head.field;
  throw new UsageError(`${NAME}: ${JSON.stringify(column)}: expected ${head.expected}`);
}

function reachOf(text: string): Record<string, unknown> {
  const number = readExact(text, 'fraction');
  if (number.ok) return { correlation: number.value };
  const length = readExact(text, 'length');
  if (length.ok) return { correlationLength: text };
  throw new UsageError(
    `${NAME}: --source … :${text}: expected a correlation length such as 80km, or a correlation such as 0.4`,
  );
}
