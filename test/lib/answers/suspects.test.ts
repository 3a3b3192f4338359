import { describe, expect, test } from 'vitest';
import { evaluate } from '../../../lib/answers/evaluate.js';
import { predict } from '../../../lib/answers/predict.js';
import { suspectsSentence } from '../../../lib/answers/suspects/suspects.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';
import { expectWithin } from '../../expect-within.js';

// biome-ignore lint/suspicious/noExplicitAny: a campaign to be spoiled at will
type Any = any;

/** A good campaign, known to a millimetre so that each mistake stands out. */
const good = (): Any => ({
  format: 'plumbtick-campaign/1',
  effect: '3 cm',
  transitions: [
    { id: '87Sr', offset: 0 },
    { id: '171Yb', offset: '5.000(5)e-17' },
  ],
  datums: [{ id: 'net', W0: { value: '62636854.30(1) m²/s²', tide: 'mean' }, origin: { lat: 44 } }],
  sites: [
    {
      id: 'a',
      lat: 50,
      lon: 8,
      g: '9.8105000(30) m/s²',
      h: { value: '148.2000(5) m', tide: 'free' },
      determinations: [{ kind: 'gnss-quasigeoid', zeta: { value: '47.8000(5) m', tide: 'zero' } }],
    },
    {
      id: 'b',
      lat: 46.5,
      lon: 8,
      g: '9.8021000(30) m/s²',
      determinations: [
        { kind: 'geopotential-number', datum: 'net', C: { value: '12034.511 ± 0.005 m²/s²', tide: 'zero' } },
      ],
    },
    {
      id: 'c',
      lat: 46.51,
      lon: 8.01,
      g: '9.8015000(30) m/s²',
      determinations: [{ kind: 'levelled-from', site: 'b', dH: '312.4500(5) m', g: '9.8018300(30) m/s²' }],
    },
  ],
  clocks: [
    {
      id: 'ka',
      site: 'a',
      transition: '87Sr',
      tie: [
        { name: 'down', dH: '-3.2500(5) m' },
        { name: 'up', dH: '1.1000(5) m' },
      ],
    },
    { id: 'kb', site: 'b', transition: '171Yb', tie: [{ dH: '0.9400(5) m' }] },
    { id: 'kc', site: 'c', transition: '87Sr', tie: [{ dH: '1.0700(5) m' }] },
  ],
  links: [
    { id: 'ab', from: 'ka', to: 'kb' },
    { id: 'ac', from: 'ka', to: 'kc' },
  ],
});

/** What the clocks of the good campaign would read. */
const measured = (link: 'ab' | 'ac') => {
  const y = predict(readCampaignValue(good()).campaign).links.find((l) => l.id === link)!.y!.value;
  return y + (link === 'ab' ? 5e-17 : 0);
};

const evaluated = (link: 'ab' | 'ac', spoil: (c: Any, y: number) => number | undefined, effect = '3 cm') => {
  const c = good();
  c.effect = effect;
  const y = spoil(c, measured(link)) ?? measured(link);
  c.measurements = [{ link, y: { value: y, u: 2e-19 } }];
  return evaluate(readCampaignValue(c).campaign).links[0]!;
};

test('the good campaign agrees and suspects nothing', () => {
  for (const link of ['ab', 'ac'] as const) {
    const e = evaluated(link, () => undefined);
    expectWithin(e.residual!.value, 0, 1e-21);
    expect(e.verdict).toBe('agree');
    expect(e.suspects).toEqual([]);
  }
});

