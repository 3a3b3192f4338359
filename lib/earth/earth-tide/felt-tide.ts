import type { Radians } from '../../quantity/radians.js';
import type { LoveNumbers } from '../permanent-tide.js';
import { fundamentalArguments } from './astronomical-arguments.js';
import { type OceanLoadingConstituent, oceanLoadingM2s2 } from './ocean-loading.js';
import { type PolePosition, poleAt, poleTideM2s2 } from './pole-tide.js';
import { solidEarthTideM2s2, tideSite } from './solid-earth-tide.js';
import { SunAndMoonTable } from './sun-and-moon-table.js';

/** A place where the tide is wanted. */
export interface TidePlace {
  readonly latitudeRad: Radians;
  readonly longitudeRad: Radians;
  /** ellipsoidal height, m; a hundred metres change the tide by 3e-5 of itself */
  readonly heightM: number;
  readonly oceanLoading: readonly OceanLoadingConstituent[];
}

/** Potential felt by clocks at several places through time: solid-Earth tide, the places' ocean loading, pole tide.
 *  The ephemeris is computed once for all places. */
export class FeltTide {
  readonly #table = new SunAndMoonTable();
  readonly #sites: readonly ReturnType<typeof tideSite>[];
  readonly #places: readonly TidePlace[];
  readonly #love: LoveNumbers;
  readonly #pole: readonly PolePosition[];
  readonly #hasOceanLoading: boolean;

  /** @param pole positions in order of time; empty: no pole tide. Dates outside them give no pole tide: check before. */
  constructor(places: readonly TidePlace[], love: LoveNumbers, pole: readonly PolePosition[]) {
    this.#places = places;
    this.#sites = places.map((p) => tideSite(p.latitudeRad, p.longitudeRad, p.heightM));
    this.#love = love;
    this.#pole = pole;
    this.#hasOceanLoading = places.some((p) => p.oceanLoading.length > 0);
  }

  /** Writes the potential at each place at UTC `timeMs`, m²/s², into `into`.
   * @throws {QuantityRangeError} outside 1950…2100 */
  at(timeMs: number, into: Float64Array): void {
    const bodies = this.#table.at(timeMs);
    const pole = poleAt(this.#pole, timeMs);
    const tides = this.#hasOceanLoading ? fundamentalArguments(timeMs) : null;
    for (let i = 0; i < this.#sites.length; i++) {
      const site = this.#sites[i]!;
      let felt = solidEarthTideM2s2(site, bodies, this.#love);
      if (tides) felt += oceanLoadingM2s2(this.#places[i]!.oceanLoading, tides);
      if (pole) felt += poleTideM2s2(site.position, pole, timeMs, this.#love);
      into[i] = felt;
    }
  }
}
