import type { Campaign, Link, TimeInterval } from '../campaign/campaign.js';
import { comparisonNoise, statisticalVariance } from '../clocks/averaging.js';
import { type MeasuredOffset, measuredOffset, statisticalCovariance } from '../model/frequency-comparison.js';
import { jointUptime } from '../model/joint-uptime.js';
import type { Model } from '../model/model.js';
import { gradientOf } from '../uncertainty/gradient.js';
import type { LoopClosure } from './adjustment.js';
import type { SolvedCampaign } from './solve-campaign.js';

interface Edge {
  readonly link: Link;
  /** null: planned */
  readonly measured: MeasuredOffset | null;
}

/** Closures of an independent set of loops of links (a spanning forest and the links left over). Around a loop potentials,
 *  clock systematics and frequency offsets cancel. If all were measured at the same time the clocks' noise cancels as well:
 *  then u is the links' noise and systematics alone; else it is the measurements' statistics and the links' systematics.
 *  The first measurement of each link stands for it. */
export function loopClosures(solved: SolvedCampaign, planned: boolean): LoopClosure[] {
  const { model } = solved;
  const { campaign } = model;
  const edges = campaign.links.flatMap((link): Edge[] => {
    if (link.candidate) return [];
    const index = campaign.measurements.findIndex((m) => m.link === link.id && !m.check);
    if (index >= 0) return [{ link, measured: measuredOffset(model, index) }];
    return planned ? [{ link, measured: null }] : [];
  });
  return independentLoops(edges).map((loop) => closure(model, loop));
}

type Loop = readonly { readonly edge: Edge; readonly sign: 1 | -1 }[];

function independentLoops(edges: readonly Edge[]): Loop[] {
  const up = new Map<string, { readonly parent: string; readonly edge: Edge; readonly sign: 1 | -1 } | null>();
  const pathToRoot = (clock: string) => {
    const path: { clock: string; edge: Edge; sign: 1 | -1 }[] = [];
    for (let at = clock, step = up.get(at); step; at = step.parent, step = up.get(at))
      path.push({ clock: at, edge: step.edge, sign: step.sign });
    return path;
  };
  const left: Edge[] = [];
  // grow the forest breadth first, so that loops come out short
  const waiting = new Set(edges);
  for (const start of edges) {
    if (up.has(start.link.from)) continue;
    up.set(start.link.from, null);
    const queue = [start.link.from];
    for (let clock = queue.shift(); clock !== undefined; clock = queue.shift())
      for (const edge of waiting) {
        const { from, to } = edge.link;
        if (from !== clock && to !== clock) continue;
        waiting.delete(edge);
        const other = from === clock ? to : from;
        if (up.has(other)) left.push(edge);
        else {
          // walked from the child up to its parent
          up.set(other, { parent: clock, edge, sign: from === other ? 1 : -1 });
          queue.push(other);
        }
      }
  }
  return left.map((edge) => {
    const a = pathToRoot(edge.link.to);
    const b = pathToRoot(edge.link.from);
    while (a.length > 0 && b.length > 0 && a.at(-1)!.edge === b.at(-1)!.edge) {
      a.pop();
      b.pop();
    }
    const down = b.reverse().map(({ edge: e, sign }) => ({ edge: e, sign: -sign as 1 | -1 }));
    return [{ edge, sign: 1 as const }, ...a.map(({ edge: e, sign }) => ({ edge: e, sign })), ...down];
  });
}

function closure(model: Model, loop: Loop): LoopClosure {
  const { campaign } = model;
  const spans = loop.map(({ edge }) => spanOf(campaign, edge));
  const [first] = spans;
  const simultaneous = !!first && spans.every((span) => span?.startMs === first.startMs && span.endMs === first.endMs);
  const systematic = model.covariance.variance(
    gradientOf(loop.map(({ edge, sign }) => [model.frequencyInputs.link[campaign.links.indexOf(edge.link)]!, sign])),
  );
  const statistics = simultaneous
    ? loop.reduce((s, { edge }) => s + linkNoiseVariance(campaign, edge.link, first), 0)
    : measuredVariance(model, loop);
  const u = Math.sqrt(systematic + statistics);
  const measured = loop.every(({ edge }) => edge.measured !== null);
  const value = loop.reduce((s, { edge, sign }) => s + sign * (edge.measured?.yMean ?? 0), 0);
  return {
    links: loop.map(({ edge, sign }) => ({ id: edge.link.id, sign })),
    simultaneous,
    closure: { ...(measured ? { value } : {}), u },
    z: measured && u > 0 ? value / u : null,
  };
}

/** Time a comparison ran: as its measurement states it, else the window. */
function spanOf(campaign: Campaign, { measured }: Edge): TimeInterval | null {
  const { startMs, endMs } = measured?.measurement ?? { startMs: null, endMs: null };
  return startMs !== null && endMs !== null ? { startMs, endMs } : campaign.window;
}

/** Noise of the link alone over the time it ran together with its clocks. */
function linkNoiseVariance(campaign: Campaign, link: Link, span: TimeInterval): number {
  const clock = (id: string) => campaign.clocks.find((c) => c.id === id)!;
  const uptime = jointUptime(campaign, clock(link.from), clock(link.to), link);
  const { white, flicker, phase } = link.stability;
  const alone = { white2: white ** 2, flicker2: flicker ** 2, phase2: link.segments * phase ** 2 };
  return statisticalVariance(alone, ((span.endMs - span.startMs) / 1000) * uptime);
}

/** Statistics of measurements that ran at different times: their clocks' noise does not cancel. A planned
 *  link beside them counts with all its noise over the window. */
function measuredVariance(model: Model, loop: Loop): number {
  const measured = loop.flatMap(({ edge, sign }) => (edge.measured ? [{ offset: edge.measured, sign }] : []));
  const v = statisticalCovariance(
    model,
    measured.map((m) => m.offset),
  );
  const stated = v.reduce(
    (s, row, i) => s + row.reduce((t, x, j) => t + measured[i]!.sign * measured[j]!.sign * x, 0),
    0,
  );
  const planned = loop.flatMap(({ edge }) => (edge.measured ? [] : [edge.link]));
  return planned.reduce((s, link) => s + wholeNoiseVariance(model.campaign, link), stated);
}

function wholeNoiseVariance(campaign: Campaign, link: Link): number {
  const clock = (id: string) => campaign.clocks.find((c) => c.id === id)!;
  const [from, to] = [clock(link.from), clock(link.to)];
  const { startMs, endMs } = campaign.window!;
  const effectiveS = ((endMs - startMs) / 1000) * jointUptime(campaign, from, to, link);
  return statisticalVariance(comparisonNoise(from, to, link), effectiveS);
}