const step = 2.6005 / 299792458 ** 2;
/** the mistake planted, and the code and path that must come first or tie */
const planted: readonly [
  name: string,
  link: 'ab' | 'ac',
  code: string,
  path: string,
  spoil: (c: Any, y: number) => number | undefined,
][] = [
  ['gravity already removed', 'ac', 'redshift-removed', 'measurements.0.y', () => 0],
  ['gravity removed with unlike W₀', 'ac', 'redshift-removed-unlike-reference', 'measurements.0.y', () => -step],
  ['shift taken for correction', 'ac', 'redshift-removed-twice-signed', 'measurements.0.y', (_, y) => 2 * y],
  ['direction reversed', 'ac', 'direction-reversed', 'measurements.0.y', (_, y) => -y],
  [
    'W₀ of TT for that of the IHRS',
    'ac',
    'reference-potential',
    'sites.a.determinations.0.datum',
    (c) => {
      c.sites[0].determinations[0].datum = 'tt';
      return undefined;
    },
  ],
  [
    'ζ without the zero-degree term',
    'ac',
    'zero-degree-term',
    'sites.a.determinations.0.datum',
    (c) => {
      c.sites[0].determinations[0].zeta.value = '48.5594(5) m';
      return undefined;
    },
  ],
  [
    'tide label of ζ',
    'ac',
    'tide-label',
    'sites.a.determinations.0.zeta',
    (c) => {
      c.sites[0].determinations[0].zeta.tide = 'mean';
      return undefined;
    },
  ],
  [
    'tide label of h',
    'ac',
    'tide-label',
    'sites.a.h',
    (c) => {
      c.sites[0].h.tide = 'zero';
      return undefined;
    },
  ],
  [
    'tide label of C',
    'ab',
    'tide-label',
    'sites.b.determinations.0.C',
    (c) => {
      c.sites[1].determinations[0].C.tide = 'mean';
      return undefined;
    },
  ],
  [
    'tide label of y',
    'ac',
    'tide-label',
    'measurements.0.y',
    (c) => {
      c.tideOfY = true;
      return undefined;
    },
  ],
  [
    'datum origin forgotten',
    'ab',
    'datum-origin',
    'sites.b.determinations.0.datum',
    (c) => {
      delete c.datums[0].origin;
      c.datums[0].W0.value = '62636854.30(1) m²/s²';
      return undefined;
    },
  ],
  [
    'standard g on the line',
    'ac',
    'standard-gravity',
    'sites.c.determinations.0.g',
    (c) => {
      c.sites[2].determinations[0].g = '9.80665 m/s²';
      return undefined;
    },
  ],
  [
    'C made with standard gravity',
    'ab',
    'standard-gravity',
    'sites.b.determinations.0.C',
    (c) => {
      // H = C/(g + 4.24e-7·H), Helmert (NGS), then multiplied by 9.80665
      const height = 12034.511 / (9.8021 + 4.24e-7 * 1227.683);
      c.sites[1].determinations[0].C.value = `${(9.80665 * height).toFixed(4)} ± 0.005 m²/s²`;
      return undefined;
    },
  ],
  [
    'tie with the wrong sign',
    'ac',
    'tie-sign',
    'clocks.ka.tie.0.dH',
    (c) => {
      c.clocks[0].tie[0].dH = '3.2500(5) m';
      return undefined;
    },
  ],
  [
    'tie that does not belong',
    'ac',
    'tie-applied',
    'clocks.kc.tie.0.dH',
    (c) => {
      c.clocks[2].tie = [{ dH: '1.0700(5) m' }];
      const y = measured('ac');
      return y - (9.8015 * 1.07) / 299792458 ** 2;
    },
  ],
  [
    'floor for atoms',
    'ac',
    'floor-for-atoms',
    'clocks.kc.tie',
    (c) => {
      delete c.clocks[2].tie;
      return undefined;
    },
  ],
  [
    'ratio inverted',
    'ab',
    'ratio-inverted',
    'transitions.171Yb.offset',
    (c) => {
      c.transitions[1].offset = '-5.000(5)e-17';
      return undefined;
    },
  ],
  [
    'levelling with the wrong sign',
    'ac',
    'levelling-sign',
    'sites.c.determinations.0.dH',
    (c) => {
      c.sites[2].determinations[0].dH = '-312.4500(5) m';
      return undefined;
    },
  ],
];

describe('a planted mistake ranks first or ties', () => {
  test.each(planted.filter(([name]) => name !== 'tide label of y'))('%s', (_, link, code, path, spoil) => {
    const e = evaluated(link, spoil);
    expect(e.verdict).toBe('differ');
    const [first] = e.suspects;
    const own = e.suspects.find((s) => s.code === code && s.path === path);
    expect(own, JSON.stringify(e.suspects.slice(0, 4), null, 1)).toBeDefined();
    expect(own!.fits).toBe(true);
    // a tie: another mistake makes the same difference within the uncertainty
    expect(Math.abs(own!.z) - Math.abs(first!.z), JSON.stringify(first)).toBeLessThan(
      code === 'floor-for-atoms' ? 1 : 0.3,
    );
    expect(suspectsSentence(e.suspects)).toMatch(/fit/);
  });
  test('tide label of y', () => {
    const c = good();
    // y stated in mean tide, although the permanent tide was taken out: zero. 0.16 m²/s² between the sites
    c.measurements = [{ link: 'ac', y: { value: measured('ac'), u: 2e-19, tide: 'zero' } }];
    const e = evaluate(readCampaignValue(c).campaign).links[0]!;
    expect(e.verdict).toBe('differ');
    expect(e.suspects.filter((s) => s.fits).map((s) => s.path)).toContain('measurements.0.y');
  });
});

describe('honest when nothing fits', () => {
  test('two mistakes at once: none fits alone', () => {
    const e = evaluated('ac', (c) => {
      c.sites[0].h.tide = 'zero';
      c.clocks[0].tie[0].dH = '3.2500(5) m';
      c.sites[2].determinations[0].dH = '312.9100(5) m';
      return undefined;
    });
    expect(e.verdict).toBe('differ');
    expect(e.suspects.filter((s) => s.fits)).toEqual([]);
    expect(suspectsSentence(e.suspects)).toMatch(/No single mistake/);
  });
});
