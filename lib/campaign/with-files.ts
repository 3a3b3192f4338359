import { interpolate, nodesToKeep } from '../earth/geoid-grid/interpolation.js';
import { kaulaOmission } from '../earth/gravity-model/model-uncertainty.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { normalGravity } from '../earth/normal-field.js';
import { tideConversion } from '../earth/permanent-tide.js';
import { radToDeg } from '../quantity/radians.js';
import type { Campaign, Determination, GravityModelCorrelation, Measured, Site } from './campaign.js';
import type { CampaignFiles, GravityModelRequest } from './campaign-files.js';
import { CampaignError, type Fault, faultAt, type Warning } from './fault.js';
import { faultInFile } from './fault-in-file.js';
import { openSeries, withReducedSeries } from './with-series.js';

/** What a determination says of its datum in the file: to know whether a zero level was chosen or taken by default. */
export type StatesDatum = (site: number, determination: number) => boolean;

/** Puts in what stands in files beside the campaign: values of geoid grids, potentials of gravity models, means of measured series.
 *  Nothing is left open.
 * @throws {CampaignError} a file is not at hand or refused, a place lies outside, a grid is of the other surface */
export function withFiles(
  campaign: Campaign,
  files: CampaignFiles,
  statesDatum: StatesDatum,
): { readonly campaign: Campaign; readonly warnings: readonly Warning[] } {
  const faults: Fault[] = [];
  const warnings: Warning[] = [];
  const potentials = new ModelPotentials(campaign, files, faults, warnings);
  const sites = campaign.sites.map((site, s) => ({
    ...site,
    determinations: site.determinations.map((d, n) => {
      const path = `sites.${site.id}.determinations.${n}`;
      const read = (key: 'zeta' | 'N', measured: Measured) =>
        measured.grid
          ? gridValue(measured, site, `${path}.${key}`, statesDatum(s, n), files, faults, warnings)
          : measured;
      if (d.kind === 'gnss-quasigeoid') return { ...d, zeta: read('zeta', d.zeta) };
      if (d.kind === 'gnss-geoid') return { ...d, N: read('N', d.N) };
      return d.kind === 'gravity-model' ? { ...d, atMarker: potentials.of(s, n) ?? d.atMarker } : d;
    }),
  }));
  const series = openSeries(campaign, files, faults);
  if (faults.length > 0) throw new CampaignError(faults);
  const { correlations } = potentials;
  const whole = { ...campaign, sites, ...(correlations.length > 0 ? { gravityModels: correlations } : {}) };
  return { campaign: withReducedSeries(whole, series, warnings), warnings };
}

/** The value off the grid, or off the nodes that the campaign keeps. */
function gridValue(
  measured: Measured,
  site: Site,
  path: string,
  statesDatum: boolean,
  files: CampaignFiles,
  faults: Fault[],
  warnings: Warning[],
): Measured {
  const grid = measured.grid!;
  const place = { latitudeDeg: radToDeg(site.latitudeRad), longitudeDeg: radToDeg(site.longitudeRad) };
  const isZeta = path.endsWith('zeta');
  let { nodes } = grid;
  let { tide } = measured;
  if (nodes === null) {
    const reading = files.grid({ file: grid.file, ...place });
    if (reading === null) {
      faults.push(
        faultAt(
          'file-not-at-hand',
          `${path}.grid`,
          grid.file,
          'the file beside the campaign; or "nodes", which a campaign keeps in its place',
        ),
      );
      return measured;
    }
    if ('faults' in reading) {
      faults.push(...reading.faults.map((f) => faultInFile(f, `${path}.grid`, grid.file)));
      return measured;
    }
    const wanted = isZeta ? 'quasigeoid' : 'geoid';
    if (reading.surface !== 'unknown' && reading.surface !== wanted)
      faults.push(
        faultAt(
          'wrong-surface',
          `${path}.grid`,
          `${grid.file}, a ${reading.surface}`,
          `a ${wanted}; or kind "${isZeta ? 'gnss-geoid' : 'gnss-quasigeoid'}" with "${isZeta ? 'N' : 'zeta'}"`,
        ),
      );
    if (tide !== null && reading.tide !== 'unknown' && tide !== reading.tide)
      faults.push(
        faultAt('tide-system-differs', `${path}.tide`, tide, `"${reading.tide}", as the file says, or no label`),
      );
    if (reading.tide !== 'unknown') tide = reading.tide;
    nodes = reading.nodes;
    warnings.push(...reading.warnings.map((w) => ({ ...w, path: `${path}.grid` })));
    if (reading.surface === 'unknown')
      warnings.push({
        code: 'surface-unknown',
        path: `${path}.grid`,
        message: `${grid.file} does not say whether it is a geoid or a quasigeoid; taken as ${isZeta ? 'height anomaly ζ' : 'geoid height N'}. They differ by 25 mm (2.8e-18) for a Bouguer anomaly of 50 mGal at 500 m.`,
      });
    if (!statesDatum)
      warnings.push({
        code: 'zero-level-default',
        path: `${path}.grid`,
        message: `no "datum" stated: the zero-degree term of ${grid.file}${reading.heightDatum === null ? '' : ` (its head says ${reading.heightDatum})`} is taken to refer to the IHRS. A model without that term needs "datum": "u0-grs80": 0.76 m (8.3e-17).`,
      });
  }
  if (measured.u === 0)
    warnings.push({
      code: 'grid-exact',
      path,
      message: 'no uncertainty stated for the value off the grid: it counts as exact, which no geoid is. State "u".',
    });
  try {
    const { valueM } = interpolate(nodes, place.latitudeDeg, place.longitudeDeg, grid.method);
    return {
      ...measured,
      value: valueM,
      tide,
      grid: { ...grid, nodes: nodesToKeep(nodes, place.latitudeDeg, place.longitudeDeg) },
    };
  } catch (error) {
    if (!(error instanceof CampaignError)) throw error;
    faults.push(...error.faults.map((f) => faultInFile(f, `${path}.grid`, grid.file)));
    return measured;
  }
}

