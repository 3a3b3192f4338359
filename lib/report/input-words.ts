import type { Campaign } from '../campaign/campaign.js';

/** Words with the symbols of quantities apart, so that a page can set them in italics. */
export type InputWords = readonly (string | { readonly symbol: string; readonly sub?: string })[];

const symbol = (name: string, sub?: string) => (sub === undefined ? { symbol: name } : { symbol: name, sub });

const SYMBOLS: Readonly<Record<string, InputWords>> = {
  h: [symbol('h')],
  zeta: [symbol('ζ')],
  N: [symbol('N')],
  H: [symbol('H')],
  g: [symbol('g')],
  W: [symbol('W')],
  C: [symbol('C')],
  W0: [symbol('W', '0')],
  dH: ['Δ', symbol('H')],
  gradient: ['gradient ', symbol('Γ')],
  gammaRef: [symbol('γ'), ' of reference'],
  meanGravityFactor: ['factor of mean gravity'],
  variable: ['loading, water, air'],
  commission: ['coefficients of the gravity model'],
  omission: ['omission of the gravity model'],
  b: [symbol('b'), ' of the line'],
  k: [symbol('k'), ' of the line'],
};

const named = (things: readonly { readonly id: string; readonly name?: string }[], id: string): string =>
  things.find((thing) => thing.id === id)?.name ?? id;

/** An input of a campaign in words: `sites.ridge.determinations.0.zeta` → *Ridge, ζ*; what has no words keeps its path. */
export function inputWords(campaign: Campaign, path: string): InputWords {
  const steps = path.split('.');
  const [group, id = ''] = steps;
  const last = steps.at(-1) ?? '';
  if (last === 'systematic') return [`${group === 'links' ? 'link' : 'clock'} ${id}, systematic`];
  if (group === 'transitions') return [`offset of ${id}`];
  if (group === 'clocks' && steps[2] === 'tie') {
    const step = campaign.clocks.find((one) => one.id === id)?.tie[Number(steps[3])];
    return [`clock ${id}, tie ${step?.name ?? Number(steps[3]) + 1}`];
  }
  const words = SYMBOLS[last];
  if (!words) return [path];
  if (group === 'sites') return [`${named(campaign.sites, id)}, `, ...words];
  if (group === 'datums') return [`datum ${named(campaign.datums, id)}, `, ...words];
  return [path];
}

const SUBSCRIPTS: Readonly<Record<string, string>> = { '0': '₀' };

/** The same as plain text. */
export const inputText = (campaign: Campaign, path: string): string =>
  inputWords(campaign, path)
    .map((part) =>
      typeof part === 'string' ? part : part.symbol + (part.sub ? (SUBSCRIPTS[part.sub] ?? part.sub) : ''),
    )
    .join('');

/** Name of a source as stated, else its id; of the built-in one what it is. */
export function sourceText(campaign: Campaign, id: string): string {
  if (id === 'built-in:default-gravity') return 'default gravity';
  return campaign.sources.find((source) => source.id === id)?.name ?? id;
}
