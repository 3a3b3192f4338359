import type { GeocentricPosition } from '../geocentric.js';
import { QuantityRangeError } from '../range-error.js';
import {
  type FourteenParameters,
  transformBackward,
  transformForward,
  type Vector,
  velocityChangeMPerYear,
} from './fourteen-parameters.js';
import type { FrameName } from './frame-name.js';
import { PUBLISHED_TRANSFORMATIONS } from './published-transformations.js';

/** One step of a route between two frames: a published set, used in or against its sense. */
export interface FrameStep {
  readonly from: FrameName;
  readonly to: FrameName;
  readonly parameters: FourteenParameters;
  readonly forward: boolean;
  readonly source: string;
}

function published(from: FrameName, to: FrameName): FrameStep | null {
  for (const t of PUBLISHED_TRANSFORMATIONS) {
    if (t.from === from && t.to === to) return { from, to, parameters: t.parameters, forward: true, source: t.source };
    if (t.from === to && t.to === from) return { from, to, parameters: t.parameters, forward: false, source: t.source };
  }
  return null;
}

/** The steps from one frame to another: none for the same, one where the pair is published, else two through ITRF2014. */
export function frameRoute(from: FrameName, to: FrameName): readonly FrameStep[] {
  if (from === to) return [];
  const direct = published(from, to);
  if (direct !== null) return [direct];
  const first = published(from, 'ITRF2014');
  const second = published('ITRF2014', to);
  if (first === null || second === null) throw new Error(`no published transformation from ${from} to ${to}`);
  return [first, second];
}

/** Position in another frame at the same instant: what changes is the description, not the point.
 * @param epochYear decimal year to which the position refers, 1980…2100 (the parameters drift by up to 2 mm a year)
 * @throws {QuantityRangeError} outside those years */
export function transformPosition(
  position: GeocentricPosition,
  from: FrameName,
  to: FrameName,
  epochYear: number,
): GeocentricPosition {
  checkEpoch(epochYear);
  return frameRoute(from, to).reduce(
    (p, step) =>
      step.forward ? transformForward(step.parameters, p, epochYear) : transformBackward(step.parameters, p, epochYear),
    position,
  );
}

/** Velocity in `to` minus velocity in `from` of one point, m/a in geocentric axes. */
export function velocityBetweenFramesMPerYear(position: GeocentricPosition, from: FrameName, to: FrameName): Vector {
  let sum: Vector = [0, 0, 0];
  for (const step of frameRoute(from, to)) {
    const v = velocityChangeMPerYear(step.parameters, position);
    const sign = step.forward ? 1 : -1;
    sum = [sum[0] + sign * v[0], sum[1] + sign * v[1], sum[2] + sign * v[2]];
  }
  return sum;
}

export function checkEpoch(epochYear: number): void {
  if (!(epochYear >= 1980 && epochYear <= 2100))
    throw new QuantityRangeError('epochYear', epochYear, 'a decimal year from 1980 to 2100');
}
