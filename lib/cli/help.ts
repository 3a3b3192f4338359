import { version } from '../constants/version.js';
import { wrap } from '../report/as-text.js';
import type { Command, OptionSpec } from './command.js';

/** Options that every command understands. */
export const commonOptions: Readonly<Record<string, OptionSpec>> = {
  json: { help: 'one JSON object, SI units, unrounded' },
  csv: { help: 'the tables as comma-separated values, unrounded' },
  markdown: { help: 'the tables as Markdown' },
  mediawiki: { help: 'the tables in the markup of MediaWiki' },
  latex: { help: 'the tables as LaTeX' },
  html: { help: 'the tables as HTML without scripts and styles, to paste into a page' },
  table: { value: 'ID', help: 'only the table of that name, with --csv or a markup' },
  help: { help: 'this text' },
};

const aligned = (rows: readonly (readonly [string, string])[]): string => {
  const width = Math.max(...rows.map(([left]) => left.length)) + 2;
  return rows.map(([left, right]) => `  ${wrap(left.padEnd(width) + right, 94, ' '.repeat(width + 2))}`).join('\n');
};

const optionRows = (options: Readonly<Record<string, OptionSpec>>) =>
  Object.entries(options).map(
    ([name, { value, help, repeatable }]) =>
      [`--${name}${value === undefined ? '' : ` ${value}`}`, repeatable ? `${help}; may be repeated` : help] as const,
  );

const quantities = `Numbers     "143.216(8) m" is 143.216 m with a standard uncertainty of 0.008 m. Also "143.216 ± 0.008 m",
            "4.1(1.6)e-17", "8 mm". Without an uncertainty a number is exact. Decimal point, no comma.`;

const exitStatus = `Exit status 0 done; 1 the file was refused, every fault named; 2 the call's words were wrong.`;

/** What `plumbtick --help` says: the job, where to begin, the commands, how a number is written. */
export const globalHelp = (
  commands: readonly Command[],
): string => `Plumbtick ${version}: plans and checks height comparisons by optical clocks

The higher of two clocks runs faster: by 1.1e-18 of its frequency for every centimetre. From what is known
about two places (heights, geoid, levelling, gravity) Plumbtick computes the offset that gravity makes between
their clocks, its uncertainty, and what limits it.

Use         plumbtick COMMAND FILE [--json | --csv | --markdown]
            FILE is a campaign file; - reads it from standard input.

Begin here
  plumbtick floors --dH "12.348(3) m" --g "9.8125(1) m/s²"   two floors of a house; no file needed
  plumbtick new --out first.json                             a commented campaign file to change
  plumbtick predict first.json                               offsets, uncertainties, what limits them

Commands
${aligned(commands.map(({ name, summary }) => [name, summary]))}

plumbtick COMMAND --help tells more about one. plumbtick --version prints the version.

${quantities}
Sign        Of a link from A to B, y > 0 when B runs fast: B is the higher one.
${exitStatus}
`;

export const commandHelp = (command: Command): string => `plumbtick ${command.name}: ${command.summary}

${wrap(`Use         plumbtick ${command.name} ${command.synopsis}`, 108, ' '.repeat(12))}

${command.description.map((paragraph) => wrap(paragraph, 94)).join('\n\n')}

Options
${aligned(optionRows({ ...command.options, ...commonOptions }))}

${command.examples.length === 1 ? 'Example' : 'Examples'}
${command.examples.map((example) => `  ${example}`).join('\n')}

${quantities}
${exitStatus}
`;
