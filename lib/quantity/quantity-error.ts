/** Why a text or a value was not taken as a quantity, an angle or an instant. Stable: tests and translations use them. */
export type QuantityFaultCode =
  | 'empty' // nothing but spaces
  | 'too-long'
  | 'wrong-type' // neither number nor text (nor object where one may stand)
  | 'missing'
  | 'not-a-number' // a digit was expected
  | 'not-finite' // NaN, infinity
  | 'decimal-comma'
  | 'two-signs'
  | 'dash-for-minus' // a dash or hyphen that is no minus sign
  | 'digit-groups' // spaces not between groups of three
  | 'empty-bracket'
  | 'open-bracket'
  | 'bad-bracket' // something else than an uncertainty inside, or in the wrong place
  | 'bad-power'
  | 'lost-superscript' // ×10-17
  | 'ambiguous-power' // 4.1 ± 1.6e-17
  | 'overflow'
  | 'underflow'
  | 'two-uncertainties'
  | 'negative-u'
  | 'unknown-unit'
  | 'wrong-unit'
  | 'unit-missing'
  | 'unit-twice'
  | 'ambiguous-unit'
  | 'stray-text'
  | 'calendar-duration' // years and months have no fixed length
  | 'bad-duration'
  | 'wrong-hemisphere'
  | 'out-of-range'
  | 'bad-instant'
  | 'local-time'
  | 'leap-second'
  | 'uncertainty-not-expected'
  | 'source-twice'
  | 'source-beside-parts'
  | 'u-disagrees'
  | 'unknown-distribution'
  | 'dof-missing'
  | 'bad-dof';

/** A value as a message shows it: text in quotes and cut to a readable length, other things by their kind. */
export const shown = (input: unknown): string => {
  if (typeof input === 'string') return `"${input.length > 80 ? input.slice(0, 79) + '…' : input}"`;
  if (input === null || input === undefined) return input === null ? 'null' : 'nothing';
  if (Array.isArray(input)) return 'a list';
  return typeof input === 'object' ? 'an object' : String(input);
};

/** Thrown where a text cannot be read, or a number cannot be printed. */
export class QuantityError extends Error {
  override readonly name = 'QuantityError';
  /** @param code stable word for the reason
   *  @param text the whole text as given
   *  @param position index into `text`, from 0, of the character at fault
   *  @param expected what would be right, with the corrected text where it can be told */
  constructor(
    readonly code: QuantityFaultCode,
    readonly text: string,
    readonly position: number,
    readonly expected: string,
  ) {
    super(`${code} at character ${position + 1} of ${shown(text)}: expected ${expected}`);
  }
}
