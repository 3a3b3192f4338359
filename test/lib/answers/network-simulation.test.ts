import { describe, expect, test } from 'vitest';
import { covarianceOfUnknowns, networkProblem, solveNetwork } from '../../../lib/answers/network.js';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';
import { plannedCovariance } from '../../../lib/model/planned-covariance.js';
import { chiSquareQuantile, normalQuantile } from '../../../lib/uncertainty/distributions/index.js';
import { cholesky } from '../../../lib/uncertainty/matrix.js';
import { Xoshiro128 } from '../../../lib/uncertainty/random.js';
import { reliability } from '../../../lib/uncertainty/reliability.js';

/** Seeded uniform draws, one at a time. */
const uniforms = (seed: number) => {
  const random = Xoshiro128.fromSeed(seed);
  const block = new Float64Array(4096);
  let at = block.length;
  return () => {
    if (at === block.length) {
      random.fillUniform(block, block.length);
      at = 0;
    }
    return block[at++]!;
  };
};

const normals = (seed: number) => {
  const uniform = uniforms(seed);
  return () => normalQuantile(uniform());
};

/** Twelve sites on a grid: GNSS everywhere, a datum with an unknown offset at five, a ring and spokes of clocks. */
const network = () => {
  const at = Array.from({ length: 12 }, (_, i) => ({ lat: 46 + Math.floor(i / 4), lon: 6 + 1.3 * (i % 4) }));
  return readCampaignValue({
    format: 'plumbtick-campaign/1',
    window: { start: '2027-06-01T00:00:00Z', end: '2027-06-15T00:00:00Z' },
    sources: [{ id: 'qg', correlationLength: '90 km' }, { id: 'gnss', correlation: 0.3 }, { id: 'sr' }],
    datums: [{ id: 'd', W0: '62636853.0(5) m²/s²', estimateOffset: true }],
    sites: at.map((p, i) => ({
      id: `s${i}`,
      ...p,
      g: '9.81000(1) m/s²',
      determinations: [
        {
          kind: 'gnss-quasigeoid',
          h: { value: `${400 + 80 * i}.00(1) m`, tide: 'free', source: 'gnss' },
          zeta: { value: '48.00(3) m', tide: 'zero', source: 'qg' },
        },
        ...(i < 5
          ? [
              {
                kind: 'geopotential-number',
                datum: 'd',
                C: { value: `${(3450 + 785 * i).toFixed(2)} ± 0.05 m²/s²`, tide: 'mean' },
              },
            ]
          : []),
      ],
    })),
    clocks: at.map((_, i) => ({
      id: `k${i}`,
      site: `s${i}`,
      transition: '87Sr',
      tie: [{ dH: '1.000(3) m' }],
      systematic: [{ u: '1e-18', source: 'sr' }, { u: '2e-18' }],
      stability: { white: '3e-16', flicker: '5e-19' },
      uptime: 0.6,
    })),
    links: Array.from({ length: 14 }, (_, i) => ({
      id: `l${i}`,
      from: `k${i % 12}`,
      to: `k${i < 12 ? (i + 1) % 12 : (i % 12) + 6}`,
      stability: { phase: '1e-15' },
      systematic: '2e-19',
    })),
  }).campaign;
};

