import { describe, expect, it } from 'vitest';
import { parseQuantity, type QuantityKind, readUnit } from '../../../lib/quantity/index.js';
import { refusal } from './refusal.js';

/** SI factor of a unit as decimal text, exact. */
const factor = (unit: string, kind: QuantityKind) => parseQuantity(`1 ${unit}`, kind).decimal.value.toString();

describe('factors', () => {
  it.each([
    // SI Brochure, 9th ed. (2019, updated 2022), table 7
    ['Qm', '1e+30'],
    ['Rm', '1e+27'],
    ['Ym', '1e+24'],
    ['Zm', '1e+21'],
    ['Em', '1000000000000000000'],
    ['Pm', '1000000000000000'],
    ['Tm', '1000000000000'],
    ['Gm', '1000000000'],
    ['Mm', '1000000'],
    ['km', '1000'],
    ['hm', '100'],
    ['dam', '10'],
    ['m', '1'],
    ['dm', '0.1'],
    ['cm', '0.01'],
    ['mm', '0.001'],
    ['µm', '0.000001'],
    ['μm', '0.000001'],
    ['um', '0.000001'],
    ['nm', '1e-9'],
    ['pm', '1e-12'],
    ['fm', '1e-15'],
    ['am', '1e-18'],
    ['zm', '1e-21'],
    ['ym', '1e-24'],
    ['rm', '1e-27'],
    ['qm', '1e-30'],
  ])('%s of length', (unit, si) => {
    expect(factor(unit, 'length')).toBe(si);
  });

  it.each<[string, QuantityKind, string]>([
    // SI Brochure, 9th ed., note beside table 8: 1 Gal = 1 cm s⁻² = 1e-2 m s⁻²
    ['Gal', 'acceleration', '0.01'],
    ['mGal', 'acceleration', '0.00001'],
    ['µGal', 'acceleration', '1e-8'],
    ['μGal', 'acceleration', '1e-8'],
    ['uGal', 'acceleration', '1e-8'],
    ['m/s²', 'acceleration', '1'],
    ['m/s^2', 'acceleration', '1'],
    ['m/s2', 'acceleration', '1'],
    ['m s^-2', 'acceleration', '1'],
    ['m s⁻²', 'acceleration', '1'],
    ['m\u00a0s\u22122', 'acceleration', '1'],
    ['m·s⁻²', 'acceleration', '1'],
    ['m*s^-2', 'acceleration', '1'],
    ['nm/s²', 'acceleration', '1e-9'],
    // NGS, program DYNAMIC_HT: 1 g.p.u. = 1 kgal m = 1000 gal m
    ['gpu', 'potential', '10'],
    ['kGal·m', 'potential', '10'],
    ['kGal m', 'potential', '10'],
    ['kGal*m', 'potential', '10'],
    ['Gal m', 'potential', '0.01'],
    ['m²/s²', 'potential', '1'],
    ['m^2/s^2', 'potential', '1'],
    ['m² s⁻²', 'potential', '1'],
    ['m^2·s^-2', 'potential', '1'],
    // 1 E = 1e-9 s⁻² = 1e-9 Gal/cm (common definition; the ESA pages on GOCE give the same)
    ['E', 'gradient', '1e-9'],
    ['nGal/cm', 'gradient', '1e-9'],
    ['s⁻²', 'gradient', '1'],
    ['s^-2', 'gradient', '1'],
    ['µGal/cm', 'gradient', '0.000001'],
    ['mGal/m', 'gradient', '0.00001'],
    // SI Brochure, 9th ed., table 8
    ['s', 'duration', '1'],
    ['min', 'duration', '60'],
    ['h', 'duration', '3600'],
    ['d', 'duration', '86400'],
    ['ms', 'duration', '0.001'],
    ['Hz', 'frequency', '1'],
    ['mHz', 'frequency', '0.001'],
    ['MHz', 'frequency', '1000000'],
    ['THz', 'frequency', '1000000000000'],
    ['m/s', 'speed', '1'],
    ['mm/km', 'length-ratio', '0.000001'],
    ['m^½', 'root-length', '1'],
    ['m^0.5', 'root-length', '1'],
    ['m^(1/2)', 'root-length', '1'],
  ])('%s of %s', (unit, kind, si) => {
    expect(factor(unit, kind)).toBe(si);
  });

  it('mm/√km: 1 mm after 1 km, 2 mm after 4 km', () => {
    // The definition itself: u = b·√d.
    for (const text of ['1 mm/√km', '1 mm/sqrt(km)', '1 mm/km^½', '1 mm/km^0.5']) {
      const b = parseQuantity(text, 'root-length').decimal.value;
      const square = b.times(b).toSignificantDigits(40).toString();
      expect(square).toBe('1e-9'); // (1e-3 m)²/1000 m
    }
    expect(Math.abs(parseQuantity('1 mm/√km', 'root-length').value * Math.sqrt(4000) - 0.002)).toBeLessThan(1e-18);
  });

  it('mm/a: a year has 365.25 days', () => {
    // IAU Style Manual (Wilkins 1989), 5.15
    expect(parseQuantity('31557600 mm/a', 'speed').value).toBe(0.001);
    expect(parseQuantity('3.6 km/h', 'speed').value).toBe(1);
    expect(parseQuantity('1 mm/yr', 'speed').value).toBe(0.001 / 31557600);
  });

  it('free-air gradient in its four units', () => {
    // 0.3086 mGal/m, Hofmann-Wellenhof & Moritz, Physical Geodesy, ch. 3
    for (const text of ['0.3086 mGal/m', '3.086 µGal/cm', '3086 E', '3.086e-6 s⁻²', '3.086e-6 1/s²'])
      expect(parseQuantity(text, 'gradient').value).toBe(3.086e-6);
  });

  it('tells the eötvös from a power of ten', () => {
    expect(parseQuantity('3084E', 'gradient').value).toBe(3.084e-6);
    expect(parseQuantity('3084(20) E', 'gradient')).toMatchObject({ value: 3.084e-6, u: 2e-8 });
    expect(parseQuantity('3E-6', 'gradient').value).toBe(3e-6);
    expect(parseQuantity('3e3E', 'gradient').value).toBe(3e-6);
    expect(parseQuantity('3 Em', 'length').value).toBe(3e18);
  });

  it('tells symbols from prefixes: min, d, h, a', () => {
    expect(parseQuantity('2min', 'duration').value).toBe(120);
    expect(parseQuantity('2 d', 'duration').value).toBe(172800);
    expect(parseQuantity('2 ds', 'duration').value).toBe(0.2);
    expect(parseQuantity('2 hs', 'duration').value).toBe(200);
  });

  it('carries the unit over to u, and lets u have its own', () => {
    expect(parseQuantity('1.2(3) kGal·m', 'potential')).toMatchObject({ value: 12, u: 3 });
    expect(parseQuantity('1 km ± 5 mm', 'length')).toMatchObject({ value: 1000, u: 0.005 });
  });
});

