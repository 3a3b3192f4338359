import type { Campaign, Link } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import { comparisonNoise, effectiveTimeForVariance, statisticalVariance } from '../clocks/averaging.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { systematicGradient, transitionOffset } from '../model/frequency-comparison.js';
import { jointUptime } from '../model/joint-uptime.js';
import { clocksOfLink, siteIndexOfClock } from '../model/model.js';
import { COMPARISON_TEST, DETECTION_FACTOR, type DetectionTest } from '../uncertainty/detection.js';
import { combineGradients } from '../uncertainty/gradient.js';
import { estimateOf, meanGravity } from './quantities.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** Averaging times of the curve, s: 1, 2, 5 × 10² … 10⁶ and 10⁷. */
export const PLAN_TIMES_S: readonly number[] = [
  ...[1e2, 1e3, 1e4, 1e5, 1e6].flatMap((decade) => [decade, 2 * decade, 5 * decade]),
  1e7,
];

/** Uncertainty of one comparison after a wall-clock time. */
export interface PlanPoint {
  /** wall-clock time, s */
  readonly T: number;
  /** statistics alone, as a fraction of frequency */
  readonly uStat: number;
  /** with systematics and the frequency ratio */
  readonly uY: number;
  /** uY as length equivalent, m */
  readonly uH: number;
}

export interface LinkPlan {
  readonly id: string;
  /** share of the time in which both clocks and the link run */
  readonly uptime: number;
  readonly uSystematic: number;
  readonly curve: readonly PlanPoint[];
  /** wall-clock s until uH is down to `target`; null without a target or where the floor is above it */
  readonly timeToTarget: number | null;
  /** smallest discrepancy against the prediction that the whole window shows, as length equivalent, m */
  readonly smallestDetectable: number | null;
}

/** The answer of `plan`. */
export interface Plan {
  readonly test: DetectionTest;
  readonly links: readonly LinkPlan[];
  readonly warnings: readonly Warning[];
}

/** How long clocks and link must run, and what the comparison could show.
 * @throws {CampaignError} */
export const plan = (campaign: Campaign): Plan => planOf(solveCampaign(campaign));

export function planOf(solved: SolvedCampaign): Plan {
  const { campaign } = solved.model;
  return {
    test: COMPARISON_TEST,
    links: campaign.links.map((link) => linkPlan(solved, link)),
    warnings: solved.model.warnings,
  };
}

function linkPlan(solved: SolvedCampaign, link: Link): LinkPlan {
  const { model } = solved;
  const { campaign } = model;
  const { from, to } = clocksOfLink(model, link);
  const noise = comparisonNoise(from, to, link);
  const uptime = jointUptime(campaign, from, to, link);
  const g = meanGravity(model, siteIndexOfClock(model, from), siteIndexOfClock(model, to)).value;
  const systematicVariance = model.covariance.variance(
    combineGradients([
      [1, systematicGradient(model, link)],
      [1, transitionOffset(model, link).gradient],
    ]),
  );
  const at = (T: number): PlanPoint => {
    const statistical = statisticalVariance(noise, T * uptime);
    const uY = Math.sqrt(statistical + systematicVariance);
    return { T, uStat: Math.sqrt(statistical), uY, uH: (uY * C2) / g };
  };
  const windowS = campaign.window ? (campaign.window.endMs - campaign.window.startMs) / 1000 : null;
  const dH = solved.links[campaign.links.indexOf(link)]?.dH;
  return {
    id: link.id,
    uptime,
    uSystematic: Math.sqrt(systematicVariance),
    // a link that never runs has no curve
    curve: uptime > 0 ? PLAN_TIMES_S.map(at) : [],
    timeToTarget:
      campaign.targetM === null || uptime === 0
        ? null
        : scaledOrNull(
            effectiveTimeForVariance(noise, ((campaign.targetM * g) / C2) ** 2 - systematicVariance),
            1 / uptime,
          ),
    smallestDetectable:
      windowS === null || !dH || uptime === 0
        ? null
        : DETECTION_FACTOR * Math.hypot(at(windowS).uH, estimateOf(model.covariance, dH).u),
  };
}

const scaledOrNull = (x: number | null, factor: number): number | null => (x === null ? null : x * factor);
