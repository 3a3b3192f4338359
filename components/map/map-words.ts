import type { SharedError, SitePair } from '../../lib/answers/site-pairs.js';
import type { Campaign, Source } from '../../lib/campaign/campaign.js';
import { formatConcise, formatLength } from '../../lib/quantity/index.js';
import { num, type RichText, sym } from '../shared/rich-text.js';

const nameOf = ({ sites }: Campaign, id: string): string =>
  (sites.find((site) => site.id === id)?.name ?? id).split(',')[0]!.trim();

export const pairName = (campaign: Campaign, { sites: [a, b] }: SitePair): string =>
  `${nameOf(campaign, a)}, ${nameOf(campaign, b)}`;

export const siteName = nameOf;

export const sourceName = ({ id, name }: Source): string => name ?? id;

/** Whole kilometres from ten on, metres below one. */
export const distance = (metres: number): string =>
  metres >= 1e4 ? `${Math.round(metres / 1000)}\u00a0km` : formatLength(metres, 2);

const LENGTHS = ['zeta', 'N', 'h', 'H', 'dH'];
/** An uncertainty of an input in the unit that its field is used to. */
export const inputSize = (si: number, quantity: string): string =>
  LENGTHS.includes(quantity)
    ? formatLength(si, 2)
    : quantity === 'g'
      ? `${formatConcise(si * 1e8, null, { significant: 2 })}\u00a0µGal`
      : formatConcise(si, null, { significant: 2 });

const SYMBOLS: Readonly<Record<string, string>> = { zeta: 'ζ' };
export const quantitySymbol = (quantity: string): string => SYMBOLS[quantity] ?? quantity;

export const correlation = (rho: number): string => rho.toFixed(2).replace('-', '\u2212');

/** How near the nearest two are, and what that does to a source's error. */
export function sentence(campaign: Campaign, pairs: readonly SitePair[], source: Source | null): RichText {
  const nearest = pairs.find(({ distanceM }) => distanceM > 0) ?? pairs[0];
  if (!nearest) return [campaign.sites.length === 0 ? 'The campaign has no sites.' : 'The campaign has one site.'];
  const [a, b] = nearest.sites.map((id) => nameOf(campaign, id));
  const first = campaign.sites.length > 2 ? `The nearest two, ${a} and ${b}, lie ` : `${a} and ${b} lie `;
  const apart: RichText = [first, num(distance(nearest.distanceM)), ' apart'];
  if (!source || !nearest.shared) {
    const farthest = pairs.at(-1)!;
    return pairs.length < 2 ? [...apart, '.'] : [...apart, ', the farthest ', num(distance(farthest.distanceM)), '.'];
  }
  return [...apart, ...reachClause(nearest.distanceM, source), ...sharedClause(nearest.shared)];
}

function reachClause(distanceM: number, { correlationLengthM, ...source }: Source): RichText {
  if (correlationLengthM === undefined) return ['.'];
  const where = distanceM <= correlationLengthM ? 'within' : 'beyond';
  return [`, ${where} the reach of the ${sourceName(source)}, `, num(formatLength(correlationLengthM, 3)), '.'];
}

function sharedClause({ uDifference, uIfApart, quantity }: SharedError): RichText {
  const [left, all] = [inputSize(uDifference, quantity), inputSize(uIfApart, quantity)];
  if (left === all)
    return [
      ' They share too little of its error to tell: ',
      num(left),
      ' is left of the difference of ',
      sym(quantitySymbol(quantity)),
      '.',
    ];
  return [' What they share of its error leaves ', num(left), ' of ', num(all), '.'];
}
