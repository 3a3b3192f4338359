import type { Campaign, Determination, Measured, Site } from '../campaign/campaign.js';
import { CampaignError, faultAt } from '../campaign/fault.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { normalGravity } from '../earth/normal-field.js';
import { readNormalHeightField } from '../earth/normal-height-field.js';
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
import type { HeightReduction, HeightReductions } from './height-reductions.js';
import { levelledDifference } from './levelling-line.js';
import type { DeterminationObservation, SiteInputs } from './model.js';
import { atEstimates, type ModelFunction } from './model-function.js';
import { type MovingArgument, withMotion } from './moved-height.js';
import { normalHeightOfFieldFunction } from './normal-height-of-field.js';
import { placeOfSite, registerMeanGravityFactor, registerMeasured } from './site-inputs.js';
import type { TideConverter } from './tide-labels.js';

/** What a determination needs to become an observation equation. */
export interface DeterminationContext {
  readonly campaign: Campaign;
  readonly register: InputRegister;
  readonly tide: TideConverter;
  readonly heights: HeightReductions;
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

/** The rate of a height, as an input, and the seconds over which it acts. */
type Motion = { readonly rate: number; readonly seconds: number } | null;

/** Which argument of its function a physical height is, where it stands beside W0 alone. */
const PHYSICAL_HEIGHT = 1;

const moving = (heights: readonly (readonly [argument: number, motion: Motion])[]): MovingArgument[] =>
  heights.flatMap(([argument, motion]) => (motion === null ? [] : [{ argument, ...motion }]));

function determinationFunction(
  context: DeterminationContext,
  site: Site,
  siteIndex: number,
  d: Determination,
  path: string,
): ModelFunction {
  const { campaign, register, tide, heights, datums } = context;
  const place = placeOfSite(site);
  const own = (key: string, measured: Measured) => registerMeasured(register, `${path}.${key}`, measured, place);
  /** a quantity of the determination itself, or else the site's */
  const height = (
    surface: Measured | null,
  ): { readonly input: number; readonly shiftM: number; readonly motion: Motion } => {
    const stated = 'h' in d && d.h ? d.h : null;
    const measured = stated ?? site.h;
    const at = stated ? `${path}.h` : `sites.${site.id}.h`;
    if (!measured)
      throw new CampaignError([
        faultAt('missing', `${path}.h`, 'no h here or at the site', 'an ellipsoidal height "h"'),
      ]);
    const reduction = heights.ellipsoidal(measured, at, site, surface, 'datum' in d ? d.datum : null);
    return {
      input: registerMeasured(register, at, measured, place),
      shiftM: tide.shift('ellipsoidal-height', measured, at, site.latitudeRad) + reduction.shiftM,
      motion: motionOf(reduction, measured, at),
    };
  };
  /** the rate of a height as an input, if it acts */
  const motionOf = ({ motionS }: HeightReduction, { rate }: Measured, at: string): Motion =>
    rate === undefined || motionS === 0
      ? null
      : { rate: registerMeasured(register, `${at}.rate`, rate, place), seconds: motionS };
  const physicalMotion = (H: Measured, datum: string): readonly MovingArgument[] =>
    moving([[PHYSICAL_HEIGHT, motionOf(heights.physical(H, `${path}.H`, datum), H, `${path}.H`)]]);
  const surfaceMotion = (measured: Measured, key: string): Motion =>
    motionOf(heights.surface(measured, `${path}.${key}`), measured, `${path}.${key}`);
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
      const h = height(null);
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
      return withMotion(
        gravityModelFunction(
          {
            h: h.input,
            commission: error('commission', atMarker.commissionM2s2, commissionSource(campaign, d)),
            omission: error('omission', atMarker.omissionM2s2, omissionSourceId(model.file, atMarker.maxDegree)),
          },
          atMarker,
          h.shiftM,
        ),
        moving([[0, h.motion]]),
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
      const shift = { W0M2s2: shiftM2s2, HM: physicalShift('physical-height', 'H', d.H, d.datum) };
      if (d.kind === 'normal-orthometric-height') heights.noteNormalOrthometric(d.H, `${path}.H`, site);
      const field = d.kind === 'normal-height' && d.field !== undefined ? readNormalHeightField(d.field) : null;
      const f =
        field === null || field.id === 'GRS80'
          ? normalHeightFunction(site.latitudeRad, input, own('H', d.H), null, shift)
          : normalHeightOfFieldFunction(field, site.latitudeRad, input, own('H', d.H), shift);
      return withMotion(f, physicalMotion(d.H, d.datum));
    }
    case 'orthometric-height': {
      const { input, shiftM2s2 } = datums.fitted(d.datum);
      const f = orthometricHeightFunction(input, gravity(), own('H', d.H), {
        W0M2s2: shiftM2s2,
        HM: physicalShift('physical-height', 'H', d.H, d.datum),
      });
      const motion = motionOf(heights.physical(d.H, `${path}.H`, d.datum), d.H, `${path}.H`);
      return withMotion(f, moving([[2, motion]]));
    }
    case 'dynamic-height': {
      const { input, shiftM2s2 } = datums.fitted(d.datum);
      const gamma = d.gammaRef
        ? { input: own('gammaRef', d.gammaRef) }
        : { exactMs2: normalGravity(GRS80, degToRad(45), 0) };
      const f = dynamicHeightFunction(input, own('H', d.H), gamma, {
        W0M2s2: shiftM2s2,
        HM: physicalShift('physical-height', 'H', d.H, d.datum),
      });
      return withMotion(f, physicalMotion(d.H, d.datum));
    }
    case 'gnss-quasigeoid': {
      const h = height(d.zeta);
      // for a (quasi)geoid model W0 is a number, the potential to which its zero-degree term refers: no benchmark, no tide
      const f = normalHeightFunction(site.latitudeRad, datums.asNumber(d.datum), h.input, own('zeta', d.zeta), {
        W0M2s2: 0,
        HM: h.shiftM - tide.shift('geoid-height', d.zeta, `${path}.zeta`, site.latitudeRad),
      });
      return withMotion(
        f,
        moving([
          [1, h.motion],
          [2, surfaceMotion(d.zeta, 'zeta')],
        ]),
      );
    }
    case 'gnss-geoid': {
      const h = height(d.N);
      const f = gnssGeoidFunction(
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
      return withMotion(
        f,
        moving([
          [1, h.motion],
          [2, surfaceMotion(d.N, 'N')],
        ]),
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
