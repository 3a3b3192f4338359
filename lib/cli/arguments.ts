import { parseArgs } from 'node:util';
import { closest } from '../quantity/near-match.js';
import { type OptionSpec, UsageError } from './command.js';

export interface ParsedWords {
  readonly positionals: readonly string[];
  readonly values: ReadonlyMap<string, readonly string[]>;
}

const isNegativeNumber = (word: string | undefined) => word !== undefined && /^-[\d.]/.test(word);

/** A value may be a negative number, which a plain parser would take for an option: tie it to the option before it. */
function joinNegativeValues(words: readonly string[], options: Readonly<Record<string, OptionSpec>>): string[] {
  const joined: string[] = [];
  for (let i = 0; i < words.length; i++) {
    const word = words[i]!;
    if (word === '--') return [...joined, ...words.slice(i)];
    const spec = word.startsWith('--') ? options[word.slice(2)] : undefined;
    if (spec?.value !== undefined && isNegativeNumber(words[i + 1])) joined.push(`${word}=${words[++i]}`);
    else joined.push(word);
  }
  return joined;
}

/** Splits a call into file names and options.
 * @throws {UsageError} an unknown option (with the nearest known one), a value missing or too many, an option given twice */
export function parseWords(words: readonly string[], options: Readonly<Record<string, OptionSpec>>): ParsedWords {
  const { tokens } = parseArgs({
    args: joinNegativeValues(words, options),
    options: Object.fromEntries(
      Object.entries(options).map(([name, { value }]) => [name, { type: value === undefined ? 'boolean' : 'string' }]),
    ),
    allowPositionals: true,
    strict: false,
    tokens: true,
  });
  const positionals: string[] = [];
  const values = new Map<string, readonly string[]>();
  for (const token of tokens) {
    if (token.kind === 'positional') positionals.push(token.value);
    if (token.kind !== 'option') continue;
    const { name, rawName } = token;
    const spec = Object.hasOwn(options, name) && rawName.startsWith('--') ? options[name] : undefined;
    if (spec === undefined) {
      const near = closest(name, Object.keys(options));
      throw new UsageError(
        `there is no option ${rawName}${near === null ? '' : `; did you mean --${near}?`}${isNegativeNumber(rawName) ? '. A negative value belongs behind its option' : ''}`,
      );
    }
    if (spec.value === undefined && token.value !== undefined) throw new UsageError(`--${name} takes no value`);
    if (spec.value !== undefined && (token.value === undefined || token.value === ''))
      throw new UsageError(`--${name} needs a value: --${name} ${spec.value}`);
    const before = values.get(name) ?? [];
    if (before.length > 0 && !spec.repeatable) throw new UsageError(`--${name} is given twice`);
    values.set(name, [...before, token.value ?? '']);
  }
  return { positionals, values };
}
