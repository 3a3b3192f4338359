import { describe, expect, test } from 'vitest';
import { groupedBudget } from '../../../lib/answers/budget-groups.js';
import { predict } from '../../../lib/answers/predict.js';
import { effortOf, type LabelError, linkQuestions, varianceGain } from '../../../lib/answers/questions.js';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import { linkUncertainty, whatIf } from '../../../lib/answers/what-if.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';
import { expectWithin } from '../../expect-within.js';

type Loose = { [key: string]: unknown };
type Labels = { hA?: string; hB?: string; zetaA?: string; zetaB?: string; C?: string; W0?: string; dH?: string };

/** Three sites: GNSS and quasigeoid, a geopotential number to a benchmark, a levelled line. Labels as given. */
const campaign = (
  labels: Labels = {},
  more: { C?: string; W?: string; zetaA?: string; gA?: Loose; gradientA?: Loose } = {},
) => {
  const tide = { hA: 'free', hB: 'free', zetaA: 'zero', zetaB: 'zero', C: 'mean', W0: 'mean', dH: 'mean', ...labels };
  return readCampaignValue({
    format: 'plumbtick-campaign/1',
    sources: [{ id: 'geoid', correlationLength: '60 km' }],
    datums: [{ id: 'net', W0: { value: '62636854.12(25) m²/s²', tide: tide.W0 }, origin: { lat: 52 } }],
    sites: [
      {
        id: 'a',
        lat: 50.1,
        lon: 8.6,
        h: { value: '158.4127(60) m', tide: tide.hA },
        ...(more.gA ?? { g: '9.8104412(20) m/s²' }),
        ...more.gradientA,
        determinations: [
          { kind: 'gnss-quasigeoid', zeta: { value: more.zetaA ?? '47.832(14) m', source: 'geoid', tide: tide.zetaA } },
          { kind: 'geopotential-number', datum: 'net', C: { value: more.C ?? '1085.48(6) m²/s²', tide: tide.C } },
        ],
      },
      {
        id: 'b',
        lat: 47.4,
        lon: 8.5,
        h: { value: '489.2055(60) m', tide: tide.hB },
        g: '9.8068835(30) m/s²',
        determinations: [
          { kind: 'gnss-quasigeoid', zeta: { value: '48.271(16) m', source: 'geoid', tide: tide.zetaB } },
          { kind: 'levelled-from', site: 'c', dH: { value: '12.300(9) m', tide: tide.dH } },
        ],
      },
      {
        id: 'c',
        lat: 46.5,
        lon: 8.0,
        g: '9.8064000(30) m/s²',
        determinations: [{ kind: 'potential', W: { value: more.W ?? '62632600.0(9) m²/s²', tide: 'mean' } }],
      },
    ],
    clocks: [
      { id: 'ka', site: 'a', transition: '87Sr', tie: [{ dH: '-21.5000(10) m' }] },
      { id: 'kb', site: 'b', transition: '87Sr', tie: [{ dH: '1.3310(12) m' }] },
    ],
    links: [{ id: 'ab', from: 'ka', to: 'kb' }],
  }).campaign;
};

const questionsOf = (c = campaign()) => linkQuestions(solveCampaign(c), 0)!;
const y = (c: ReturnType<typeof campaign>) => predict(c).links[0]!.y!;
const errorOf = (errors: readonly LabelError[], system: string) => errors.find((e) => e.system === system)!;

