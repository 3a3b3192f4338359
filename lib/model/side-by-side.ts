import type { Campaign, Clock, Link, SideBySide, UncertaintyPart } from '../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { InputCovariance } from '../uncertainty/covariance.js';
import { type Dependent, type Gradient, gradientOf } from '../uncertainty/gradient.js';
import type { Input } from '../uncertainty/inputs.js';
import { systematicGradient } from './frequency-comparison.js';
import { clocksOfLink, type Model, siteIndexOfClock, siteOfClock } from './model.js';
import { DEFAULT_GRAVITY_SOURCE, placeOfSite, placeWithoutPosition } from './site-inputs.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** The inputs that a transported clock's comparisons add to the model. */
export interface TransportInputs {
  /** of the model and of the comparisons together */
  readonly covariance: InputCovariance;
  readonly inputs: readonly Input[];
  readonly travels: Clock;
  readonly stays: Clock;
  /** +1 if the travelling clock is `to`, −1 if it is `from` */
  readonly sign: 1 | -1;
  readonly remoteReproducibility: number;
  readonly sideBySide: readonly {
    readonly y: number;
    readonly systematic: number;
    readonly reproducibility: number;
    readonly dH: number;
  }[];
  /** statistics of a remote comparison, one per variance given */
  readonly remote: readonly number[];
}

/** Systematic pieces of the travelling clock in one comparison side by side. */
export const piecesAt = (entry: SideBySide, travels: Clock): readonly UncertaintyPart[] =>
  entry.systematic ?? travels.systematic;

/** Registers what a transported clock's comparisons are uncertain by, beside everything the model knows already: so that a
 *  source named in both places is the same error in both, and gravity at the site is one input. A piece without a source is a
 *  new error each time the clock is set up, and so is its reproducibility (VIM 2.25). The clock that stays and the offsets of
 *  unlike transitions are one error in all comparisons, by the rules of the file, and cancel.
 * @param yVariance statistical variances of the comparisons side by side, in their order
 * @param remoteVariance those of the remote comparisons */
export function transportInputs(
  model: Model,
  link: Link,
  yVariance: readonly number[],
  remoteVariance: readonly number[],
): TransportInputs {
  const { from, to } = clocksOfLink(model, link);
  const transported = link.transported!;
  const [travels, stays] = transported.clock === to.id ? [to, from] : [from, to];
  const home = placeOfSite(siteOfClock(model, stays));
  const inputs: Input[] = [...model.inputs];
  const add = (path: string, u: number, parts: readonly UncertaintyPart[], rest: Partial<Input> = {}): number => {
    inputs.push({ path, value: 0, u, parts, place: home, distribution: 'normal', dof: null, ...rest });
    return inputs.length - 1;
  };
  const one = (path: string, variance: number): number => {
    const u = Math.sqrt(variance);
    return add(path, u, u > 0 ? [{ u, source: null }] : [], { place: placeWithoutPosition(path) });
  };
  const at = `links.${link.id}.transported`;
  const reproducibility = transported.reproducibility ** 2;
  const sideBySide = transported.sideBySide.map((entry, k) => {
    const path = `${at}.sideBySide.${k}`;
    const pieces = piecesAt(entry, travels);
    return {
      y: one(`${path}.y`, yVariance[k]!),
      systematic: add(`${path}.systematic`, Math.hypot(...pieces.map(({ u }) => u)), pieces),
      reproducibility: one(`${path}.reproducibility`, reproducibility),
      dH: add(`${path}.dH`, entry.dH.u, entry.dH.parts, { value: entry.dH.value }),
    };
  });
  const remoteReproducibility = one(`${at}.reproducibility`, reproducibility);
  const remote = remoteVariance.map((variance, i) => one(`${at}.remote.${i}`, variance));
  return {
    covariance: new InputCovariance(inputs, sourcesOf(model.campaign)),
    inputs,
    travels,
    stays,
    sign: travels === to ? 1 : -1,
    remoteReproducibility,
    sideBySide,
    remote,
  };
}

const sourcesOf = ({ sources }: Campaign) => [
  ...sources.map((s) => ({
    id: s.id,
    correlation: s.correlation ?? null,
    correlationLengthM: s.correlationLengthM ?? null,
  })),
  DEFAULT_GRAVITY_SOURCE,
];

/** Potential difference W(from) − W(to) of the two clocks side by side, m²/s², positive when `to` is the higher one:
 *  g·dH − Γ·z·dH ∓ ½·Γ·dH², z the height of the clock that stays over its marker; − where `to` travels, + where `from` does. */
export function localPotentialDifference(model: Model, t: TransportInputs, k: number): Dependent {
  const site = model.siteInputs[siteIndexOfClock(model, t.stays)]!;
  const tie = model.tieFunctions[model.clockIndex.get(t.stays.id)!];
  const steps = tie ? tie.inputs.slice(2) : [];
  const value = (i: number) => t.inputs[i]!.value;
  const { dH } = t.sideBySide[k]!;
  const [g, gradient, height] = [value(site.g), value(site.gradient), value(dH)];
  const z = steps.reduce((s, i) => s + value(i), 0);
  const bend = -z * height - t.sign * 0.5 * height * height;
  return {
    value: g * height + gradient * bend,
    gradient: gradientOf([
      [site.g, height],
      [site.gradient, bend],
      [dH, g - gradient * (z + t.sign * height)],
      ...steps.map((i) => [i, -gradient * height] as const),
    ]),
  };
}

/** Error of a comparison side by side, gravity taken off, as a fraction of frequency. */
export function localGradient(model: Model, t: TransportInputs, k: number, dWLocal: Dependent): Gradient {
  const { y, systematic, reproducibility } = t.sideBySide[k]!;
  const { indices, values } = dWLocal.gradient;
  return gradientOf([
    [y, 1],
    [systematic, t.sign],
    [reproducibility, t.sign],
    [model.frequencyInputs.clock[model.clockIndex.get(t.stays.id)!]!, -t.sign],
    ...indices.map((i, n) => [i, -values[n]! / C2] as const),
  ]);
}

/** Error of a remote comparison, as a fraction of frequency. */
export const remoteGradient = (
  model: Model,
  t: TransportInputs,
  link: Link,
  remote: number,
): readonly [number, Gradient][] => [
  [1, systematicGradient(model, link)],
  [
    1,
    gradientOf([
      [t.remote[remote]!, 1],
      [t.remoteReproducibility, t.sign],
    ]),
  ],
];
