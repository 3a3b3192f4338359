import type { GeodeticPosition } from '../../lib/earth/geodesic-distance.js';
import { radToDeg } from '../../lib/quantity/radians.js';

/** What part of the Earth is drawn: meridians and parallels as straight lines, true to scale along the middle parallel and along
 *  every meridian (plate carrée with a standard parallel). */
export interface MapView {
  /** degrees */
  readonly latitude: number;
  readonly longitude: number;
  /** px per degree along a meridian */
  readonly pxPerDegree: number;
}

export interface MapFrame {
  readonly width: number;
  readonly height: number;
  /** standard parallel, degrees */
  readonly parallel: number;
}

const RAD = Math.PI / 180;
/** −180 … 180 */
export const wrapped = (degrees: number): number => ((((degrees + 180) % 360) + 360) % 360) - 180;

/** Degrees to px inside the frame. */
export class MapProjection {
  readonly #shrink: number;
  constructor(
    readonly view: MapView,
    readonly frame: MapFrame,
  ) {
    this.#shrink = Math.cos(frame.parallel * RAD);
  }

  /** px per degree along a parallel */
  get pxPerDegreeEast(): number {
    return this.view.pxPerDegree * this.#shrink;
  }

  /** Longitudes are taken as they are, on or off the map: see {@link near}. */
  toPx(latitude: number, longitude: number): readonly [x: number, y: number] {
    const { view, frame } = this;
    return [
      frame.width / 2 + (longitude - view.longitude) * this.pxPerDegreeEast,
      frame.height / 2 - (latitude - view.latitude) * view.pxPerDegree,
    ];
  }

  /** The longitude of the same place that lies nearest to the middle of the map. */
  near(longitude: number): number {
    return this.view.longitude + wrapped(longitude - this.view.longitude);
  }

  place(position: GeodeticPosition): readonly [x: number, y: number] {
    return this.toPx(radToDeg(position.latitudeRad), this.near(radToDeg(position.longitudeRad)));
  }

  /** A line whose longitudes run on without a jump, begun at the copy nearest to the middle. */
  line(points: readonly GeodeticPosition[]): readonly (readonly [x: number, y: number])[] {
    const [first] = points;
    if (!first) return [];
    const start = radToDeg(first.longitudeRad);
    const shift = this.near(start) - start;
    return points.map((p) => this.toPx(radToDeg(p.latitudeRad), radToDeg(p.longitudeRad) + shift));
  }

  /** Longitude at x, running on beyond ±180. */
  toDegreesUnwrapped(x: number): number {
    return this.view.longitude + (x - this.frame.width / 2) / this.pxPerDegreeEast;
  }

  toDegrees(x: number, y: number): { readonly latitude: number; readonly longitude: number } {
    const { view, frame } = this;
    return {
      latitude: Math.min(90, Math.max(-90, view.latitude - (y - frame.height / 2) / view.pxPerDegree)),
      longitude: wrapped(this.toDegreesUnwrapped(x)),
    };
  }
}

/** The view moved so that the map ends at the poles. */
export function clamped(view: MapView, { height }: { readonly height: number }): MapView {
  const pxPerDegree = Math.max(view.pxPerDegree, height / 180);
  const most = 90 - height / 2 / pxPerDegree;
  return { ...view, pxPerDegree, latitude: Math.min(most, Math.max(-most, view.latitude)) };
}

/** Narrowest part of the Earth that is shown, degrees of latitude: the coast says nothing on less. */
const LEAST_DEG = 0.25;
const AIR = 0.62;

/** Middle, standard parallel and scale that show all places with air round them.
 * @param places degrees; at least one */
export function fitted(
  places: readonly { readonly latitude: number; readonly longitude: number }[],
  { width, height }: { readonly width: number; readonly height: number },
): { readonly view: MapView; readonly parallel: number } {
  const latitudes = places.map(({ latitude }) => latitude);
  const [south, north] = [Math.min(...latitudes), Math.max(...latitudes)];
  const latitude = (south + north) / 2;
  const { middle, span } = longitudes(places.map(({ longitude }) => longitude));
  // meridians meet at the poles: nearer than this the map would be all stretched
  const parallel = Math.max(-75, Math.min(75, latitude));
  const shrink = Math.cos(parallel * RAD);
  const high = Math.max(north - south, LEAST_DEG);
  const wide = Math.max(span * shrink, LEAST_DEG);
  const pxPerDegree = AIR * Math.min(height / high, width / wide);
  return { view: clamped({ latitude, longitude: middle, pxPerDegree }, { height }), parallel };
}

/** Middle and span of longitudes, the widest empty stretch of the circle left out. */
function longitudes(degrees: readonly number[]): { readonly middle: number; readonly span: number } {
  const sorted = degrees.map(wrapped).sort((a, b) => a - b);
  const gaps = sorted.map((from, i) => ({ from, gap: (sorted[i + 1] ?? sorted[0]! + 360) - from }));
  const widest = gaps.reduce((one, other) => (other.gap > one.gap ? other : one));
  const span = 360 - widest.gap;
  return { middle: wrapped(widest.from + widest.gap + span / 2), span };
}

const STEPS = [0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2, 5, 10, 15, 30];

/** Degrees between two lines of the grid, at least `apartPx` apart. */
export const gridStep = (pxPerDegree: number, apartPx: number): number =>
  STEPS.find((step) => step * pxPerDegree >= apartPx) ?? 30;
