import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { plan } from '../../../lib/answers/plan.js';
import { predict } from '../../../lib/answers/predict.js';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import {
  lengthUncertaintyIf,
  linkUncertainty,
  type WhatIfChange,
  whatIf,
  withChanges,
} from '../../../lib/answers/what-if.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';
import { expectWithin } from '../../expect-within.js';

interface Sizes {
  zetaA?: number;
  zetaB?: number;
  C?: number;
  tie?: number;
  systematic?: number;
  ratio?: number;
  length?: string;
  gnss?: number;
}

/** Two institutes, one of them also levelled: redundant, so that weights move. Sizes in mm, of clocks in 1e-19, of the ratio in 1e-20. */
const campaign = ({
  zetaA = 14,
  zetaB = 16,
  C = 60,
  tie = 2,
  systematic = 15,
  ratio = 50,
  length = '60 km',
  gnss = 0.4,
}: Sizes = {}) =>
  readCampaignValue({
    format: 'plumbtick-campaign/1',
    window: { start: '2027-09-06T00:00:00Z', end: '2027-09-27T00:00:00Z' },
    target: '3 cm',
    sources: [
      { id: 'geoid', correlationLength: length },
      { id: 'gnss', correlation: gnss },
    ],
    datums: [{ id: 'net', W0: '62636854.12(25) m²/s²' }],
    transitions: [
      { id: '87Sr', offset: 0 },
      { id: '171Yb', offset: { value: 3.1e-18, u: ratio * 1e-20 } },
    ],
    sites: [
      {
        id: 'a',
        lat: 50.1,
        lon: 8.6,
        h: { value: '158.4127(60) m', tide: 'free', source: 'gnss' },
        g: '9.8104412(20) m/s²',
        determinations: [
          {
            kind: 'gnss-quasigeoid',
            zeta: { value: 47.832, tide: 'zero', parts: [{ u: `${zetaA} mm`, source: 'geoid' }, { u: '5 mm' }] },
          },
          { kind: 'geopotential-number', datum: 'net', C: { value: 1085.48, u: C / 1000, tide: 'mean' } },
        ],
      },
      {
        id: 'b',
        lat: 49.9,
        lon: 8.9,
        h: { value: '489.2055(60) m', tide: 'free', source: 'gnss' },
        g: '9.8094835(30) m/s²',
        determinations: [
          { kind: 'gnss-quasigeoid', zeta: { value: 48.271, u: zetaB / 1000, source: 'geoid', tide: 'zero' } },
        ],
      },
    ],
    clocks: [
      {
        id: 'sr',
        site: 'a',
        transition: '87Sr',
        tie: [{ dH: { value: 1.2, u: tie / 1000 } }],
        systematic: `${systematic / 10}e-18`,
        stability: { white: '1e-16' },
      },
      { id: 'yb', site: 'b', transition: '171Yb', systematic: '1e-18', stability: { white: '2e-16' } },
    ],
    links: [{ id: 'ab', from: 'sr', to: 'yb', systematic: '3e-19' }],
  }).campaign;

/** What-if against a campaign that says so in its file, solved from the beginning. */
function expectAs(changes: readonly WhatIfChange[], changed: Sizes): void {
  const found = whatIf(solveCampaign(campaign()), 0, changes)!;
  const file = campaign(changed);
  const [predicted] = predict(file).links;
  const [planned] = plan(file).links;
  expectWithin(found.y.u, predicted!.y!.u, 1e-9 * predicted!.y!.u, 'u(y)');
  expectWithin(found.dH.u, predicted!.dH!.u, 1e-9 * predicted!.dH!.u, 'u(dH)');
  expectWithin(found.dW.value, predicted!.dW!.value, 1e-7, 'dW');
  expectWithin(found.outlook.smallestDetectableM!, planned!.smallestDetectable!, 1e-9, 'smallest detectable');
  if (planned!.timeToTarget === null) expect(found.outlook.timeToTargetS).toBe(null);
  else expectWithin(found.outlook.timeToTargetS!, planned!.timeToTarget, 1e-6 * planned!.timeToTarget, 'time');
}

const part = (input: string, source: string | null, factor: number): WhatIfChange => ({
  kind: 'part',
  input,
  source,
  amount: { factor },
});

