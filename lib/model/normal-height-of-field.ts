import type { NormalHeightField } from '../earth/normal-height-field.js';
import type { Radians } from '../quantity/radians.js';
import type { ModelFunction } from './model-function.js';

/** W = W₀ − C of a normal height that was made with another normal field than GRS80: C comes from that field. */
export function normalHeightOfFieldFunction(
  field: NormalHeightField,
  latitudeRad: Radians,
  W0: number,
  H: number,
  shift: { readonly W0M2s2: number; readonly HM: number },
): ModelFunction {
  const at = (x: ArrayLike<number>) => field.geopotential(latitudeRad, x[1]! + shift.HM);
  return {
    inputs: [W0, H],
    evaluate: (x) => x[0]! + shift.W0M2s2 - at(x).geopotentialM2s2,
    partials: (x) => [1, -at(x).perHeightMs2],
  };
}
