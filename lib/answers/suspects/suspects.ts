import type { Campaign } from '../../campaign/campaign.js';
import { CampaignError } from '../../campaign/fault.js';
import { QuantityRangeError } from '../../earth/range-error.js';
import { comparisonOf, residualEstimate } from '../comparison.js';
import type { Estimate } from '../prediction.js';
import { type SolvedCampaign, solveCampaign } from '../solve-campaign.js';
import { endSites, frequencyMistakes } from './frequency-mistakes.js';
import { heightMistakes } from './height-mistakes.js';
import { type Mistake, sitesBehind } from './mistake.js';
import { tieMistakes } from './tie-mistakes.js';

/** A single mistake held against a residual. */
export interface Suspect {
  readonly code: string;
  /** path of what would be wrong */
  readonly path: string;
  readonly mistake: string;
  readonly lookAt: string;
  /** the part of the residual that the mistake would have made, as a fraction of frequency */
  readonly explains: Estimate;
  /** (residual without the mistake)/u: within ±2 the mistake explains size and sign */
  readonly z: number;
  /** |z| ≤ 2 */
  readonly fits: boolean;
}

/** Single mistakes that would explain a residual, best first. Each is taken out of the campaign and the whole model run again,
 *  so its size and sign are this campaign's own. Ranked by how probable the residual is under each: z² + 2·ln u, which costs
 *  a mistake of uncertain size what its vagueness is worth.
 *  Those that change the residual by less than a tenth of its u are left out: they explain nothing.
 * @returns every mistake tried that would matter; none fitting means that no single one of them will do */
export function suspectsOf(solved: SolvedCampaign, measurement: number): Suspect[] {
  const { campaign } = solved.model;
  const comparison = comparisonOf(solved, measurement);
  const residual = residualEstimate(solved, comparison);
  if (!residual || residual.u === 0) return [];
  const ends = endSites(solved, comparison);
  const { link } = comparison.offset;
  const mistakes = [
    ...frequencyMistakes(solved, comparison),
    ...tieMistakes(
      campaign,
      campaign.clocks.filter((k) => k.id === link.from || k.id === link.to),
    ),
    ...heightMistakes(campaign, sitesBehind(campaign, ends)),
  ];
  return mistakes
    .flatMap((m) => {
      const without = residualWithout(m, measurement);
      if (!without) return [];
      const explained = residual.value - without.value;
      const uWithout = Math.hypot(without.u, m.uOffset);
      if (Math.abs(explained) < 0.1 * residual.u && m.code !== 'systematic-not-included') return [];
      const z = without.value / uWithout;
      return [{ m, explained, z, score: z * z + 2 * Math.log(uWithout / residual.u) }];
    })
    .sort((a, b) => a.score - b.score)
    .map(({ m, explained, z }) => ({
      code: m.code,
      path: m.path,
      mistake: m.mistake,
      lookAt: m.lookAt,
      explains: { value: explained, u: m.uOffset },
      z,
      fits: Math.abs(z) <= 2,
    }));
}

/** Residual of the campaign with the mistake taken out; null where that campaign cannot be solved. */
function residualWithout({ corrected }: Mistake, measurement: number): Estimate | null {
  const solved = trySolve(corrected);
  return solved && residualEstimate(solved, comparisonOf(solved, measurement));
}

/** A correction can make the campaign contradict itself or leave the Earth; then it is no explanation. */
function trySolve(campaign: Campaign): SolvedCampaign | null {
  try {
    return solveCampaign(campaign);
  } catch (e) {
    if (e instanceof CampaignError || e instanceof QuantityRangeError) return null;
    throw e;
  }
}

/** One line for people: what fits, or that nothing does. */
export function suspectsSentence(suspects: readonly Suspect[]): string {
  const fitting = suspects.filter((s) => s.fits);
  const [first] = fitting;
  if (!first) return 'No single mistake that was tried fits in size and sign.';
  if (fitting.length === 1) return `One mistake fits in size and sign: ${first.path}: ${first.mistake}.`;
  return `${fitting.length} mistakes fit in size and sign, ${first.path} (${first.mistake}) best.`;
}
