import type { Campaign } from '../campaign/campaign.js';

/** Ids, as paths, of everything marked `"candidate": true`, in file order: sites, their determinations, clocks, links. */
export function candidatePaths(campaign: Campaign): string[] {
  return [
    ...campaign.sites.flatMap((s) => [
      ...(s.candidate ? [`sites.${s.id}`] : []),
      ...s.determinations.flatMap((d, n) => (d.candidate ? [`sites.${s.id}.determinations.${n}`] : [])),
    ]),
    ...campaign.clocks.flatMap((c) => (c.candidate ? [`clocks.${c.id}`] : [])),
    ...campaign.links.flatMap((l) => (l.candidate ? [`links.${l.id}`] : [])),
  ];
}

/** Cost of a candidate as stated; null if none stands there. */
export function costOf(campaign: Campaign, path: string): number | null {
  // ids hold no full stop
  const [list, id, , n] = path.split('.');
  if (list === 'clocks') return campaign.clocks.find((c) => c.id === id)?.cost ?? null;
  if (list === 'links') return campaign.links.find((l) => l.id === id)?.cost ?? null;
  const site = campaign.sites.find((s) => s.id === id);
  return (n === undefined ? site?.cost : site?.determinations[Number(n)]?.cost) ?? null;
}

/** Whether an observation can be made with these candidates at hand: everything it needs is there. */
export interface Availability {
  site(index: number): boolean;
  clock(id: string): boolean;
  link(id: string): boolean;
  determination(siteIndex: number, n: number): boolean;
}

/** @param added paths of the candidates that are taken as present */
export function availability(campaign: Campaign, added: ReadonlySet<string>): Availability {
  const present = (candidate: boolean, path: string) => !candidate || added.has(path);
  const siteIndex = new Map(campaign.sites.map((s, i) => [s.id, i]));
  const clocks = new Map(campaign.clocks.map((c) => [c.id, c]));
  const links = new Map(campaign.links.map((l) => [l.id, l]));
  const site = (index: number) => present(campaign.sites[index]!.candidate, `sites.${campaign.sites[index]!.id}`);
  const clock = (id: string) =>
    present(clocks.get(id)!.candidate, `clocks.${id}`) && site(siteIndex.get(clocks.get(id)!.site)!);
  return {
    site,
    clock,
    link: (id) => {
      const l = links.get(id)!;
      return present(l.candidate, `links.${id}`) && clock(l.from) && clock(l.to);
    },
    determination: (index, n) => {
      const s = campaign.sites[index]!;
      const d = s.determinations[n]!;
      const other = d.kind === 'levelled-from' ? siteIndex.get(d.site)! : index;
      return present(d.candidate, `sites.${s.id}.determinations.${n}`) && site(index) && site(other);
    },
  };
}
