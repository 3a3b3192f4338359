import { describe, it } from 'vitest';
import { plan } from '../../../lib/answers/plan.js';
import { expectWithin } from '../../expect-within.js';
import { normalDeviates, powerLawFm } from '../clocks/simulated-noise.js';
import { campaignOf } from '../model/campaign-of.js';

// Clocks and a link simulated in steps of 600 s over 8 days with their outages; the mean over what is there, again and again.
// The spread of 500 means has a sampling error of 1/√1000 = 3.2 %; three times that is allowed.
const TRIALS = 500;
const ALLOWED = 3 / Math.sqrt(2 * TRIALS);
const STEP_S = 600;
const STEPS = (8 * 86_400) / STEP_S;
const START = Date.UTC(2027, 2, 1);

type Loose = { [key: string]: unknown };
const site = (id: string): Loose => ({
  id,
  lat: 50,
  lon: 9,
  g: 9.81,
  determinations: [{ kind: 'potential', W: 62636000 }],
});
const uStatOf = (a: Loose, b: Loose, link: Loose) =>
  plan(
    campaignOf({
      window: { start: new Date(START).toISOString(), end: new Date(START + 1000 * STEP_S * STEPS).toISOString() },
      sites: [site('p'), site('q')],
      clocks: [
        { id: 'ka', site: 'p', transition: '87Sr', ...a },
        { id: 'kb', site: 'q', transition: '87Sr', ...b },
      ],
      links: [{ id: 'ab', from: 'ka', to: 'kb', ...link }],
    }),
  ).links[0]!;

const WHITE_A = 3e-16;
const WHITE_B = 2e-16;
const WHITE_L = 1e-16;

/** Intervals of steps as the file states them. */
const available = (on: readonly (readonly [number, number])[]): Loose[] =>
  on.map(([from, to]) => ({
    start: new Date(START + 1000 * STEP_S * from).toISOString(),
    end: new Date(START + 1000 * STEP_S * to).toISOString(),
  }));
const stepsOf = (on: readonly (readonly [number, number])[]): number[] =>
  on.flatMap(([from, to]) => Array.from({ length: to - from }, (_, i) => from + i));

const rms = (errors: readonly number[]): number => Math.sqrt(errors.reduce((s, e) => s + e * e, 0) / errors.length);

/** White frequency noise with an Allan deviation at 1 s, averaged over one step. */
const white = (next: () => number, level: number): number => (level * next()) / Math.sqrt(STEP_S);

