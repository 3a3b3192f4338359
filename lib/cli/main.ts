import { CampaignError, type Fault, faultAt } from '../campaign/fault.js';
import { version } from '../constants/version.js';
import { closest } from '../quantity/near-match.js';
import { reportAsCsv, tableAsCsv } from '../report/as-csv.js';
import { cautionsAsText, reportAsText } from '../report/as-text.js';
import { type MarkupForm, markup, markupForms } from '../report/markup.js';
import { type ParsedWords, parseWords } from './arguments.js';
import { type Answer, type Call, type Command, type PlainText, UsageError } from './command.js';
import { commands } from './commands/index.js';
import { faultsAsText } from './faults.js';
import { filesBeside } from './files-beside.js';
import { commandHelp, commonOptions, globalHelp } from './help.js';
import { readFileText } from './read-file.js';

type Status = 0 | 1 | 2;
type Form = 'text' | 'json' | 'csv' | MarkupForm;

const out = (text: string) => process.stdout.write(text);
const err = (text: string) => process.stderr.write(text);

/** JSON turns NaN and infinity into null without a word, and null means something else here. */
function refuseNonFinite(value: unknown, at: string): void {
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new RangeError(`${at} is ${value}`);
  } else if (Array.isArray(value)) for (const item of value) refuseNonFinite(item, at);
  else if (typeof value === 'object' && value !== null)
    for (const [key, item] of Object.entries(value)) refuseNonFinite(item, key);
}

function jsonText(value: unknown): string {
  refuseNonFinite(value, 'a result');
  return `${JSON.stringify(value, null, 1)}\n`;
}

/** The command line: words in, exit status out. Nothing it meets ends in a stack trace. */
export async function main(words: readonly string[]): Promise<Status> {
  // known before anything can go wrong, since it decides in which form a fault is told
  const wantsJson = words.includes('--json');
  let fileName = '';
  try {
    const [first, ...rest] = words;
    if (first === undefined) {
      err(globalHelp(commands));
      return 2;
    }
    if (first === '--help' || first === '-h' || first === 'help') return help(rest);
    if (first === '--version' || first === '-V') {
      out(`${version}\n`);
      return 0;
    }
    const command = commandOf(first);
    const parsed = parse(command, rest);
    if (parsed.values.has('help')) {
      out(commandHelp(command));
      return 0;
    }
    const form = formOf(command, parsed);
    const name = fileOf(command, parsed);
    fileName = name ?? '';
    const text = name === null || command.takesFile === 'data' ? null : await readFileText(name);
    const secondName = command.secondFile === undefined ? null : parsed.positionals[1]!;
    const second = secondName === null ? null : { name: secondName, text: await readFileText(secondName) };
    const file = name === null || text === null ? null : { name, text, files: await filesBeside(name, text) };
    const call = callOf(parsed, name, file, second);
    return print(await command.run(call), form, parsed.values.get('table')?.[0] ?? null);
  } catch (error) {
    if (error instanceof UsageError) {
      err(`plumbtick: ${error.message}\n`);
      return 2;
    }
    if (error instanceof CampaignError) {
      if (wantsJson) out(jsonText({ faults: error.faults }));
      else err(faultsAsText(fileName, error.faults));
      return 1;
    }
    return internalError(error, wantsJson);
  }
}

function help(words: readonly string[]): Status {
  const [name] = words;
  out(name === undefined || name.startsWith('-') ? globalHelp(commands) : commandHelp(commandOf(name)));
  return 0;
}

function commandOf(name: string): Command {
  const command = commands.find((candidate) => candidate.name === name);
  if (command) return command;
  const names = commands.map((candidate) => candidate.name);
  if (name.startsWith('-'))
    throw new UsageError(`the command comes first: plumbtick COMMAND FILE. Commands: ${names.join(', ')}`);
  const near = closest(name, names);
  throw new UsageError(
    `there is no command ${JSON.stringify(name)}${near === null ? '' : `; did you mean ${near}?`} Commands: ${names.join(', ')}`,
  );
}

