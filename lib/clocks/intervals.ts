import type { TimeInterval } from '../campaign/campaign.js';

/** A set of instants as half-open intervals [start, end): sorted, disjoint, none empty. */
export type IntervalSet = readonly TimeInterval[];

/** The instants that lie in at least one of the intervals: sorted, touching ones joined, empty ones left out.
 * @param intervals in any order, overlapping or not; milliseconds since 1970-01-01T00:00:00Z
 * @throws {RangeError} if an end lies before its start or a bound is NaN */
export function unionOfIntervals(intervals: readonly TimeInterval[]): TimeInterval[] {
  for (const { startMs, endMs } of intervals) {
    if (!(endMs >= startMs))
      throw new RangeError(`interval from ${startMs} to ${endMs} ms: the end must not lie before the start`);
  }
  const sorted = intervals.filter((i) => i.endMs > i.startMs).sort((a, b) => a.startMs - b.startMs);
  const joined: TimeInterval[] = [];
  for (const next of sorted) {
    const last = joined.at(-1);
    if (last === undefined || next.startMs > last.endMs) joined.push({ startMs: next.startMs, endMs: next.endMs });
    else if (next.endMs > last.endMs) joined[joined.length - 1] = { startMs: last.startMs, endMs: next.endMs };
  }
  return joined;
}

/** The instants that lie in every one of the lists: when clock A and clock B and the link are all up.
 * @param lists each in any order; a list without intervals is never up, so the result is empty. No list at all is refused:
 *   there is nothing it could mean.
 * @throws {RangeError} for no list, an end before its start, or a NaN */
export function intersectionOfIntervals(lists: readonly (readonly TimeInterval[])[]): TimeInterval[] {
  const [first, ...rest] = lists;
  if (first === undefined) throw new RangeError('intersection of no interval lists: give at least one');
  return rest.reduce<TimeInterval[]>(
    (common, list) => intersectionOfTwo(common, unionOfIntervals(list)),
    unionOfIntervals(first),
  );
}

function intersectionOfTwo(a: IntervalSet, b: IntervalSet): TimeInterval[] {
  const common: TimeInterval[] = [];
  let i = 0;
  let j = 0;
  while (i < a.length && j < b.length) {
    const p = a[i]!;
    const q = b[j]!;
    const startMs = Math.max(p.startMs, q.startMs);
    const endMs = Math.min(p.endMs, q.endMs);
    if (endMs > startMs) common.push({ startMs, endMs });
    if (p.endMs < q.endMs) i++;
    else j++;
  }
  return common;
}

/** The instants of `within` that lie in none of the intervals: the dead time of a campaign. */
export function complementOfIntervals(intervals: readonly TimeInterval[], within: TimeInterval): TimeInterval[] {
  const gaps: TimeInterval[] = [];
  let from = within.startMs;
  for (const { startMs, endMs } of unionOfIntervals(intervals)) {
    if (startMs >= within.endMs) break;
    if (startMs > from) gaps.push({ startMs: from, endMs: startMs });
    from = Math.max(from, endMs);
  }
  if (within.endMs > from) gaps.push({ startMs: from, endMs: within.endMs });
  return gaps;
}

/** Total length of the union, in seconds; what is covered twice counts once. */
export const totalLengthS = (intervals: readonly TimeInterval[]): number =>
  unionOfIntervals(intervals).reduce((sum, { startMs, endMs }) => sum + (endMs - startMs), 0) / 1000;
