import { describe, expect, it } from 'vitest';
import { geodesicDistanceM } from '../../../lib/earth/geodesic-distance.js';
import { geodesicCircle, geodesicLine, pointAtDistance } from '../../../lib/earth/geodesic-line.js';
import { degToRad, radToDeg } from '../../../lib/quantity/radians.js';
import { expectWithin } from '../../expect-within.js';

const at = (lat: number, lon: number) => ({ latitudeRad: degToRad(lat), longitudeRad: degToRad(lon) });

describe('lines and circles on the ellipsoid', () => {
  it('a line runs in equal steps from end to end, and its points lie on it', () => {
    const [p, q] = [at(52.3, 10.5), at(46.6, 7.9)];
    const { lengthM, points } = geodesicLine(p, q, 8);
    expectWithin(lengthM, geodesicDistanceM(p, q), 1e-6);
    expect(points).toHaveLength(9);
    points.forEach((point, i) => {
      expectWithin(geodesicDistanceM(p, point), (lengthM * i) / 8, 1e-6);
      expectWithin(geodesicDistanceM(point, q), (lengthM * (8 - i)) / 8, 1e-6);
    });
  });

  it('goes over the date line without a jump, and north of the parallel between places of one latitude', () => {
    const { points } = geodesicLine(at(50, 170), at(50, -160), 10);
    points.slice(1).forEach(({ longitudeRad }, i) => {
      expect(longitudeRad).toBeGreaterThan(points[i]!.longitudeRad);
    });
    expectWithin(radToDeg(points.at(-1)!.longitudeRad), 200, 1e-9);
    expect(radToDeg(points[5]!.latitudeRad)).toBeGreaterThan(50.5);
  });

  it('a circle keeps its distance and closes', () => {
    const centre = at(78.2, 15.6);
    const ring = geodesicCircle(centre, 60_000, 24);
    for (const point of ring) expectWithin(geodesicDistanceM(centre, point), 60_000, 1e-6);
    expectWithin(ring.at(-1)!.latitudeRad, ring[0]!.latitudeRad, 1e-12);
    // the first point lies north
    expectWithin(ring[0]!.longitudeRad, centre.longitudeRad, 1e-12);
    expect(ring[0]!.latitudeRad).toBeGreaterThan(centre.latitudeRad);
  });

  it('one kilometre east is one kilometre, near the pole too', () => {
    for (const lat of [0, 60, 89.9]) {
      const there = pointAtDistance(at(lat, 20), 1000, degToRad(90));
      expectWithin(geodesicDistanceM(at(lat, 20), there), 1000, 1e-6);
      expect(there.longitudeRad).toBeGreaterThan(degToRad(20));
    }
  });
});
