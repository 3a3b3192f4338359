import type { Campaign, Clock, Measured, Site, UncertaintyPart } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import {
  FREE_AIR_GRADIENT,
  HELMERT_FACTOR,
  SPEED_OF_LIGHT_SQUARED_M2_PER_S2,
} from '../constants/defining-constants.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { normalGravity } from '../earth/normal-field.js';
import { offsetSizeText, sizeText } from '../quantity/size.js';
import type { ErrorSource, InputRegister, Place } from '../uncertainty/inputs.js';
import { statedHeightM } from './first-determination.js';

/** Built-in source of default gravity: its errors are the regional gravity anomaly, alike over some 30 km
 *  (common practice, no source). A colon keeps it out of the way of a campaign's own ids. */
export const DEFAULT_GRAVITY_SOURCE: ErrorSource = {
  id: 'built-in:default-gravity',
  correlation: null,
  correlationLengthM: 30_000,
};

export const placeOfSite = (site: Site): Place => ({
  key: `sites.${site.id}`,
  position: { latitudeRad: site.latitudeRad, longitudeRad: site.longitudeRad },
});

export const placeWithoutPosition = (key: string): Place => ({ key, position: null });

/** Registers a measured value under its path. */
export const registerMeasured = (register: InputRegister, path: string, measured: Measured, place: Place): number =>
  register.indexOf(path, () => ({
    value: measured.value,
    u: measured.u,
    parts: measured.parts,
    place,
    distribution: measured.distribution,
    dof: measured.dof,
  }));

function registerDefault(register: InputRegister, path: string, value: number, part: UncertaintyPart, place: Place) {
  return register.indexOf(path, () => ({ value, u: part.u, parts: [part], place, distribution: 'normal', dof: null }));
}

/** The site's g, stated or by default γ(φ, H) with u = 5e-4 m/s² + 5e-7 s⁻²·|H| (gravity anomalies of 50 mGal, more in the
 *  mountains: common practice, no source). */
export function registerSiteGravity(
  register: InputRegister,
  campaign: Campaign,
  site: Site,
  warnings: Warning[],
): number {
  const path = `sites.${site.id}.g`;
  if (site.g) return registerMeasured(register, path, site.g, placeOfSite(site));
  const height = statedHeightM(campaign, site);
  const value = normalGravity(GRS80, site.latitudeRad, height);
  const u = 5e-4 + 5e-7 * Math.abs(height);
  warnings.push({
    code: 'default-gravity',
    path,
    message: `no gravity stated; normal gravity ${value.toFixed(5)} m/s² at ${height.toFixed(0)} m is used with u = ${(u * 1e5).toFixed(0)} mGal. A gravity visit removes this.`,
  });
  return registerDefault(register, path, value, { u, source: DEFAULT_GRAVITY_SOURCE.id }, placeOfSite(site));
}

export function registerSiteGradient(register: InputRegister, site: Site): number {
  const path = `sites.${site.id}.gradient`;
  if (site.gradient) return registerMeasured(register, path, site.gradient, placeOfSite(site));
  const { value, standardUncertainty: u } = FREE_AIR_GRADIENT;
  return registerDefault(register, path, value, { u, source: null }, placeOfSite(site));
}

/** The factor k of mean gravity along the plumb line, where `gnss-geoid` does not state it: 4.24e-7 s⁻² with u = 10 %. */
export function registerMeanGravityFactor(register: InputRegister, site: Site): number {
  const path = `sites.${site.id}.meanGravityFactor`;
  const { value } = HELMERT_FACTOR;
  return registerDefault(register, path, value, { u: 0.1 * value, source: null }, placeOfSite(site));
}

/** Beyond this a default gradient is worth a word, m. */
const LONG_TIE_M = 50;
/** Spread of real gradients against the normal one under and above ground, s⁻²: 2.2e-6 between free air and rock (2πGρ·2). */
const GRADIENT_SPREAD_S2 = 2.2e-6;

export function longTieWarning(site: Site, clock: Clock): Warning | null {
  const height = clock.tie.reduce((s, step) => s + step.dH.value, 0);
  if (Math.abs(height) <= LONG_TIE_M || site.gradient) return null;
  const size = 0.5 * GRADIENT_SPREAD_S2 * height * height;
  return {
    code: 'tie-gradient',
    path: `clocks.${clock.id}.tie`,
    message: `the tie is ${height.toFixed(1)} m long and the site has no gradient; rock, shafts and buildings can change W by ½·2.2e-6 s⁻²·Δ² = ${sizeText(size)} m²/s² (${offsetSizeText(size / SPEED_OF_LIGHT_SQUARED_M2_PER_S2)}). State the site's gradient.`,
  };
}
