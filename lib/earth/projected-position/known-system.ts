/** Where a system is meant to be used, degrees; west may exceed east across 180°. */
export interface AreaOfUse {
  readonly west: number;
  readonly south: number;
  readonly east: number;
  readonly north: number;
}

/** Seven parameters from a system's own datum to ETRS89 or WGS 84. */
export interface DatumShift {
  /** T₁, T₂, T₃ in m, R₁, R₂, R₃ in arc-seconds ("position vector" sense), scale in 1e-6: the order of PROJ's +towgs84 */
  readonly parameters: readonly number[];
  readonly source: string;
  /** how well it fits, horizontally, m; null: not known */
  readonly accuracyM: number | null;
}

/** A projected system that can be named by its EPSG code. */
export interface KnownSystem {
  readonly code: number;
  readonly name: string;
  /** PROJ definition without units (m) and datum shift */
  readonly definition: string;
  readonly shift: DatumShift | null;
  readonly area: AreaOfUse;
}
