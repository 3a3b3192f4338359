import type { Campaign } from '../../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2, W0_IHRS, W0_TT } from '../../constants/defining-constants.js';
import { toMeanTideOffset } from '../../model/frequency-comparison.js';
import { siteIndexOfClock } from '../../model/model.js';
import type { Comparison } from '../comparison.js';
import type { SolvedCampaign } from '../solve-campaign.js';
import { type Mistake, withMeasurement } from './mistake.js';

const REFERENCE_STEP = (W0_TT.value - W0_IHRS.value) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** Mistakes in what is stated of the measured offset: its sign, what was already taken off, its tide, the species' ratio. */
export function frequencyMistakes(solved: SolvedCampaign, comparison: Comparison): Mistake[] {
  const { model } = solved;
  const { campaign } = model;
  const { index, link, measurement } = comparison.offset;
  const path = `measurements.${index}.y`;
  const gravity = solved.links[campaign.links.indexOf(link)]!.y.value;
  const y = (code: string, mistake: string, lookAt: string, to: (stated: number) => number): Mistake => ({
    code,
    path,
    mistake,
    lookAt,
    corrected: withMeasurement(campaign, index, (m) => ({ ...m, value: to(m.value) })),
    uOffset: 0,
  });
  const removal = 'the reduction of the frequency data: was a gravity correction applied to either clock?';
  const found: Mistake[] = [
    y('redshift-removed', 'gravity’s part has already been removed from y', removal, (v) => v + gravity),
    y(
      'redshift-removed-twice-signed',
      'gravity’s part was added where it should have been removed: a correction taken for a shift',
      removal,
      (v) => v - gravity,
    ),
    y(
      'direction-reversed',
      'y is that of the first clock seen from the second',
      'which clock stands above and which below in the ratio',
      (v) => -v,
    ),
    ...([1, -1] as const).map((sign) =>
      y(
        'redshift-removed-unlike-reference',
        `gravity’s part has been removed, with the W₀ of TT at ${sign > 0 ? link.to : link.from} and that of the IHRS at the other clock`,
        'which W₀ stands behind each clock’s redshift correction',
        // each clock's rate was corrected by −(W₀ − W)/c²: an unlike W₀ does not cancel
        (v) => v + gravity + sign * REFERENCE_STEP,
      ),
    ),
    ...(['mean', 'zero', 'free'] as const)
      .filter((tide) => tide !== (measurement.y.tide ?? 'mean'))
      .map((tide) =>
        y(
          'tide-label',
          `y refers to the ${tide} tide, not to the ${measurement.y.tide ?? 'mean'} tide`,
          'whether the permanent tide was taken out of the frequency data',
          (v) => v + toMeanTideOffset(model, link, tide) - toMeanTideOffset(model, link, measurement.y.tide),
        ),
      ),
    ...ratioMistakes(campaign, comparison),
  ];
  // a systematic stated twice makes u too large and explains nothing; one left out makes it too small
  if (measurement.includesSystematic)
    found.push({
      code: 'systematic-not-included',
      path: `measurements.${index}.includesSystematic`,
      mistake: 'the stated u is statistics alone: the systematics of the clocks are not in it',
      lookAt: 'how u(y) was made',
      corrected: {
        ...campaign,
        measurements: campaign.measurements.map((m, i) => (i === index ? { ...m, includesSystematic: false } : m)),
      },
      uOffset: 0,
    });
  return found;
}

/** offset(to) − offset(from) of unlike transitions with the wrong sign, or left out. */
function ratioMistakes(campaign: Campaign, { offset: { link } }: Comparison): Mistake[] {
  const transition = (clock: string) => campaign.clocks.find((k) => k.id === clock)!.transition;
  const ends = [transition(link.from), transition(link.to)];
  if (ends[0] === ends[1]) return [];
  return campaign.transitions.flatMap((t): Mistake[] => {
    if (!ends.includes(t.id) || !t.offset || t.offset.value === 0) return [];
    const scaled = (factor: number): Campaign => ({
      ...campaign,
      transitions: campaign.transitions.map((x) =>
        x.id === t.id ? { ...x, offset: { ...t.offset!, value: factor * t.offset!.value } } : x,
      ),
    });
    const common = { path: `transitions.${t.id}.offset`, uOffset: 0 };
    return [
      {
        ...common,
        code: 'ratio-inverted',
        mistake: `the offset of ${t.id} has the wrong sign: the frequency ratio was inverted`,
        lookAt: 'which transition stands above in the measured ratio',
        corrected: scaled(-1),
      },
      {
        ...common,
        code: 'ratio-applied',
        mistake: `the offset of ${t.id} is already in y`,
        lookAt: 'whether y was formed with recommended or with measured frequencies',
        corrected: scaled(0),
      },
    ];
  });
}

/** Whether both ends of the link lie at sites with a level: else there is no residual to explain. */
export const endSites = (solved: SolvedCampaign, { offset: { link } }: Comparison): [string, string] => {
  const { model } = solved;
  const site = (clock: string) =>
    model.campaign.sites[siteIndexOfClock(model, model.campaign.clocks[model.clockIndex.get(clock)!]!)]!.id;
  return [site(link.from), site(link.to)];
};
