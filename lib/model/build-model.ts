import type { Campaign, Link, Site } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import { transitionFrequency } from '../clocks/transition-frequency.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { tideConversion } from '../earth/permanent-tide.js';
import { offsetSizeText, sizeText } from '../quantity/size.js';
import { InputCovariance } from '../uncertainty/covariance.js';
import { type ErrorSource, InputRegister } from '../uncertainty/inputs.js';
import { checkPositiveSemidefinite } from '../uncertainty/positive-semidefinite.js';
import { ReferencePotentials } from './datums.js';
import { tieFunction } from './determination-functions.js';
import { determinationObservation } from './determination-observations.js';
import { datumOfGeopotentialNumber } from './first-determination.js';
import { gravityModelSources } from './gravity-model-sources.js';
import { HeightReductions } from './height-reductions.js';
import type { FrequencyInputs, Model } from './model.js';
import {
  DEFAULT_GRAVITY_SOURCE,
  longTieWarning,
  placeOfSite,
  placeWithoutPosition,
  registerMeasured,
  registerSiteGradient,
  registerSiteGravity,
} from './site-inputs.js';
import { TideConverter } from './tide-labels.js';

/** Turns a validated campaign into named inputs, their covariance, and observation equations.
 * @throws {CampaignError} a height is missing, or the correlations of a source are impossible */
export function buildModel(campaign: Campaign): Model {
  const register = new InputRegister();
  const tide = new TideConverter(campaign);
  const heights = new HeightReductions(campaign);
  const datums = new ReferencePotentials(campaign, register, tide);
  const warnings: Warning[] = [];
  const siteIndex = new Map(campaign.sites.map((s, i) => [s.id, i]));
  const clockIndex = new Map(campaign.clocks.map((c, i) => [c.id, i]));

  const siteInputs = campaign.sites.map((site) => ({
    g: registerSiteGravity(register, campaign, site, warnings),
    gradient: registerSiteGradient(register, site),
  }));
  const context = { campaign, register, tide, heights, datums, siteInputs, siteIndex };
  const determinations = campaign.sites.flatMap((site, s) =>
    site.determinations.map((_, n) => determinationObservation(context, s, n)),
  );
  const referencePotential = campaign.sites.map((site) => {
    const datum = datumOfGeopotentialNumber(campaign, site);
    return { ...datums.dependent(datum), datum };
  });
  const tieFunctions = campaign.clocks.map((clock) => {
    const s = siteIndex.get(clock.site)!;
    const site = campaign.sites[s]!;
    const warning = longTieWarning(site, clock);
    if (warning) warnings.push(warning);
    if (clock.tie.length === 0) return null;
    const steps = clock.tie.map((step, i) =>
      registerMeasured(register, `clocks.${clock.id}.tie.${i}.dH`, step.dH, placeOfSite(site)),
    );
    return tieFunction(siteInputs[s]!.g, siteInputs[s]!.gradient, steps);
  });
  const variableInputs = campaign.clocks.map((clock) => {
    const site = campaign.sites[siteIndex.get(clock.site)!]!;
    return site.variable
      ? registerMeasured(register, `sites.${site.id}.variable`, site.variable, placeOfSite(site))
      : null;
  });
  const frequencyInputs = registerFrequencyInputs(register, campaign, siteIndex, warnings);

  const sources: ErrorSource[] = [
    ...campaign.sources.map((s) => ({
      id: s.id,
      correlation: s.correlation ?? null,
      correlationLengthM: s.correlationLengthM ?? null,
    })),
    DEFAULT_GRAVITY_SOURCE,
    ...gravityModelSources(campaign),
  ];
  const covariance = new InputCovariance(register.inputs, sources);
  checkPositiveSemidefinite(covariance, campaign.sources);
  const toMeanTideM2s2 = campaign.sites.map((s) =>
    tideConversion('potential', campaign.tide, 'mean', s.latitudeRad, campaign.love),
  );
  warnings.push(...notMeanTideWarnings(campaign, siteIndex, clockIndex, toMeanTideM2s2));
  return {
    campaign,
    inputs: register.inputs,
    covariance,
    determinations,
    siteInputs,
    frequencyInputs,
    tieFunctions,
    variableInputs,
    referencePotential,
    siteIndex,
    clockIndex,
    toMeanTideM2s2,
    warnings: [...tide.warnings, ...heights.warnings, ...warnings],
  };
}

