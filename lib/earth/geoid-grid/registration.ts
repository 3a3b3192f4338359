import { CampaignError, type Warning } from '../../campaign/fault.js';
import type { Registration } from './geoid-grid.js';

/** A number of a header and half of its last printed digit. */
export interface PrintedNumber {
  readonly value: number;
  readonly halfDigit: number;
}

/** One axis of a grid as its header describes it, degrees. */
export interface PrintedAxis {
  readonly name: 'lat' | 'lon';
  readonly min: PrintedNumber;
  readonly max: PrintedNumber;
  readonly delta: PrintedNumber;
  readonly count: number;
}

interface AxisFit {
  /** max − min is the right number of steps within the printed digits */
  readonly fits: boolean;
  /** … with the step taken as exact */
  readonly exact: boolean;
  /** the step that follows is a whole number of arc-seconds */
  readonly round: boolean;
  readonly stepDeg: number;
}

function fitAxis({ min, max, delta, count }: PrintedAxis, registration: Registration): AxisFit {
  const steps = registration === 'nodes' ? count - 1 : count;
  const extent = max.value - min.value;
  const boundsDigit = min.halfDigit + max.halfDigit + 1e-9;
  const miss = Math.abs(extent - steps * delta.value);
  const stepDeg = extent / steps;
  const arcSeconds = stepDeg * 3600;
  return {
    fits: miss <= boundsDigit + steps * delta.halfDigit,
    exact: miss <= boundsDigit,
    round: Math.abs(arcSeconds - Math.round(arcSeconds)) <= (3600 * boundsDigit) / steps && Math.round(arcSeconds) > 0,
    stepDeg,
  };
}

/** Number of rows or columns that bounds and step give, as text. */
const countAs = ({ min, max, delta }: PrintedAxis, registration: Registration): string =>
  Number(((max.value - min.value) / delta.value + (registration === 'nodes' ? 1 : 0)).toFixed(3)).toString();

const describe = (axis: PrintedAxis): string =>
  `${axis.name} ${axis.min.value} … ${axis.max.value} by ${axis.delta.value}: ${countAs(axis, 'nodes')} ${axis.name === 'lat' ? 'rows' : 'columns'} if these are nodes, ${countAs(axis, 'edges')} if cell edges; the header says ${axis.count}`;

/** Whether a header's bounds are nodes or cell edges: both are worked out from bounds, step and count, and one is taken only if both
 *  axes fit it. A step printed with few digits can fit both ways (37° by 0.0167° is 2219 or 2220 steps); then the one wins whose
 *  step is a whole number of arc-seconds, or equals the printed one, else what the format's description says, with a warning.
 * @throws {CampaignError} `registration`: neither way fits both axes */
export function findRegistration(
  latitude: PrintedAxis,
  longitude: PrintedAxis,
  byDefinition: Registration,
): {
  readonly registration: Registration;
  readonly latitudeStepDeg: number;
  readonly longitudeStepDeg: number;
  readonly reason: string;
  readonly warnings: readonly Warning[];
} {
  const reason = `${describe(latitude)}; ${describe(longitude)}`;
  const candidates = (['nodes', 'edges'] as const)
    .map((registration) => {
      const lat = fitAxis(latitude, registration);
      const lon = fitAxis(longitude, registration);
      const both = (key: 'fits' | 'exact' | 'round') => lat[key] && lon[key];
      const score = (both('round') ? 2 : 0) + (both('exact') ? 1 : 0);
      return { registration, lat, lon, fits: both('fits'), score: score * 2 + (registration === byDefinition ? 1 : 0) };
    })
    .filter((c) => c.fits)
    .sort((a, b) => b.score - a.score);
  const [best, other] = candidates;
  if (!best)
    throw new CampaignError([
      {
        code: 'registration',
        path: 'header',
        line: null,
        column: null,
        found: reason,
        expected:
          'bounds, step and size that agree, as nodes or as cell edges, in both directions: else the nodes may lie half a cell off',
      },
    ]);
  const warnings: Warning[] = [];
  // a whole and exact step against one that is neither leaves no doubt
  if (other && !(best.score >= 6 && other.score < 2))
    warnings.push({
      code: 'registration-doubtful',
      path: 'header',
      message: `the step is printed with so few digits that the bounds fit both as nodes and as cell edges; taken as ${best.registration}. If that is wrong, every node lies half a cell off: ${((Math.abs(best.lat.stepDeg) / 2) * 111.2).toPrecision(2)} km. ${reason}.`,
    });
  return {
    registration: best.registration,
    latitudeStepDeg: best.lat.stepDeg,
    longitudeStepDeg: best.lon.stepDeg,
    reason,
    warnings,
  };
}
