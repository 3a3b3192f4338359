import { html, type TemplateResult } from 'lit';
import { quantityText } from './number.js';

/** A line that is both shown and copied: words, italic symbols, numbers with their digits grouped. */
export type RichPart =
  | string
  | { readonly symbol: string; readonly sub?: string }
  | { readonly number: string }
  | { readonly word: string };
export type RichText = readonly RichPart[];

/** Symbol of a quantity, in italics: `sym('W', '0')`. */
export const sym = (symbol: string, sub?: string): RichPart => (sub === undefined ? { symbol } : { symbol, sub });
/** A formatted number, with its unit if it has one. */
export const num = (number: string): RichPart => ({ number });

/** A name that is not broken over lines, an id with a hyphen. */
export const word = (text: string): RichPart => ({ word: text });

/** With a capital at its beginning. */
export const sentenceCase = (words: string): string => `${words[0]?.toUpperCase() ?? ''}${words.slice(1)}`;

/** As words for the clipboard, a title or a screen reader's label. */
export const plainText = (parts: RichText): string =>
  parts
    .map((part) => {
      if (typeof part === 'string') return part;
      if ('number' in part) return part.number;
      return 'word' in part ? part.word : part.symbol + (part.sub ?? '');
    })
    .join('');

export const richText = (parts: RichText): TemplateResult =>
  html`${parts.map((part) => {
    if (typeof part === 'string') return part;
    if ('number' in part) return quantityText(part.number);
    if ('word' in part) return html`<span class="nb">${part.word}</span>`;
    return part.sub === undefined
      ? html`<i class="s">${part.symbol}</i>`
      : html`<i class="s">${part.symbol}</i><sub>${part.sub}</sub>`;
  })}`;
