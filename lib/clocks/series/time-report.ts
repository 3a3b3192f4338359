import type { Warning } from '../../campaign/fault.js';
import type { Run } from '../deviations/index.js';
import { pathOfLine } from './frequency-series.js';
import type { Disorder } from './time-order.js';

const DAY_S = 86400;
const HOUR_S = 3600;

/** Most line numbers that a message lists. */
const MOST_LINES = 5;

const lineList = (lines: readonly number[], count: number): string =>
  `${count === 1 ? 'line' : 'lines'} ${lines.join(', ')}${count > lines.length ? ` and ${count - lines.length} more` : ''}`;

const plural = (n: number, word: string): string => `${n} ${word}${n === 1 ? '' : 's'}`;

const span = (s: number): string => {
  const a = Math.abs(s);
  if (a >= 0.999 * DAY_S) return `${Number((s / DAY_S).toPrecision(4))} d`;
  return a >= 0.999 * HOUR_S ? `${Number((s / HOUR_S).toPrecision(4))} h` : `${Number(s.toPrecision(4))} s`;
};

/** A step of exactly so many days or hours is seldom a pause: someone mistyped a date, or a clock was put forward. */
function leapOf(seconds: number, intervalS: number): 'day' | 'hour' | null {
  const close = (unit: number): boolean => {
    const n = Math.round(seconds / unit);
    return n !== 0 && Math.abs(n) <= 31 && unit >= 4 * intervalS && Math.abs(seconds - n * unit) <= 0.3 * intervalS;
  };
  if (close(DAY_S)) return 'day';
  return Math.abs(Math.round(seconds / HOUR_S)) === 1 && close(HOUR_S) ? 'hour' : null;
}

const leapWarning = (leap: 'day' | 'hour', line: number, direction: string, size: string): Warning => ({
  code: `${leap}-leap`,
  path: pathOfLine(line),
  message:
    leap === 'day'
      ? `time leaps ${direction} by exactly ${size} at line ${line}: is the date wrong from there, or up to there? Dates are taken as written.`
      : `time leaps ${direction} by exactly 1 h at line ${line}: were the stamps local time with a change of summer time? They are taken as written.`,
});

/** What is said about rows out of order. The samples are sorted; nothing is dropped for it. */
export function disorderWarnings(disorder: Disorder, intervalS: number, lineOf: (i: number) => number): Warning[] {
  const lines = disorder.places.slice(0, MOST_LINES).map((p) => lineOf(p.sample));
  const warnings: Warning[] = [
    {
      code: 'time-order',
      path: pathOfLine(lines[0]!),
      message: `time goes back ${disorder.count === 1 ? 'once' : `${disorder.count} times`}, at ${lineList(lines, disorder.count)}: samples are sorted by their start.`,
    },
  ];
  for (const { sample, stepS } of disorder.places) {
    const leap = leapOf(stepS - intervalS, intervalS);
    if (leap) warnings.push(leapWarning(leap, lineOf(sample), 'back', span(-(stepS - intervalS))));
  }
  return warnings;
}

/** Gathers what the pass through the time axis meets, and says it in a few sentences with line numbers. */
export class TimeReport {
  readonly #lineOf: (i: number) => number;
  readonly #intervalS: number;
  readonly #duplicateLines: number[] = [];
  readonly #overlapLines: number[] = [];
  readonly #gapLines: number[] = [];
  readonly #leaps: Warning[] = [];
  #duplicates = 0;
  #conflicts = 0;
  #largestConflict = 0;
  #overlaps = 0;
  #gaps = 0;
  #gapS = 0;
  #longestGapS = 0;
  #longestGapLine = 0;
  #worstJitterS = 0;
  #deadS = 0;

  constructor(lineOf: (i: number) => number, intervalS: number) {
    this.#lineOf = lineOf;
    this.#intervalS = intervalS;
  }

  duplicate(_first: number, second: number, y1: number, y2: number): void {
    this.#duplicates++;
    if (this.#duplicateLines.length < MOST_LINES) this.#duplicateLines.push(this.#lineOf(second));
    if (y1 !== y2) {
      this.#conflicts++;
      this.#largestConflict = Math.max(this.#largestConflict, Math.abs(y1 - y2));
    }
  }

  overlap(_first: number, second: number, _seconds: number): void {
    this.#overlaps++;
    if (this.#overlapLines.length < MOST_LINES) this.#overlapLines.push(this.#lineOf(second));
  }

  /** @param missingS time between where the next sample was due and where it came */
  gap(_before: number, after: number, missingS: number): void {
    const line = this.#lineOf(after);
    this.#gaps++;
    this.#gapS += missingS;
    if (this.#gapLines.length < MOST_LINES) this.#gapLines.push(line);
    if (missingS > this.#longestGapS) {
      this.#longestGapS = missingS;
      this.#longestGapLine = line;
    }
    const leap = leapOf(missingS, this.#intervalS);
    if (leap && this.#leaps.length < MOST_LINES) this.#leaps.push(leapWarning(leap, line, 'forward', span(missingS)));
  }

  jitter(seconds: number): void {
    if (seconds > this.#worstJitterS) this.#worstJitterS = seconds;
  }

  deadTime(seconds: number, runs: readonly Run[]): void {
    if (seconds > 0.005 * this.#intervalS && runs.some((r) => r.count > 1)) this.#deadS = seconds;
  }

  warnings(sampleS: number): Warning[] {
    const said: Warning[] = [];
    const say = (code: string, line: number | null, message: string): void => {
      said.push({ code, path: pathOfLine(line), message });
    };
    if (this.#duplicates > 0) {
      const where = lineList(this.#duplicateLines, this.#duplicates);
      const clash =
        this.#conflicts === 0
          ? 'with the same value'
          : `${this.#conflicts} of them with another value, up to ${this.#largestConflict.toExponential(1)} away`;
      say(
        'duplicate-time',
        this.#duplicateLines[0]!,
        `${plural(this.#duplicates, 'row')} with a time already given (${where}), ${clash}: the first of each is kept.`,
      );
    }
    if (this.#overlaps > 0) {
      say(
        'overlap',
        this.#overlapLines[0]!,
        `${plural(this.#overlaps, 'sample')} starting before the one before has ended (${lineList(this.#overlapLines, this.#overlaps)}): left out.`,
      );
    }
    said.push(...this.#leaps);
    if (this.#gaps > 0) {
      say(
        'gaps',
        this.#gapLines[0]!,
        `${this.#gaps === 1 ? 'one gap' : `${this.#gaps} gaps`}, ${span(this.#gapS)} in all, before ${lineList(this.#gapLines, this.#gaps)}; the longest, ${span(this.#longestGapS)}, before line ${this.#longestGapLine}. Deviations use only what lies between gaps.`,
      );
    }
    if (this.#deadS > 0) {
      say(
        'dead-time',
        null,
        `samples last ${sampleS} s and come every ${this.#intervalS} s: ${((100 * this.#deadS) / this.#intervalS).toFixed(1)} % dead time, for which the deviations are not corrected.`,
      );
    }
    if (this.#worstJitterS > 0.05 * this.#intervalS) {
      say(
        'time-jitter',
        null,
        `starts stray up to ${span(this.#worstJitterS)} from an even spacing of ${this.#intervalS} s: taken as even.`,
      );
    }
    return said;
  }
}
