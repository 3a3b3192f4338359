import type { Link } from '../campaign/campaign.js';
import { CampaignError, faultAt } from '../campaign/fault.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { sizeText } from '../quantity/size.js';
import { combineGradients, type Dependent, type Gradient } from '../uncertainty/gradient.js';
import { type MeasuredOffset, measuredOffset, toMeanTideOffset, transitionOffset } from './frequency-comparison.js';
import { clocksOfLink, type DeterminationObservation, type Model, siteIndexOfClock } from './model.js';
import type { NetworkUnknowns } from './network-unknowns.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** One observation of the network, m²/s². */
export interface NetworkObservation {
  /** `sites.ID.determinations.N`, `measurements.N` or `links.ID` */
  readonly id: string;
  /** observed potential or potential difference; null for a link that is only planned */
  readonly value: number | null;
  /** error through the inputs: heights, g, ties, W₀s, systematics, frequency ratios; its statistics come on top */
  readonly gradient: Gradient;
  /** coefficient per unknown */
  readonly design: readonly (readonly [unknown: number, coefficient: number])[];
  /** W itself rather than a difference of W */
  readonly absolute: boolean;
}

/** A determination as an observation of the network. A datum whose offset is estimated loses its stated u: the data decide. */
export function determinationInNetwork(
  model: Model,
  unknowns: NetworkUnknowns,
  d: DeterminationObservation,
): NetworkObservation {
  const design: [number, number][] = [[d.site, 1]];
  if (d.from !== null) design.push([d.from, -1]);
  let { gradient } = d;
  const datum = unknowns.datums.find((x) => x.id === d.datum);
  // W₀ at the site is the stated one + offset + tilt·(way from the origin), so the stated one observes W minus those
  if (datum && datum.offset !== null) {
    design.push([datum.offset, -1]);
    gradient = withoutInput(gradient, (i) => model.inputs[i]!.path === `datums.${datum.id}.W0`);
  }
  if (datum?.tilt) {
    const { northM, eastM } = datum.tilt.wayFromOrigin(model.campaign.sites[d.site]!);
    design.push([datum.tilt.north, -northM], [datum.tilt.east, -eastM]);
  }
  return { id: d.path, value: d.value, gradient, design, absolute: d.from === null };
}

function withoutInput({ indices, values }: Gradient, drop: (index: number) => boolean): Gradient {
  const keep = indices.map((i) => !drop(i));
  return { indices: indices.filter((_, k) => keep[k]), values: values.filter((_, k) => keep[k]) };
}

/** What a comparison over a link says of W(site from) − W(site to): the ties, `variable`, the systematics and the frequency
 *  ratio enter its error. `yMean` null: not measured yet. */
export function linkInNetwork(
  model: Model,
  clocksW: readonly Dependent[],
  sitesW: readonly Dependent[],
  link: Link,
  id: string,
  systematic: Gradient,
  yMean: number | null,
): NetworkObservation {
  const { from, to } = clocksOfLink(model, link);
  const a = siteIndexOfClock(model, from);
  const b = siteIndexOfClock(model, to);
  const tie = (clock: string, site: number) => tieOf(clocksW[model.clockIndex.get(clock)!]!, sitesW[site]!);
  const tieA = tie(link.from, a);
  const tieB = tie(link.to, b);
  const ratio = transitionOffset(model, link);
  return {
    id,
    value:
      yMean === null
        ? null
        : (yMean - toMeanTideOffset(model, link, model.campaign.tide) - ratio.value) * C2 - tieA.value + tieB.value,
    gradient: combineGradients([
      [C2, systematic],
      [-C2, ratio.gradient],
      [-1, tieA.gradient],
      [1, tieB.gradient],
    ]),
    design:
      a === b
        ? []
        : [
            [a, 1],
            [b, -1],
          ],
    absolute: false,
  };
}

/** W(clock) − W(site): the tie's part alone. */
const tieOf = (clock: Dependent, site: Dependent): Dependent => ({
  value: clock.value - site.value,
  gradient: combineGradients([
    [1, clock.gradient],
    [-1, site.gradient],
  ]),
});

/** Measurements in the fit; a stated whole u must leave something for the statistics.
 * @throws {CampaignError} `nothing-left` */
export function fittedMeasurements(model: Model): MeasuredOffset[] {
  const offsets = model.campaign.measurements.flatMap((m, i) =>
    m.check || model.campaign.links.find((l) => l.id === m.link)!.candidate ? [] : [measuredOffset(model, i)],
  );
  const faults = offsets
    .filter((o) => o.measurement.includesSystematic && !(o.statisticalVariance > 0))
    .map((o) =>
      faultAt(
        'nothing-left',
        `measurements.${o.index}.y`,
        `u = ${sizeText(o.measurement.y.u)} with "includesSystematic"`,
        `more than the systematics of its clocks and link, ${sizeText(Math.sqrt(model.covariance.variance(o.systematic)), 3)}`,
      ),
    );
  if (faults.length > 0) throw new CampaignError(faults);
  return offsets;
}
