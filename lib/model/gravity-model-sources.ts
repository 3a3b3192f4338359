import type { Campaign, Determination } from '../campaign/campaign.js';
import { kaulaOmission } from '../earth/gravity-model/model-uncertainty.js';
import type { ErrorSource } from '../uncertainty/inputs.js';

type ByModel = Determination & { readonly kind: 'gravity-model' };

/** Built-in error sources of gravity models; a colon keeps them out of the way of a campaign's own ids. */
export const omissionSourceId = (file: string, maxDegree: number): string => `built-in:omission:${file}:${maxDegree}`;

const commissionSourceId = (file: string): string => `built-in:commission:${file}`;

/** Where the file gives no covariance, a stated commission error is one error for all sites that use the file to the same degree, alike
 *  over the same distance as the omission: half a wavelength. */
const statedCommissionSourceId = (file: string, maxDegree: number): string =>
  `built-in:stated-commission:${file}:${maxDegree}`;

export const commissionSource = (campaign: Campaign, { model, commissionM, atMarker }: ByModel): string =>
  commissionM === null && campaign.gravityModels?.some(({ file }) => file === model.file)
    ? commissionSourceId(model.file)
    : statedCommissionSourceId(model.file, atMarker.maxDegree);

/** The error sources that the gravity models of a campaign bring with them. */
export function gravityModelSources(campaign: Campaign): ErrorSource[] {
  const sources = new Map<string, ErrorSource>();
  for (const { file, sites, correlation } of campaign.gravityModels ?? []) {
    const index = new Map(sites.map((id, i) => [`sites.${id}`, i]));
    const id = commissionSourceId(file);
    sources.set(id, {
      id,
      correlation: null,
      correlationLengthM: null,
      between: (a, b) => {
        const rho = correlation[index.get(a.key) ?? -1]?.[index.get(b.key) ?? -1];
        if (rho === undefined) throw new Error(`internal: no correlation of ${file} between ${a.key} and ${b.key}`);
        return rho;
      },
    });
  }
  for (const site of campaign.sites)
    for (const d of site.determinations) {
      if (d.kind !== 'gravity-model') continue;
      const { maxDegree } = d.atMarker;
      const { correlationLengthM } = kaulaOmission(maxDegree);
      for (const id of [omissionSourceId(d.model.file, maxDegree), statedCommissionSourceId(d.model.file, maxDegree)])
        sources.set(id, { id, correlation: null, correlationLengthM });
    }
  return [...sources.values()];
}
