const MANTISSAS = [1, 2, 5] as const;

/** The smallest of 1, 2, 5 × 10ⁿ that is at least `least`. */
export function roundStep(least: number): number {
  const power = 10 ** Math.floor(Math.log10(least));
  for (const mantissa of MANTISSAS) if (mantissa * power >= least * (1 - 1e-12)) return mantissa * power;
  return 10 * power;
}

/** Multiples of a step from `from` to `to`, both included, free of the dust of repeated addition. */
export function multiples(step: number, from: number, to: number): readonly number[] {
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => (first + i) * step);
}

/** Digits after the point that a multiple of the step needs. */
export const decimalsOf = (step: number): number => Math.max(0, -Math.floor(Math.log10(step) + 1e-9));

/** A multiple of a step as a label: U+2212 for a minus, no more digits than the step has. */
export function stepLabel(value: number, step: number): string {
  const text = Math.abs(value) < step / 2 ? '0' : value.toFixed(decimalsOf(step));
  return text.replace('-', '\u2212');
}