describe('a wrong tide label', () => {
  const { tideLabels, commonLabels } = questionsOf();
  const stated = y(campaign());
  // the campaign with the label in its file, predicted from the beginning
  test.each([
    ['sites.a.h', 'hA', ['mean', 'zero']],
    ['sites.b.h', 'hB', ['mean', 'zero']],
    ['sites.a.determinations.0.zeta', 'zetaA', ['mean', 'free']],
    ['sites.b.determinations.0.zeta', 'zetaB', ['mean', 'free']],
    ['sites.a.determinations.1.C', 'C', ['zero', 'free']],
    ['datums.net.W0', 'W0', ['zero', 'free']],
    ['sites.b.determinations.1.dH', 'dH', ['zero', 'free']],
  ] as const)('%s', (path, key, systems) => {
    const label = tideLabels.find((one) => one.path === path)!;
    expect(label.errors.map(({ system }) => system).sort()).toEqual([...systems].sort());
    const [first, second] = label.errors.map(({ y: error }) => Math.abs(error));
    expect(first).toBeGreaterThanOrEqual(second!);
    for (const system of systems) {
      const { y: error, lengthM } = errorOf(label.errors, system);
      const found = y(campaign({ [key]: system })).value - stated.value;
      // the rest is the change of gravity over some centimetres
      expectWithin(error, found, 1e-23, `${path} ${system}`);
      expectWithin(lengthM, (found * 299_792_458 ** 2) / 9.80866235, 1e-6, `${path} ${system}`);
    }
  });

  test('a height in zero or mean tide is the same', () => {
    const { errors } = tideLabels.find((one) => one.path === 'sites.a.h')!;
    expect(errorOf(errors, 'mean').y).toBe(errorOf(errors, 'zero').y);
    expect(Math.abs(errorOf(errors, 'mean').y)).toBeGreaterThan(1e-19);
  });

  test('all of one kind together: what a wrong header does', () => {
    const zetas = commonLabels.find((one) => one.quantity === 'geoid-height')!;
    expect(zetas.paths).toEqual(['sites.a.determinations.0.zeta', 'sites.b.determinations.0.zeta']);
    expectWithin(
      errorOf(zetas.errors, 'mean').y,
      y(campaign({ zetaA: 'mean', zetaB: 'mean' })).value - stated.value,
      1e-23,
    );
    // alone a label does more than all together, which cancel in part
    const alone = tideLabels.find(({ path }) => path === 'sites.b.determinations.0.zeta')!;
    expect(Math.abs(errorOf(zetas.errors, 'mean').y)).toBeLessThan(Math.abs(errorOf(alone.errors, 'mean').y));
  });

  test('a label that does not stand there is told from one that does', () => {
    const { tideLabels: assumed } = questionsOf(
      campaign({ zetaA: undefined as unknown as string, hA: undefined as unknown as string }),
    );
    expect(assumed.find(({ path }) => path === 'sites.a.h')).toMatchObject({ stated: null, used: 'free' });
    expect(assumed.find(({ path }) => path.endsWith('a.determinations.0.zeta'))).toMatchObject({
      stated: null,
      used: 'zero',
    });
  });
});

describe('what would help most', () => {
  test('the first single value is the one whose half brings most, by trying them all', () => {
    const { inputs, uM } = questionsOf();
    expectWithin(uM, predict(campaign()).links[0]!.dH!.u, 1e-12);
    const byTrying = [
      ['sites.a.determinations.0.zeta', predict(campaign({}, { zetaA: '47.8320(70) m' })).links[0]!.dH!.u],
      ['sites.c.determinations.0.W', predict(campaign({}, { W: '62632600.00(45) m²/s²' })).links[0]!.dH!.u],
    ] as const;
    for (const [path, u] of byTrying) {
      const found = inputs.find(({ input }) => input === path)!;
      expectWithin(found.halvedM, u, 1e-9, path);
    }
    const halved = inputs.map(({ halvedM }) => halvedM);
    expect(halved).toEqual([...halved].sort((a, b) => a - b));
    expect(inputs.every(({ exactM, halvedM }) => exactM <= halvedM && halvedM < uM)).toBe(true);
  });

  test('what a factor takes out of the variance, by the Jacobian: what solving again gives where nothing is redundant', () => {
    const { sites, ...rest } = campaign();
    const single = { ...rest, sites: sites.map((s) => ({ ...s, determinations: s.determinations.slice(0, 1) })) };
    const solved = solveCampaign(single);
    const budget = groupedBudget(solved.model.covariance, solved.links[0]!.y.gradient);
    const { y: now } = linkUncertainty(solved, 0)!;
    for (const part of budget.groups.flatMap(({ parts }) => parts))
      for (const factor of [0, 0.5, 2]) {
        const { input, source } = part;
        const then = whatIf(solved, 0, [{ kind: 'part', input, source, amount: { factor } }])!.y;
        expectWithin(varianceGain(budget, part, factor), now.u ** 2 - then.u ** 2, 1e-12 * now.u ** 2, input);
      }
  });

  test('a shared source as a whole', () => {
    const { sources } = questionsOf();
    expect(sources.map(({ source }) => source)).toEqual(['geoid']);
  });

  test('an error that takes part of another away is named: knowing it better would not help', () => {
    const near = readCampaignValue({
      format: 'plumbtick-campaign/1',
      sources: [{ id: 's' }],
      sites: [1, 0.4].map((u, i) => ({
        id: `s${i}`,
        lat: 50,
        lon: 8,
        g: 9.81,
        determinations: [{ kind: 'potential', W: { value: 62636000, u, tide: 'mean', source: 's' } }],
      })),
      clocks: [0, 1].map((i) => ({ id: `k${i}`, site: `s${i}`, transition: '87Sr' })),
      links: [{ id: 'l', from: 'k0', to: 'k1' }],
    }).campaign;
    const { harmful, inputs } = questionsOf(near as ReturnType<typeof campaign>);
    expect(harmful.map(({ input }) => input)).toEqual(['sites.s1.determinations.0.W']);
    expect(inputs.map(({ input }) => input)).toEqual(['sites.s0.determinations.0.W']);
  });

  test('work that would change nothing', () => {
    const { idle } = questionsOf();
    expect(idle).toContain('gravity');
    expect(idle).toContain('ties');
    expect(idle).not.toContain('(quasi)geoid');
  });
});

