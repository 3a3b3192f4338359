import type { Warning } from '../../campaign/fault.js';
import type { Run } from '../deviations/index.js';
import { pathOfLine } from './frequency-series.js';
import { findOutliers, type Outliers } from './outliers.js';
import { findStep } from './steps.js';
import { findUnitSlips, type UnitSlip } from './unit-slips.js';

/** Fractions larger than this are no clock comparison: 1e-8 is 9e7 m of height. */
const LARGEST_FRACTION = 1e-8;

const MOST_LINES = 5;

const sci = (x: number): string => x.toExponential(2);

/** What looks wrong about the values, in words and with lines. Nothing is changed or left out: that is the reader's decision. */
export function inspectValues(
  y: Float64Array,
  runs: readonly Run[],
  intervalS: number,
  lineOf: (i: number) => number,
): Warning[] {
  const warnings: Warning[] = [];
  const say = (code: string, sample: number | null, message: string): void => {
    warnings.push({ code, path: pathOfLine(sample === null ? null : lineOf(sample)), message });
  };
  const lines = (samples: readonly number[], count: number): string =>
    `${count === 1 ? 'line' : 'lines'} ${samples.slice(0, MOST_LINES).map(lineOf).join(', ')}${count > MOST_LINES ? ` and ${count - MOST_LINES} more` : ''}`;

  const zeros = exactZeros(y);
  if (zeros !== null) {
    say(
      'zero-values',
      zeros.first,
      `${zeros.count === 1 ? 'one value is' : `${zeros.count} values are`} exactly 0 among values that are not (the first in line ${lineOf(zeros.first)}): were missing values written as 0? Zero is taken as measured.`,
    );
  }
  const outliers = findOutliers(y);
  const slips = findUnitSlips(y, outliers);
  for (const slip of slips) say('unit-slip', slip.first, slipMessage(slip, lineOf));
  const others = slips.length === 0 ? outliers : outsideSlips(y, slips);
  if (others.samples.length > 0) {
    const worst = others.samples.reduce((a, b) => (others.distanceOf(b) > others.distanceOf(a) ? b : a));
    const count = others.samples.length;
    say(
      'outliers',
      others.samples[0]!,
      `${count === 1 ? 'one value lies' : `${count} values lie`} more than ${others.limit.toFixed(1)} robust standard deviations from the neighbours (${lines(others.samples, count)}); the farthest, ${sci(y[worst]!)} in line ${lineOf(worst)}, by ${others.distanceOf(worst).toPrecision(3)}. Nothing is left out for that.`,
    );
  }
  const step = slips.length === 0 ? findStep(y, outliers) : null;
  if (step !== null) {
    const s = step.windowSamples * intervalS;
    const across = runs.some((r) => r.first === step.sample) ? ', after a gap' : '';
    say(
      'step',
      step.sample,
      `the frequency steps by ${sci(step.size)} near line ${lineOf(step.sample)}${across}: the means of ${Number(s.toPrecision(4))} s before and after differ by ${step.significance.toFixed(0)} times what is usual in this record.`,
    );
  }
  const size = typicalSize(y);
  if (size > LARGEST_FRACTION) {
    say(
      'y-too-large',
      null,
      `values are of order ${sci(size)}: more than any comparison of clocks on Earth. Is y in another unit, or is it not a fraction?`,
    );
  }
  return warnings;
}

/** Outliers among the values in the usual unit: a slipped stretch is no measure for its neighbours, nor for the scatter. */
function outsideSlips(y: Float64Array, slips: readonly UnitSlip[]): Pick<Outliers, 'samples' | 'limit' | 'distanceOf'> {
  const kept: number[] = [];
  let s = 0;
  for (let i = 0; i < y.length; i++) {
    while (s < slips.length && slips[s]!.last < i) s++;
    if (s === slips.length || i < slips[s]!.first) kept.push(i);
  }
  const found = findOutliers(Float64Array.from(kept, (i) => y[i]!));
  const place = new Map(found.samples.map((k) => [kept[k]!, k]));
  return { limit: found.limit, samples: [...place.keys()], distanceOf: (i) => found.distanceOf(place.get(i)!) };
}

function slipMessage({ first, last, factor, evidence }: UnitSlip, lineOf: (i: number) => number): string {
  const one = first === last;
  const where = one ? `line ${lineOf(first)}` : `lines ${lineOf(first)} to ${lineOf(last)}`;
  const what = evidence === 'scatter' ? 'the scatter is' : one ? 'the value is' : 'the values are';
  return `in ${where} ${what} ${factor.toExponential(0).replace('+', '')} times that of the rest: another unit? Taken as written.`;
}

/** Values that are exactly zero where the others are not: only in a record that has digits enough for that to be no chance. */
function exactZeros(y: Float64Array): { count: number; first: number } | null {
  let count = 0;
  let first = -1;
  const seen = new Set<number>();
  for (let i = 0; i < y.length; i++) {
    if (y[i] === 0) {
      if (count++ === 0) first = i;
    } else if (seen.size < 200) seen.add(y[i]!);
  }
  const others = y.length - count;
  return count === 0 || others === 0 || seen.size < Math.min(20, others) ? null : { count, first };
}

function typicalSize(y: Float64Array): number {
  const step = Math.max(1, Math.floor(y.length / 2001));
  const sizes: number[] = [];
  for (let i = 0; i < y.length; i += step) sizes.push(Math.abs(y[i]!));
  sizes.sort((a, b) => a - b);
  return sizes[sizes.length >> 1]!;
}
