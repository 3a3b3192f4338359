import type { LinkPrediction } from '../../lib/answers/prediction.js';
import type { Section, SectionClock } from '../../lib/answers/section.js';
import { formatConcise } from '../../lib/quantity/index.js';
import type { SectionScale } from '../charts/section-scale.js';
import type { LoupeSubject } from './section-loupe.js';

/** Ends of a link that come out closer than this are shown under the loupe, px. */
const NEAR_PX = 7;

/** What the loupe is put on: the clock that the reader chose; else two ends on one level, of the link in hand or of the first
 *  that has them so; else the least certain tie, of the link in hand if there is one. Null: there is nothing to magnify. */
export function subjectOf(
  { clocks, sites }: Section,
  links: readonly LinkPrediction[],
  { inHand, chosen }: { readonly inHand: string | null; readonly chosen: string | null },
  scale: SectionScale,
): LoupeSubject | null {
  const clockOf = (id: string | null) => clocks.find((clock) => clock.id === id);
  const markerOf = (clock: SectionClock) =>
    sites
      .find(({ id }) => id === clock.site)!
      .name.split(',')[1]
      ?.trim() ?? 'marker';
  const tieOf = (clock: SectionClock): LoupeSubject => ({ kind: 'tie', clock, marker: markerOf(clock) });
  const chosenClock = clockOf(chosen);
  if (chosenClock) return tieOf(chosenClock);
  const held = links.find(({ id }) => id === inHand);
  for (const link of held ? [held] : links) {
    const [from, to] = [clockOf(link.from), clockOf(link.to)];
    if (!from || !to || !link.dW || !link.dH || from.site === to.site) continue;
    if (Math.abs(link.dW.value) * scale.pxPerUnit < NEAR_PX)
      return {
        kind: 'near',
        link: link.id,
        from,
        to,
        difference: link.dW,
        text: `${formatConcise(link.dH.value, link.dH.u, { scale: -3, sign: 'always' })} mm`,
      };
  }
  const ends = held ? clocks.filter(({ id }) => id === held.from || id === held.to) : clocks;
  const worst = ends.reduce<SectionClock | null>(
    (one, other) => (one && (one.sum?.potential.u ?? -1) >= (other.sum?.potential.u ?? -1) ? one : other),
    null,
  );
  return worst?.sum ? tieOf(worst) : null;
}
