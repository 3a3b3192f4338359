import type { Link } from '../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2, W0_IHRS, W0_TT } from '../constants/defining-constants.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { normalHeightOfGeopotential } from '../earth/normal-field.js';
import { clocksOfLink, type Model, siteIndexOfClock } from '../model/model.js';
import { atEstimates } from '../model/model-function.js';
import { hasLevel, type SitePotentials, sameGroup } from '../model/site-potentials.js';
import type { InputCovariance } from '../uncertainty/covariance.js';
import { combineGradients, type Dependent, type Gradient, gradientOf } from '../uncertainty/gradient.js';
import type { Estimate } from './prediction.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** value and u of a dependent quantity */
export const estimateOf = (covariance: InputCovariance, d: Dependent): Estimate => ({
  value: d.value,
  u: Math.sqrt(covariance.variance(d.gradient)),
});

export const scaled = (d: Dependent, factor: number, offset = 0): Dependent => ({
  value: offset + factor * d.value,
  gradient: combineGradients([[factor, d.gradient]]),
});

export const difference = (a: Dependent, b: Dependent): Dependent => ({
  value: a.value - b.value,
  gradient: combineGradients([
    [1, a.gradient],
    [-1, b.gradient],
  ]),
});

/** W at the atoms: the site's, plus the tie, plus `variable`. In a group without a level the common constant stays in it. */
export function clockPotential(model: Model, potentials: SitePotentials, clock: number): Dependent {
  const site = potentials.sites[siteIndexOfClock(model, model.campaign.clocks[clock]!)]!;
  const terms: [number, Gradient][] = [[1, site.gradient]];
  let value = site.value;
  const tie = model.tieFunctions[clock];
  if (tie) {
    const t = atEstimates(tie, (i) => model.inputs[i]!.value);
    value += t.value;
    terms.push([1, t.gradient]);
  }
  const variable = model.variableInputs[clock];
  if (variable !== null && variable !== undefined) {
    value += model.inputs[variable]!.value;
    terms.push([1, gradientOf([[variable, 1]])]);
  }
  return { value, gradient: combineGradients(terms) };
}

/** (W₀_TT − W_mean)/c² of a clock at a site. */
export const redshiftAgainstTT = (W: Dependent, toMeanTideM2s2: number): Dependent => ({
  value: (W0_TT.value - (W.value + toMeanTideM2s2)) / C2,
  gradient: combineGradients([[-1 / C2, W.gradient]]),
});

/** Normal height H* with U₀ − U(φ, H*) = W₀(IHRS) − W. */
export function normalHeight(model: Model, site: number, W: Dependent): Dependent {
  const { latitudeRad } = model.campaign.sites[site]!;
  const { normalHeightM, perGeopotentialS2PerM } = normalHeightOfGeopotential(
    GRS80,
    latitudeRad,
    W0_IHRS.value - W.value,
  );
  return { value: normalHeightM, gradient: combineGradients([[-perGeopotentialS2PerM, W.gradient]]) };
}

/** What a link compares, each with its gradient. */
export interface LinkQuantities {
  readonly dW: Dependent;
  readonly y: Dependent;
  readonly dH: Dependent;
  /** null where the sites have no level */
  readonly dHNormal: Dependent | null;
  /** ḡ = ½(g_A + g_B), m/s² */
  readonly meanGravity: Dependent;
  readonly siteFrom: number;
  readonly siteTo: number;
}

/** ḡ of the two sites at their markers. */
export function meanGravity(model: Model, siteFrom: number, siteTo: number): Dependent {
  const a = model.siteInputs[siteFrom]!.g;
  const b = model.siteInputs[siteTo]!.g;
  return {
    value: (model.inputs[a]!.value + model.inputs[b]!.value) / 2,
    gradient: gradientOf([
      [a, 0.5],
      [b, 0.5],
    ]),
  };
}

/** dH = dW/ḡ with u(ḡ). */
export const lengthEquivalent = (dW: Dependent, g: Dependent): Dependent => ({
  value: dW.value / g.value,
  gradient: combineGradients([
    [1 / g.value, dW.gradient],
    [-dW.value / (g.value * g.value), g.gradient],
  ]),
});

/** Quantities of a link; null where its ends have no common level. */
export function linkQuantities(
  model: Model,
  potentials: SitePotentials,
  clocks: readonly Dependent[],
  link: Link,
): LinkQuantities | null {
  const { from, to } = clocksOfLink(model, link);
  const siteFrom = siteIndexOfClock(model, from);
  const siteTo = siteIndexOfClock(model, to);
  const level = hasLevel(potentials, siteFrom) && hasLevel(potentials, siteTo);
  if (!level && !sameGroup(potentials, siteFrom, siteTo)) return null;
  const WA = clocks[model.clockIndex.get(link.from)!]!;
  const WB = clocks[model.clockIndex.get(link.to)!]!;
  const dW = difference(WA, WB);
  const toMean = model.toMeanTideM2s2[siteFrom]! - model.toMeanTideM2s2[siteTo]!;
  const g = meanGravity(model, siteFrom, siteTo);
  return {
    dW,
    y: { value: (dW.value + toMean) / C2, gradient: combineGradients([[1 / C2, dW.gradient]]) },
    dH: lengthEquivalent(dW, g),
    dHNormal: level ? difference(normalHeight(model, siteTo, WB), normalHeight(model, siteFrom, WA)) : null,
    meanGravity: g,
    siteFrom,
    siteTo,
  };
}
