const HOUR_MS = 3_600_000;
const DAY_MS = 86_400_000;
/** Steps of a time axis, in hours; months beyond. */
const STEPS_H = [1, 3, 6, 12, 24, 48, 120, 240];
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

export interface TimeTick {
  readonly ms: number;
  /** null: a tick without a label */
  readonly label: string | null;
}

const two = (n: number) => String(n).padStart(2, '0');
const monthOf = (ms: number) => MONTHS[new Date(ms).getUTCMonth()]!;

/** Ticks of a stretch of time, UTC, at least `apartPx` apart; the month is named where it begins.
 * @param pxPerMs scale of the axis */
export function timeTicks(startMs: number, endMs: number, pxPerMs: number, apartPx: number): readonly TimeTick[] {
  const step = STEPS_H.map((hours) => hours * HOUR_MS).find((ms) => ms * pxPerMs >= apartPx);
  if (step === undefined) return monthTicks(startMs, endMs, pxPerMs, apartPx);
  const ticks: TimeTick[] = [];
  // steps of several days are counted from the first of each month, so that they fall on the same days
  for (let day = startOfDay(startMs); day <= endMs; day += DAY_MS) {
    const date = new Date(day).getUTCDate();
    if (step >= DAY_MS) {
      const every = step / DAY_MS;
      const fits = (date - 1) % every === 0 && date <= 31 - every / 2;
      if (day >= startMs && fits) ticks.push({ ms: day, label: date === 1 ? monthOf(day).slice(0, 3) : String(date) });
    } else
      for (let ms = day; ms < day + DAY_MS && ms <= endMs; ms += step)
        if (ms >= startMs)
          ticks.push({
            ms,
            label: ms === day ? `${date} ${monthOf(ms).slice(0, 3)}` : `${two(new Date(ms).getUTCHours())} h`,
          });
  }
  return ticks;
}

const startOfDay = (ms: number): number => Math.floor(ms / DAY_MS) * DAY_MS;

function monthTicks(startMs: number, endMs: number, pxPerMs: number, apartPx: number): readonly TimeTick[] {
  const every = [1, 2, 3, 6, 12, 24, 60, 120].find((months) => months * 30.4 * DAY_MS * pxPerMs >= apartPx) ?? 240;
  const first = new Date(startMs);
  const ticks: TimeTick[] = [];
  for (let month = 0; ; month++) {
    const ms = Date.UTC(first.getUTCFullYear(), month);
    if (ms > endMs) return ticks;
    if (ms < startMs || month % every !== 0) continue;
    const year = new Date(ms).getUTCFullYear();
    ticks.push({ ms, label: month % 12 === 0 ? String(year) : monthOf(ms).slice(0, 3) });
  }
}

/** The stretch in words, for below the axis: `September 2027, UTC`. */
export function timeTitle(startMs: number, endMs: number): string {
  const [from, to] = [new Date(startMs), new Date(endMs - 1)];
  const years = [from.getUTCFullYear(), to.getUTCFullYear()];
  const months = [monthOf(startMs), monthOf(endMs - 1)];
  if (years[0] !== years[1]) return `${months[0]} ${years[0]} to ${months[1]} ${years[1]}, UTC`;
  return months[0] === months[1] ? `${months[0]} ${years[0]}, UTC` : `${months[0]} to ${months[1]} ${years[0]}, UTC`;
}

/** An instant to the minute: `2027-09-08 14:20 UTC`. */
export const instantText = (ms: number): string =>
  `${new Date(ms).toISOString().slice(0, 16).replace('T', ' ')}\u00a0UTC`;
