import type { Evaluation } from '../answers/evaluation.js';
import type { Estimate, Prediction } from '../answers/prediction.js';
import type { Campaign, Site } from '../campaign/campaign.js';
import { W0_IHRS, W0_TT } from '../constants/defining-constants.js';
import { formatConcise } from '../quantity/index.js';

/** Sentences to be cited: value, u, k, W₀, tide system, frame and epoch, method, version and date in one line each. */
export interface Citation {
  /** `links.ID` or `clocks.ID` */
  readonly path: string;
  readonly sentence: string;
}

const scientific = ({ value, u }: Estimate): string => {
  const power = Math.floor(Math.log10(Math.abs(value) || 1));
  return u > 0
    ? formatConcise(value, u, { power, sign: 'always' })
    : formatConcise(value, null, { power, sign: 'always' });
};

/** One sentence per link: the offset that gravity makes. @param provenance version and date */
export function linkCitations(prediction: Prediction, campaign: Campaign, provenance: string): Citation[] {
  return prediction.links.flatMap((link) => {
    if (!link.y || !link.dW) return [];
    const sites = [link.from, link.to].map((clock) => siteOf(campaign, clock));
    const dW = formatConcise(link.dW.value, link.dW.u, { sign: 'always' });
    return [
      {
        path: `links.${link.id}`,
        sentence: `Gravity makes clock ${link.to} run at y = ${scientific(link.y)} relative to clock ${link.from} (u, k = 1; ΔW = W(${link.from}) − W(${link.to}) = ${dW} m²/s², ${prediction.tide} tide; y in mean tide; W₀: ${referencesOf(campaign, sites)}; ${methodOf(sites)}${frameOf(sites)}). ${provenance}.`,
      },
    ];
  });
}

/** One sentence per clock: its redshift against Terrestrial Time, shift and correction by name. */
export function clockCitations(prediction: Prediction, campaign: Campaign, provenance: string): Citation[] {
  return prediction.clocks.flatMap((clock) => {
    if (!clock.redshift) return [];
    const site = siteOf(campaign, clock.id);
    const correction = { value: -clock.redshift.value, u: clock.redshift.u };
    return [
      {
        path: `clocks.${clock.id}`,
        sentence: `Clock ${clock.id} runs at ${scientific(clock.redshift)} relative to Terrestrial Time by gravity (u, k = 1; W₀ = ${formatConcise(Number(W0_TT.value.toFixed(4)), null)} m²/s², L_G·c²; mean tide; ${methodOf([site])}${frameOf([site])}); the correction to its frequency is ${scientific(correction)}. ${provenance}.`,
      },
    ];
  });
}

/** One sentence per measurement: what the clocks found. */
export function measurementCitations(evaluation: Evaluation, provenance: string): Citation[] {
  return evaluation.links.flatMap((l) => {
    if (!l.residual || l.z === null) return [];
    const dW = formatConcise(l.inferred.dW.value, l.inferred.dW.u, { sign: 'always' });
    return [
      {
        path: `links.${l.id}`,
        sentence: `Measured over link ${l.id} (${l.measurement}): y = ${scientific(l.measured)} (u with systematics, k = 1; mean tide), from which ΔW = ${dW} m²/s²; predicted ${scientific(l.predicted!)}, difference ${formatConcise(l.z, null, { significant: 2, sign: 'always' })} standard uncertainties${l.verdict ? `: ${l.verdict}` : ''}. ${provenance}.`,
      },
    ];
  });
}

const siteOf = (campaign: Campaign, clock: string): Site =>
  campaign.sites.find((s) => s.id === campaign.clocks.find((k) => k.id === clock)!.site)!;

function referencesOf(campaign: Campaign, sites: readonly Site[]): string {
  const ids = new Set(
    sites.flatMap((s) => s.determinations.flatMap((d) => ('datum' in d && !d.check ? [d.datum] : []))),
  );
  if (ids.size === 0) return `ihrs ${formatConcise(W0_IHRS.value, null)} m²/s²`;
  return [...ids]
    .map((id) => {
      const own = campaign.datums.find((d) => d.id === id);
      if (own) return `${id} ${formatConcise(own.W0.value, own.W0.u)} m²/s²`;
      return id === 'ihrs' ? `ihrs ${formatConcise(W0_IHRS.value, null)} m²/s²` : id;
    })
    .join(', ');
}

const methodOf = (sites: readonly Site[]): string =>
  [...new Set(sites.flatMap((s) => s.determinations.flatMap((d) => (d.check || d.candidate ? [] : [d.kind]))))].join(
    ', ',
  ) || 'no determination';

/** Frame and epoch of the GNSS heights, where they are stated. */
function frameOf(sites: readonly Site[]): string {
  const stated = new Set(
    sites.flatMap((s) =>
      [s.h, ...s.determinations.map((d) => ('h' in d ? d.h : null))].flatMap((h) =>
        h?.frame ? [`${h.frame}${h.epochYear === undefined ? '' : `, epoch ${h.epochYear}`}`] : [],
      ),
    ),
  );
  return stated.size === 0 ? '' : `; h in ${[...stated].join(' and ')}`;
}
