/** Longest id, in UTF-16 units. */
export const MAX_ID_LENGTH = 100;

/** Ids stand in dotted paths (`sites.cellar.h`), in messages and in tables. They hold letters, marks, digits and signs of any
 *  script and single spaces inside: `171Yb+ E3`, `München/1`. They hold no full stop, no double quote or backslash, no
 *  control, format or unassigned character, no other kind of space. */
const ID = /^[^\p{C}\p{Z}."\\]+(?: [^\p{C}\p{Z}."\\]+)*$/u;

/** Nearly ID, for a JSON Schema: without classes of characters, which not every validator knows. */
export const ID_PATTERN = '^[^."\\\\\\s]+( [^."\\\\\\s]+)*$';

/** What is wrong with an id; null when nothing is. Names that every object carries, such as `constructor`, are refused so
 *  that no table of ids can be led astray by them. */
export function idFault(id: string): string | null {
  if (id === '') return 'a name: it is empty';
  if (id.length > MAX_ID_LENGTH) return `a name of at most ${MAX_ID_LENGTH} characters`;
  if (id in {}) return 'another name: this one is reserved';
  if (id.includes('.'))
    return `a name without full stop, such as ${JSON.stringify(id.replaceAll('.', '-'))}: paths are dotted`;
  if (!ID.test(id))
    return 'a name of letters, digits and signs, single spaces inside; no quotes, backslashes or control characters';
  return null;
}
