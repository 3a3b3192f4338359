import type { Campaign, Measured, TideSystem } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { type TideQuantity, tideConversion } from '../earth/permanent-tide.js';
import type { Radians } from '../quantity/radians.js';
import { offsetSizeText, sizeText } from '../quantity/size.js';

const SYSTEMS: readonly TideSystem[] = ['mean', 'zero', 'free'];
/** Normal gravity to turn a height into a potential for a size in words; 0.3 % over the Earth. */
const ROUND_GRAVITY_MS2 = 9.81;

/** What is assumed where no label stands: GNSS heights come tide-free, (quasi)geoids zero-tide (common practice, no source). */
export function assumedTide(quantity: TideQuantity, campaign: TideSystem): TideSystem {
  if (quantity === 'ellipsoidal-height') return 'free';
  if (quantity === 'geoid-height') return 'zero';
  return campaign;
}

/** Converts stated values into the campaign's permanent-tide system and collects a warning, with its size, per missing label. */
export class TideConverter {
  readonly warnings: Warning[] = [];
  readonly #campaign: Campaign;
  readonly #seen = new Set<string>();
  constructor(campaign: Campaign) {
    this.#campaign = campaign;
  }

  /** What to add to the stated value, in its SI unit. */
  shift(quantity: TideQuantity, measured: Measured, path: string, latitudeRad: Radians): number {
    return this.#shift(quantity, measured.tide, path, (from, to) =>
      tideConversion(quantity, from, to, latitudeRad, this.#campaign.love),
    );
  }

  /** The same for a height difference `upper` − `lower`, or a C or H that refers to a datum's origin (`lower`). */
  shiftBetween(quantity: TideQuantity, measured: Measured, path: string, upper: Radians, lower: Radians): number {
    const { love } = this.#campaign;
    return this.#shift(
      quantity,
      measured.tide,
      path,
      (from, to) => tideConversion(quantity, from, to, upper, love) - tideConversion(quantity, from, to, lower, love),
    );
  }

  /** As {@link shiftBetween} for a levelled dH: without a label it stands in the campaign's system, and between near sites
   *  (a hundredth of a millimetre) that is not worth a word. */
  shiftOfLevelling(measured: Measured, path: string, upper: Radians, lower: Radians): number {
    const { tide, love } = this.#campaign;
    const quantity = 'physical-height';
    const size = Math.max(
      ...SYSTEMS.map((s) =>
        Math.abs(tideConversion(quantity, s, tide, upper, love) - tideConversion(quantity, s, tide, lower, love)),
      ),
    );
    if (measured.tide === null && size < 1e-5) return 0;
    return this.shiftBetween(quantity, measured, path, upper, lower);
  }

  #shift(
    quantity: TideQuantity,
    stated: TideSystem | null,
    path: string,
    convert: (from: TideSystem, to: TideSystem) => number,
  ): number {
    const to = this.#campaign.tide;
    const from = stated ?? assumedTide(quantity, to);
    const shift = convert(from, to);
    if (stated === null && !this.#seen.has(path)) {
      this.#seen.add(path);
      const others = SYSTEMS.filter((s) => s !== from).map((s) => ({ system: s, error: convert(s, to) - shift }));
      const worst = others.reduce((a, b) => (Math.abs(b.error) > Math.abs(a.error) ? b : a));
      const isPotential = quantity === 'potential' || quantity === 'geopotential-number';
      const metres = Math.abs(worst.error) / (isPotential ? ROUND_GRAVITY_MS2 : 1);
      const y = (metres * ROUND_GRAVITY_MS2) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
      this.warnings.push({
        code: 'tide-label-missing',
        path,
        message: `no permanent-tide label; taken as ${from}. If it is ${worst.system}, the value is off by ${sizeText(metres * 1000)} mm (${offsetSizeText(y)}). Write "tide": "${from}" or what is right.`,
      });
    }
    return shift;
  }
}
