import type { Campaign, Link } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import { linkPhaseNoise } from '../clocks/averaging.js';
import { intersectionOfIntervals } from '../clocks/intervals.js';
import { clocksOfLink } from '../model/model.js';
import { sizeText } from '../quantity/size.js';
import { COMPARISON_TEST, type DetectionTest, detectionFactor } from '../uncertainty/detection.js';
import { type BridgedPlan, bridgedPlan } from './plan-bridged.js';
import {
  comparisonLimit,
  floorM,
  type LinkBudget,
  linkBudget,
  type PlanLimit,
  type PlanPoint,
  planPoint,
  wallClockForLength,
} from './plan-budget.js';
import { type Met, metAt } from './plan-calendar.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';

export type { BridgedPlan, BridgedPoint } from './plan-bridged.js';
export type { PlanLimit, PlanPart, PlanPartKind, PlanPoint, PlanShares } from './plan-budget.js';
export type { Met } from './plan-calendar.js';

/** Averaging times of the curve, s: 1, 2, 5 × 10² … 10⁶ and 10⁷. */
export const PLAN_TIMES_S: readonly number[] = [
  ...[1e2, 1e3, 1e4, 1e5, 1e6].flatMap((decade) => [decade, 2 * decade, 5 * decade]),
  1e7,
];

/** The comparison over the whole window. */
export interface WindowPoint extends PlanPoint {
  /** time of common data in it, s */
  readonly data: number;
  /** what limits the comparison with the prediction: a part of uY², or geodesy */
  readonly comparisonLimit: PlanLimit | null;
}

export interface LinkPlan {
  readonly id: string;
  /** share of the time in which both clocks and the link run */
  readonly uptime: number;
  readonly uSystematic: number;
  readonly curve: readonly PlanPoint[];
  /** uH that no averaging passes: flicker, systematics and the frequency ratio, m */
  readonly floor: number;
  /** null without `window`, or for a link that never runs */
  readonly window: WindowPoint | null;
  /** wall-clock s until uH is down to `target`; null without a target or where the floor is above it */
  readonly timeToTarget: number | null;
  /** when that is; null where it never is, or without a window to start from */
  readonly targetMet: Met | null;
  /** smallest discrepancy against the prediction that the whole window shows, as length equivalent, m */
  readonly smallestDetectable: number | null;
  /** wall-clock s until `effect` is detectable; null without effect or where it never is */
  readonly timeToEffect: number | null;
  /** u of the predicted length equivalent, m; null without a prediction */
  readonly uGeodesy: number | null;
  /** with the gaps of its clocks bridged by their flywheels; null without */
  readonly bridged: BridgedPlan | null;
}

/** The answer of `plan`. */
export interface Plan {
  readonly test: DetectionTest;
  /** wanted standard uncertainty, m */
  readonly target: number | null;
  /** discrepancy that is to be revealed, m: as stated, else ten times the target */
  readonly effect: number | null;
  readonly links: readonly LinkPlan[];
  readonly warnings: readonly Warning[];
}

/** How long clocks and link must run, and what the comparison could show.
 * @throws {CampaignError} */
export const plan = (campaign: Campaign, test: DetectionTest = COMPARISON_TEST): Plan =>
  planOf(solveCampaign(campaign), test);

export function planOf(solved: SolvedCampaign, test: DetectionTest = COMPARISON_TEST): Plan {
  const { campaign, warnings } = solved.model;
  const effect = campaign.effectM ?? (campaign.targetM === null ? null : 10 * campaign.targetM);
  const links = campaign.links.map((link) => linkPlan(linkBudget(solved, link), test, effect));
  return {
    test,
    target: campaign.targetM,
    effect,
    links,
    warnings: [...warnings, ...campaign.links.flatMap((link, i) => planWarnings(solved, link, links[i]!))],
  };
}

function linkPlan(budget: LinkBudget, test: DetectionTest, effectM: number | null): LinkPlan {
  const { model, link, uptime, systematicVariance, uGeodesyM } = budget;
  const { campaign } = model;
  const { from, to } = clocksOfLink(model, link);
  const factor = detectionFactor(test);
  const windowS = campaign.window ? (campaign.window.endMs - campaign.window.startMs) / 1000 : null;
  const atWindow = windowS === null || uptime === 0 ? null : planPoint(budget, windowS);
  const timeToTarget = campaign.targetM === null ? null : wallClockForLength(budget, campaign.targetM);
  return {
    id: link.id,
    uptime,
    uSystematic: Math.sqrt(systematicVariance),
    // a link that never runs has no curve
    curve: uptime > 0 ? PLAN_TIMES_S.map((T) => planPoint(budget, T)) : [],
    floor: floorM(budget),
    window: atWindow && {
      ...atWindow,
      data: atWindow.T * uptime,
      comparisonLimit: comparisonLimit(budget, atWindow),
    },
    timeToTarget,
    targetMet: timeToTarget === null ? null : metAt(campaign, [from, to, link], uptime, timeToTarget),
    smallestDetectable: atWindow && uGeodesyM !== null ? factor * Math.hypot(atWindow.uH, uGeodesyM) : null,
    timeToEffect:
      effectM === null || uGeodesyM === null
        ? null
        : wallClockForLength(budget, lengthLeft(effectM / factor, uGeodesyM)),
    uGeodesy: uGeodesyM,
    bridged: bridgedPlan(budget, PLAN_TIMES_S),
  };
}

/** What is left of a standard uncertainty when another is taken out; NaN-free: 0 where nothing is. */
const lengthLeft = (whole: number, out: number): number => (whole > out ? Math.sqrt((whole - out) * (whole + out)) : 0);

function planWarnings({ model }: SolvedCampaign, link: Link, plan: LinkPlan): Warning[] {
  const { campaign } = model;
  const { from, to } = clocksOfLink(model, link);
  const warnings: Warning[] = [];
  if (plan.uptime === 0)
    warnings.push({
      code: 'never-runs',
      path: `links.${link.id}`,
      message: 'clocks and link have no common time: there is no plan for it.',
    });
  const stated = [from, to, link].flatMap((x) => (x.available ? [x.available] : []));
  if (stated.length > 0 && campaign.window && linkPhaseNoise(link) > 0) {
    const pieces = intersectionOfIntervals([...stated, [campaign.window]]).length;
    if (pieces > link.segments)
      warnings.push({
        code: 'segments',
        path: `links.${link.id}.segments`,
        message: `the intervals leave ${pieces} unbroken stretches, segments says ${link.segments}: each stretch brings the phase noise of its two ends, so that its part of uStat² is ${sizeText(pieces / link.segments)} times what is used. State "segments": ${pieces}.`,
      });
  }
  if (link.transported)
    warnings.push({
      code: 'transported-clock',
      path: `links.${link.id}.transported`,
      message:
        'the plan counts the systematics of both clocks whole; what cancels side by side is in plumbtick transported.',
    });
  const { bridged, window } = plan;
  if (bridged?.window && window && bridged.window.uStat > window.uStat)
    warnings.push({
      code: 'flywheel-loses',
      path: `clocks.${bridged.clocks[0]}.flywheel`,
      message: `over the window of link ${link.id} the flywheel adds more than the bridged time brings: ${sizeText(bridged.window.uStat)} instead of ${sizeText(window.uStat)} from the common time alone.`,
    });
  return warnings;
}
