/** Powers of length and time in a unit, doubled so that the m^½ of a levelling line's random error is a whole number. */
export interface Dimension {
  readonly length2: number;
  readonly time2: number;
}

/** What a field measures; fixes its default unit and which units may stand there. */
export type QuantityKind =
  | 'length'
  | 'acceleration'
  | 'potential'
  | 'gradient'
  | 'duration'
  | 'frequency'
  | 'speed'
  | 'root-length'
  | 'length-ratio'
  | 'fraction';

export interface KindDescription {
  readonly dimension: Dimension;
  /** SI unit, the default of a number without one */
  readonly unit: string;
  /** words for messages */
  readonly name: string;
  /** units that may stand there, most usual first, for messages */
  readonly units: readonly string[];
  readonly example: string;
}

const kind = (
  length: number,
  time: number,
  unit: string,
  name: string,
  units: readonly string[],
  example: string,
): KindDescription => ({ dimension: { length2: 2 * length, time2: 2 * time }, unit, name, units, example });

export const KINDS: Readonly<Record<QuantityKind, KindDescription>> = {
  length: kind(1, 0, 'm', 'a length', ['m', 'mm', 'cm', 'km', 'µm', 'nm', 'dm'], '143.216(8) m'),
  acceleration: kind(
    1,
    -2,
    'm/s²',
    'an acceleration',
    ['m/s²', 'mGal', 'µGal', 'Gal', 'm/s^2', 'm s^-2', 'm s⁻²', 'nm/s²', 'µm/s²'],
    '9.8125523(30) m/s²',
  ),
  potential: kind(2, -2, 'm²/s²', 'a potential', ['m²/s²', 'kGal·m', 'gpu', 'm^2/s^2'], '62636853.4(5) m²/s²'),
  gradient: kind(0, -2, 's⁻²', 'a gradient', ['s⁻²', 'E', 'µGal/cm', 'mGal/m', 's^-2', '1/s²'], '3.086e-6 s⁻²'),
  duration: kind(0, 1, 's', 'a duration', ['s', 'min', 'h', 'd', 'ms'], '14 d'),
  frequency: kind(0, -1, 'Hz', 'a frequency', ['Hz', 'mHz', 'kHz', 'MHz', 'GHz', 'THz'], '429228004229872.99(8) Hz'),
  speed: kind(1, -1, 'm/s', 'a speed', ['m/s', 'mm/a', 'mm/yr'], '1.2(3) mm/a'),
  'root-length': kind(0.5, 0, 'm^½', 'a length per root length', ['mm/√km', 'm^½'], '1.5 mm/√km'),
  'length-ratio': kind(0, 0, '1', 'a length per length', ['mm/km', 'm/m'], '0.1 mm/km'),
  fraction: kind(0, 0, '1', 'a number without a unit', [], '4.1(1.6)e-17'),
};

/** Name of the kind that has this dimension, for "a unit of …"; null if none has. */
export const nameOfDimension = (d: Dimension): string | null =>
  Object.values(KINDS).find((k) => k.dimension.length2 === d.length2 && k.dimension.time2 === d.time2)?.name ?? null;