describe('ISO 8601 durations', () => {
  it.each([
    ['P14D', 1209600],
    ['PT12H30M', 45000],
    ['P1DT6H', 108000],
    ['P2W', 1209600],
    ['PT0.5S', 0.5],
    ['PT1.5H', 5400],
    [' P1D ', 86400],
    ['PT1H2M3S', 3723],
  ])('%s', (text, seconds) => {
    expect(parseQuantity(text, 'duration').value).toBe(seconds);
  });

  it.each([
    ['P1M', 'calendar-duration', 2, 'P30D'],
    ['P1Y', 'calendar-duration', 2, 'P365D'],
    ['P1Y2M', 'calendar-duration', 2, 'a year has no fixed length'],
    ['P', 'bad-duration', 1, 'P14D'],
    ['PT', 'bad-duration', 2, 'P14D'],
    ['P1DT', 'bad-duration', 4, 'P14D'],
    ['P1H', 'bad-duration', 2, 'P14D'],
    ['PT1M1H', 'bad-duration', 5, 'P14D'],
    ['PT1H1H', 'bad-duration', 5, 'P14D'],
    ['PT1.5H30M', 'bad-duration', 3, 'P14D'],
    ['P1', 'bad-duration', 2, 'P14D'],
    ['P1.D', 'bad-duration', 3, 'P14D'],
    ['P-1D', 'bad-duration', 1, 'P14D'],
    ['P1D x', 'bad-duration', 3, 'P14D'],
    ['PT1,5H', 'decimal-comma', 3, 'write PT1.5H'],
  ])('refuses %s', (text, code, position, expected) => {
    const error = refusal(() => parseQuantity(text, 'duration'));
    expect([error.code, error.position]).toEqual([code, position]);
    expect(error.expected).toContain(expected);
  });
});

