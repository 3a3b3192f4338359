import { describe, expect, it } from 'vitest';
import { poleAt, poleTideM2s2, secularPole } from '../../../../lib/earth/earth-tide/pole-tide.js';
import { tideSite } from '../../../../lib/earth/earth-tide/solid-earth-tide.js';
import { LOVE_NUMBERS } from '../../../../lib/earth/permanent-tide.js';
import { degToRad } from '../../../../lib/quantity/radians.js';

const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);
const ARCSEC = Math.PI / 648_000;
const ms = Date.UTC(2027, 4, 3);

describe('pole tide', () => {
  it('raises the crust by −33 mm·sin 2θ·(m₁ cos λ + m₂ sin λ) per arc-second (IERS Conventions 2010, eq. 7.26)', () => {
    const mean = secularPole(ms);
    for (const [lat, lon] of [
      [52.3, 10.5],
      [-33.8, 151.1],
      [40, -105.3],
    ] as const)
      for (const [m1, m2] of [
        [0.2, 0],
        [0, 0.3],
        [-0.1, 0.25],
      ] as const) {
        const pole = { xRad: mean.xRad + m1 * ARCSEC, yRad: mean.yRad - m2 * ARCSEC };
        const felt = poleTideM2s2(tideSite(degToRad(lat), degToRad(lon), 0).position, pole, ms);
        // radial displacement h₂·ΔV/g from the potential felt, (1 + k₂ − h₂)·ΔV
        const mm = ((felt * LOVE_NUMBERS.h2) / (1 + LOVE_NUMBERS.k2 - LOVE_NUMBERS.h2) / 9.8) * 1000;
        const sin2theta = Math.sin(2 * degToRad(90 - lat));
        const iers = -33 * sin2theta * (m1 * Math.cos(degToRad(lon)) + m2 * Math.sin(degToRad(lon)));
        within(mm, iers, 0.03 * Math.hypot(m1, m2) * 33, `${lat} ${lon} ${m1} ${m2}`);
      }
  });

  it('is nothing at the secular pole, the equator and the poles', () => {
    const off = { xRad: 0.4 * ARCSEC, yRad: 0.6 * ARCSEC };
    const at = (lat: number) => tideSite(degToRad(lat), degToRad(10), 0).position;
    within(poleTideM2s2(at(45), secularPole(ms), ms), 0, 1e-12);
    within(poleTideM2s2(at(0), off, ms), 0, 1e-12);
    within(poleTideM2s2(at(90), off, ms), 0, 1e-12);
    expect(Math.abs(poleTideM2s2(at(45), off, ms))).toBeGreaterThan(0.05);
  });

  it('has the secular pole of the IERS: 55.0 and 320.5 mas in 2000, 1.677 and 3.460 mas a year', () => {
    const j2000 = secularPole(Date.UTC(2000, 0, 1, 12));
    within(j2000.xRad / ARCSEC, 0.055, 1e-9);
    within(j2000.yRad / ARCSEC, 0.3205, 1e-9);
    const later = secularPole(Date.UTC(2000, 0, 1, 12) + 10 * 365.25 * 86_400_000);
    within(later.xRad / ARCSEC, 0.07177, 1e-9);
    within(later.yRad / ARCSEC, 0.3551, 1e-9);
  });

  it('interpolates between dates and knows nothing outside them', () => {
    const positions = [
      { timeMs: 0, xRad: 1e-6, yRad: 2e-6 },
      { timeMs: 100, xRad: 2e-6, yRad: 0 },
    ];
    expect(poleAt(positions, 0)).toMatchObject({ xRad: 1e-6 });
    expect(poleAt(positions, 100)).toMatchObject({ xRad: 2e-6 });
    within(poleAt(positions, 25)!.xRad, 1.25e-6, 1e-20);
    within(poleAt(positions, 25)!.yRad, 1.5e-6, 1e-20);
    expect(poleAt(positions, -1)).toBeNull();
    expect(poleAt(positions, 101)).toBeNull();
    expect(poleAt([], 0)).toBeNull();
    expect(poleAt([{ timeMs: null, xRad: 5e-7, yRad: 0 }], 1e12)).toMatchObject({ xRad: 5e-7 });
  });
});
