import type { LinkPlan, Plan, PlanPart } from '../answers/plan.js';
import type { Campaign } from '../campaign/campaign.js';
import { formatLength } from '../quantity/index.js';
import { sizeText } from './numbers.js';

/** A part of a comparison's uncertainty in words: "white noise of r1", "phase noise of link hr", "offset of 171Yb". */
export function partText({ kind, of }: PlanPart, campaign: Campaign): string {
  const name = campaign.links.some(({ id }) => id === of) ? `link ${of}` : of;
  switch (kind) {
    case 'white':
      return `white noise of ${name}`;
    case 'flicker':
      return `flicker of ${name}`;
    case 'phase':
      return `phase noise of ${name}`;
    case 'dead-time':
      return `dead time of ${name}`;
    case 'systematic':
      return `systematic of ${name}`;
    case 'ratio':
      return `offset of ${of}`;
    case 'geodesy':
      return 'geodesy';
  }
}

/** A duration on the wall, to two digits: `0.81 d`, `7 h`, `never`. */
export function wallText(seconds: number | null): string {
  if (seconds === null) return 'never';
  if (seconds === 0) return 'at once';
  const [size, unit] =
    seconds >= 0.1 * 86_400 ? [86_400, 'd'] : seconds >= 3600 ? [3600, 'h'] : seconds >= 60 ? [60, 'min'] : [1, 's'];
  return `${sizeText(seconds / size)}\u00a0${unit}`;
}

/** A day of the calendar from an instant: `2 June 2027`. */
export function dayText(instant: string): string {
  const [year, month, day] = instant.slice(0, 10).split('-');
  return `${Number(day)} ${MONTHS[Number(month) - 1]} ${year}`;
}

const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

/** What stands in the way of a target that is never reached: the largest part of the floor. */
export const floorLimit = ({ curve }: LinkPlan): PlanPart | null => curve.at(-1)?.limit ?? null;

/** One link in one or two sentences: when the target is met, and what limits the window. */
export function linkSentence(link: LinkPlan, plan: Plan, campaign: Campaign): string {
  const { window, timeToTarget, targetMet, floor } = link;
  if (link.uptime === 0) return `Link ${link.id} never runs: its clocks and the link have no common time.`;
  const limit = window?.limit ? `; ${partText(window.limit, campaign)} limits what the window gives` : '';
  const wanted = plan.target === null ? null : formatLength(plan.target);
  if (wanted === null) {
    if (!window) return `Link ${link.id}: without a target and a window there is only its curve.`;
    return `Link ${link.id} gives ${formatLength(window.uH, 2)} over the window${limit}.`;
  }
  if (timeToTarget === null) {
    const why = floorLimit(link);
    return `Link ${link.id} never reaches ${wanted}: its floor is ${formatLength(floor, 2)}${why ? `, and ${partText(why, campaign)} is the largest part of it` : ''}.`;
  }
  const day = targetMet ? `, on ${dayText(targetMet.at)}` : '';
  const late = targetMet && !targetMet.inWindow ? ', after the window has ended' : '';
  return `Link ${link.id} reaches ${wanted} after ${wallText(timeToTarget)}${day}${late}${limit}.`;
}

/** What the window could show of a discrepancy. */
export function detectionSentence(link: LinkPlan, plan: Plan): string | null {
  const { smallestDetectable, uGeodesy, window } = link;
  if (smallestDetectable === null || uGeodesy === null || !window) return null;
  const shown = `A discrepancy of ${formatLength(smallestDetectable, 2)} against the prediction would show`;
  const share = uGeodesy > window.uH ? ', and geodesy has the larger part of that' : '';
  if (plan.effect === null) return `${shown}${share}.`;
  const enough = smallestDetectable <= plan.effect;
  return `${shown}${share}; the effect asked about is ${formatLength(plan.effect, 2)}${enough ? '' : ' and would not'}.`;
}