describe('spread of simulated means', () => {
  it('with uptimes: outages of each at random, the mean over the common up-time', () => {
    const next = normalDeviates(1);
    const uniform = normalDeviates(2);
    const on = (share: number) => Math.abs(uniform()) < share;
    // P(|z| < x): 0.7 at 1.036433, 0.8 at 1.281552, 0.9 at 1.644854 (any table of the normal distribution)
    const errors = Array.from({ length: TRIALS }, () => {
      let sum = 0;
      let n = 0;
      for (let i = 0; i < STEPS; i++)
        if (on(1.036433) && on(1.281552) && on(1.644854)) {
          sum += white(next, WHITE_B) - white(next, WHITE_A) + white(next, WHITE_L);
          n++;
        }
      return sum / n;
    });
    const { window } = uStatOf(
      { stability: { white: WHITE_A }, uptime: 0.7 },
      { stability: { white: WHITE_B }, uptime: 0.8 },
      { stability: { white: WHITE_L }, uptime: 0.9 },
    );
    expectWithin(rms(errors), window!.uStat, ALLOWED * window!.uStat);
  });

  it('with intervals: overlap of clocks and link, phase noise for each unbroken stretch', () => {
    const onA = [
      [0, 300],
      [340, 700],
      [800, 1152],
    ] as const;
    const onB = [
      [50, 500],
      [520, 1000],
    ] as const;
    const onL = [
      [100, 900],
      [910, 1100],
    ] as const;
    // common: 100–300, 340–500, 520–700, 800–900, 910–1000
    const common = [
      [100, 300],
      [340, 500],
      [520, 700],
      [800, 900],
      [910, 1000],
    ] as const;
    const phase = 3e-13;
    const next = normalDeviates(3);
    const steps = stepsOf(common);
    const errors = Array.from({ length: TRIALS }, () => {
      let sum = 0;
      for (let i = 0; i < steps.length; i++) sum += white(next, WHITE_B) - white(next, WHITE_A);
      // phase at the ends of each stretch: σ_y(1 s) = √3·σ_x, of which a mean over T keeps √2·σ_x/T
      let ends = 0;
      for (let i = 0; i < 2 * common.length; i++) ends += next() * (phase / Math.sqrt(3));
      return (sum * STEP_S + ends) / (steps.length * STEP_S);
    });
    const { window } = uStatOf(
      { stability: { white: WHITE_A }, available: available(onA) },
      { stability: { white: WHITE_B }, available: available(onB) },
      { stability: { phase }, segments: 5, available: available(onL) },
    );
    expectWithin(window!.data, steps.length * STEP_S, 1e-6);
    // the format's n·phase²/T² is the Allan variance, 3σ_x²/T², of each stretch; the mean itself keeps 2σ_x²/T²
    const T = steps.length * STEP_S;
    const format = 5 * (phase / T) ** 2;
    const expected = Math.sqrt(window!.uStat ** 2 - format / 3);
    expectWithin(rms(errors), expected, ALLOWED * expected);
  });

  it('with a flywheel over measured intervals: flicker noise of a maser bridges a clock that runs by day', () => {
    const onA = [
      [0, 60],
      [144, 230],
      [300, 372],
      [576, 700],
      [720, 800],
      [1000, 1090],
    ] as const;
    const onB = [
      [0, 400],
      [450, 1152],
    ] as const;
    const runs = stepsOf(onA);
    const used = stepsOf(onB);
    const next = normalDeviates(4);
    const flicker = 4e-16;
    // unit driving noise gives an Allan floor of √(2·ln 2/π) (Kasdin & Walter 1992)
    const drive = flicker / Math.sqrt((2 * Math.LN2) / Math.PI);
    const errors = Array.from({ length: TRIALS }, (_, k) => {
      const maser = powerLawFm(STEPS, -1, drive, 500 + k);
      let remote = 0;
      for (const i of used) remote += white(next, WHITE_B) - maser[i]!;
      let local = 0;
      for (const i of runs) local += white(next, WHITE_A) - maser[i]!;
      return remote / used.length - local / runs.length;
    });
    const { bridged, window } = uStatOf(
      { stability: { white: WHITE_A }, available: available(onA), flywheel: { stability: { flicker } } },
      { stability: { white: WHITE_B }, available: available(onB) },
      {},
    );
    expectWithin(rms(errors), bridged!.window!.uStat, ALLOWED * bridged!.window!.uStat);
    // the maser's part counts: without it the spread would be another
    const without = Math.sqrt(bridged!.window!.uStat ** 2 - bridged!.window!.uDeadTime ** 2);
    if (!(bridged!.window!.uStat > 1.3 * without)) throw new Error('this case would not show a wrong dead-time term');
    expectWithin(window!.data, 512 * STEP_S, 1e-6);
  });

  it('with a flywheel and uptimes: random walk and white noise, a shift at the beginning of every day', () => {
    const day = 86_400 / STEP_S;
    const runs = stepsOf(Array.from({ length: 8 }, (_, d) => [d * day, d * day + 48] as const));
    const next = normalDeviates(5);
    const uniform = normalDeviates(6);
    const walkStep = 1e-16;
    const maserWhite = 4e-15;
    const errors = Array.from({ length: TRIALS }, () => {
      const maser = new Float64Array(STEPS);
      let level = 0;
      for (let i = 0; i < STEPS; i++) {
        level += walkStep * next();
        maser[i] = level + white(next, maserWhite);
      }
      let remote = 0;
      let n = 0;
      for (let i = 0; i < STEPS; i++) {
        // the other clock and the link: up for 0.8 of the time, in short gaps
        if (Math.abs(uniform()) > 1.281552) continue;
        remote += white(next, WHITE_B) - maser[i]!;
        n++;
      }
      let local = 0;
      for (const i of runs) local += white(next, WHITE_A) - maser[i]!;
      return remote / n - local / runs.length;
    });
    const { bridged } = uStatOf(
      {
        stability: { white: WHITE_A },
        uptime: 1 / 3,
        // steps of s every τ0: σ(1 s) = s/√(3·τ0)
        flywheel: { stability: { white: maserWhite, randomWalk: walkStep / Math.sqrt(3 * STEP_S) }, cycle: '1 d' },
      },
      { stability: { white: WHITE_B }, uptime: 0.8 },
      {},
    );
    expectWithin(rms(errors), bridged!.window!.uStat, ALLOWED * bridged!.window!.uStat);
  });
});