function parse(command: Command, words: readonly string[]): ParsedWords {
  try {
    return parseWords(words, { ...command.options, ...commonOptions });
  } catch (error) {
    if (error instanceof UsageError)
      throw new UsageError(`${command.name}: ${error.message}. See plumbtick ${command.name} --help`);
    throw error;
  }
}

function formOf(command: Command, { values }: ParsedWords): Form {
  const forms = (['json', 'csv', ...markupForms] as const).filter((name) => values.has(name));
  if (forms.length > 1)
    throw new UsageError(`${command.name}: only one of ${forms.map((f) => `--${f}`).join(' and ')}`);
  const [form = 'text'] = forms;
  if (values.has('table') && (form === 'text' || form === 'json'))
    throw new UsageError(`${command.name}: --table goes with --csv or --markdown (--mediawiki, --latex, --html)`);
  return form;
}

function fileOf(command: Command, { positionals }: ParsedWords): string | null {
  const [name, ...more] = positionals;
  if (!command.takesFile && name !== undefined)
    throw new UsageError(
      `${command.name} takes no file, but was given ${JSON.stringify(name)}. See plumbtick ${command.name} --help`,
    );
  if (command.takesFile && name === undefined)
    throw new UsageError(`${command.name} needs a file: plumbtick ${command.name} FILE (or - for standard input)`);
  const wanted = command.secondFile === undefined ? 1 : 2;
  if (wanted === 2 && more.length === 0)
    throw new UsageError(`${command.name} needs two files: plumbtick ${command.name} ${command.synopsis}`);
  if (more.length >= wanted)
    throw new UsageError(
      `${command.name} takes ${wanted === 1 ? 'one file' : 'two files'}, but was given ${positionals.length}: ${positionals.join(', ')}`,
    );
  return name ?? null;
}

const callOf = (
  { values }: ParsedWords,
  fileName: string | null,
  file: Call['file'],
  second: Call['second'],
): Call => ({
  file,
  second,
  fileName,
  option: (name) => values.get(name)?.[0] ?? null,
  values: (name) => values.get(name) ?? [],
  has: (name) => values.has(name),
  provenance: `Computed by Plumbtick ${version} on ${today()}`,
});

/** In the reader's time zone. */
function today(): string {
  const now = new Date();
  const two = (n: number) => String(n).padStart(2, '0');
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}

function print(answer: Answer | PlainText, form: Form, tableId: string | null): Status {
  if (answer.kind === 'plain') {
    out(answer.text);
    return 0;
  }
  if (form === 'json') {
    out(jsonText(answer.json));
    return answer.status;
  }
  if (form === 'text' && answer.text) {
    out(answer.text());
    return answer.status;
  }
  const report = answer.report(form === 'csv' ? 'full' : 'readable');
  const table = report.tables.find(({ id }) => id === tableId);
  if (tableId !== null && table === undefined)
    throw new UsageError(
      `there is no table ${JSON.stringify(tableId)} in this answer. Tables: ${report.tables.map(({ id }) => id).join(', ')}`,
    );
  if (form === 'csv') {
    out(table ? tableAsCsv(table) : reportAsCsv(report));
    if (report.cautions.length > 0) err(`${cautionsAsText(report.cautions)}\n`); // no place for them among the values
  } else if (form === 'text') out(reportAsText(report));
  else out(table ? `${markup[form].table(table)}\n` : markup[form].report(report));
  return answer.status;
}

/** A fault of the program: one line, and where it should go. */
function internalError(error: unknown, wantsJson: boolean): Status {
  const { name, message, code } = error as NodeJS.ErrnoException;
  const what = `${code ?? name ?? 'error'}: ${String(message ?? error).split('\n', 1)[0]}`;
  const report = `This is a fault of Plumbtick ${version}, not of your file: please open an issue with this line, the call and the file`;
  const fault: Fault = faultAt('internal-error', '', what, report);
  if (wantsJson) out(jsonText({ faults: [fault] }));
  else err(`plumbtick: internal error [${what}]. ${report}.\n`);
  return 1;
}
