const units: Readonly<Record<string, string>> = {
  h: 'm',
  zeta: 'm',
  N: 'm',
  n: 'm',
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

/** SI unit of an input by the key that ends its path (`sites.cellar.h`) or its option's name (`a-h`); 1 for what has none. */
export const inputUnit = (path: string): string => units[/[^.-]*$/.exec(path)?.[0] ?? ''] ?? '1';
