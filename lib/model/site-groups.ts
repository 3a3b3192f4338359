import type { DeterminationObservation } from './model.js';

/** Sites tied to each other by levelling. */
export interface SiteGroups {
  /** group index per site */
  readonly groupOfSite: readonly number[];
  /** per group, whether some absolute determination gives it a level */
  readonly hasLevel: readonly boolean[];
  /** per group, its sites in file order */
  readonly sites: readonly (readonly number[])[];
}

/** Connects sites through the observations in the fit (levelling, and further `ties` such as measured links). */
export function siteGroups(
  siteCount: number,
  fitted: readonly Pick<DeterminationObservation, 'site' | 'from'>[],
  ties: readonly (readonly [number, number])[] = [],
): SiteGroups {
  const parent = Array.from({ length: siteCount }, (_, i) => i);
  const root = (i: number): number => {
    let at = i;
    while (parent[at] !== at) {
      parent[at] = parent[parent[at]!]!;
      at = parent[at]!;
    }
    return at;
  };
  const join = (a: number, b: number) => {
    const [ra, rb] = [root(a), root(b)];
    // the earlier site stays root, so that groups come out in file order
    if (ra !== rb) parent[Math.max(ra, rb)] = Math.min(ra, rb);
  };
  for (const { site, from } of fitted) if (from !== null) join(site, from);
  for (const [a, b] of ties) join(a, b);
  const sites: number[][] = [];
  const indexOfRoot = new Map<number, number>();
  const groupOfSite = parent.map((_, i) => {
    const r = root(i);
    let g = indexOfRoot.get(r);
    if (g === undefined) {
      g = sites.length;
      indexOfRoot.set(r, g);
      sites.push([]);
    }
    sites[g]!.push(i);
    return g;
  });
  const hasLevel = sites.map(() => false);
  for (const { site, from } of fitted) if (from === null) hasLevel[groupOfSite[site]!] = true;
  return { groupOfSite, hasLevel, sites };
}
