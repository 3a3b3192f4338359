/** Digits of the standard uncertainty as a source gave it, 1 or 2: `1.2034(5) m` → 1, `± 0.008` → 1. What is printed from it
 *  then claims no more than it did. 2 where it cannot be told or more were given.
 * @param text the quantity as typed; null: a bare number */
export function statedDigits(text: string | null): 1 | 2 {
  const stated = text?.match(/\(([\d.\s]+)\)|±\s*([\d.]+)/u);
  const digits = (stated?.[1] ?? stated?.[2] ?? '').replace(/[^\d]/g, '').replace(/^0+/, '');
  return digits.length === 1 ? 1 : 2;
}
