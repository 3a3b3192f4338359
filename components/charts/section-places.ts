import type { SectionPlanInput } from './section-plan.js';
import type { SectionScale } from './section-scale.js';

/** Among very many links none is told apart by moving a site. */
const MANY_LINKS = 40;
/** A third clock that close to a link, px, looks as if it lay on it. */
const CLEAR_PX = 34;
const NUDGES = [0, 0.2, -0.2, 0.3, -0.3];

/** x of the sites, evenly, but for one that a link between two others would run through: it moves aside. */
export function sitePlaces(
  { section, links }: SectionPlanInput,
  scale: SectionScale,
  left: number,
  apart: number,
): number[] {
  const siteOf = new Map(section.clocks.map(({ id, site }) => [id, section.sites.findIndex((one) => one.id === site)]));
  const y = new Map(section.clocks.map(({ id, C }) => [id, scale.toPx(C.value)]));
  const xs = section.sites.map((_, i) => left + apart * (i + 0.5));
  if (links.length > MANY_LINKS) return xs;
  section.sites.forEach(({ id }, i) => {
    const here = section.clocks.filter(({ site }) => site === id).map((clock) => y.get(clock.id)!);
    const passing = links.filter(({ from, to }) => {
      const [a, b] = [siteOf.get(from), siteOf.get(to)];
      return a !== undefined && b !== undefined && (a - i) * (b - i) < 0;
    });
    if (here.length === 0 || passing.length === 0) return;
    const clearance = (nudge: number) => {
      const x = xs[i]! + nudge * apart;
      return Math.min(
        ...passing.flatMap(({ from, to }) => {
          const [xa, xb] = [xs[siteOf.get(from)!]!, xs[siteOf.get(to)!]!];
          const at = y.get(from)! + ((x - xa) / (xb - xa)) * (y.get(to)! - y.get(from)!);
          return here.map((level) => Math.abs(level - at));
        }),
      );
    };
    const best = NUDGES.find((nudge) => clearance(nudge) >= CLEAR_PX);
    xs[i] = xs[i]! + apart * (best ?? [...NUDGES].sort((p, q) => clearance(q) - clearance(p))[0]!);
  });
  return xs;
}
