const units: Readonly<Record<string, string>> = {
  h: 'm',
  zeta: 'm',
  N: 'm',
  H: 'm',
  dH: 'm',
  height: 'm',
  g: 'm/s²',
  gammaRef: 'm/s²',
  W: 'm²/s²',
  W0: 'm²/s²',
  C: 'm²/s²',
  variable: 'm²/s²',
  gradient: 's⁻²',
  meanGravityFactor: 's⁻²',
};

/** SI unit of an input by the key that ends its path; 1 for what has none. */
export const inputUnit = (path: string): string => units[path.slice(path.lastIndexOf('.') + 1)] ?? '1';
