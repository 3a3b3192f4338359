import { type Fault, faultAt } from '../campaign/fault.js';
import { KINDS, parseQuantity, QuantityError, type QuantityKind } from '../quantity/index.js';

/** Texts of a call or of an element's attributes, by option name; null or spaces alone: not given. */
export type OptionTexts = Readonly<Record<string, string | null | undefined>>;

/** Reads options one by one and keeps every fault, so that all are shown at once. A fault's `path` is the option's name,
 *  `found` its text as given, `column` the character at fault, from 1; `expected` ends in `: write …` where it can be told. */
export class OptionReader {
  readonly faults: Fault[] = [];
  /** the quantities as given, trimmed, with their default unit where none was written: for a line to cite */
  readonly asGiven: Record<string, string> = {};
  readonly #texts: OptionTexts;

  constructor(texts: OptionTexts) {
    this.#texts = texts;
  }

  /** The text as given, line breaks of a page's source as spaces; null if there is none. */
  text(name: string): string | null {
    const text = this.#texts[name]?.replace(/[\t\n\r\f]/g, ' ');
    return text === undefined || text.trim() === '' ? null : text;
  }

  refuse(code: string, name: string, expected: string, position: number | null = null): null {
    const fault = faultAt(code, name, this.text(name) ?? 'nothing', expected);
    this.faults.push(position === null ? fault : { ...fault, column: position + 1 });
    return null;
  }

  /** What `read` makes of the text; null where there is none, or where it is refused. */
  value<T>(name: string, read: (text: string) => T): T | null {
    const text = this.text(name);
    if (text === null) return null;
    try {
      return read(text);
    } catch (error) {
      if (!(error instanceof QuantityError)) throw error;
      return this.refuse(error.code, name, error.expected, error.position);
    }
  }

  /** A measured number, SI, within a range. @param range the same in words, for the message */
  quantity(
    name: string,
    kind: QuantityKind,
    [low, high]: readonly [number, number],
    range: string,
  ): { readonly value: number; readonly u: number } | null {
    const quantity = this.value(name, (text) => parseQuantity(text, kind));
    if (quantity === null) return null;
    if (quantity.value >= low && quantity.value <= high) {
      const unit = quantity.unitWritten || kind === 'fraction' ? '' : ` ${KINDS[kind].unit}`;
      this.asGiven[name] =
        quantity.text
          .trim()
          .replaceAll('-', '\u2212')
          .replace(/e\u2212/g, 'e-') + unit;
      return { value: quantity.value, u: quantity.u };
    }
    return this.refuse('out-of-range', name, range);
  }
}
