import { Decimal } from 'decimal.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type FloorsInput, floors } from '../../../lib/answers/floors.js';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { geopotentialOfNormalHeight, normalGravity } from '../../../lib/earth/normal-field.js';
import { QuantityRangeError } from '../../../lib/earth/range-error.js';
import { degToRad } from '../../../lib/quantity/radians.js';

const stated: FloorsInput = {
  dHM: { value: 12.348, u: 0.003 },
  gMs2: { value: 9.8125, u: 1e-4 },
  latitudeRad: null,
  heightM: null,
  gradientPerS2: null,
  transitions: [],
  measuredY: null,
};
const codes = (input: FloorsInput) => floors(input).warnings.map((w) => w.code);
const within = (found: number, wanted: number, tolerance: number) =>
  expect(Math.abs(found - wanted), `${found} against ${wanted}`).toBeLessThanOrEqual(tolerance);

describe('floors: value', () => {
  it('is g·Δ − ½·Γ·Δ² over c², in forty digits', () => {
    const D = Decimal.clone({ precision: 40 });
    const delta = new D('12.348');
    const dW = new D('9.8125').times(delta).minus(new D('3.086e-6').times(delta).times(delta).div(2));
    const answer = floors(stated);
    within(answer.dW.value, dW.toNumber(), 1e-12);
    within(answer.y.value, dW.div(new D(299792458).pow(2)).toNumber(), 1e-29);
    within(answer.terms.linear, 121.16475, 1e-12);
    within(answer.terms.quadratic, -0.000235266, 1e-9);
    expect(answer.terms.linear + answer.terms.quadratic).toBe(answer.dW.value);
  });

  // Chou et al. (2010), Science 329:1630: 33 cm; NIST news of 2010-09-23: about 90 ns over a 79-year lifetime
  it('gives 3.6e-17 for 33 cm and 90 ns in 79 years', () => {
    const { y } = floors({ ...stated, dHM: { value: 0.33, u: 0 }, gMs2: { value: 9.796, u: 0 } });
    within(y.value, 3.6e-17, 0.05e-17);
    within(y.value * 79 * 365.25 * 86_400, 90e-9, 0.5e-9);
  });

  // Zheng et al. (2023), Nat. Commun. 14:4886: expected −10.9e-19 per centimetre (sign by their order of the two samples)
  it('gives 10.9e-19 for 1 cm', () => {
    const { y } = floors({ ...stated, dHM: { value: 0.01, u: 0 }, gMs2: { value: 9.793, u: 0 } });
    within(y.value, 10.9e-19, 0.05e-19);
  });

  // SI Brochure, 9th ed., mise en pratique of the second: of the order of 1 part in 1e16 per metre of altitude
  it('is of the order of 1e-16 a metre', () => {
    const { y } = floors({ ...stated, dHM: { value: 1, u: 0 } });
    within(y.value, 1e-16, 0.1e-16);
  });

  // KRISS frequency standard, relativistic redshift evaluation, abstract: 75.15(4) m gives 8.193(4)e-15 at g = 9.7985 m/s²
  it('gives 8.193(4)e-15 for 75.15(4) m', () => {
    const { y } = floors({ ...stated, dHM: { value: 75.15, u: 0.04 }, gMs2: { value: 9.7985, u: 0 } });
    within(y.value, 8.193e-15, 0.0005e-15);
    within(y.u, 0.004e-15, 0.0005e-15);
  });

  // independent route: the closed normal field, differenced, with its own γ and gradient put in
  it.each([
    [0, 0, 12],
    [52.3, 80, 12],
    [-37, 1200, 60],
    [90, 10, 300],
  ])('agrees with the closed normal field at %d°, %d m, over %d m', (latitude, height, delta) => {
    const phi = degToRad(latitude);
    const C = (h: number) => geopotentialOfNormalHeight(GRS80, phi, h).geopotentialM2s2;
    const slope = -(normalGravity(GRS80, phi, height + 50) - normalGravity(GRS80, phi, height - 50)) / 100;
    const answer = floors({
      ...stated,
      dHM: { value: delta, u: 0 },
      gMs2: { value: normalGravity(GRS80, phi, height), u: 0 },
      gradientPerS2: { value: slope, u: 0 },
    });
    within(answer.dW.value, C(height + delta) - C(height), 1e-5);
    // and the quadratic term is what makes it so
    expect(Math.abs(answer.terms.linear - (C(height + delta) - C(height)))).toBeGreaterThan(1e-4);
  });

  it('returns the height difference put in as dH, with its own uncertainty', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -800, max: 800, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (v, u) => {
          const { dH, dW, g, gradient } = floors({ ...stated, dHM: { value: v, u } });
          expect(dH).toEqual({ value: v, u });
          // dW over the mean gravity of the two floors is that height
          within(dW.value / (g.value - 0.5 * gradient.value * v), v, 1e-12 * Math.max(1, Math.abs(v)));
        },
      ),
      { numRuns: 50 },
    );
  });

  it('is positive for the higher clock, negative below, and zero on one level', () => {
    expect(floors(stated).y.value).toBeGreaterThan(0);
    expect(floors(stated).correction.value).toBe(-floors(stated).y.value);
    const below = floors({ ...stated, dHM: { value: -12.348, u: 0.003 } });
    expect(below.y.value).toBeLessThan(0);
    within(below.dW.value, -121.16475 - 0.000235266, 1e-9);
    const level = floors({ ...stated, dHM: { value: 0, u: 0 } });
    expect([level.y, level.dW, level.correction]).toEqual(Array(3).fill({ value: 0, u: 0 }));
    expect(Object.is(level.correction.value, 0)).toBe(true);
    expect(level.budget).toEqual([]);
  });

  it('turns y into hertz with the uncertainty of both', () => {
    const frequencyHz = { value: 429_228_004_229_872.99, u: 0.08 };
    const { offsetHz, y } = floors({ ...stated, transitions: [{ id: '87Sr', frequencyHz }] });
    within(offsetHz['87Sr']!.value, 0.57866, 5e-5);
    within(offsetHz['87Sr']!.u, y.u * frequencyHz.value, 1e-15);
    const poor = floors({ ...stated, transitions: [{ id: 'x', frequencyHz: { value: 1e15, u: 1e12 } }] });
    within(poor.offsetHz['x']!.u, Math.hypot(poor.y.u * 1e15, poor.y.value * 1e12), 1e-12);
  });
});

