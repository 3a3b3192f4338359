import { D, type Decimal, HALF_EVEN } from './decimal.js';
import { KINDS, type QuantityKind } from './kinds.js';
import { closest } from './near-match.js';
import { type Exact, Problems, type Read, readNumber, readU, refuseBare } from './number-input.js';
import { QuantityError } from './quantity-error.js';
import { readUnit, type Unit } from './units.js';

export type DistributionName = 'normal' | 'uniform' | 'triangular' | 't';

/** The numbers of a measured quantity, SI. Tide, frame and remarks are for the reader of the file. */
export interface MeasuredNumbers {
  readonly value: number;
  /** combined standard uncertainty; 0 if exact */
  readonly u: number;
  /** pieces with u > 0; they add as squares to u. A single u is one piece. Empty if exact */
  readonly parts: readonly { readonly u: number; readonly source: string | null }[];
  readonly distribution: DistributionName;
  readonly dof: number | null;
  /** the value as typed; null for a bare number */
  readonly text: string | null;
}

/** Keys of the object form that are read here; the others are the caller's. */
export const MEASURED_KEYS = ['value', 'u', 'unit', 'source', 'parts', 'distribution', 'dof'] as const;
/** Keys of one entry of `parts` that are read here. */
export const PART_KEYS = ['u', 'source'] as const;

const DISTRIBUTIONS: readonly DistributionName[] = ['normal', 'uniform', 'triangular', 't'];

const readSource = (input: unknown, at: string, problems: Problems): string | null => {
  if (input === undefined) return null;
  if (typeof input !== 'string' || input === '')
    return problems.add('wrong-type', at, input, 'the id of an entry of "sources"');
  return input;
};

const isObject = (input: unknown): input is Readonly<Record<string, unknown>> =>
  typeof input === 'object' && input !== null && !Array.isArray(input);

/** An own key of an object; undefined where it is absent (never something inherited). */
const own = (object: Readonly<Record<string, unknown>>, key: string): unknown =>
  Object.hasOwn(object, key) ? object[key] : undefined;

interface Piece {
  readonly u: Exact;
  readonly source: string | null;
}

const readParts = (
  input: unknown,
  kind: QuantityKind,
  unit: Unit | null,
  problems: Problems,
): readonly Piece[] | null => {
  if (!Array.isArray(input) || input.length === 0)
    return problems.add(
      'wrong-type',
      'parts',
      input,
      'a list of pieces, [{"u": "18 mm", "source": "…"}, {"u": "6 mm"}]',
    );
  const pieces: Piece[] = [];
  const seen = new Map<string, number>();
  let whole = true;
  input.forEach((entry: unknown, i) => {
    const at = `parts.${i}`;
    if (!isObject(entry)) {
      problems.add('wrong-type', at, entry, 'a piece such as {"u": "18 mm", "source": "…"}');
      whole = false;
      return;
    }
    const typed = own(entry, 'u');
    const bare = refuseBare(typed, kind, unit, `${at}.u`, problems);
    if (bare) {
      whole = false;
      return;
    }
    const u = readU(typed, kind, null, `${at}.u`, problems);
    const source = readSource(own(entry, 'source'), `${at}.source`, problems);
    if (source !== null) {
      const first = seen.get(source);
      if (first !== undefined)
        problems.add(
          'source-twice',
          `${at}.source`,
          source,
          `each source once; it stands at parts.${first} already (add the two as squares)`,
        );
      seen.set(source, first ?? i);
    }
    if (u === null) whole = false;
    else pieces.push({ u, source });
  });
  return whole ? pieces : null;
};

/** Root of the sum of squares, in decimals so that the last digit of a stated u can be judged. */
const combined = (pieces: readonly Piece[]): Decimal =>
  pieces.reduce((sum, p) => sum.plus(p.u.value.times(p.u.value)), new D(0)).sqrt();

/** The same in doubles, scaled by the largest so that squares of 1e-170 do not vanish. */
const rootSumOfSquares = (us: readonly number[]): number => {
  const largest = us.reduce((max, u) => Math.max(max, u), 0);
  return largest === 0 ? 0 : largest * Math.sqrt(us.reduce((sum, u) => sum + (u / largest) ** 2, 0));
};

const sameUnit = (a: Unit, b: Unit): boolean => a.numerator.times(b.denominator).eq(b.numerator.times(a.denominator));

/** Whether a stated u is `exact` rounded to the stated last digit (a tie may go either way). A zero says exact, whatever its
 *  digits. */
const agrees = (stated: Decimal, step: Decimal, exact: Decimal): boolean =>
  stated.isZero() ? exact.isZero() : stated.minus(exact).abs().lte(step.div(2));

