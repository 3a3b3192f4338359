import { D, type Decimal } from './decimal.js';
import { KINDS, type QuantityKind } from './kinds.js';
import { parseQuantity } from './quantity.js';
import { QuantityError, type QuantityFaultCode, shown } from './quantity-error.js';
import { isSi, readUnit, toSi, type Unit } from './units.js';

/** One thing wrong with a measured number. */
export interface QuantityProblem {
  readonly code: QuantityFaultCode;
  /** where inside the input: '' the input itself, else `value`, `u`, `unit`, `source`, `parts.1.u`, … */
  readonly at: string;
  /** index from 0 into the text that stands at `at`; null where no character is to blame */
  readonly position: number | null;
  /** what stands there, ready for a message (texts in quotes) */
  readonly found: string;
  readonly expected: string;
}

export type Read<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly problems: readonly QuantityProblem[] };

/** A number before its double is taken. */
export interface Exact {
  readonly value: Decimal;
  readonly double: number;
  readonly u: Decimal | null;
  readonly uDouble: number;
  /** sizes of the last digits of value and u */
  readonly step: Decimal;
  readonly uStep: Decimal | null;
  /** the unit beside it was applied */
  readonly usedUnit: boolean;
  /** its own unit, if the text has one */
  readonly written: Unit | null;
}

export class Problems {
  readonly list: QuantityProblem[] = [];
  add(code: QuantityFaultCode, at: string, input: unknown, expected: string, position: number | null = null): null {
    this.list.push({ code, at, position, found: shown(input), expected });
    return null;
  }
}

/** A number or a text; null when refused. */
export const readNumber = (
  input: unknown,
  kind: QuantityKind,
  unit: Unit | null,
  at: string,
  problems: Problems,
): Exact | null => {
  const { name, example } = KINDS[kind];
  if (typeof input === 'number') {
    if (!Number.isFinite(input)) return problems.add('not-finite', at, input, 'a finite number');
    const typed = new D(input);
    const value = unit === null ? typed : toSi(typed, unit);
    const double = value.toNumber();
    if (!Number.isFinite(double)) return problems.add('overflow', at, input, 'a magnitude below 1.8e308');
    if (double === 0 && input !== 0) return problems.add('underflow', at, input, 'a magnitude above 5e-324, or 0');
    const step = new D(`1e${-typed.decimalPlaces()}`);
    return {
      value,
      double: double === 0 ? 0 : double,
      u: null,
      uDouble: 0,
      step: unit === null ? step : toSi(step, unit),
      uStep: null,
      usedUnit: unit !== null,
      written: null,
    };
  }
  if (typeof input !== 'string') {
    if (input === undefined) return problems.add('missing', at, input, `${name} such as ${example}`);
    return problems.add('wrong-type', at, input, `${name}: a number or a text such as "${example}"`);
  }
  try {
    const q = parseQuantity(input, kind, unit);
    return {
      value: q.decimal.value,
      double: q.value,
      u: q.decimal.u,
      uDouble: q.u,
      step: q.decimal.step,
      uStep: q.decimal.uStep,
      usedUnit: unit !== null && !q.unitWritten,
      written: q.unitWritten ? readUnit(q.unit, kind) : null,
    };
  } catch (error) {
    if (!(error instanceof QuantityError)) throw error;
    return problems.add(error.code, at, input, error.expected, error.position);
  }
};

/** A standard uncertainty by itself; null when refused. */
export const readU = (
  input: unknown,
  kind: QuantityKind,
  unit: Unit | null,
  at: string,
  problems: Problems,
): Exact | null => {
  const x = readNumber(input, kind, unit, at, problems);
  if (x === null) return null;
  if (x.u !== null)
    return problems.add('two-uncertainties', at, input, 'a standard uncertainty without one of its own');
  if (x.value.isNegative() && !x.value.isZero())
    return problems.add('negative-u', at, input, 'a standard uncertainty, zero or positive');
  return x;
};

/** A u without a unit near a value in another unit than the default: either could be meant. */
export const refuseBare = (
  typed: unknown,
  kind: QuantityKind,
  beside: Unit | null,
  at: string,
  problems: Problems,
): boolean => {
  if (beside === null || isSi(beside)) return false;
  if (typeof typed === 'string') {
    try {
      if (parseQuantity(typed, kind).unitWritten) return false;
    } catch {
      return false; // refused where it is read
    }
  } else if (typeof typed !== 'number') return false;
  problems.add(
    'ambiguous-unit',
    at,
    typed,
    `a text with its unit: "${typed} ${beside.text}" or "${typed} ${KINDS[kind].unit}"`,
  );
  return true;
};

/** Reads a number that carries no uncertainty (a length of fibre, a target, a duration): number or text, SI.
 *  Sign and range are the caller's. */
export const readExact = (input: unknown, kind: QuantityKind): Read<number> => {
  const problems = new Problems();
  const x = readNumber(input, kind, null, '', problems);
  if (x !== null && x.u !== null)
    problems.add('uncertainty-not-expected', '', input, 'a number without an uncertainty');
  return x === null || problems.list.length > 0
    ? { ok: false, problems: problems.list }
    : { ok: true, value: x.double };
};

/** Reads a standard uncertainty (a systematic, an Allan deviation): number or text, ≥ 0, SI. */
export const readStandardUncertainty = (input: unknown, kind: QuantityKind): Read<number> => {
  const problems = new Problems();
  const x = readU(input, kind, null, '', problems);
  return x === null ? { ok: false, problems: problems.list } : { ok: true, value: x.double };
};