describe('floors: gravity', () => {
  const place: FloorsInput = {
    ...stated,
    gMs2: null,
    latitudeRad: degToRad(52.3),
    heightM: { value: 80, u: 0 },
  };

  it('comes from the normal field where none is stated, with its scatter and a warning', () => {
    const { g, warnings } = floors(place);
    expect(g.from).toBe('normal-field');
    // GRS80 at 52.3°, 80 m: between γ(45°) = 9.80620 and γ(60°) = 9.81917 m/s² (Moritz 2000, γ by latitude), less 0.25e-3
    within(g.value, normalGravity(GRS80, degToRad(52.3), 80), 0);
    within(g.value, 9.8126, 5e-4);
    within(g.u, 5e-4 + 5e-7 * 80, 1e-15);
    expect(warnings.map((w) => w.code)).toEqual(['default-gravity']);
    expect(warnings[0]!.message).toContain('7.4e-20');
  });

  it('takes the uncertainty of the height along', () => {
    const { g, budget } = floors({ ...place, heightM: { value: 80, u: 200 } });
    within(g.u, Math.hypot(5.4e-4, 3.086e-6 * 200), 1e-12);
    expect(budget.map((row) => row.input)).toContain('height');
  });

  it('is checked against the place where both are stated', () => {
    expect(codes({ ...place, gMs2: { value: 9.8125, u: 1e-4 } })).toEqual([]);
    // two digits swapped
    expect(codes({ ...place, gMs2: { value: 9.8215, u: 1e-4 } })).toEqual(['gravity-unlike-place']);
  });

  it('is refused when there is nothing to take it from', () => {
    expect(() => floors({ ...place, heightM: null })).toThrow(TypeError);
    expect(() => floors({ ...place, latitudeRad: null })).toThrow(TypeError);
  });
});

describe('floors: uncertainty', () => {
  it('has the derivatives of the formula', () => {
    const base: FloorsInput = {
      ...stated,
      dHM: { value: 40, u: 0.01 },
      gradientPerS2: { value: 3.0e-6, u: 2e-7 },
    };
    const { budget, y } = floors(base);
    const at = (change: Partial<FloorsInput>) => floors({ ...base, ...change }).dW.value;
    const c2 = 299_792_458 ** 2;
    const numeric = {
      dH: (at({ dHM: { value: 40.5, u: 0.01 } }) - at({ dHM: { value: 39.5, u: 0.01 } })) / c2,
      g: (at({ gMs2: { value: 9.8225, u: 1e-4 } }) - at({ gMs2: { value: 9.8025, u: 1e-4 } })) / 0.02 / c2,
      gradient:
        (at({ gradientPerS2: { value: 3.1e-6, u: 0 } }) - at({ gradientPerS2: { value: 2.9e-6, u: 0 } })) / 0.2e-6 / c2,
    };
    expect(budget.map((row) => row.input)).toEqual(['dH', 'g', 'gradient']);
    for (const row of budget) {
      const wanted = numeric[row.input as keyof typeof numeric];
      within(row.sensitivity, wanted, 1e-6 * Math.abs(wanted));
      within(row.uy, Math.abs(row.sensitivity) * row.u, 0);
    }
    within(
      budget.reduce((sum, row) => sum + row.share, 0),
      1,
      1e-14,
    );
    within(Math.sqrt(budget.reduce((sum, row) => sum + row.uy ** 2, 0)), y.u, 1e-32);
  });

  it('counts the default gradient with 10 %', () => {
    const { y, gradient } = floors({
      ...stated,
      dHM: { value: 100, u: 0 },
      gMs2: { value: 9.8, u: 0 },
    });
    expect(gradient.from).toBe('default');
    within(y.u * 299_792_458 ** 2, 0.5 * 3.086e-7 * 1e4, 1e-12);
  });
});

