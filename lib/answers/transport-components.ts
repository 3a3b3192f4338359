import type { Clock, Link } from '../campaign/campaign.js';
import { piecesAt, type TransportInputs } from '../model/side-by-side.js';

/** What a component leaves in (remote − side by side), as a fraction of frequency. */
export interface TransportComponent {
  /** whose it is: a clock's or the link's id */
  readonly of: string;
  /** piece's name, or what it is */
  readonly name: string;
  readonly source: string | null;
  readonly uRemote: number;
  /** root mean square over the comparisons side by side */
  readonly uSideBySide: number;
  readonly uLeft: number;
}

/** Per piece: what it is in each place, and what is left of it. */
export function transportComponents(link: Link, t: TransportInputs, weight: readonly number[]): TransportComponent[] {
  const { travels, stays } = t;
  const entries = link.transported!.sideBySide;
  const squares = weight.reduce((s, w) => s + w * w, 0);
  const rows: TransportComponent[] = [];
  const names = new Map<string, { name: string; source: string | null; remote: number; local: number[] }>();
  const row = (key: string, name: string, source: string | null) => {
    const known = names.get(key) ?? { name, source, remote: 0, local: entries.map(() => 0) };
    names.set(key, known);
    return known;
  };
  const keyOf = (source: string | null, name: string) => (source === null ? `piece ${name}` : `source ${source}`);
  const nameOf = (piece: { readonly name?: string; readonly source: string | null }) =>
    piece.name ?? piece.source ?? 'without a name';
  for (const piece of travels.systematic) {
    const r = row(keyOf(piece.source, nameOf(piece)), nameOf(piece), piece.source);
    r.remote = Math.hypot(r.remote, piece.u);
  }
  entries.forEach((entry, k) => {
    for (const piece of piecesAt(entry, travels)) {
      const r = row(keyOf(piece.source, nameOf(piece)), nameOf(piece), piece.source);
      r.local[k] = Math.hypot(r.local[k]!, piece.u);
    }
  });
  for (const { name, source, remote, local } of names.values()) {
    const rho = source === null ? 0 : correlationHomeAndAway(t, source);
    const sum = local.reduce((s, u, k) => s + weight[k]! * u, 0);
    const home = source === null ? local.reduce((s, u, k) => s + (weight[k]! * u) ** 2, 0) : sum * sum;
    const left = remote * remote + home - 2 * rho * remote * sum;
    rows.push({
      of: travels.id,
      name,
      source,
      uRemote: remote,
      uSideBySide: Math.sqrt(local.reduce((s, u) => s + u * u, 0) / local.length),
      uLeft: Math.sqrt(Math.max(0, left)),
    });
  }
  const uOf = (pieces: Clock['systematic']) => Math.hypot(...pieces.map(({ u }) => u));
  const { reproducibility } = link.transported!;
  if (reproducibility > 0)
    rows.push({
      of: travels.id,
      name: 'reproducibility',
      source: null,
      uRemote: reproducibility,
      uSideBySide: reproducibility,
      uLeft: reproducibility * Math.sqrt(1 + squares),
    });
  if (stays.systematic.length > 0) {
    const u = uOf(stays.systematic);
    rows.push({ of: stays.id, name: 'the clock that stays', source: null, uRemote: u, uSideBySide: u, uLeft: 0 });
  }
  if (link.systematic.length > 0) {
    const u = uOf(link.systematic);
    rows.push({ of: link.id, name: 'the link', source: null, uRemote: u, uSideBySide: 0, uLeft: u });
  }
  return rows;
}

/** Correlation of a source between the remote site and that of the clock that stays. */
function correlationHomeAndAway(t: TransportInputs, source: string): number {
  const field = t.covariance.sourceField(source);
  if (!field) return 1;
  const at = (clock: Clock) => field.places.findIndex(({ key }) => key === `sites.${clock.site}`);
  const [away, home] = [at(t.travels), at(t.stays)];
  return away < 0 || home < 0 ? 1 : field.rho(away, home);
}
