import { describe, expect, it } from 'vitest';
import { path } from '../../../lib/answers/path.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../../lib/constants/defining-constants.js';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { geopotentialOfNormalHeight } from '../../../lib/earth/normal-field.js';
import { degToRad } from '../../../lib/quantity/radians.js';

const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);

const normal = (H: number) => [{ kind: 'normal-height', H: { value: H, tide: 'mean' } }];
const campaignOf = (link: object) =>
  readCampaignValue({
    format: 'plumbtick-campaign/1',
    sites: [
      { id: 'a', lat: 0, lon: 0, determinations: normal(0) },
      { id: 'b', lat: 0, lon: 40, determinations: normal(1000) },
    ],
    clocks: [
      { id: 'ca', site: 'a', transition: '87Sr' },
      { id: 'cb', site: 'b', transition: '87Sr' },
    ],
    links: [{ id: 'ab', from: 'ca', to: 'cb', ...link }],
  }).campaign;
const linkOf = (link: object) => path(campaignOf(link)).links[0]!;

describe('path of a link', () => {
  it('is the geodesic between the sites: 40° of 207.386 ns along the equator', () => {
    const link = linkOf({ kind: 'fibre' });
    // the second site is 1 km high: a part in 6378 more area, half of that on average
    within(link.sagnac.oneWay * 1e9, (207.386 * 40) / 360, 0.006);
    within(link.sagnac.twoWay, link.sagnac.oneWay, 0);
    within(link.length, GRS80.a * degToRad(40), 400);
    expect(link).toMatchObject({ way: 'surface', via: 0, gravitationalDelay: null, movedClock: null });
  });

  it('goes over its way points: a detour over the pole sweeps no area', () => {
    const over = linkOf({ kind: 'fibre', route: { via: [{ lat: 90, lon: 0 }] } });
    within(over.sagnac.oneWay, 0, 1e-20);
    within(over.length / 1000, 20_004, 2);
  });

  it('goes up and down to a satellite in straight legs, with the delay by gravity, which two ways cancel', () => {
    const link = linkOf({ kind: 'satellite', route: { via: [{ lat: 0, lon: 20, height: '35786 km' }] } });
    const triangles = GRS80.a * (GRS80.a + 35_786_000) * Math.sin(degToRad(20));
    within(link.sagnac.oneWay * 1e9, ((2 * GRS80.omega * triangles) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2) * 1e9, 0.02);
    expect(link.way).toBe('straight');
    within(link.gravitationalDelay!.oneWay * 1e12, 110, 20);
    expect(link.gravitationalDelay!.twoWay).toBe(0);
  });

  it('says that a satellite link without its satellite is taken along the ground', () => {
    const answer = path(campaignOf({ kind: 'satellite' }));
    expect(answer.warnings.map((w) => w.code)).toEqual(['satellite-missing']);
    expect(answer.links[0]).toMatchObject({ way: 'surface', gravitationalDelay: null });
  });

  it('gives the time a carried clock gains by height, velocity and rotation', () => {
    const day = '2027-05-03T00:00:00Z';
    const link = linkOf({
      kind: 'transported',
      route: {
        departure: day,
        via: [{ lat: 0, lon: 40, height: 1000, time: '2027-05-04T00:00:00Z' }],
        arrival: '2027-05-06T00:00:00Z',
      },
    });
    const m = link.movedClock!;
    // half of C over the first day's climb, all of it for two days' rest
    const C = geopotentialOfNormalHeight(GRS80, degToRad(0), 1000).geopotentialM2s2;
    within(m.potential, (C * 2.5 * 86_400) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2, 2e-12);
    const v = link.length / 86_400;
    within(m.velocity, -(v * v * 43_200) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2, 1e-12);
    within(m.rotation, -link.sagnac.oneWay, 1e-18);
    within(m.total, m.potential + m.velocity + m.rotation, 1e-22);
    expect(m.duration).toBe(3 * 86_400);
  });

  it('refuses what no signal or clock can do, at the route', () => {
    const fault = (link: object) => {
      try {
        linkOf(link);
      } catch (error) {
        if (error instanceof CampaignError) return error.faults[0]!;
      }
      throw new Error('not refused');
    };
    expect(fault({ route: { departure: '2027-05-03T00:00:00Z', arrival: '2027-05-03T00:01:00Z' } })).toMatchObject({
      code: 'impossible-way',
      path: 'links.ab.route',
    });
    expect(fault({ route: { via: [{ lat: 0, lon: 180, height: '400 km' }] } }).expected).toMatch(/in sight/);
  });
});
