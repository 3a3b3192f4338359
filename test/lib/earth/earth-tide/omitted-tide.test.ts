import { describe, expect, it } from 'vitest';
import { omittedTide, totalOmittedM2s2 } from '../../../../lib/earth/earth-tide/omitted-tide.js';
import { mayBeNearOpenCoast } from '../../../../lib/earth/earth-tide/open-coast.js';
import { degToRad } from '../../../../lib/quantity/radians.js';

const near = (lat: number, lon: number) => mayBeNearOpenCoast(degToRad(lat), degToRad(lon));

describe('places within 50 km of an open coast', () => {
  it.each([
    ['the Low Saxon plain', 52.2961, 10.4598],
    ['Thuringia', 50.91, 11.72],
    ['Bavaria', 48.26, 11.67],
    ['the Rocky Mountains', 39.9912, -105.2601],
    ['the middle of Asia', 43.8, 87.6],
    ['the middle of Australia', -23.7, 133.9],
    ['the South Pole', -90, 0],
    ['western Switzerland', 47, 6.95],
    ['the Amazon', -3.1, -60.0],
    ['Siberia beside 180°', 67.6, 168],
  ])('%s is not', (_, lat, lon) => {
    expect(near(lat, lon)).toBe(false);
    expect(near(lat, lon - 360)).toBe(false);
  });

  it.each([
    ['the Thames estuary', 51.4252, -0.3442],
    ['the bay of Tokyo', 35.71, 139.76],
    ['the coast of Chile', -24.6, -70.4],
    ['Sydney', -33.77, 151.11],
    ['New Zealand', -39.5021, 176.9],
    ['the open ocean', 0, -150],
    ['the North Pole', 90, 12],
    ['the date line', 52, 180],
    ['a coast of the Baltic', 54.35, 18.65],
  ])('%s may be', (_, lat, lon) => {
    expect(near(lat, lon)).toBe(true);
  });
});

describe('what the tide leaves out', () => {
  const lat = degToRad(52.2961);
  it('is the sum of its bounds', () => {
    const o = omittedTide(lat, degToRad(10.4598), { oceanLoading: false, pole: false });
    const s = Math.sin(2 * lat);
    expect(o).toEqual({
      diurnalResonanceM2s2: 0.06 * s,
      poleTideM2s2: 0.11 * s,
      oceanLoadingM2s2: 0,
      airAndWaterM2s2: 0.1,
    });
    expect(Math.abs(totalOmittedM2s2(o) - (0.17 * s + 0.1))).toBeLessThan(1e-15);
  });

  it('has no pole tide and no ocean loading where they are given, and 0.4 m²/s² at a coast where not', () => {
    const coast = [degToRad(-33.77), degToRad(151.11)] as const;
    expect(omittedTide(...coast, { oceanLoading: false, pole: true })).toMatchObject({
      oceanLoadingM2s2: 0.4,
      poleTideM2s2: 0,
    });
    expect(omittedTide(...coast, { oceanLoading: true, pole: false }).oceanLoadingM2s2).toBe(0);
    expect(omittedTide(...coast, { oceanLoading: true, pole: false }).diurnalResonanceM2s2).toBeGreaterThan(0.05);
  });
});
