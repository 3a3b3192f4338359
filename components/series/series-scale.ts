import { multiples, roundStep } from '../charts/round-step.js';

/** Values to px along one axis. */
export type ToPx = (value: number) => number;

export const linear =
  (from: number, to: number, fromPx: number, toPx: number): ToPx =>
  (value) =>
    fromPx + ((toPx - fromPx) * (value - from)) / (to - from);

export const logarithmic =
  (from: number, to: number, fromPx: number, toPx: number): ToPx =>
  (value) =>
    fromPx + ((toPx - fromPx) * Math.log(value / from)) / Math.log(to / from);

/** Whole powers of ten inside a range. */
export function decades(from: number, to: number): number[] {
  const first = Math.ceil(Math.log10(from) - 1e-9);
  const last = Math.floor(Math.log10(to) + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => Number(`1e${first + i}`));
}

const MINUTE = 60;
const HOUR = 3600;
const DAY = 86_400;
const STEPS = [1, 10, MINUTE, 10 * MINUTE, 30 * MINUTE, HOUR, 3 * HOUR, 6 * HOUR, 12 * HOUR, DAY, 2 * DAY, 5 * DAY];
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'June', 'July', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** Ticks of a time axis, s on the axis of the series, with their labels: dates in UTC, or seconds where there are none. */
export function timeTicks(
  fromS: number,
  toS: number,
  originMs: number | null,
  most: number,
): readonly { readonly atS: number; readonly label: string }[] {
  const least = (toS - fromS) / most;
  if (originMs === null) {
    return multiples(roundStep(least), fromS, toS).map((atS) => ({ atS, label: String(Number(atS.toPrecision(6))) }));
  }
  const step = STEPS.find((s) => s >= least) ?? DAY * roundStep(least / DAY);
  const origin = originMs / 1000;
  return multiples(step, origin + fromS, origin + toS).map((utcS) => ({
    atS: utcS - origin,
    label: dateLabel(utcS, step),
  }));
}

function dateLabel(utcS: number, step: number): string {
  const date = new Date(Math.round(utcS * 1000));
  if (utcS % DAY === 0 || step >= DAY) return `${date.getUTCDate()} ${MONTHS[date.getUTCMonth()]}`;
  return date.toISOString().slice(11, step < MINUTE ? 19 : 16);
}
