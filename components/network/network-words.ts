import type { NetworkItem, NetworkView } from '../../lib/answers/network-view.js';
import { formatLength } from '../../lib/quantity/index.js';
import { num, type RichText } from '../shared/rich-text.js';

const length = (metres: number) => num(formatLength(metres, 2));

/** What the links bring, and the weakest spot. */
export function networkSentence(view: NetworkView): RichText {
  const worst = [...view.sites].sort((a, b) => b.uAfterM - a.uAfterM)[0];
  const parts: RichText[number][] = [];
  if (worst) {
    parts.push(`The least certain site, ${worst.name}, `);
    if (worst.uBeforeM === null) parts.push('was without a level and comes to ', length(worst.uAfterM), '.');
    else if (worst.uBeforeM - worst.uAfterM < 0.005 * worst.uBeforeM)
      parts.push('stays at ', length(worst.uAfterM), ': the links bring it nothing.');
    else parts.push('comes from ', length(worst.uBeforeM), ' to ', length(worst.uAfterM), '.');
  }
  const weakest = view.items.find((x) => x.control !== null);
  if (weakest) parts.push(' ', ...weakSpot(weakest));
  return parts;
}

/** One weak spot in words. */
export function weakSpot(item: NetworkItem): RichText {
  const what = whatItIs(item);
  return item.smallestDetectableM === null
    ? [`Weakest is ${what}: nothing controls it, a mistake in it would not show at all.`]
    : [`Weakest is ${what}: only a mistake of `, length(item.smallestDetectableM), ' or more would show.'];
}

/** `link ab`, `ζ of cellar`, `levelling from a to b`. */
export const whatItIs = (item: NetworkItem): string =>
  item.kind === 'link'
    ? `link ${item.name}`
    : item.kind === 'levelling'
      ? `levelling from ${item.from} to ${item.to}`
      : `${item.name} of ${item.from}`;

export const controlText = (control: number | null): string =>
  control === null ? 'exact' : control < 1e-10 ? 'none' : control.toFixed(2);

export const detectableText = (item: NetworkItem): string =>
  item.control === null
    ? 'exact'
    : item.smallestDetectableM === null
      ? 'none'
      : formatLength(item.smallestDetectableM, 2);
