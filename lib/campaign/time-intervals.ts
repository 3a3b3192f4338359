import type { TimeInterval } from './campaign.js';

/** The same time as intervals that follow each other: sorted, those that touch or overlap joined. */
export function inOrder(intervals: readonly TimeInterval[]): TimeInterval[] {
  const joined: TimeInterval[] = [];
  for (const next of [...intervals].sort((a, b) => a.startMs - b.startMs)) {
    const last = joined.at(-1);
    if (last && next.startMs <= last.endMs)
      joined[joined.length - 1] = { ...last, endMs: Math.max(last.endMs, next.endMs) };
    else joined.push(next);
  }
  return joined;
}

/** Share of the window that intervals in order cover; without a window, of the span from their first start to their last end.
 * @returns 0…1 */
export function coveredShare(intervals: readonly TimeInterval[], window: TimeInterval | null): number {
  const from = window?.startMs ?? intervals[0]?.startMs ?? 0;
  const to = window?.endMs ?? intervals.at(-1)?.endMs ?? 0;
  let covered = 0;
  for (const { startMs, endMs } of intervals) covered += Math.max(0, Math.min(endMs, to) - Math.max(startMs, from));
  return to > from ? covered / (to - from) : 0;
}