const readObject = (
  input: Readonly<Record<string, unknown>>,
  kind: QuantityKind,
  problems: Problems,
): MeasuredNumbers | null => {
  let unit: Unit | null = null;
  const unitText = own(input, 'unit');
  if (unitText !== undefined) {
    if (typeof unitText !== 'string')
      problems.add('wrong-type', 'unit', unitText, `a unit as text, "${KINDS[kind].unit}"`);
    else
      try {
        unit = readUnit(unitText, kind);
      } catch (error) {
        if (!(error instanceof QuantityError)) throw error;
        problems.add(error.code, 'unit', unitText, error.expected, error.position);
      }
  }
  const typed = own(input, 'value');
  const value = readNumber(typed, kind, unit, 'value', problems);
  const uTyped = own(input, 'u');
  const uBare = unit === null && refuseBare(uTyped, kind, value?.written ?? null, 'u', problems);
  const u = uTyped === undefined || uBare ? null : readU(uTyped, kind, unit, 'u', problems);
  const repeated = unit !== null && value?.written != null && sameUnit(unit, value.written);
  if (unit !== null && value !== null && !value.usedUnit && u?.usedUnit !== true && !repeated)
    problems.add('unit-twice', 'unit', unitText, 'the unit once, in the text or here');
  const partsTyped = own(input, 'parts');
  const parts = partsTyped === undefined ? null : readParts(partsTyped, kind, value?.written ?? unit, problems);
  const source = readSource(own(input, 'source'), 'source', problems);
  if (source !== null && partsTyped !== undefined)
    problems.add('source-beside-parts', 'source', source, 'the source in the pieces, not beside "parts"');

  // Up to three statements of one u: "parts" stands, else "u", else the bracket; the others must agree with it.
  const bracket = value !== null && value.u !== null ? { at: 'value', typed, u: value.u, step: value.uStep! } : null;
  const single = u === null ? null : { at: 'u', typed: uTyped, u: u.value, step: u.step };
  if (parts !== null && (bracket !== null || single !== null)) {
    const exact = combined(parts);
    for (const s of [bracket, single])
      if (s !== null && !agrees(s.u, s.step, exact))
        problems.add(
          'u-disagrees',
          s.at,
          s.typed,
          `the root of the sum of squares of "parts", ${exact.toSignificantDigits(3, HALF_EVEN)} ${KINDS[kind].unit}`.replace(
            / 1$/,
            '',
          ),
        );
  } else if (
    parts === null &&
    bracket !== null &&
    single !== null &&
    !agrees(bracket.u, bracket.step, single.u) &&
    !agrees(single.u, single.step, bracket.u)
  )
    problems.add('u-disagrees', 'u', uTyped, 'one uncertainty, in the bracket or here');

  const distribution = readDistribution(own(input, 'distribution'), problems);
  const dof = readDof(own(input, 'dof'), problems);
  if (distribution === 't' && dof === null && own(input, 'dof') === undefined)
    problems.add('dof-missing', 'dof', undefined, 'degrees of freedom beside "distribution": "t"');
  if (problems.list.length > 0 || value === null || distribution === null) return null;

  const one = u !== null ? u.double : value.uDouble;
  const pieces = parts !== null ? parts.map((p) => ({ u: p.u.double, source: p.source })) : [{ u: one, source }];
  const kept = pieces.filter((p) => p.u > 0);
  return {
    value: value.double,
    u: rootSumOfSquares(kept.map((p) => p.u)),
    parts: kept,
    distribution,
    dof,
    text: typeof typed === 'string' ? typed : null,
  };
};

const readDistribution = (input: unknown, problems: Problems): DistributionName | null => {
  if (input === undefined) return 'normal';
  const name = DISTRIBUTIONS.find((d) => d === input);
  if (name !== undefined) return name;
  const near = typeof input === 'string' ? closest(input, DISTRIBUTIONS) : null;
  return problems.add(
    'unknown-distribution',
    'distribution',
    input,
    `one of ${DISTRIBUTIONS.join(', ')}${near === null ? '' : `; did you mean ${near}?`}`,
  );
};

const readDof = (input: unknown, problems: Problems): number | null => {
  if (input === undefined) return null;
  if (typeof input !== 'number' || !Number.isFinite(input) || input <= 0)
    return problems.add(
      'bad-dof',
      'dof',
      input,
      'degrees of freedom: a finite number above 0 (left out: infinitely many)',
    );
  return input;
};

/** Reads a measured number in any form: number, text, or object with `value`, `u`, `unit`, `source`, `parts`,
 *  `distribution`, `dof`. Other keys of the object are left to the caller. All problems at once.
 *
 *  `unit` is that of `value` and `u` where they are numbers or texts without one. `parts[].u` carries its own unit or has the
 *  default one. A u without a unit beside a value in another unit than the default is refused as ambiguous, unless `unit` says
 *  what it is. Pieces with u = 0 are left out. A bracket or `u` beside `parts` must be their root sum of squares rounded to
 *  its last digit; u is then that of the parts. */
export const readMeasured = (input: unknown, kind: QuantityKind): Read<MeasuredNumbers> => {
  const problems = new Problems();
  let measured: MeasuredNumbers | null = null;
  if (isObject(input)) measured = readObject(input, kind, problems);
  else {
    const x = readNumber(input, kind, null, '', problems);
    if (x !== null)
      measured = {
        value: x.double,
        u: x.uDouble,
        parts: x.uDouble > 0 ? [{ u: x.uDouble, source: null }] : [],
        distribution: 'normal',
        dof: null,
        text: typeof input === 'string' ? input : null,
      };
  }
  return measured === null ? { ok: false, problems: problems.list } : { ok: true, value: measured };
};
