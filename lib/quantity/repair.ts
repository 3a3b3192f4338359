import { QuantityError } from './quantity-error.js';
import { isDash, isSpace } from './scan.js';

const withoutSpacesBetweenDigits = (text: string): string => {
  let out = '';
  for (let i = 0; i < text.length; i++)
    if (!(isSpace(text[i]) && /^[\d.]$/.test(text[i - 1] ?? '') && /^[\d.]$/.test(text[i + 1] ?? ''))) out += text[i];
  return out;
};

const dashesToMinus = (text: string): string => [...text].map((c) => (isDash(c) ? '-' : c)).join('');

/** Texts that the writer may have meant, best first. */
const candidates = ({ code, text, position }: QuantityError): readonly string[] => {
  switch (code) {
    case 'decimal-comma': {
      const commas = text.split(',').length - 1;
      const comma = text.indexOf(',');
      const point = text.indexOf('.');
      // 1.234,5: the points group digits. 1,234.5 and 1,234,567: the commas do.
      if (commas === 1 && point >= 0 && point < comma) return [text.replaceAll('.', '').replace(',', '.')];
      if (commas === 1) return [text.replace(',', '.'), text.replace(',', '')];
      return [text.replaceAll(',', '')];
    }
    case 'dash-for-minus':
      return [dashesToMinus(text)];
    case 'lost-superscript':
      return [dashesToMinus(text.slice(0, position) + '^' + text.slice(position))];
    case 'digit-groups':
      return [withoutSpacesBetweenDigits(text)];
    case 'empty-bracket':
      return [text.replace(/\([^)]*\)/, '')];
    case 'not-a-number':
      // "- 5 m": a sign stands by itself.
      return isSpace(text[position]) ? [text.slice(0, position) + text.slice(position).trimStart()] : [];
    default:
      return [];
  }
};

/** The same fault with the corrected text in `expected`, if a plain correction makes the text readable. */
export const withCorrection = (error: QuantityError, read: (candidate: string) => unknown): QuantityError => {
  for (const candidate of candidates(error)) {
    try {
      read(candidate);
    } catch {
      continue; // not what was meant
    }
    return new QuantityError(error.code, error.text, error.position, `${error.expected}: write ${candidate.trim()}`);
  }
  return error;
};