describe('a what-if is the campaign that says so', () => {
  test('as stated', () => expectAs([], {}));
  test('the geoid at 1 cm', () =>
    expectAs([{ kind: 'source', source: 'geoid', amount: { u: 0.01 } }], { zetaA: 10, zetaB: 10 }));
  test('the geoid halved', () =>
    expectAs([{ kind: 'source', source: 'geoid', amount: { factor: 0.5 } }], { zetaA: 7, zetaB: 8 }));
  test('one ζ doubled, its part of the source alone', () =>
    expectAs([part('sites.a.determinations.0.zeta', 'geoid', 2)], { zetaA: 28 }));
  test('an input of a redundant determination: the weights follow', () => {
    expectAs([part('sites.a.determinations.1.C', null, 0.1)], { C: 6 });
    const held = solveCampaign(campaign());
    const better = whatIf(held, 0, [part('datums.net.W0', null, 0)])!;
    // at the old weights only the part of W0 would go
    const share = linkUncertainty(held, 0)!.budget.groups.find((g) => g.parts[0]!.input === 'datums.net.W0')!.share;
    expect(better.y.u).toBeLessThan(0.97 * linkUncertainty(held, 0)!.y.u * Math.sqrt(1 - share));
  });
  test('a tie typed over', () =>
    expectAs([{ kind: 'part', input: 'clocks.sr.tie.0.dH', source: null, amount: { u: 0.02 } }], { tie: 20 }));
  test('a systematic moves the comparison and not the prediction', () => {
    expectAs([part('clocks.sr.systematic', null, 2)], { systematic: 30 });
    const solved = solveCampaign(campaign());
    const changed = whatIf(solved, 0, [part('clocks.sr.systematic', null, 2)])!;
    expect(changed.y).toEqual(linkUncertainty(solved, 0)!.y);
    expect(changed.outlook.smallestDetectableM!).toBeGreaterThan(
      linkUncertainty(solved, 0)!.outlook.smallestDetectableM!,
    );
  });
  test('a frequency ratio', () => expectAs([part('transitions.171Yb.offset', null, 0.1)], { ratio: 5 }));
  test('a correlation', () => expectAs([{ kind: 'correlation', source: 'gnss', correlation: 0.9 }], { gnss: 0.9 }));
  test('a correlation length', () =>
    expectAs([{ kind: 'correlation-length', source: 'geoid', lengthM: 20_000 }], { length: '20 km' }));
  test('several at once; the change of a part stands before that of its source, whatever the order', () => {
    const changes: WhatIfChange[] = [
      { kind: 'source', source: 'geoid', amount: { factor: 0.5 } },
      part('sites.b.determinations.0.zeta', 'geoid', 2),
      { kind: 'correlation', source: 'gnss', correlation: -0.2 },
    ];
    expectAs(changes, { zetaA: 7, zetaB: 32, gnss: -0.2 });
    expectAs([...changes].reverse(), { zetaA: 7, zetaB: 32, gnss: -0.2 });
  });
});

describe('properties', () => {
  const solved = solveCampaign(campaign());
  const inputs = solved.model.inputs.flatMap(({ path, parts }) => parts.map(({ source }) => ({ path, source })));
  const everything = (factor: number): WhatIfChange[] => inputs.map(({ path, source }) => part(path, source, factor));

  test('scaling every u by s scales u(y) by s, and leaves shares and combined values', () => {
    const stated = linkUncertainty(solved, 0)!;
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 100, noNaN: true }), (s) => {
        const scaled = whatIf(solved, 0, everything(s))!;
        expectWithin(scaled.y.u, s * stated.y.u, 1e-10 * s * stated.y.u);
        expectWithin(scaled.dW.value, stated.dW.value, 1e-7);
        scaled.budget.groups.forEach((group, i) => {
          expectWithin(group.share, stated.budget.groups[i]!.share, 1e-9);
        });
      }),
      { numRuns: 30 },
    );
  });

  test('a better value never makes a combination with its best weights worse, where nothing is shared', () => {
    const own = inputs.filter(({ source }) => source === null);
    fc.assert(
      fc.property(fc.constantFrom(...own), fc.double({ min: 0, max: 1, noNaN: true }), ({ path }, factor) => {
        const better = lengthUncertaintyIf(solved, 0, [part(path, null, factor)])!;
        expect(better).toBeLessThanOrEqual(linkUncertainty(solved, 0)!.dH.u * (1 + 1e-12));
      }),
      { numRuns: 40 },
    );
  });

  test('the campaign in hand stays as it is', () => {
    const before = linkUncertainty(solved, 0);
    whatIf(solved, 0, [...everything(3), { kind: 'correlation', source: 'gnss', correlation: 0 }]);
    expect(linkUncertainty(solved, 0)).toEqual(before);
  });

  test('the parts of an input add as squares', () => {
    const path = 'sites.a.determinations.0.zeta';
    const { inputs } = withChanges(solved, [part(path, 'geoid', 2)]).model;
    expectWithin(inputs.find((x) => x.path === path)!.u, Math.hypot(0.028, 0.005), 1e-15);
  });

  test('factor 0 is exact, factor 1 nothing', () => {
    const stated = linkUncertainty(solved, 0)!;
    expectWithin(whatIf(solved, 0, everything(1))!.y.u, stated.y.u, 1e-12 * stated.y.u);
  });
});

