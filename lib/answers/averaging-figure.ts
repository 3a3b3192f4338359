import type { Campaign } from '../campaign/campaign.js';
import { statisticalVariance } from '../clocks/averaging.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { type LinkPlan, type Plan, type PlanPart, planOf } from './plan.js';
import { type LinkBudget, linkBudget, planPoint } from './plan-budget.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';

/** A point of a curve that is drawn: lengths in m. */
export interface AveragingPoint {
  readonly T: number;
  readonly uH: number;
  /** statistics alone */
  readonly uStatH: number;
}

/** A stretch of averaging time in which one part is the largest. */
export interface LimitStretch {
  readonly fromS: number;
  readonly toS: number;
  readonly part: PlanPart;
}

/** A link as the averaging figure shows it. */
export interface AveragingLink {
  readonly plan: LinkPlan;
  readonly points: readonly AveragingPoint[];
  /** what limits it, along the time; worked out when asked for, since a figure shows one link's */
  limits(): readonly LimitStretch[];
  /** fraction of frequency per metre of length equivalent, ḡ/c², m⁻¹ */
  readonly yPerM: number;
}

export interface AveragingFigure {
  readonly plan: Plan;
  /** range of averaging times, s */
  readonly fromS: number;
  readonly toS: number;
  readonly links: readonly AveragingLink[];
}

const DAY_S = 86_400;
/** A curve is drawn by so many points a decade. */
const POINTS_PER_DECADE = 30;

/** Everything the averaging figure draws: curves of all links from a hundredth of a day on to the decade that holds window and
 *  targets, and what limits each.
 * @throws {CampaignError} */
export const averagingFigure = (campaign: Campaign): AveragingFigure => averagingFigureOf(solveCampaign(campaign));

export function averagingFigureOf(solved: SolvedCampaign): AveragingFigure {
  const plan = planOf(solved);
  const { window, links } = solved.model.campaign;
  const times = [
    window ? (window.endMs - window.startMs) / 1000 : 0,
    ...plan.links.map(({ timeToTarget }) => timeToTarget ?? 0),
  ].filter((t) => t < 1e5 * DAY_S);
  const fromS = 0.01 * DAY_S;
  const toS = DAY_S * Math.max(100, 10 ** Math.ceil(Math.log10(Math.max(...times, DAY_S) / DAY_S)));
  return {
    plan,
    fromS,
    toS,
    links: links.map((link, i) => {
      const budget = linkBudget(solved, link);
      const yPerM = budget.gravityMs2 / SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
      const empty = budget.uptime === 0;
      return {
        plan: plan.links[i]!,
        points: empty ? [] : pointsOf(budget, fromS, toS, yPerM),
        limits: () => (empty ? [] : limitsOf(budget, fromS, toS)),
        yPerM,
      };
    }),
  };
}

function pointsOf(budget: LinkBudget, fromS: number, toS: number, yPerM: number): AveragingPoint[] {
  const count = Math.ceil(Math.log10(toS / fromS) * POINTS_PER_DECADE);
  return Array.from({ length: count + 1 }, (_, i) => {
    const T = fromS * (toS / fromS) ** (i / count);
    const statistical = statisticalVariance(budget.noise, T * budget.uptime);
    const uY = Math.sqrt(statistical + budget.systematicVariance);
    return { T, uH: uY / yPerM, uStatH: Math.sqrt(statistical) / yPerM };
  });
}

/** Stretches by the largest part, their ends to a thousandth. */
function limitsOf(budget: LinkBudget, fromS: number, toS: number): LimitStretch[] {
  const at = (T: number) => planPoint(budget, T).limit;
  const same = (a: PlanPart | null, b: PlanPart | null) => a?.kind === b?.kind && a?.of === b?.of;
  const stretches: LimitStretch[] = [];
  const count = Math.ceil(Math.log10(toS / fromS) * POINTS_PER_DECADE);
  let start = fromS;
  let part = at(fromS);
  const close = (end: number) => {
    if (part) stretches.push({ fromS: start, toS: end, part: { kind: part.kind, of: part.of } });
  };
  let last = fromS;
  for (let i = 1; i <= count; i++) {
    const T = fromS * (toS / fromS) ** (i / count);
    const next = at(T);
    if (!same(next, part)) {
      let [low, high] = [last, T];
      while (high / low > 1.001) {
        const middle = Math.sqrt(low * high);
        if (same(at(middle), part)) low = middle;
        else high = middle;
      }
      close(high);
      start = high;
      part = next;
    }
    last = T;
  }
  close(toS);
  return stretches;
}
