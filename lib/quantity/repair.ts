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
      // Commas as points; 1.234,5: the points group digits; 1,234.5 and 1,234,567: the commas do.
      const points = text.replaceAll(',', '.');
      const pointsGroup = text.replaceAll('.', '').replaceAll(',', '.');
      const first = text.indexOf('.');
      return [points, ...(first >= 0 && first < position ? [pointsGroup] : []), text.replaceAll(',', '')];
    }
    case 'dash-for-minus':
      return [dashesToMinus(text)];
    case 'lost-superscript':
      return [dashesToMinus(text.slice(0, position) + '^' + text.slice(position))];
    case 'digit-groups':
      // 62636 853.4 is one number with spaces too few; 5 3 may be anything.
      return /^\d{4}$/.test(text.slice(Math.max(0, position - 4), position)) ? [withoutSpacesBetweenDigits(text)] : [];
    case 'empty-bracket':
      return [text.replace(/\([^)]*\)/, '')];
    case 'not-a-number':
      // "- 5 m": a sign stands by itself.
      return isSpace(text[position]) ? [text.slice(0, position) + text.slice(position).trimStart()] : [];
    case 'bad-bracket': {
      // 4.1e-17(3): the power goes behind the bracket.
      const power = text.search(/[eE]/);
      const close = text.indexOf(')');
      if (power < 0 || power > position || close < position) return [];
      const bracket = text.slice(position, close + 1);
      return [text.slice(0, power) + bracket + text.slice(power, position).trimEnd() + text.slice(close + 1)];
    }
    case 'ambiguous-power': {
      const inside = text.slice(0, position).trim();
      return [`${inside.startsWith('(') ? inside : `(${inside}`})${text.slice(position).trimStart().replace(')', '')}`];
    }
    case 'unit-missing':
      // 143.216 m ± 0.008
      return [`${text} ${/[^\d\s(.]+(?=\s?(?:±|\+\/?[-\u2212]))/.exec(text)?.[0] ?? ''}`];
    case 'unknown-unit':
    case 'wrong-unit': {
      const number = text.slice(0, position).trimEnd();
      const rest = text.slice(position).trim();
      if (rest === '%') return [`${number}e-2`];
      // 1.5D-16, as older programs print it
      const fortran = /^([^A-Za-z]+)[dD]([+-]?\d.*)$/.exec(text);
      return fortran === null ? [] : [`${fortran[1]}e${fortran[2]}`];
    }
    case 'bad-instant':
      return text[position] === ' ' ? [`${text.slice(0, position)}T${text.slice(position + 1)}`] : [];
    case 'wrong-hemisphere':
      return [text.slice(0, position) + text.charAt(position).toUpperCase() + text.slice(position + 1)];
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