describe('degrees of freedom', () => {
  test('U and k by Welch–Satterthwaite over the blocks', () => {
    const few = readCampaignValue({
      format: 'plumbtick-campaign/1',
      sites: ['a', 'b'].map((id) => ({
        id,
        lat: 50,
        lon: 8,
        g: 9.81,
        determinations: [{ kind: 'potential', W: { value: '62636000.0(1) m²/s²', tide: 'mean', dof: 5 } }],
      })),
      clocks: ['a', 'b'].map((id) => ({ id: `k${id}`, site: id, transition: '87Sr' })),
      links: [{ id: 'ab', from: 'ka', to: 'kb' }],
    }).campaign;
    const { expanded } = linkUncertainty(solveCampaign(few), 0)!;
    // two equal variances of 5 degrees of freedom each: 10; t(10) for 95 %: 2.228 (GUM, table G.2: 2.23)
    expectWithin(expanded.degreesOfFreedom!, 10, 1e-9);
    expectWithin(expanded.coverageFactor, 2.228, 5e-4);
    expectWithin(expanded.dW, 2.228 * Math.sqrt(0.02), 5e-5);
  });

  test('none stated: infinitely many', () => {
    const { expanded } = linkUncertainty(solveCampaign(campaign()), 0)!;
    expect(expanded.degreesOfFreedom).toBe(null);
    expectWithin(expanded.coverageFactor, 1.959964, 1e-6);
  });
});

describe('what cannot be', () => {
  const solved = solveCampaign(campaign());
  const codes = (changes: readonly WhatIfChange[]): string[] => {
    try {
      whatIf(solved, 0, changes);
    } catch (error) {
      if (error instanceof CampaignError) return error.faults.map(({ code }) => code);
      throw error;
    }
    return [];
  };
  test('is refused by name', () => {
    expect(codes([part('sites.nowhere.h', null, 1)])).toEqual(['unknown-input']);
    expect(codes([{ kind: 'source', source: 'none', amount: { factor: 1 } }])).toEqual(['unknown-source']);
    expect(codes([part('datums.net.W0', null, -1)])).toEqual(['out-of-range']);
    expect(codes([part('datums.net.W0', null, Number.NaN)])).toEqual(['out-of-range']);
    expect(codes([{ kind: 'correlation', source: 'gnss', correlation: 1.1 }])).toEqual(['out-of-range']);
    expect(codes([{ kind: 'correlation-length', source: 'geoid', lengthM: 0 }])).toEqual(['out-of-range']);
    expect(codes([{ kind: 'correlation-length', source: 'gnss', lengthM: 1000 }])).toEqual(['out-of-range']);
  });

  test('correlations that no errors can have', () => {
    const three = readCampaignValue({
      format: 'plumbtick-campaign/1',
      sources: [{ id: 's', correlation: 0.1 }],
      sites: ['a', 'b', 'c'].map((id, i) => ({
        id,
        lat: 50 + i,
        lon: 8,
        g: 9.81,
        determinations: [{ kind: 'potential', W: { value: '62636000.0(1) m²/s²', tide: 'mean', source: 's' } }],
      })),
      clocks: ['a', 'b'].map((id) => ({ id: `k${id}`, site: id, transition: '87Sr' })),
      links: [{ id: 'ab', from: 'ka', to: 'kb' }],
    }).campaign;
    const of = (correlation: number) =>
      whatIf(solveCampaign(three), 0, [{ kind: 'correlation', source: 's', correlation }]);
    expect(() => of(-0.6)).toThrow(/at least -0\.5/);
    expect(of(-0.4)!.dW.u).toBeGreaterThan(of(0.4)!.dW.u);
  });
});
