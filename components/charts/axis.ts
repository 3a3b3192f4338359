/** Maps values to px along one axis. */
export interface AxisScale {
  readonly from: number;
  readonly to: number;
  /** px of a value; outside the range it lies outside the axis */
  at(value: number): number;
}

/** A logarithmic axis. @param from, to values > 0 at the px given */
export function logAxis(from: number, to: number, fromPx: number, toPx: number): AxisScale {
  const perDecade = (toPx - fromPx) / Math.log10(to / from);
  return { from, to, at: (value) => fromPx + perDecade * Math.log10(value / from) };
}

/** A linear axis. */
export function linearAxis(from: number, to: number, fromPx: number, toPx: number): AxisScale {
  const perUnit = (toPx - fromPx) / (to - from);
  return { from, to, at: (value) => fromPx + perUnit * (value - from) };
}

/** Powers of ten times `mantissas` from `from` to `to`, both included. */
export function logTicks(from: number, to: number, mantissas: readonly number[]): number[] {
  const ticks: number[] = [];
  for (let power = Math.floor(Math.log10(from)); power <= Math.ceil(Math.log10(to)); power++)
    for (const mantissa of mantissas) {
      const value = Number(`${mantissa}e${power}`);
      if (value >= from * (1 - 1e-9) && value <= to * (1 + 1e-9)) ticks.push(value);
    }
  return ticks;
}

/** 1 and 3 of each decade. */
export const ONE_THREE = [1, 3] as const;
/** What lies between the decades. */
export const BETWEEN = [2, 3, 4, 5, 6, 7, 8, 9] as const;

/** The largest 1 or 3 × 10ⁿ that is at most a value > 0. */
export function downToOneThree(value: number): number {
  const ticks = logTicks(value / 20, value, ONE_THREE);
  return ticks.at(-1)!;
}

/** The smallest 1 or 3 × 10ⁿ that is at least a value > 0. */
export const upToOneThree = (value: number): number => logTicks(value, value * 20, ONE_THREE)[0]!;

/** A tick as its label: `0.01`, `30`, `10 000` without its gap. */
export const tickLabel = (value: number): string => String(Number(value.toPrecision(3)));

/** A curve as an SVG path; null points break it. */
export function pathOf(points: readonly (readonly [x: number, y: number] | null)[]): string {
  let d = '';
  let open = false;
  for (const point of points) {
    if (point === null) open = false;
    else {
      d += `${open ? 'L' : 'M'}${point[0].toFixed(1)} ${point[1].toFixed(1)}`;
      open = true;
    }
  }
  return d;
}

/** Runs of points inside [top, bottom] px, each with the place where it enters and leaves: a line cut at the frame. */
export function cutToFrame(
  points: readonly (readonly [x: number, y: number])[],
  top: number,
  bottom: number,
): (readonly [number, number] | null)[] {
  const inside = ([, y]: readonly [number, number]) => y >= top && y <= bottom;
  const cut: (readonly [number, number] | null)[] = [];
  points.forEach((p, i) => {
    const last = points[i - 1];
    if (last !== undefined && inside(last) !== inside(p)) {
      const edge = (inside(last) ? p : last)[1] < top ? top : bottom;
      const t = (edge - last[1]) / (p[1] - last[1]);
      cut.push([last[0] + t * (p[0] - last[0]), edge]);
      if (inside(last)) cut.push(null);
    }
    if (inside(p)) cut.push(p);
  });
  return cut;
}