interface ModelUse {
  readonly site: number;
  readonly determination: number;
  readonly heightM: number;
  readonly d: Determination & { readonly kind: 'gravity-model' };
}

/** W of gravity models at the markers, one reading per file. */
class ModelPotentials {
  readonly correlations: GravityModelCorrelation[] = [];
  readonly #found = new Map<string, (Determination & { readonly kind: 'gravity-model' })['atMarker']>();

  constructor(campaign: Campaign, files: CampaignFiles, faults: Fault[], warnings: Warning[]) {
    const byFile = new Map<string, ModelUse[]>();
    campaign.sites.forEach((site, s) => {
      site.determinations.forEach((d, n) => {
        if (d.kind !== 'gravity-model') return;
        const h = (d.h ?? site.h)!;
        const shift = tideConversion(
          'ellipsoidal-height',
          h.tide ?? 'free',
          campaign.tide,
          site.latitudeRad,
          campaign.love,
        );
        const uses = byFile.get(d.model.file) ?? [];
        uses.push({ site: s, determination: n, heightM: h.value + shift, d });
        byFile.set(d.model.file, uses);
      });
    });
    for (const [file, uses] of byFile) this.#sum(campaign, file, uses, files, faults, warnings);
  }

  of(site: number, determination: number) {
    return this.#found.get(`${site}:${determination}`);
  }

  #sum(
    campaign: Campaign,
    file: string,
    uses: readonly ModelUse[],
    files: CampaignFiles,
    faults: Fault[],
    warnings: Warning[],
  ) {
    const pathOf = (u: ModelUse) => `sites.${campaign.sites[u.site]!.id}.determinations.${u.determination}`;
    const request: GravityModelRequest = {
      file,
      tide: campaign.tide,
      k2: campaign.love.k2,
      points: uses.map((u) => ({
        latitudeRad: campaign.sites[u.site]!.latitudeRad,
        longitudeRad: campaign.sites[u.site]!.longitudeRad,
        heightM: u.heightM,
        maxDegree: u.d.model.maxDegree,
        modelTide: u.d.model.tide,
        commission: u.d.commissionM === null,
      })),
    };
    const reading = files.gravityModel(request);
    const first = `${pathOf(uses[0]!)}.model`;
    if (reading === null) {
      faults.push(
        ...uses.map((u) =>
          faultAt(
            'file-not-at-hand',
            `${pathOf(u)}.model`,
            file,
            'the file beside the campaign; or W as it was worked out, with "kind": "potential"',
          ),
        ),
      );
      return;
    }
    if ('faults' in reading) {
      faults.push(...reading.faults.map((f) => faultInFile(f, first, file)));
      return;
    }
    warnings.push(...reading.warnings.map((w) => ({ ...w, path: first })));
    const n = uses.length;
    const covariance = reading.commissionM4s4;
    uses.forEach((u, i) => {
      const { maxDegree, potentialM2s2, perHeightMs2 } = reading.points[i]!;
      const gamma = normalGravity(GRS80, campaign.sites[u.site]!.latitudeRad, 0);
      const { commissionM } = u.d;
      if (commissionM === null && covariance === null)
        warnings.push({
          code: 'commission-missing',
          path: pathOf(u),
          message: `${file} gives no standard deviations of its coefficients and no "commission" is stated: W carries the omission error alone.`,
        });
      this.#found.set(`${u.site}:${u.determination}`, {
        maxDegree,
        heightM: u.heightM,
        potentialM2s2,
        perHeightMs2,
        commissionM2s2: commissionM === null ? Math.sqrt(covariance?.[i * n + i] ?? 0) : commissionM * gamma,
        omissionM2s2: (u.d.omissionM ?? kaulaOmission(maxDegree).geoidHeightM) * gamma,
      });
    });
    if (covariance) this.correlations.push({ file, ...correlationBySite(campaign, uses, covariance) });
  }
}

/** Correlation between sites; a site with two uses of the file counts with its first, since errors at one place are one. */
function correlationBySite(campaign: Campaign, uses: readonly ModelUse[], covariance: Float64Array) {
  const firsts = uses
    .map((u, i) => ({ site: u.site, i }))
    .filter(({ site }, i) => uses.findIndex((u) => u.site === site) === i);
  const n = uses.length;
  const at = (i: number, j: number) => covariance[i * n + j]!;
  return {
    sites: firsts.map(({ site }) => campaign.sites[site]!.id),
    correlation: firsts.map(({ i }) =>
      firsts.map(({ i: j }) => (i === j ? 1 : at(i, i) * at(j, j) > 0 ? at(i, j) / Math.sqrt(at(i, i) * at(j, j)) : 0)),
    ),
  };
}
