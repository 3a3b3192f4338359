import { describe, expect, it } from 'vitest';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { geopotentialOfNormalHeight } from '../../../lib/earth/normal-field.js';
import { levelledFunction, normalHeightFunction, tieFunction } from '../../../lib/model/determination-functions.js';
import { geopotentialDifference, trialDifferences } from '../../../lib/model/trial-differences.js';
import { degToRad } from '../../../lib/quantity/radians.js';
import { expectRelative, expectWithin } from '../uncertainty/expect-relative.js';

const closedForm = (latitude: number, H: number, d: number) =>
  geopotentialOfNormalHeight(GRS80, degToRad(latitude), H + d).geopotentialM2s2 -
  geopotentialOfNormalHeight(GRS80, degToRad(latitude), H).geopotentialM2s2;

describe('geopotential of a normal height that moves', () => {
  it('agrees with the closed form to its rounding, equator to pole, sea level to 8 km', () => {
    for (const latitude of [0, 45, 52.3, -90]) {
      for (const H of [-100, 80, 3400, 8000]) {
        const difference = geopotentialDifference(degToRad(latitude), H);
        // the closed form rounds at 7.5e-9 m²/s² a time
        for (const d of [-900, -30, -0.02, 0.011, 4, 1000])
          expectWithin(difference(d), closedForm(latitude, H, d), 3e-8, `${latitude} ${H} ${d}`);
        for (const d of [-9000, 20_000]) expectRelative(difference(d), closedForm(latitude, H, d), 1e-9);
      }
    }
  });

  it('keeps 15 digits of a millimetre, which the difference of two potentials would not', () => {
    const slope = (d: number) => geopotentialOfNormalHeight(GRS80, degToRad(50), 500 + d).perHeightMs2;
    const second = (slope(10) - slope(-10)) / 20 / 2;
    expectRelative(geopotentialDifference(degToRad(50), 500)(1e-3), slope(0) * 1e-3 + second * 1e-6, 1e-15);
  });
});

describe('differences of model functions over many trials', () => {
  const d = [Float64Array.of(0.1, -0.4, 0), Float64Array.of(0.02, 0, -0.01), Float64Array.of(0.01, 0.03, 0)];

  it('are those of the function itself, by its fast form', () => {
    const f = normalHeightFunction(degToRad(52), 0, 1, 2, { W0M2s2: 0.3, HM: -0.1 });
    const x = [62_636_853.4, 143.2, 43.8];
    const out = new Float64Array(3);
    trialDifferences(f, x)(d, 3, out);
    for (let t = 0; t < 3; t++) {
      expectWithin(out[t]!, f.evaluate(x.map((v, k) => v + d[k]![t]!)) - f.evaluate(x), 3e-8);
    }
    const single = normalHeightFunction(degToRad(52), 0, 1, null, { W0M2s2: 0, HM: 0 });
    trialDifferences(single, x.slice(0, 2))(d.slice(0, 2), 1, out);
    expectWithin(out[0]!, single.evaluate([x[0]! + 0.1, x[1]! + 0.02]) - single.evaluate(x.slice(0, 2)), 3e-8);
  });

  it('and where it has none', () => {
    for (const [f, x] of [
      [levelledFunction(0, [1, 2], 0.001), [2.5, 9.81, 9.8]],
      [tieFunction(0, 1, [2]), [9.81, 3.086e-6, 1.5]],
    ] as const) {
      const out = new Float64Array(4).fill(7);
      trialDifferences(f, x)(d, 3, out);
      for (let t = 0; t < 3; t++) {
        expectWithin(out[t]!, f.evaluate(x.map((v, k) => v + d[k]![t]!)) - f.evaluate(x), 1e-14);
      }
      expect(out[3]).toBe(7);
    }
  });
});