describe('floors: warnings', () => {
  it('sizes the default gradient over a shaft, and only there', () => {
    const shaft = { ...stated, dHM: { value: 200, u: 0.01 } };
    expect(codes(shaft)).toEqual(['default-gradient']);
    // ½·2.2e-6·200² = 0.044 m²/s² = 4.9e-19 = 4.5 mm
    const { message } = floors(shaft).warnings[0]!;
    expect(message).toContain('4.9e-19');
    expect(message).toContain('4.5 mm');
    expect(codes({ ...shaft, gradientPerS2: { value: 3.05e-6, u: 1e-8 } })).toEqual([]);
    expect(codes({ ...stated, dHM: { value: 50, u: 0.01 } })).toEqual([]);
    expect(codes({ ...stated, dHM: { value: -50.1, u: 0.01 } })).toEqual(['default-gradient']);
  });

  it('names a gradient of the wrong sign or power', () => {
    expect(codes({ ...stated, gradientPerS2: { value: -3.086e-6, u: 0 } })).toEqual(['gradient-unusual']);
    expect(codes({ ...stated, gradientPerS2: { value: 3.086e-5, u: 0 } })).toEqual(['gradient-unusual']);
  });

  it('says when the height is taken as exact', () => {
    expect(codes({ ...stated, dHM: { value: 3, u: 0 } })).toEqual(['exact-height']);
    expect(codes({ ...stated, dHM: { value: 0, u: 0 } })).toEqual([]);
  });

  it('is silent otherwise', () => expect(codes(stated)).toEqual([]));
});

describe('floors: measured', () => {
  const y = floors(stated).y;
  const verdict = (value: number, u: number) => floors({ ...stated, measuredY: { value, u } }).measured!;

  it('differs beyond twice the standard uncertainty of the difference, and not before', () => {
    const u = 1e-17;
    const uDifference = Math.hypot(u, y.u);
    expect(verdict(y.value + 1.99 * uDifference, u).verdict).toBe('agree');
    const over = verdict(y.value + 2.01 * uDifference, u);
    expect(over.verdict).toBe('differ');
    within(over.difference.value, 2.01 * uDifference, 1e-30);
    within(over.difference.u, uDifference, 1e-32);
    within(over.z!, 2.01, 1e-9);
    expect(verdict(y.value - 2.01 * uDifference, u).z).toBeLessThan(-2);
  });

  it('is inconclusive when it could not have told the offset from none', () => {
    expect(verdict(1.4e-15, 0.4e-15).verdict).toBe('agree');
    const poor = verdict(1.4e-15, 0.5e-15);
    expect(poor.verdict).toBe('inconclusive');
    within(poor.smallestDetectable, 2.801585 * Math.hypot(0.5e-15, y.u), 1e-21);
  });

  it('recognises a correction given for a shift, and a value with gravity already removed', () => {
    expect(verdict(-y.value, 1e-18)).toMatchObject({ verdict: 'differ', hint: 'sign-turned' });
    expect(verdict(1e-18, 1e-18)).toMatchObject({ verdict: 'differ', hint: 'gravity-already-removed' });
    expect(verdict(y.value * 1.1, 1e-18)).toMatchObject({ verdict: 'differ', hint: null });
    expect(verdict(y.value, 1e-18).hint).toBe(null);
  });

  it('knows exact against exact', () => {
    const exact: FloorsInput = {
      ...stated,
      dHM: { value: 0, u: 0 },
      measuredY: { value: 0, u: 0 },
    };
    expect(floors(exact).measured).toMatchObject({ verdict: 'agree', z: 0 });
    expect(floors({ ...exact, measuredY: { value: 1e-18, u: 0 } }).measured).toMatchObject({
      verdict: 'differ',
      z: null,
    });
  });
});

describe('floors: refused', () => {
  it.each([
    [{ dHM: { value: Number.NaN, u: 0 } }],
    [{ dHM: { value: 6000, u: 0 } }],
    [{ dHM: { value: 1, u: -1 } }],
    [{ dHM: { value: 1, u: Number.POSITIVE_INFINITY } }],
    [{ gMs2: { value: 981.25, u: 0 } }],
    [{ gradientPerS2: { value: 3.086, u: 0 } }],
    [{ measuredY: { value: 1, u: 0 } }],
    [{ gMs2: null, latitudeRad: degToRad(52), heightM: { value: 1e6, u: 0 } }],
  ])('%o', (change) => {
    expect(() => floors({ ...stated, ...(change as Partial<FloorsInput>) })).toThrow(QuantityRangeError);
  });
});
