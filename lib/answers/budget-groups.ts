import type { InputCovariance } from '../uncertainty/covariance.js';
import type { Gradient } from '../uncertainty/gradient.js';

/** One part of an input's uncertainty in a result y: what it has from one source, or what names no source. */
export interface BudgetPart {
  /** path of the input */
  readonly input: string;
  /** id of the shared source; null: independent */
  readonly source: string | null;
  /** the input as stated, SI */
  readonly value: number;
  /** standard uncertainty of this part, SI */
  readonly u: number;
  /** the input has no other part */
  readonly isWhole: boolean;
  /** c = ∂y/∂x, in y per SI unit of the input */
  readonly sensitivity: number;
  /** c·u, signed: what an error of +u does to y */
  readonly effect: number;
  /** covariance with y as a part of u²(y); the shares of all parts add up to 1, one can be negative */
  readonly share: number;
}

/** Parts that belong together: those of one source, or a single part without one. Groups are independent of each other, so that
 *  their variances add up to u²(y) exactly. */
export interface BudgetGroup {
  readonly source: string | null;
  /** by falling |share| */
  readonly parts: readonly BudgetPart[];
  /** the group's variance as a part of u²(y), 0…1 */
  readonly share: number;
  /** standard uncertainty of y from this group, correlations included */
  readonly uy: number;
  /** √Σ(c·u)²: what it would be if the errors of its inputs were independent */
  readonly independentUy: number;
  /** |Σ c·u|: what it would be if they were wholly common; equal to `uy` for a source with correlation 1 */
  readonly commonUy: number;
}

export interface GroupedBudget {
  /** standard uncertainty of y */
  readonly u: number;
  /** by falling share */
  readonly groups: readonly BudgetGroup[];
}

/** Parts under this fraction of u(y) are left out. */
const NEGLIGIBLE_PART = 1e-12;

/** Splits u²(y) by source, and within a source by input. An input with parts of several sources stands in several groups.
 * @see GUM 5.2.2, eq. 16, and F.1.2.3; shares as cov(y, c·part)/u²(y) */
export function groupedBudget(covariance: InputCovariance, gradient: Gradient): GroupedBudget {
  const u = Math.sqrt(covariance.variance(gradient));
  if (u === 0) return { u, groups: [] };
  const bySource = new Map<string, Member[]>();
  const groups: BudgetGroup[] = [];
  gradient.indices.forEach((index, k) => {
    const { parts, path, value, place } = covariance.inputs[index]!;
    const sensitivity = gradient.values[k]!;
    const own = Math.hypot(...parts.filter((p) => p.source === null).map((p) => p.u));
    const stated = parts.filter((p) => p.source !== null).length + (own > 0 ? 1 : 0);
    const part = (source: string | null, uPart: number): Omit<BudgetPart, 'share'> => ({
      input: path,
      source,
      value,
      u: uPart,
      isWhole: stated === 1,
      sensitivity,
      effect: sensitivity * uPart,
    });
    if (own > 0) {
      const alone = part(null, own);
      const uy = Math.abs(alone.effect);
      const share = (uy / u) ** 2;
      if (uy > NEGLIGIBLE_PART * u)
        groups.push({ source: null, parts: [{ ...alone, share }], share, uy, independentUy: uy, commonUy: uy });
    }
    for (const { source, u: uPart } of parts) {
      if (source === null || uPart === 0) continue;
      const member = { part: part(source, uPart), place: place.key };
      const known = bySource.get(source);
      if (known) known.push(member);
      else bySource.set(source, [member]);
    }
  });
  for (const [source, members] of bySource) {
    const group = groupOf(covariance, source, members, u);
    if (group.parts.length > 0) groups.push(group);
  }
  return { u, groups: groups.sort((a, b) => b.share - a.share) };
}

interface Member {
  readonly part: Omit<BudgetPart, 'share'>;
  /** key of its place */
  readonly place: string;
}

function groupOf(covariance: InputCovariance, source: string, members: readonly Member[], u: number): BudgetGroup {
  const field = covariance.sourceField(source);
  if (!field) throw new Error(`internal: unlisted source ${source}`);
  const placeAt = new Map(field.places.map((p, i) => [p.key, i]));
  const sums = new Map<number, number>();
  for (const { part, place } of members) {
    const at = placeAt.get(place)!;
    sums.set(at, (sums.get(at) ?? 0) + part.effect);
  }
  // what each place feels of all: R·S
  const image = new Map([...sums.keys()].map((p) => [p, sum([...sums], ([q, s]) => field.rho(p, q) * s)]));
  const parts = members
    .map(({ part, place }) => ({ ...part, share: (part.effect * image.get(placeAt.get(place)!)!) / (u * u) }))
    .sort((a, b) => Math.abs(b.share) - Math.abs(a.share));
  // what cancels exactly may come out at −1e-16 of its terms
  const share = Math.max(
    0,
    sum(parts, (p) => p.share),
  );
  return {
    source,
    parts: parts.filter(({ effect }) => Math.abs(effect) > NEGLIGIBLE_PART * u),
    share,
    uy: Math.sqrt(share) * u,
    independentUy: Math.hypot(...parts.map(({ effect }) => effect)),
    commonUy: Math.abs(sum(parts, ({ effect }) => effect)),
  };
}

const sum = <T>(items: readonly T[], of: (item: T) => number): number => items.reduce((s, item) => s + of(item), 0);