describe('refusals', () => {
  it.each<[string, QuantityKind, string, number, string]>([
    ['143.216(8) mGal', 'length', 'wrong-unit', 11, 'a unit of length: m, mm, cm, km; mGal measures an acceleration'],
    ['5 m', 'acceleration', 'wrong-unit', 2, 'm measures a length'],
    ['5 m²', 'length', 'wrong-unit', 2, 'a unit of length'],
    ['5 s', 'frequency', 'wrong-unit', 2, 's measures a duration'],
    ['1e-17 m', 'fraction', 'wrong-unit', 6, 'no unit: the field is a plain number'],
    ['1 m/m', 'fraction', 'wrong-unit', 2, 'no unit'],
    ['143 m ± 8 s', 'length', 'wrong-unit', 10, 's measures a duration'],
    ['143 s ± 8 m', 'length', 'wrong-unit', 4, 's measures a duration'],
    ['9.8 mgal', 'acceleration', 'unknown-unit', 4, 'did you mean mGal?'],
    ['9.8 GAL', 'acceleration', 'unknown-unit', 4, 'did you mean Gal?'],
    ['3 GPU', 'potential', 'unknown-unit', 2, 'did you mean gpu?'],
    ['3 kGalm', 'potential', 'unknown-unit', 2, 'did you mean kGal·m?'],
    ['5 mn', 'length', 'unknown-unit', 2, 'did you mean mm?'],
    ['5 hours', 'duration', 'unknown-unit', 2, 's, min, h, d'],
    ['5 ft', 'length', 'unknown-unit', 2, 'm, mm, cm, km'],
    ['5 cmin', 'duration', 'unknown-unit', 2, 'a unit of duration'],
    ['9.8 m/s/s', 'acceleration', 'unknown-unit', 7, 'did you mean m/s'],
    ['9.8 m/s·s', 'acceleration', 'unknown-unit', 7, 'a unit of acceleration'],
    ['9.8 m/', 'acceleration', 'unknown-unit', 5, 'a unit of acceleration'],
    ['9.8 m·', 'acceleration', 'unknown-unit', 5, 'a unit of acceleration'],
    ['8 m^', 'length', 'unknown-unit', 3, 'a unit of length'],
    ['8 m^0', 'length', 'unknown-unit', 3, 'a unit of length'],
    ['8 m^22', 'length', 'unknown-unit', 3, 'a unit of length'],
    ['8 sqrt(m', 'root-length', 'unknown-unit', 2, 'a unit of length per root length'],
    ['8 toString', 'length', 'unknown-unit', 2, 'a unit of length'],
    ['70 %', 'fraction', 'unknown-unit', 3, 'write 70e-2'],
    ['1.5D-16', 'fraction', 'unknown-unit', 3, 'write 1.5e-16'],
    ['1.5d-16', 'fraction', 'unknown-unit', 4, 'write 1.5e-16'],
    ['1 ppm', 'fraction', 'unknown-unit', 2, 'no unit'],
  ])('%s as %s', (text, kind, code, position, expected) => {
    const error = refusal(() => parseQuantity(text, kind));
    expect([error.code, error.position]).toEqual([code, position]);
    expect(error.expected).toContain(expected);
  });

  it('an empty unit', () => {
    expect(refusal(() => readUnit(' ', 'length')).code).toBe('unknown-unit');
  });
});
