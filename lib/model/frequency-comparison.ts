import type { Link, Measurement } from '../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { tideConversion } from '../earth/permanent-tide.js';
import { type Dependent, type Gradient, gradientOf } from '../uncertainty/gradient.js';
import { clocksOfLink, type Model } from './model.js';

/** Systematics of a comparison as an error of y: clock `to` − clock `from` + link. Shared sources cancel in the covariance. */
export function systematicGradient(model: Model, link: Link): Gradient {
  const { clock, link: links } = model.frequencyInputs;
  return gradientOf([
    [clock[model.clockIndex.get(link.to)!]!, 1],
    [clock[model.clockIndex.get(link.from)!]!, -1],
    [links[model.campaign.links.indexOf(link)]!, 1],
  ]);
}

/** offset(to) − offset(from): what unlike transitions add to y; 0 ± 0 between equal ones. */
export function transitionOffset(model: Model, link: Link): Dependent {
  const { from, to } = clocksOfLink(model, link);
  if (from.transition === to.transition) return { value: 0, gradient: gradientOf([]) };
  const a = model.frequencyInputs.transition.get(from.transition)!;
  const b = model.frequencyInputs.transition.get(to.transition)!;
  return {
    value: model.inputs[b]!.value - model.inputs[a]!.value,
    gradient: gradientOf([
      [b, 1],
      [a, -1],
    ]),
  };
}

/** y_mean − y in the campaign's (or the stated) tide system for a link: (shift_A − shift_B)/c². */
export function toMeanTideOffset(model: Model, link: Link, from: Measurement['y']['tide']): number {
  const { campaign } = model;
  const { from: a, to: b } = clocksOfLink(model, link);
  const shift = (site: string) =>
    tideConversion(
      'potential',
      from ?? 'mean',
      'mean',
      campaign.sites[model.siteIndex.get(site)!]!.latitudeRad,
      campaign.love,
    );
  return (shift(a.site) - shift(b.site)) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
}

/** A measured offset in mean tide, ready for comparison. */
export interface MeasuredOffset {
  readonly measurement: Measurement;
  /** position in campaign.measurements */
  readonly index: number;
  readonly link: Link;
  /** y in mean tide, gravity's part in it */
  readonly yMean: number;
  /** variance of the statistical part; with `includesSystematic` what the stated u leaves over the systematics, which can come
   *  out negative */
  readonly statisticalVariance: number;
  /** error of y through clocks and link */
  readonly systematic: Gradient;
}

export function measuredOffset(model: Model, index: number): MeasuredOffset {
  const measurement = model.campaign.measurements[index]!;
  const link = model.campaign.links.find((l) => l.id === measurement.link)!;
  const systematic = systematicGradient(model, link);
  const { value, u, tide } = measurement.y;
  return {
    measurement,
    index,
    link,
    yMean: value + toMeanTideOffset(model, link, tide),
    statisticalVariance: u * u - (measurement.includesSystematic ? model.covariance.variance(systematic) : 0),
    systematic,
  };
}

/** Covariance of the statistical parts of measurements: their variances, and the stated correlations. */
export function statisticalCovariance(model: Model, offsets: readonly MeasuredOffset[]): Float64Array[] {
  const u = offsets.map((o) => Math.sqrt(Math.max(0, o.statisticalVariance)));
  const position = new Map(
    offsets.flatMap((o, i) => (o.measurement.id === null ? [] : [[o.measurement.id, i] as const])),
  );
  const v = offsets.map((o, i) => {
    const row = new Float64Array(offsets.length);
    row[i] = o.statisticalVariance;
    return row;
  });
  for (const { between, rho } of model.campaign.correlations) {
    const i = position.get(between[0]);
    const j = position.get(between[1]);
    if (i === undefined || j === undefined) continue;
    v[i]![j] = rho * u[i]! * u[j]!;
    v[j]![i] = v[i]![j]!;
  }
  return v;
}