/** Systematics and frequency ratios: they enter the comparison, never the prediction. */
function registerFrequencyInputs(
  register: InputRegister,
  campaign: Campaign,
  siteIndex: ReadonlyMap<string, number>,
  warnings: Warning[],
): FrequencyInputs {
  const systematic = (path: string, of: Campaign['clocks'][number] | Link, site: Site | null) =>
    register.indexOf(path, () => ({
      value: 0,
      u: Math.sqrt(of.systematic.reduce((s, p) => s + p.u * p.u, 0)),
      parts: of.systematic,
      place: site ? placeOfSite(site) : placeWithoutPosition(`links.${of.id}`),
      distribution: 'normal',
      dof: of.systematic.reduce<number | null>(
        (least, p) => (p.dof === null ? least : Math.min(least ?? p.dof, p.dof)),
        null,
      ),
    }));
  const clock = campaign.clocks.map((c) =>
    systematic(`clocks.${c.id}.systematic`, c, campaign.sites[siteIndex.get(c.site)!]!),
  );
  const link = campaign.links.map((l) => systematic(`links.${l.id}.systematic`, l, null));
  const transition = new Map<string, number>();
  const transitionOf = new Map(campaign.clocks.map((c) => [c.id, c.transition]));
  const joined = new Set<string>();
  for (const l of campaign.links) {
    const [a, b] = [transitionOf.get(l.from)!, transitionOf.get(l.to)!];
    if (a !== b) joined.add(a).add(b);
  }
  for (const id of new Set(campaign.clocks.map((c) => c.transition))) {
    const path = `transitions.${id}.offset`;
    const place = placeWithoutPosition(`transitions.${id}`);
    const stated = campaign.transitions.find((t) => t.id === id);
    if (stated?.offset) {
      transition.set(id, registerMeasured(register, path, stated.offset, place));
      continue;
    }
    const u = transitionFrequency(campaign, id).relativeStandardUncertainty;
    transition.set(
      id,
      register.indexOf(path, () => ({
        value: 0,
        u,
        parts: u > 0 ? [{ u, source: null }] : [],
        place,
        distribution: 'normal',
        dof: null,
      })),
    );
    if (joined.has(id) && u > 0)
      warnings.push({
        code: 'default-frequency-offset',
        path,
        message: `no measured ratio; the recommended value's u = ${sizeText(u)} is used, which is ${sizeText((u * SPEED_OF_LIGHT_SQUARED_M2_PER_S2) / 9.81)} m of height in a link to another transition. State transitions[].offset from a measured ratio.`,
      });
  }
  return { clock, link, transition };
}

function notMeanTideWarnings(
  campaign: Campaign,
  siteIndex: ReadonlyMap<string, number>,
  clockIndex: ReadonlyMap<string, number>,
  toMean: readonly number[],
): Warning[] {
  if (campaign.tide === 'mean') return [];
  const site = (clock: string) => siteIndex.get(campaign.clocks[clockIndex.get(clock)!]!.site)!;
  return campaign.links.map((l) => {
    const y = (toMean[site(l.from)]! - toMean[site(l.to)]!) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
    return {
      code: 'not-mean-tide',
      path: `links.${l.id}`,
      message: `dW is printed in ${campaign.tide} tide, y is what clocks feel, in mean tide: y differs from dW/c² by ${offsetSizeText(y)}.`,
    };
  });
}
