import { checkTideTime, J2000_MS, type SunAndMoon, sunAndMoonOfDate } from './sun-and-moon.js';

const DAY_MS = 86_400_000;
/** Chebyshev segments of 8 days with 16 nodes: half a day apart, against lunar periods of 5 days and more. The error against
 *  {@link sunAndMoonOfDate} is below 1e-25 in the frequency offset, measured in the tests. */
const SEGMENT_DAYS = 8;
const NODES = 16;
const SERIES = 7;
/** Earth rotation, turns per day of UT1: IAU 2000 Resolution B1.8. What is left of sidereal time after it is taken out runs
 *  by 0.13″ a day and can be interpolated. */
const TURNS_PER_DAY = 1.00273781191135448;

/** cos(j·θ_k) at the Chebyshev nodes θ_k, the transform from values to coefficients. */
const TRANSFORM: readonly (readonly number[])[] = Array.from({ length: NODES }, (_, j) =>
  Array.from({ length: NODES }, (_, k) => ((j === 0 ? 1 : 2) / NODES) * Math.cos((Math.PI * j * (k + 0.5)) / NODES)),
);
const NODE_POSITIONS = Array.from({ length: NODES }, (_, k) => Math.cos((Math.PI * (k + 0.5)) / NODES));

/** Sun and Moon for many epochs and many sites: the ephemeris is computed at a few nodes and interpolated between them.
 *  Segments start at fixed dates, so an epoch's value does not depend on which other epochs were asked for. */
export class SunAndMoonTable {
  readonly #segments = new Map<number, Float64Array>();
  readonly #sum = new Float64Array(SERIES);

  /** Earth-fixed positions at UTC `timeMs` (milliseconds since 1970), m.
   * @throws {QuantityRangeError} outside 1950…2100 */
  at(timeMs: number): SunAndMoon {
    checkTideTime(timeMs);
    const days = (timeMs - J2000_MS) / DAY_MS;
    const index = Math.floor(days / SEGMENT_DAYS);
    const coefficients = this.#segment(index);
    const x = 2 * (days / SEGMENT_DAYS - index) - 1;
    const sum = this.#sum;
    // Clenshaw's recurrence for the seven series together
    for (let i = 0; i < SERIES; i++) {
      let b1 = 0;
      let b2 = 0;
      for (let j = NODES - 1; j > 0; j--) {
        const b0 = 2 * x * b1 - b2 + coefficients[j * SERIES + i]!;
        b2 = b1;
        b1 = b0;
      }
      sum[i] = x * b1 - b2 + coefficients[i]!;
    }
    const turns = days * TURNS_PER_DAY;
    const angle = 2 * Math.PI * (turns - Math.floor(turns)) + sum[6]!;
    const s = Math.sin(angle);
    const c = Math.cos(angle);
    const [mx, my, mz, sx, sy, sz] = [sum[0]!, sum[1]!, sum[2]!, sum[3]!, sum[4]!, sum[5]!];
    return { moon: [c * mx + s * my, c * my - s * mx, mz], sun: [c * sx + s * sy, c * sy - s * sx, sz] };
  }

  #segment(index: number): Float64Array {
    const known = this.#segments.get(index);
    if (known !== undefined) return known;
    const values: number[][] = NODE_POSITIONS.map((x) => {
      const days = (index + (x + 1) / 2) * SEGMENT_DAYS;
      const { moon, sun, siderealTimeRad } = sunAndMoonOfDate(J2000_MS + days * DAY_MS);
      const turns = days * TURNS_PER_DAY;
      const rest = siderealTimeRad - 2 * Math.PI * (turns - Math.floor(turns));
      return [...moon, ...sun, rest];
    });
    // the rest is only known to a whole turn: keep it on one branch over the segment
    for (const v of values) v[6] = v[6]! - 2 * Math.PI * Math.round((v[6]! - values[0]![6]!) / (2 * Math.PI));
    const coefficients = new Float64Array(NODES * SERIES);
    for (let j = 0; j < NODES; j++)
      for (let i = 0; i < SERIES; i++) {
        let c = 0;
        for (let k = 0; k < NODES; k++) c += TRANSFORM[j]![k]! * values[k]![i]!;
        coefficients[j * SERIES + i] = c;
      }
    this.#segments.set(index, coefficients);
    return coefficients;
  }
}
