import { type ConciseOptions, concise, conciseText, formatConcise, type TextOptions } from './concise.js';
import { D, type Decimal, HALF_EVEN } from './decimal.js';
import type { QuantityKind } from './kinds.js';
import { fromSi, readUnit } from './units.js';

const NO_BREAK_SPACE = '\u00a0';

/** Value and standard uncertainty in SI, u 0 if exact, null if not known. */
export interface SiEstimate {
  readonly value: number;
  readonly u: number | null;
}

/** An SI estimate in another unit, exactly, before any rounding.
 * @throws {QuantityError} unknown-unit, wrong-unit, not-finite */
const inUnit = ({ value, u }: SiEstimate, kind: QuantityKind, unit: string): { value: Decimal; u: Decimal | null } => {
  const to = readUnit(unit, kind);
  return { value: fromSi(new D(value), to), u: u === null ? null : fromSi(new D(u), to) };
};

/** An SI estimate in a unit with the unit behind it: −850.012(44) m. The space is a no-break one; without a unit none.
 * @param unit any unit of the kind, printed as given; '' or '1' for a plain number
 * @throws {QuantityError} unknown-unit, wrong-unit, not-finite, negative-u */
export const formatEstimate = (
  estimate: SiEstimate,
  kind: QuantityKind,
  unit: string,
  options: TextOptions = {},
): string => {
  if (unit === '' || unit === '1') return formatConcise(estimate.value, estimate.u, options);
  const { value, u } = inUnit(estimate, kind, unit);
  return `${conciseText(concise(value, u, options), options)}${NO_BREAK_SPACE}${unit}`;
};

/** The same in pieces and without the unit, for table cells. */
export const conciseInUnit = (estimate: SiEstimate, kind: QuantityKind, unit: string, options: ConciseOptions = {}) => {
  const { value, u } = inUnit(estimate, kind, unit);
  return concise(value, u, options);
};

/** Sizes from which a unit is used, largest first. */
type Ladder = readonly (readonly [from: string, unit: string])[];
const LENGTHS: Ladder = [
  ['1e3', 'km'],
  ['1', 'm'],
  ['1e-3', 'mm'],
  ['1e-6', 'µm'],
  ['1e-9', 'nm'],
];
const DURATIONS: Ladder = [
  ['86400', 'd'],
  ['3600', 'h'],
  ['60', 'min'],
  ['1', 's'],
];

/** For sentences: rounded to so many significant digits, zeros at the end left away. */
const inSentence = (si: number, kind: QuantityKind, significant: number, unit: string): string => {
  const value = fromSi(new D(si), readUnit(unit, kind)).toSignificantDigits(significant, HALF_EVEN);
  return `${formatConcise(value, null)}${NO_BREAK_SPACE}${unit}`;
};

const onLadder = (si: number, kind: QuantityKind, ladder: Ladder, base: string, significant: number): string => {
  const size = new D(si).abs();
  // 999.7 m has to become 1 km, not 1000 m: the size that counts is the rounded one, in the unit tried.
  const fits = ([from]: Ladder[number]) => size.div(from).toSignificantDigits(significant, HALF_EVEN).gte(1);
  return inSentence(si, kind, significant, ladder.find(fits)?.[1] ?? base);
};

/** A length for a sentence: 44 mm, 1.4 m, 457 km.
 * @param lengthM any finite length in m
 * @param significant digits, default 3; zeros at the end are left away
 * @throws {QuantityError} not-finite */
export const formatLength = (lengthM: number, significant = 3): string =>
  onLadder(lengthM, 'length', LENGTHS, 'm', significant);

/** A duration for a sentence, in the largest of d, h, min, s that it fills: 3.2 d, 45 min.
 * @param durationS any finite duration in s */
export const formatDuration = (durationS: number, significant = 3): string =>
  onLadder(durationS, 'duration', DURATIONS, 's', significant);

/** A duration in days whatever its size: 14 d, 0.25 d. */
export const formatDays = (durationS: number, significant = 3): string =>
  inSentence(durationS, 'duration', significant, 'd');