test('2000 simulated campaigns of a 12-site network: covariance, χ² and false alarms as predicted', () => {
  const TRIALS = 2000;
  const campaign = network();
  const solved = solveCampaign(campaign);
  const problem = networkProblem(solved, true);
  const { model } = solved;
  // errors of the inputs from their own covariance, element by element, not from the propagated one
  const used = [...new Set(problem.observations.flatMap((o) => o.gradient.indices))].filter(
    (i) => model.inputs[i]!.u > 0,
  );
  const inputFactor = cholesky(
    used.map((i) =>
      Float64Array.from(used, (j) => model.covariance.between(i, j) + (i === j ? 1e-12 * model.inputs[i]!.u ** 2 : 0)),
    ),
  )!;
  const c4 = 299792458 ** 4;
  const clockFactor = cholesky(plannedCovariance(campaign, campaign.links, 14 * 86400))!;
  const draw = normals(7);
  const truth = solveNetwork(campaign, problem);
  const predicted = covarianceOfUnknowns(truth);
  const n = truth.columns.length;
  const sums = Array.from({ length: n }, () => new Float64Array(n));
  let rejected = 0;
  let alarms = 0;
  let tested = 0;
  let chi2Sum = 0;
  const limit = chiSquareQuantile(0.95, truth.solution.dof);
  const alarmLimit = normalQuantile(1 - 0.05 / 2);
  for (let t = 0; t < TRIALS; t++) {
    const z = used.map(draw);
    const error = new Map(used.map((i, a) => [i, inputFactor[a]!.reduce((s, f, b) => s + f * z[b]!, 0)]));
    const noise = clockFactor.map(() => draw());
    let link = 0;
    const observations = problem.observations.map((o) => {
      const byInputs = o.gradient.indices.reduce((s, i, k) => s + o.gradient.values[k]! * (error.get(i) ?? 0), 0);
      const byClocks = o.id.startsWith('links.')
        ? Math.sqrt(c4) * clockFactor[link++]!.reduce((s, f, b) => s + f * noise[b]!, 0)
        : 0;
      // what is observed of a world in which every potential is 0 and W₀ is as stated
      return { ...o, value: byInputs + byClocks + (o.absolute ? 62636853.4 : 0) };
    });
    const { solution } = solveNetwork(campaign, { ...problem, observations });
    for (let i = 0; i < n; i++)
      for (let j = 0; j <= i; j++) sums[i]![j]! += solution.estimate[i]! * solution.estimate[j]!;
    chi2Sum += solution.chi2;
    if (solution.chi2 > limit) rejected++;
    for (const r of reliability(solution, observations.length))
      if (r.standardised !== null) {
        tested++;
        if (Math.abs(r.standardised) > alarmLimit) alarms++;
      }
  }
  let worst = 0;
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      const spread = Math.sqrt((predicted[i]![i]! * predicted[j]![j]! + predicted[i]![j]! ** 2) / TRIALS);
      worst = Math.max(worst, Math.abs(sums[i]![j]! / TRIALS - predicted[i]![j]!) / spread);
    }
  // 91 elements: five standard errors of sampling is one false failure in 1e4 such tests, and the seed is fixed
  expect(worst).toBeLessThan(5);
  const { dof } = truth.solution;
  expect(Math.abs(chi2Sum / TRIALS - dof)).toBeLessThan(4 * Math.sqrt((2 * dof) / TRIALS));
  expect(Math.abs(rejected / TRIALS - 0.05)).toBeLessThan(4 * Math.sqrt((0.05 * 0.95) / TRIALS));
  // the tests of one campaign are correlated, so only the trials count as independent
  expect(Math.abs(alarms / tested - 0.05)).toBeLessThan(4 * Math.sqrt((0.05 * 0.95) / TRIALS));
}, 60_000);

describe('covariance of links that run at the same time', () => {
  test('clocks and links with outages, simulated second by second', () => {
    const campaign = readCampaignValue({
      format: 'plumbtick-campaign/1',
      sites: ['a', 'b', 'c'].map((id, i) => ({ id, lat: 47 + i, lon: 8 })),
      clocks: [
        ['a', 2, 0.7],
        ['b', 4, 0.6],
        ['c', 1.5, 0.9],
      ].map(([id, white, uptime]) => ({
        id: `k${id}`,
        site: id,
        transition: '87Sr',
        stability: { white: Number(white) * 1e-16 },
        uptime,
      })),
      links: [
        { id: 'ab', from: 'ka', to: 'kb', uptime: 0.95 },
        { id: 'bc', from: 'kb', to: 'kc', uptime: 0.9 },
        { id: 'ca', from: 'kc', to: 'ka', uptime: 0.8 },
        { id: 'ab2', from: 'ka', to: 'kb', uptime: 0.4, stability: { white: '1e-16' } },
      ],
    }).campaign;
    const STEPS = 600;
    const TRIALS = 2500;
    const predicted = plannedCovariance(campaign, campaign.links, STEPS);
    const uniform = uniforms(11);
    const draw = normals(12);
    const up = (p: number) => uniform() < p;
    const clockIndex = new Map(campaign.clocks.map((c, i) => [c.id, i]));
    const sums = predicted.map((row) => new Float64Array(row.length));
    for (let t = 0; t < TRIALS; t++) {
      const total = campaign.links.map(() => 0);
      const count = campaign.links.map(() => 0);
      for (let s = 0; s < STEPS; s++) {
        const running = campaign.clocks.map((c) => up(c.uptime));
        const y = campaign.clocks.map((c) => c.stability.white * draw());
        campaign.links.forEach((l, i) => {
          const [a, b] = [clockIndex.get(l.from)!, clockIndex.get(l.to)!];
          if (!up(l.uptime) || !running[a] || !running[b]) return;
          total[i]! += y[b]! - y[a]! + (l.stability.white > 0 ? l.stability.white * draw() : 0);
          count[i]!++;
        });
      }
      const mean = total.map((x, i) => x / count[i]!);
      mean.forEach((x, i) => {
        mean.forEach((z, j) => {
          sums[i]![j]! += x * z;
        });
      });
    }
    predicted.forEach((row, i) => {
      row.forEach((p, j) => {
        const spread = Math.sqrt((row[i]! * predicted[j]![j]! + p * p) / TRIALS);
        // random outages make the time together scatter: 1/T_eff is right to 1/(T_eff) of itself, 0.6 % here
        expect(Math.abs(sums[i]![j]! / TRIALS - p), `${i} ${j}`).toBeLessThan(4.5 * spread + 0.01 * Math.abs(p));
      });
    });
  }, 30_000);
});
