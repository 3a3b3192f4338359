import type { Campaign, Determination, Measured, Site } from '../campaign/campaign.js';
import { CampaignError, faultAt } from '../campaign/fault.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { normalGravity } from '../earth/normal-field.js';
import { degToRad } from '../quantity/radians.js';
import type { InputRegister } from '../uncertainty/inputs.js';
import type { ReferencePotentials } from './datums.js';
import {
  dynamicHeightFunction,
  geopotentialNumberFunction,
  gnssGeoidFunction,
  gravityModelFunction,
  levelledFunction,
  normalHeightFunction,
  orthometricHeightFunction,
  potentialFunction,
} from './determination-functions.js';
import { commissionSource, omissionSourceId } from './gravity-model-sources.js';
import { levelledDifference } from './levelling-line.js';
import type { DeterminationObservation, SiteInputs } from './model.js';
import { atEstimates, type ModelFunction } from './model-function.js';
import { placeOfSite, registerMeanGravityFactor, registerMeasured } from './site-inputs.js';
import type { TideConverter } from './tide-labels.js';

/** What a determination needs to become an observation equation. */
export interface DeterminationContext {
  readonly campaign: Campaign;
  readonly register: InputRegister;
  readonly tide: TideConverter;
  readonly datums: ReferencePotentials;
  readonly siteInputs: readonly SiteInputs[];
  readonly siteIndex: ReadonlyMap<string, number>;
}

/** Builds the observation equation of one determination. */
export function determinationObservation(
  context: DeterminationContext,
  siteIndex: number,
  index: number,
): DeterminationObservation {
  const site = context.campaign.sites[siteIndex]!;
  const determination = site.determinations[index]!;
  const path = `sites.${site.id}.determinations.${index}`;
  const f = determinationFunction(context, site, siteIndex, determination, path);
  const { inputs } = context.register;
  return {
    ...atEstimates(f, (i) => inputs[i]!.value),
    path,
    site: siteIndex,
    position: index,
    from: determination.kind === 'levelled-from' ? context.siteIndex.get(determination.site)! : null,
    check: determination.check,
    candidate: determination.candidate,
    datum: 'datum' in determination ? determination.datum : null,
    f,
  };
}

function determinationFunction(
  context: DeterminationContext,
  site: Site,
  siteIndex: number,
  d: Determination,
  path: string,
): ModelFunction {
  const { campaign, register, tide, datums } = context;
  const place = placeOfSite(site);
  const own = (key: string, measured: Measured) => registerMeasured(register, `${path}.${key}`, measured, place);
  /** a quantity of the determination itself, or else the site's */
  const height = (): { readonly input: number; readonly shiftM: number } => {
    const stated = 'h' in d && d.h ? d.h : null;
    const measured = stated ?? site.h;
    const at = stated ? `${path}.h` : `sites.${site.id}.h`;
    if (!measured)
      throw new CampaignError([
        faultAt('missing', `${path}.h`, 'no h here or at the site', 'an ellipsoidal height "h"'),
      ]);
    return {
      input: registerMeasured(register, at, measured, place),
      shiftM: tide.shift('ellipsoidal-height', measured, at, site.latitudeRad),
    };
  };
  const gravity = () => ('g' in d && d.g ? own('g', d.g) : context.siteInputs[siteIndex]!.g);
  /** C and H refer to the datum's benchmark: their tide is that at the site minus that at the origin */
  const physicalShift = (
    quantity: 'geopotential-number' | 'physical-height',
    key: string,
    measured: Measured,
    datum: string,
  ) => {
    const origin = datums.originLatitudeRad(datum);
    return origin === null
      ? tide.shift(quantity, measured, `${path}.${key}`, site.latitudeRad)
      : tide.shiftBetween(quantity, measured, `${path}.${key}`, site.latitudeRad, origin);
  };
  switch (d.kind) {
    case 'potential':
      return potentialFunction(own('W', d.W), tide.shift('potential', d.W, `${path}.W`, site.latitudeRad));
    case 'gravity-model': {
      const h = height();
      const error = (key: 'commission' | 'omission', u: number, source: string) =>
        register.indexOf(`${path}.${key}`, () => ({
          value: 0,
          u,
          parts: u > 0 ? [{ u, source }] : [],
          place,
          distribution: 'normal',
          dof: null,
        }));
      const { atMarker, model } = d;
      return gravityModelFunction(
        {
          h: h.input,
          commission: error('commission', atMarker.commissionM2s2, commissionSource(campaign, d)),
          omission: error('omission', atMarker.omissionM2s2, omissionSourceId(model.file, atMarker.maxDegree)),
        },
        atMarker,
        h.shiftM,
      );
    }
    case 'geopotential-number': {
      const { input, shiftM2s2 } = datums.fitted(d.datum);
      return geopotentialNumberFunction(input, own('C', d.C), {
        W0M2s2: shiftM2s2,
        CM2s2: physicalShift('geopotential-number', 'C', d.C, d.datum),
      });
    }
    case 'normal-height':
    case 'normal-orthometric-height': {
      const { input, shiftM2s2 } = datums.fitted(d.datum);
      return normalHeightFunction(site.latitudeRad, input, own('H', d.H), null, {
        W0M2s2: shiftM2s2,
        HM: physicalShift('physical-height', 'H', d.H, d.datum),
      });
    }
    case 'orthometric-height': {
      const { input, shiftM2s2 } = datums.fitted(d.datum);
      return orthometricHeightFunction(input, gravity(), own('H', d.H), {
        W0M2s2: shiftM2s2,
        HM: physicalShift('physical-height', 'H', d.H, d.datum),
      });
    }
    case 'dynamic-height': {
      const { input, shiftM2s2 } = datums.fitted(d.datum);
      const gamma = d.gammaRef
        ? { input: own('gammaRef', d.gammaRef) }
        : { exactMs2: normalGravity(GRS80, degToRad(45), 0) };
      return dynamicHeightFunction(input, own('H', d.H), gamma, {
        W0M2s2: shiftM2s2,
        HM: physicalShift('physical-height', 'H', d.H, d.datum),
      });
    }
    case 'gnss-quasigeoid': {
      const h = height();
      // for a (quasi)geoid model W0 is a number, the potential to which its zero-degree term refers: no benchmark, no tide
      return normalHeightFunction(site.latitudeRad, datums.asNumber(d.datum), h.input, own('zeta', d.zeta), {
        W0M2s2: 0,
        HM: h.shiftM - tide.shift('geoid-height', d.zeta, `${path}.zeta`, site.latitudeRad),
      });
    }
    case 'gnss-geoid': {
      const h = height();
      return gnssGeoidFunction(
        {
          W0: datums.asNumber(d.datum),
          h: h.input,
          N: own('N', d.N),
          g: gravity(),
          k: d.meanGravityFactor
            ? own('meanGravityFactor', d.meanGravityFactor)
            : registerMeanGravityFactor(register, site),
        },
        { W0M2s2: 0, HM: h.shiftM - tide.shift('geoid-height', d.N, `${path}.N`, site.latitudeRad) },
      );
    }
    case 'levelled-from': {
      const other = context.siteIndex.get(d.site)!;
      const g = d.g ? [own('g', d.g)] : [context.siteInputs[siteIndex]!.g, context.siteInputs[other]!.g];
      const shift = tide.shiftOfLevelling(d.dH, `${path}.dH`, site.latitudeRad, campaign.sites[other]!.latitudeRad);
      return levelledFunction(own('dH', levelledDifference(d)), g, shift);
    }
  }
}
