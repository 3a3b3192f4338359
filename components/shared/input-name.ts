import type { Campaign } from '../../lib/campaign/campaign.js';
import { type RichText, sym } from './rich-text.js';

const SYMBOLS: Readonly<Record<string, RichText>> = {
  h: [sym('h')],
  zeta: [sym('ζ')],
  N: [sym('N')],
  H: [sym('H')],
  g: [sym('g')],
  W: [sym('W')],
  C: [sym('C')],
  W0: [sym('W', '0')],
  dH: ['Δ', sym('H')],
  gradient: ['gradient ', sym('Γ')],
  gammaRef: [sym('γ'), ' of reference'],
  meanGravityFactor: ['factor of mean gravity'],
  variable: ['loading, water, air'],
};

const named = (things: readonly { readonly id: string; readonly name?: string }[], id: string): string =>
  things.find((thing) => thing.id === id)?.name ?? id;

/** An input of a campaign in words: `sites.ridge.determinations.0.zeta` → *Ridge, ζ*; what has no words keeps its path. */
export function inputName(campaign: Campaign, path: string): RichText {
  const steps = path.split('.');
  const [group, id = ''] = steps;
  const symbol = SYMBOLS[steps.at(-1) ?? ''];
  if (!symbol) return [path];
  if (group === 'sites') return [`${named(campaign.sites, id)}, `, ...symbol];
  if (group === 'datums') return [`datum ${named(campaign.datums, id)}, `, ...symbol];
  if (group === 'clocks' && steps[2] === 'tie') {
    const clock = campaign.clocks.find((one) => one.id === id);
    const step = clock?.tie[Number(steps[3])];
    return [`clock ${id}, tie ${step?.name ?? Number(steps[3]) + 1}`];
  }
  return [path];
}
