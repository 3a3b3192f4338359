import type { Campaign, Datum } from '../campaign/campaign.js';
import { W0_IHRS, W0_TT } from '../constants/defining-constants.js';
import type { Radians } from '../quantity/radians.js';
import { type Dependent, gradientOf } from '../uncertainty/gradient.js';
import type { InputRegister } from '../uncertainty/inputs.js';
import { placeWithoutPosition, registerMeasured } from './site-inputs.js';
import type { TideConverter } from './tide-labels.js';

/** Reference potentials every campaign can name, all exact, m²/s². `u0-grs80` is the printed U₀ of the 1980 reference system
 *  (Moritz 2000), for ζ or N from a model without the zero-degree term W₀ − U₀. */
export const BUILT_IN_W0_M2S2: Readonly<Record<string, number>> = {
  ihrs: W0_IHRS.value,
  'u0-grs80': 62_636_860.85,
  tt: W0_TT.value,
};

/** Reference potentials W₀ of the campaign's and the built-in datums as inputs. */
export class ReferencePotentials {
  readonly #register: InputRegister;
  readonly #tide: TideConverter;
  readonly #datums: ReadonlyMap<string, Datum>;
  constructor(campaign: Campaign, register: InputRegister, tide: TideConverter) {
    this.#register = register;
    this.#tide = tide;
    this.#datums = new Map(campaign.datums.map((d) => [d.id, d]));
  }

  /** Latitude of the benchmark that carries the datum; null if it has none. */
  originLatitudeRad(id: string): Radians | null {
    return this.#datums.get(id)?.origin?.latitudeRad ?? null;
  }

  /** W₀ as stated: the number to which a (quasi)geoid model's zero-degree term refers. */
  asNumber(id: string): number {
    const path = `datums.${id}.W0`;
    const datum = this.#datums.get(id);
    if (datum) return registerMeasured(this.#register, path, datum.W0, placeWithoutPosition(`datums.${id}`));
    const value = BUILT_IN_W0_M2S2[id];
    if (value === undefined) throw new Error(`internal: unlisted datum ${id}`);
    return this.#register.indexOf(path, () => ({
      value,
      u: 0,
      parts: [],
      place: placeWithoutPosition(`datums.${id}`),
      distribution: 'normal',
      dof: null,
    }));
  }

  /** W₀ for heights and geopotential numbers: with an origin it is the potential of a benchmark on the crust and is converted
   *  to the campaign's tide system like one. */
  fitted(id: string): { readonly input: number; readonly shiftM2s2: number } {
    const input = this.asNumber(id);
    const datum = this.#datums.get(id);
    return {
      input,
      shiftM2s2: datum?.origin
        ? this.#tide.shift('potential', datum.W0, `datums.${id}.W0`, datum.origin.latitudeRad)
        : 0,
    };
  }

  /** W₀ in the campaign's tide system, with its derivative. */
  dependent(id: string): Dependent {
    const { input, shiftM2s2 } = this.fitted(id);
    return { value: this.#register.inputs[input]!.value + shiftM2s2, gradient: gradientOf([[input, 1]]) };
  }
}