describe('is a gravity visit needed', () => {
  test('not where g is stated', () => {
    const [a] = questionsOf().gravity;
    expect(a).toMatchObject({ site: 'a', clock: 'ka', gStated: true, gradientStated: false, tieM: -21.5 });
    // tie −21.5 m: u(y) through g is 21.5·2e-6/c²; through the gradient ½·21.5²·3.086e-7/c²
    expectWithin(a!.uyG, (21.5 * 2e-6) / 299_792_458 ** 2, 1e-24);
    expectWithin(a!.uyGradient, (0.5 * 21.5 ** 2 * 3.086e-7) / 299_792_458 ** 2, 1e-24);
    expect(a!.isWorthIt).toBe(false);
  });

  test('where g is a default and the tie long it is: what the campaign with exact g and gradient says', () => {
    const precise = { zetaA: '47.8320(1) m', C: '1085.480(1) m²/s²' };
    const c = campaign({}, { ...precise, gA: {}, gradientA: { gradient: '3.1(90)e-6 s⁻²' } });
    const [a] = questionsOf(c).gravity;
    expect(a).toMatchObject({ gStated: false, gradientStated: true });
    const g = solveCampaign(c).model.inputs.find(({ path }) => path === 'sites.a.g')!.value;
    const visited = campaign({}, { ...precise, gA: { g }, gradientA: { gradient: '3.1e-6 s⁻²' } });
    expectWithin(a!.exactM, predict(visited).links[0]!.dH!.u, 1e-6);
  });
});

test('every kind of input belongs to a kind of work', () => {
  const efforts = ['sites.a.g', 'sites.a.gradient', 'clocks.ka.tie.0.dH', 'sites.a.h', 'datums.net.W0'].map(effortOf);
  expect(efforts).toEqual(['gravity', 'gravity', 'ties', 'GNSS heights', 'datums']);
  expect(effortOf('sites.b.determinations.1.dH')).toBe('levelling');
  expect(effortOf('clocks.ka.systematic')).toBe(null);
});

test('a link whose ends have no common level has no answer', () => {
  const c = readCampaignValue({
    format: 'plumbtick-campaign/1',
    sites: ['a', 'b'].map((id) => ({ id, lat: 50, lon: 8, g: 9.81 })),
    clocks: ['a', 'b'].map((id) => ({ id: `k${id}`, site: id, transition: '87Sr' })),
    links: [{ id: 'l', from: 'ka', to: 'kb' }],
  }).campaign;
  expect(linkQuestions(solveCampaign(c), 0)).toBe(null);
});
