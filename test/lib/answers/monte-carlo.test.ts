import fs from 'node:fs';
import { describe, expect, it } from 'vitest';
import { expandedUncertaintyOf } from '../../../lib/answers/coverage.js';
import { linkTrials } from '../../../lib/answers/link-trials.js';
import { linkMonteCarloSteps, predictMonteCarlo } from '../../../lib/answers/monte-carlo.js';
import { predict } from '../../../lib/answers/predict.js';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { coverageFactor } from '../../../lib/uncertainty/coverage.js';
import { expectRelative, expectWithin } from '../uncertainty/expect-relative.js';

const example = (name: string) =>
  readCampaign(fs.readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8')).campaign;

const campaignOf = (value: unknown) => readCampaign(JSON.stringify(value)).campaign;

/** Two sites with GNSS and quasigeoid, one link. */
const twoSites = (zeta: (site: string) => unknown, more: object = {}) =>
  campaignOf({
    format: 'plumbtick-campaign/1',
    sources: [{ id: 'geoid', correlation: 0.9 }],
    sites: ['a', 'b'].map((id, i) => ({
      id,
      lat: 50 + i,
      lon: 10 + i,
      g: '9.8100000(30) m/s²',
      h: { value: `${100 + 200 * i}.000(1) m`, tide: 'zero' },
      determinations: [{ kind: 'gnss-quasigeoid', zeta: zeta(id) }],
    })),
    clocks: ['a', 'b'].map((id) => ({ id: `c-${id}`, site: id, transition: '87Sr', tie: [{ dH: '1.200(1) m' }] })),
    links: [{ id: 'ab', from: 'c-a', to: 'c-b' }],
    ...more,
  });

describe('measurement model of the trials', () => {
  it('moves each link by its sensitivities, for every input of every example', () => {
    for (const name of ['triangle', 'three-sites', 'other-kinds']) {
      const solved = solveCampaign(example(name));
      const links = solved.links.flatMap((q, l) => (q ? [l] : []));
      const trials = linkTrials(solved, links);
      const out = links.map(() => new Float64Array(2));
      const byPath = new Map(solved.model.inputs.map((x, i) => [x.path, i]));
      expect(trials.inputs.length).toBeGreaterThan(3);
      trials.inputs.forEach((input, i) => {
        if (input.u === 0) return;
        const step = input.u / 10;
        const d = trials.inputs.map((_, j) => (j === i ? Float64Array.of(step, -step) : new Float64Array(2)));
        trials.model.evaluate(d, 2, out);
        links.forEach((l, k) => {
          const { indices, values } = solved.links[l]!.y.gradient;
          const c = values[indices.indexOf(byPath.get(input.name)!)] ?? 0;
          // central difference of functions that are quadratic at most; rounding of W0 − C at 1.5e-8 m²/s²
          expectWithin(
            (out[k]![0]! - out[k]![1]!) / (2 * step),
            c,
            1e-9 * Math.abs(c) + 3e-25 / step,
            `${name} ${input.name}`,
          );
        });
      });
      // every input that matters is there
      for (const l of links) {
        for (const i of solved.links[l]!.y.gradient.indices) {
          expect(trials.inputs.map((x) => x.name)).toContain(solved.model.inputs[i]!.path);
        }
      }
    }
  });
});

describe('predict with trials', () => {
  it('agrees with the linear law in the examples, whose inputs are normal and models nearly linear', () => {
    for (const name of ['triangle', 'three-sites']) {
      const campaign = example(name);
      const linear = predict(campaign);
      const mc = predictMonteCarlo(campaign, { trials: 60_000, seed: 7 });
      mc.links.forEach((link, l) => {
        const y = linear.links[l]!.y!;
        const found = link.monteCarlo!;
        expect(found).toMatchObject({ trials: 60_000, seed: 7, validated: true });
        expectWithin(found.mean!, y.value, (5 * y.u) / Math.sqrt(60_000));
        expectRelative(found.u!, y.u, 5 / Math.sqrt(120_000));
        expectWithin(found.interval95[0], y.value - 1.96 * y.u, 0.06 * y.u);
        expectWithin(found.interval95[1], y.value + 1.96 * y.u, 0.06 * y.u);
        expectWithin(found.linear95[1] - found.linear95[0], 2 * 1.96 * y.u, 0.2 * y.u);
        expect(found.shortest95[1] - found.shortest95[0]).toBeLessThanOrEqual(
          found.interval95[1] - found.interval95[0],
        );
      });
      // everything else is the answer of predict
      expect({ ...mc, links: mc.links.map(({ monteCarlo: _, ...rest }) => rest) }).toEqual(linear);
    }
  });

  it('correlated uniforms: the ends of a difference of two with ρ = 0.9, not those of the linear law', () => {
    const zeta = { value: '43.812(200) m', tide: 'zero', source: 'geoid', distribution: 'uniform' };
    const mc = predictMonteCarlo(
      twoSites(() => zeta),
      { trials: 200_000, seed: 3 },
    );
    const { y, monteCarlo } = mc.links[0]!;
    // u² = 2·(1 − ρ)·(0.2·g/c²)² and small other parts
    expectRelative(y!.u, (Math.sqrt(0.2) * 0.2 * 9.81) / 8.98755e16, 0.01);
    expectRelative(monteCarlo!.u!, y!.u, 0.01);
  });

  it('a uniform that dominates is not validated, and a warning gives both intervals in words', () => {
    const uniform = { value: '43.812(200) m', tide: 'zero', distribution: 'uniform' };
    const mc = predictMonteCarlo(
      twoSites((id) => (id === 'a' ? uniform : { value: '43.8(0.001) m', tide: 'zero' })),
      {
        trials: 100_000,
        seed: 3,
      },
    );
    const { y, monteCarlo } = mc.links[0]!;
    expect(monteCarlo).toMatchObject({ validated: false, resolved: true });
    expectRelative(monteCarlo!.interval95[1] - monteCarlo!.interval95[0], 2 * 0.95 * Math.sqrt(3) * y!.u, 0.01);
    const warning = mc.warnings.find((w) => w.code === 'linear-not-validated')!;
    expect(warning.path).toBe('links.ab');
    expect(warning.message).toMatch(
      /^95 % interval of y by 100000 trials .+ by the linear law .+ The linear result does not hold/,
    );
  });

  it('a t with ν ≤ 2 leaves u null and gives an interval', () => {
    const heavy = (dof: number) => (id: string) =>
      id === 'a'
        ? { value: '43.812(20) m', tide: 'zero', distribution: 't', dof }
        : { value: '43.8(0.001) m', tide: 'zero' };
    const two = predictMonteCarlo(twoSites(heavy(2)), { trials: 20_000, seed: 3 }).links[0]!;
    expect(two.monteCarlo!.u).toBeNull();
    expect(two.monteCarlo!.mean).not.toBeNull();
    // U = k·u with k of 2 degrees of freedom, 4.303: the linear law with Welch–Satterthwaite is right here
    expectRelative(two.monteCarlo!.interval95[1] - two.monteCarlo!.interval95[0], 2 * 4.303 * two.y!.u, 0.06);
    // ν_eff is a little above 2, for one per cent of the variance has ν = ∞
    expectRelative(two.monteCarlo!.linear95[1] - two.monteCarlo!.linear95[0], 2 * 4.303 * two.y!.u, 0.03);
    expect(predictMonteCarlo(twoSites(heavy(1)), { trials: 20_000, seed: 3 }).links[0]!.monteCarlo).toMatchObject({
      u: null,
      mean: null,
    });
  });

  it('names inputs that share a source but not a shape', () => {
    const zeta = (id: string) => ({
      value: '43.812(20) m',
      tide: 'zero',
      source: 'geoid',
      ...(id === 'a' ? { distribution: 'uniform' } : {}),
    });
    const campaign = twoSites(zeta, { sources: [{ id: 'geoid' }] });
    const attempt = () => predictMonteCarlo(campaign, { trials: 1000, seed: 1 });
    expect(attempt).toThrow(CampaignError);
    expect(attempt).toThrow(
      /sites\.a\.determinations\.0\.zeta: correlation-unreachable: found correlation 1 with sites\.b\.determinations\.0\.zeta/,
    );
  });

  it('a group without a level has no trials, and a link inside it has', () => {
    const campaign = campaignOf({
      format: 'plumbtick-campaign/1',
      sites: [
        { id: 'a', lat: 50, lon: 10, g: '9.81(0.0001)', determinations: [] },
        {
          id: 'b',
          lat: 50,
          lon: 10.01,
          g: '9.81(0.0001)',
          determinations: [{ kind: 'levelled-from', site: 'a', dH: '12.0(0.01) m' }],
        },
        { id: 'c', lat: 51, lon: 10, g: '9.81(0.0001)', determinations: [{ kind: 'potential', W: '62636000(1)' }] },
      ],
      clocks: ['a', 'b', 'c'].map((id) => ({ id: `c-${id}`, site: id, transition: '87Sr' })),
      links: [
        { id: 'inside', from: 'c-a', to: 'c-b' },
        { id: 'out', from: 'c-a', to: 'c-c' },
      ],
    });
    const mc = predictMonteCarlo(campaign, { trials: 20_000, seed: 1 });
    const [inside, out] = mc.links;
    expect(out!.monteCarlo).toBeNull();
    expectRelative(inside!.monteCarlo!.u!, inside!.y!.u, 0.03);
  });

  it('auto stops by itself, and steps report on the way', () => {
    const campaign = example('triangle');
    const steps = linkMonteCarloSteps(solveCampaign(campaign), { trials: 'auto', seed: 5 });
    let last = 0;
    let step = steps.next();
    while (!step.done) {
      expect(step.value.trials).toBe(last + 10_000);
      last = step.value.trials;
      step = steps.next();
    }
    expect(step.value).toMatchObject({ stable: true, trials: last });
    expect(predictMonteCarlo(campaign, { trials: 'auto', seed: 5 }).links[0]!.monteCarlo!.trials).toBe(last);
  });
});

describe('expanded uncertainty of a link', () => {
  it('takes k from the effective degrees of freedom of its blocks', () => {
    const campaign = twoSites((id) => ({
      value: '43.812(20) m',
      tide: 'zero',
      source: 'geoid',
      ...(id === 'a' ? { dof: 4 } : { dof: 9 }),
    }));
    const { model, links } = solveCampaign(campaign);
    const { gradient } = links[0]!.y;
    const e = expandedUncertaintyOf(model.covariance, gradient, 0.95);
    // u² = geoid block (ν = 4, the smaller) and independent rest: ν_eff = 4·(u²/u_geoid²)²
    const geoid = 2 * 0.1 * (0.02 * 9.81) ** 2;
    const rest = model.covariance.variance(gradient) * 8.987551787368176e16 ** 2 - geoid;
    expectRelative(e.degreesOfFreedom, 4 * ((geoid + rest) / geoid) ** 2, 5e-3);
    expect(e.coverageFactor).toBe(coverageFactor(0.95, e.degreesOfFreedom));
    expect(e.expandedUncertainty).toBe(e.coverageFactor * Math.sqrt(model.covariance.variance(gradient)));
  });
});
