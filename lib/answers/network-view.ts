import type { Campaign, Determination } from '../campaign/campaign.js';
import { adjustmentOf } from './adjust.js';
import type { Adjustment } from './adjustment.js';
import { type Design, design } from './design.js';
import { solveCampaign } from './solve-campaign.js';

/** Gravity that turns a potential's uncertainty into a length for reading, m/s²; 0.3 % over the Earth. */
export const READING_GRAVITY_MS2 = 9.81;

/** An observation as a network drawing needs it. */
export interface NetworkItem {
  readonly id: string;
  /** short name: a link's id, or the symbol of what was determined */
  readonly name: string;
  readonly kind: 'link' | 'levelling' | 'determination';
  /** ends as site ids; `to` null for a determination of one site */
  readonly from: string;
  readonly to: string | null;
  /** satellite, fibre, … ; null for what is no link */
  readonly linkKind: string | null;
  /** 0…1; null: exact */
  readonly control: number | null;
  /** smallest mistake that shows, as length, m; null: none would */
  readonly smallestDetectableM: number | null;
}

export interface NetworkSite {
  readonly id: string;
  readonly name: string;
  /** standard uncertainty of W as length, m; null: unknown before */
  readonly uBeforeM: number | null;
  readonly uAfterM: number;
}

export interface NetworkCandidate {
  readonly id: string;
  readonly from: string;
  readonly to: string | null;
  /** u of the worst site with it, as length, m; null where something stays undetermined */
  readonly aimM: number | null;
  readonly gainM: number | null;
}

/** The network with its weak spots and what its candidates would bring to the worst site. */
export interface NetworkView {
  readonly planned: boolean;
  readonly adjustment: Adjustment;
  readonly sites: readonly NetworkSite[];
  /** weakest first, by control */
  readonly items: readonly NetworkItem[];
  readonly candidates: readonly NetworkCandidate[];
  readonly worstM: number | null;
}

/** Symbol of what a determination states. */
const SYMBOL: Readonly<Record<Determination['kind'], string>> = {
  potential: 'W',
  'geopotential-number': 'C',
  'normal-height': 'H',
  'normal-orthometric-height': 'H',
  'orthometric-height': 'H',
  'dynamic-height': 'H',
  'gnss-quasigeoid': 'ζ',
  'gnss-geoid': 'N',
  'levelled-from': 'dH',
  'gravity-model': 'W',
};

/** @param planned every link without a measurement as if run through the window  @throws {CampaignError} */
export function networkView(campaign: Campaign, planned: boolean): NetworkView {
  const adjustment = adjustmentOf(solveCampaign(campaign), planned);
  const metres = (x: number | null) => (x === null ? null : x / READING_GRAVITY_MS2);
  const nameOf = new Map(campaign.sites.map((s) => [s.id, s.name ?? s.id]));
  const items = adjustment.observations.map((o): NetworkItem => {
    const base = { id: o.id, control: o.control, smallestDetectableM: metres(o.smallestDetectable) };
    const [list, key, , n] = o.id.split('.');
    if (list === 'sites') {
      const d = campaign.sites.find((s) => s.id === key)!.determinations[Number(n)]!;
      return d.kind === 'levelled-from'
        ? { ...base, name: SYMBOL[d.kind], kind: 'levelling', from: d.site, to: key!, linkKind: null }
        : { ...base, name: SYMBOL[d.kind], kind: 'determination', from: key!, to: null, linkKind: null };
    }
    const link = campaign.links.find(
      (l) => l.id === (list === 'links' ? key : campaign.measurements[Number(key)]!.link),
    )!;
    return { ...base, name: link.id, kind: 'link', ...endsOf(campaign, link), linkKind: link.kind };
  });
  // candidates are links and clocks that would run through the window; without one nothing can be said of them
  const ranked = campaign.window ? design(campaign, { kind: 'worst-site' }) : null;
  return {
    planned,
    adjustment,
    sites: adjustment.sites.map((s) => ({
      id: s.id,
      name: nameOf.get(s.id)!,
      uBeforeM: metres(s.uBefore),
      uAfterM: s.uAfter / READING_GRAVITY_MS2,
    })),
    items: items.sort(weakestFirst),
    candidates: ranked?.ranking.map((c) => candidateOf(campaign, c)) ?? [],
    worstM: metres(ranked?.aim ?? null),
  };
}

/** Least controlled first; of equals the one whose mistakes must be larger to show; exact ones, which are not tested, last. */
const weakestFirst = (a: NetworkItem, b: NetworkItem): number =>
  (a.control ?? 2) - (b.control ?? 2) || (b.smallestDetectableM ?? 0) - (a.smallestDetectableM ?? 0);

const endsOf = (campaign: Campaign, link: { readonly from: string; readonly to: string }) => {
  const site = (clock: string) => campaign.clocks.find((k) => k.id === clock)!.site;
  return { from: site(link.from), to: site(link.to) };
};

function candidateOf(campaign: Campaign, step: Design['ranking'][number]): NetworkCandidate {
  const [list, id] = step.id.split('.');
  const base = {
    id: step.id,
    aimM: step.aim === null ? null : step.aim / READING_GRAVITY_MS2,
    gainM: step.gain === null ? null : step.gain / READING_GRAVITY_MS2,
  };
  if (list === 'links') return { ...base, ...endsOf(campaign, campaign.links.find((l) => l.id === id)!) };
  if (list === 'clocks') return { ...base, from: campaign.clocks.find((k) => k.id === id)!.site, to: null };
  return { ...base, from: id!, to: null };
}
