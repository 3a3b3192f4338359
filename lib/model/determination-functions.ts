import type { GravityModelPotential } from '../campaign/campaign.js';
import { HELMERT_FACTOR } from '../constants/defining-constants.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { geopotentialOfNormalHeight } from '../earth/normal-field.js';
import type { Radians } from '../quantity/radians.js';
import type { ModelFunction } from './model-function.js';
import { geopotentialDifference, tieDifferences } from './trial-differences.js';

/** Each function here is one way to know a potential, W or a difference of W, from inputs as stated. A `shift` is what the
 *  permanent-tide and frame conversions add to the stated number; heights are converted first, then turned into potential. */

/** W stated outright. */
export const potentialFunction = (W: number, shiftM2s2: number): ModelFunction => ({
  inputs: [W],
  evaluate: (x) => x[0]! + shiftM2s2,
  partials: () => [1],
});

/** W = W₀ − C. */
export const geopotentialNumberFunction = (
  W0: number,
  C: number,
  shift: { readonly W0M2s2: number; readonly CM2s2: number },
): ModelFunction => ({
  inputs: [W0, C],
  evaluate: (x) => x[0]! + shift.W0M2s2 - (x[1]! + shift.CM2s2),
  partials: () => [1, -1],
});

/** W = W₀ − (U₀ − U(φ, H)), H = `upper` − `lower` + shift: a normal height (no `lower`), or h − ζ. */
export function normalHeightFunction(
  latitudeRad: Radians,
  W0: number,
  upper: number,
  lower: number | null,
  shift: { readonly W0M2s2: number; readonly HM: number },
): ModelFunction {
  const H = (x: ArrayLike<number>) => x[1]! - (lower === null ? 0 : x[2]!) + shift.HM;
  return {
    inputs: lower === null ? [W0, upper] : [W0, upper, lower],
    evaluate: (x) => x[0]! + shift.W0M2s2 - geopotentialOfNormalHeight(GRS80, latitudeRad, H(x)).geopotentialM2s2,
    partials: (x) => {
      const { perHeightMs2 } = geopotentialOfNormalHeight(GRS80, latitudeRad, H(x));
      return lower === null ? [1, -perHeightMs2] : [1, -perHeightMs2, perHeightMs2];
    },
    differences: (x) => {
      const geopotential = geopotentialDifference(latitudeRad, H(x));
      return ([dW0, dUpper, dLower], count, out) => {
        if (dLower === undefined) for (let t = 0; t < count; t++) out[t] = dW0![t]! - geopotential(dUpper![t]!);
        else for (let t = 0; t < count; t++) out[t] = dW0![t]! - geopotential(dUpper![t]! - dLower[t]!);
      };
    },
  };
}

/** Helmert orthometric height: W = W₀ − (g + 4.24e-7 s⁻²·H)·H, g at the surface, the factor exact as a definition. */
export const orthometricHeightFunction = (
  W0: number,
  g: number,
  H: number,
  shift: { readonly W0M2s2: number; readonly HM: number },
): ModelFunction => ({
  inputs: [W0, g, H],
  evaluate: (x) => {
    const height = x[2]! + shift.HM;
    return x[0]! + shift.W0M2s2 - (x[1]! + HELMERT_FACTOR.value * height) * height;
  },
  partials: (x) => {
    const height = x[2]! + shift.HM;
    return [1, -height, -(x[1]! + 2 * HELMERT_FACTOR.value * height)];
  },
});

/** Dynamic height: W = W₀ − γ_ref·H. `gammaRef` a number: exact; an object: an input. */
export const dynamicHeightFunction = (
  W0: number,
  H: number,
  gammaRef: { readonly input: number } | { readonly exactMs2: number },
  shift: { readonly W0M2s2: number; readonly HM: number },
): ModelFunction => {
  const gamma = (x: ArrayLike<number>) => ('input' in gammaRef ? x[2]! : gammaRef.exactMs2);
  return {
    inputs: 'input' in gammaRef ? [W0, H, gammaRef.input] : [W0, H],
    evaluate: (x) => x[0]! + shift.W0M2s2 - gamma(x) * (x[1]! + shift.HM),
    partials: (x) => ('input' in gammaRef ? [1, -gamma(x), -(x[1]! + shift.HM)] : [1, -gamma(x)]),
  };
};

/** GNSS height and geoid: W = W₀ − (g + k·H)·H with H = h − N; here k is physics, an input with an uncertainty. */
export const gnssGeoidFunction = (
  inputs: { readonly W0: number; readonly h: number; readonly N: number; readonly g: number; readonly k: number },
  shift: { readonly W0M2s2: number; readonly HM: number },
): ModelFunction => {
  const H = (x: ArrayLike<number>) => x[1]! - x[2]! + shift.HM;
  return {
    inputs: [inputs.W0, inputs.h, inputs.N, inputs.g, inputs.k],
    evaluate: (x) => x[0]! + shift.W0M2s2 - (x[3]! + x[4]! * H(x)) * H(x),
    partials: (x) => {
      const height = H(x);
      const perHeight = x[3]! + 2 * x[4]! * height;
      return [1, -perHeight, perHeight, -height, -height * height];
    },
  };
};

/** A gravity model's W, summed at a height near h, and carried to h by its vertical derivative; its own errors as two inputs of
 *  value 0. The second derivative, 3e-6 s⁻², is nothing over an uncertainty of h. */
export const gravityModelFunction = (
  inputs: { readonly h: number; readonly commission: number; readonly omission: number },
  at: GravityModelPotential,
  shiftM: number,
): ModelFunction => ({
  inputs: [inputs.h, inputs.commission, inputs.omission],
  evaluate: (x) => at.potentialM2s2 + at.perHeightMs2 * (x[0]! + shiftM - at.heightM) + x[1]! + x[2]!,
  partials: () => [at.perHeightMs2, 1, 1],
});

/** W(site) − W(other) = −g·dH; g stated for the line, or the mean of the two sites' g. */
export const levelledFunction = (dH: number, g: readonly number[], shiftM: number): ModelFunction => ({
  inputs: [dH, ...g],
  evaluate: (x) => -meanOf(x, g.length) * (x[0]! + shiftM),
  partials: (x) => [-meanOf(x, g.length), ...g.map(() => -(x[0]! + shiftM) / g.length)],
});

function meanOf(x: ArrayLike<number>, count: number): number {
  let sum = 0;
  for (let i = 1; i <= count; i++) sum += x[i]!;
  return sum / count;
}

/** What the tie adds to W on the way from the marker to the clock: −(g·Δ − ½·Γ·Δ²), Δ the sum of the steps. */
export function tieFunction(g: number, gradient: number, steps: readonly number[]): ModelFunction {
  const height = (x: ArrayLike<number>) => {
    let sum = 0;
    for (let i = 0; i < steps.length; i++) sum += x[2 + i]!;
    return sum;
  };
  return {
    inputs: [g, gradient, ...steps],
    evaluate: (x) => -(x[0]! - 0.5 * x[1]! * height(x)) * height(x),
    partials: (x) => {
      const d = height(x);
      return [-d, 0.5 * d * d, ...steps.map(() => -(x[0]! - x[1]! * d))];
    },
    differences: (x) => tieDifferences(x[0]!, x[1]!, height(x)),
  };
}
