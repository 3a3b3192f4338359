import { sizeText } from './numbers.js';

/** What limits a result, in words: the largest share of its budget. Empty where the budget is. */
export function limitSentence(budget: readonly { readonly input: string; readonly share: number }[]): string {
  const [first] = budget;
  if (first === undefined) return '';
  const { share, input } = first;
  const part =
    share > 0.95
      ? 'Nearly all'
      : share > 0.55
        ? 'More than half'
        : share > 0.45
          ? 'About half'
          : `The largest part, ${sizeText(100 * share)}\u00a0%,`;
  return `${part} of the variance is ${input}.`;
}
