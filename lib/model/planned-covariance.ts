import type { Campaign, Clock, Link } from '../campaign/campaign.js';
import { comparisonNoise, statisticalVariance } from '../clocks/averaging.js';
import { jointUptime, jointUptimeOf } from './joint-uptime.js';

/** Statistical covariance of comparisons that run at the same time over T, as fractions of frequency squared.
 *  Links that share a clock share its noise: Σ over shared clocks s_i·s_j·(white²/(T·product of the shared clocks' uptimes) +
 *  flicker²), s = +1 where the clock is `to`, −1 where it is `from`; the diagonal with each link's own effective time. */
export function plannedCovariance(campaign: Campaign, links: readonly Link[], windowS: number): Float64Array[] {
  const clock = new Map(campaign.clocks.map((c) => [c.id, c]));
  const ends = links.map((l) => ({ from: clock.get(l.from)!, to: clock.get(l.to)! }));
  const sign = (i: number, c: Clock) => (ends[i]!.to === c ? 1 : -1);
  const v = links.map(() => new Float64Array(links.length));
  links.forEach((link, i) => {
    const { from, to } = ends[i]!;
    v[i]![i] = statisticalVariance(comparisonNoise(from, to, link), windowS * jointUptime(campaign, from, to, link));
    for (let j = 0; j < i; j++) {
      const shared = [from, to].filter((c) => c === ends[j]!.from || c === ends[j]!.to);
      if (shared.length === 0) continue;
      const effective = windowS * jointUptimeOf(campaign, shared);
      let sum = 0;
      for (const c of shared)
        sum += sign(i, c) * sign(j, c) * (c.stability.white ** 2 / effective + c.stability.flicker ** 2);
      v[i]![j] = sum;
      v[j]![i] = sum;
    }
  });
  return v;
}
