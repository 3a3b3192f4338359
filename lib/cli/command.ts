import type { CampaignFiles } from '../campaign/campaign-files.js';
import type { Report } from '../report/table.js';

export interface OptionSpec {
  /** A word stands for the value in the help; absent: the option is a switch */
  readonly value?: string;
  readonly help: string;
  /** May be given several times */
  readonly repeatable?: true;
}

/** The words of one call, checked against the command's own options. */
export interface Call {
  /** Name of the file as given (`-` is standard input), its text, and what the files beside it say; null where the command takes no
   *  file */
  readonly file: { readonly name: string; readonly text: string; readonly files: CampaignFiles } | null;
  /** Name of the file as given, where the command reads it itself (`takesFile: 'data'`) too; null without one */
  readonly fileName: string | null;
  /** The second file of a command that takes two */
  readonly second: { readonly name: string; readonly text: string } | null;
  /** Value of an option, null if it was not given */
  option(name: string): string | null;
  /** All values of a repeatable option, in order */
  values(name: string): readonly string[];
  has(name: string): boolean;
  /** Version and day of the computation, one line */
  readonly provenance: string;
}

/** An answer: one JSON object for programs, a report for people. */
export interface Answer {
  readonly kind: 'answer';
  readonly json: unknown;
  /** `full`: for a program to read, nothing summed up or left out */
  readonly report: (detail: 'readable' | 'full') => Report;
  /** Instead of the report's own text, where a table is not the best way to say it */
  readonly text?: () => string;
  /** 1: the file was refused, and the answer says why */
  readonly status: 0 | 1;
}

/** Text that goes out as it is, whatever form was asked for. */
export interface PlainText {
  readonly kind: 'plain';
  readonly text: string;
}

/** One word of the command line. To add one: a file in `commands/`, and its name in `commands/index.ts`. */
export interface Command {
  readonly name: string;
  /** Half a line for the list of commands */
  readonly summary: string;
  /** What comes after the name in a call */
  readonly synopsis: string;
  /** Paragraphs for someone who meets the command for the first time */
  readonly description: readonly string[];
  readonly examples: readonly string[];
  /** `data`: a file that is no campaign, which the command opens itself */
  readonly takesFile: boolean | 'data';
  /** a second file is wanted: what it is */
  readonly secondFile?: string;
  readonly options: Readonly<Record<string, OptionSpec>>;
  run(call: Call): Answer | PlainText | Promise<Answer | PlainText>;
}

/** The call's own words are wrong: exit status 2. */
export class UsageError extends Error {
  override readonly name = 'UsageError';
}
