import { describe, expect, test } from 'vitest';
import { adjust, adjustPlanned } from '../../../lib/answers/adjust.js';
import { design } from '../../../lib/answers/design.js';
import type { CampaignError } from '../../../lib/campaign/fault.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';
import { expectWithin } from '../../expect-within.js';

type Loose = { [key: string]: unknown };
const read = (value: Loose) => readCampaignValue(value).campaign;

/** Three countries: GNSS heights everywhere, one national datum at four of the sites, a ring of clocks. */
const lattice = (
  more: { candidate?: readonly string[]; tilt?: boolean; datumShift?: (lat: number, lon: number) => number } = {},
): Loose => {
  const at = [
    [47, 7],
    [47, 9],
    [49, 7],
    [49, 9],
    [48, 11],
    [50, 8],
  ] as const;
  const flag = (path: string) => (more.candidate?.includes(path) ? { candidate: true, cost: 2 } : {});
  return {
    format: 'plumbtick-campaign/1',
    window: { start: '2027-06-01T00:00:00Z', end: '2027-06-15T00:00:00Z' },
    sources: [{ id: 'qg', correlationLength: '80 km' }],
    datums: [
      { id: 'd', W0: '62636853.0(5) m²/s²', estimateOffset: true, ...(more.tilt ? { estimateTilt: true } : {}) },
    ],
    sites: at.map(([lat, lon], i) => ({
      id: `s${i}`,
      lat,
      lon,
      g: 9.81,
      ...flag(`sites.s${i}`),
      determinations: [
        {
          kind: 'gnss-quasigeoid',
          h: { value: `${500 + 100 * i}.00(1) m`, tide: 'free' },
          zeta: { value: '48.00(2) m', tide: 'zero', source: 'qg' },
          ...flag(`sites.s${i}.determinations.0`),
        },
        ...(i < 4
          ? [
              {
                kind: 'geopotential-number',
                datum: 'd',
                C: { value: `${(4000 + (more.datumShift?.(lat, lon) ?? 0)).toFixed(4)} ± 0.03 m²/s²`, tide: 'mean' },
                ...flag(`sites.s${i}.determinations.1`),
              },
            ]
          : []),
      ],
    })),
    clocks: at.map((_, i) => ({
      id: `k${i}`,
      site: `s${i}`,
      transition: '87Sr',
      systematic: '2e-18',
      stability: { white: '2e-16', flicker: '3e-19' },
      uptime: 0.7,
      ...flag(`clocks.k${i}`),
    })),
    links: [
      [0, 1],
      [1, 3],
      [3, 2],
      [2, 0],
      [3, 4],
      [2, 5],
    ].map(([a, b]) => ({
      id: `l${a}${b}`,
      from: `k${a}`,
      to: `k${b}`,
      stability: { phase: '1e-15' },
      systematic: '1e-19',
      ...flag(`links.l${a}${b}`),
    })),
  };
};

const without = (value: Loose, path: string): Loose => {
  // a campaign in which that candidate is plainly there
  const copy = structuredClone(value) as { [k: string]: Loose[] };
  const [list, id, , n] = path.split('.');
  const item = copy[list!]!.find((x) => x['id'] === id)!;
  const target = n === undefined ? item : (item['determinations'] as Loose[])[Number(n)]!;
  delete target['candidate'];
  return copy;
};

describe('design agrees with adjusting the network again', () => {
  const candidate = ['links.l13', 'links.l32', 'sites.s2.determinations.1', 'clocks.k4', 'sites.s5'];
  const base = lattice({ candidate });
  const aims = {
    'worst-site': (c: Loose) =>
      Math.max(
        ...adjustPlanned(read(c))
          .sites.filter((s) => s.id !== 's5')
          .map((s) => s.uAfter),
      ),
    mean: (c: Loose) => {
      const u = adjustPlanned(read(c))
        .sites.filter((s) => s.id !== 's5')
        .map((s) => s.uAfter);
      return u.reduce((s, x) => s + x, 0) / u.length;
    },
    offset: (c: Loose) => adjustPlanned(read(c)).datums[0]!.offset!.u,
  };
  test.each(['worst-site', 'mean', 'offset'] as const)('%s: every addition, and the greedy steps', (kind) => {
    const brute = aims[kind];
    const answer = design(read(base), kind === 'offset' ? { kind, datum: 'd' } : { kind });
    expectWithin(answer.aim!, brute(base), 1e-12);
    expect(answer.ranking).toHaveLength(candidate.length);
    for (const step of answer.ranking) {
      expectWithin(step.aim!, brute(without(base, step.id)), 1e-12, step.id);
      expectWithin(step.gain!, answer.aim! - step.aim!, 1e-15);
      expect(step.cost).toBe(2);
    }
    const values = answer.ranking.map((s) => s.aim!);
    expect(values).toEqual([...values].sort((a, b) => a - b));
    let built = base;
    let before = answer.aim!;
    for (const step of answer.steps) {
      built = without(built, step.id);
      expectWithin(step.aim!, brute(built), 1e-12, `greedy ${step.id}`);
      expectWithin(step.gain!, before - step.aim!, 1e-12);
      before = step.aim!;
    }
    expect(answer.steps).toHaveLength(candidate.length);
  });
  test('the best pair is the best of all pairs', () => {
    const answer = design(read(base), { kind: 'worst-site' }, { add: 2 });
    const pairs = candidate.flatMap((a, i) => candidate.slice(i + 1).map((b) => [a, b] as const));
    const values = pairs.map(([a, b]) => aims['worst-site'](without(without(base, a), b)));
    expectWithin(answer.best!.aim!, Math.min(...values), 1e-12);
    expect(answer.best!.cost).toBe(4);
    expect(answer.steps).toHaveLength(2);
  });
  test('a candidate clock lets its links in, a candidate site all of its own', () => {
    const answer = design(read(base), { kind: 'worst-site' });
    const gain = (id: string) => answer.ranking.find((s) => s.id === id)!.gain!;
    // s4 hangs on one determination until its clock comes
    expect(gain('clocks.k4')).toBeGreaterThan(1e-6);
    expect(gain('links.l13')).toBeGreaterThan(-1e-12);
  });
  test('removal: each observation left out by hand', () => {
    const full = lattice();
    const answer = design(read(full), { kind: 'mean' }, { remove: 2 });
    for (const step of answer.ranking.filter((s) => s.id.startsWith('links.'))) {
      const copy = structuredClone(full) as { links: Loose[] } & Loose;
      copy.links = copy.links.filter((l) => `links.${l['id']}` !== step.id);
      const u = adjustPlanned(read(copy)).sites.map((x) => x.uAfter);
      expectWithin(step.aim!, u.reduce((a, x) => a + x, 0) / u.length, 1e-12, step.id);
      expect(step.gain!).toBeLessThanOrEqual(1e-15);
    }
    expect(answer.steps).toHaveLength(2);
    expect(answer.steps[0]!.id).toBe(answer.ranking[0]!.id);
  });
  test('an offset that is not an unknown is refused by path', () => {
    const fixed = structuredClone(base) as { datums: Loose[] } & Loose;
    delete fixed.datums[0]!['estimateOffset'];
    try {
      design(read(fixed), { kind: 'offset', datum: 'd' });
      throw new Error('not refused');
    } catch (e) {
      expect((e as CampaignError).faults[0]).toMatchObject({
        code: 'aim-not-estimated',
        path: 'datums.d.estimateOffset',
      });
    }
  });
  test('candidates are not part of the adjustment until they are added', () => {
    const now = adjustPlanned(read(base));
    expect(now.sites.map((s) => s.id)).not.toContain('s5');
    expect(now.observations.map((o) => o.id)).not.toContain('links.l13');
    expect(now.observations.map((o) => o.id)).not.toContain('links.l34');
  });
});

describe('datum offset and tilt', () => {
  // a datum that falls 3 mm per 100 km to the north: 2.94e-7 m²/s² per m; ways on GRS80 at the middle of its four sites, 48° N 8° E
  const perMetre = (0.003 * 9.8) / 100_000;
  const meridian = 6367381.82; // M(48°) = a(1 − e²)/(1 − e²·sin²φ)^1.5, GRS80
  const planted = lattice({ tilt: true, datumShift: (lat) => (-perMetre * meridian * ((lat - 48) * Math.PI)) / 180 });
  const flat = lattice({ tilt: true });
  test('a planted tilt comes out, and leaves the rest alone', () => {
    const a = adjust(read(planted)).datums[0]!;
    const b = adjust(read(flat)).datums[0]!;
    expectWithin(a.tilt!.north.value! - b.tilt!.north.value!, -perMetre, 1e-9);
    expectWithin(a.tilt!.east.value! - b.tilt!.east.value!, 0, 1e-11);
    expectWithin(a.offset!.value! - b.offset!.value!, 0, 1e-6);
    expect(a.tilt!.north.u).toBeGreaterThan(0);
  });
  test('sites in a line cannot show the tilt across it', () => {
    const line = structuredClone(flat) as { sites: Loose[]; clocks: Loose[]; links: Loose[] } & Loose;
    for (const s of line.sites) s['lon'] = 7;
    line.sites[1]!['lat'] = 48;
    line.sites[3]!['lat'] = 50.5;
    try {
      adjustPlanned(read(line));
      throw new Error('not refused');
    } catch (e) {
      expect((e as CampaignError).faults.map((f) => f.path)).toEqual(['datums.d.estimateTilt']);
      expect((e as CampaignError).faults[0]!.found).toMatch(/east/);
    }
  });
});

describe('what the network could see', () => {
  test('4.132148 u of an offset or a tilt at size 0.001 and power 0.8 (Baarda 1968), 2.801585 u at 0.05', () => {
    const at = (size?: number) => {
      const [d] = adjustPlanned(
        read(lattice({ tilt: true })),
        size === undefined ? undefined : { size, power: 0.8 },
      ).datums;
      return [d!.offset!, d!.tilt!.north, d!.tilt!.east].map((x) => x.smallestDetectable / x.u);
    };
    for (const factor of at()) expectWithin(factor, 4.132148, 5e-7);
    for (const factor of at(0.05)) expectWithin(factor, 2.801585, 5e-7);
  });
});

describe('loops', () => {
  const ring = (times: boolean) => {
    const value = lattice();
    const y = ['1.000(50)e-14', '2.000(50)e-14', '-1.000(50)e-14', '-1.990(50)e-14'];
    return read({
      ...value,
      measurements: ['l01', 'l13', 'l32', 'l20'].map((link, i) => ({
        link,
        y: y[i],
        ...(times ? { start: `2027-06-0${i + 1}T00:00:00Z`, end: `2027-06-0${i + 2}T00:00:00Z` } : {}),
      })),
    });
  };
  test('the closure is the sum of the measured offsets; clocks cancel in its u when simultaneous', () => {
    const [loop] = adjust(ring(false)).loops;
    expect(loop!.links.map((l) => l.id).sort()).toEqual(['l01', 'l13', 'l20', 'l32']);
    expectWithin(Math.abs(loop!.closure.value!), 1e-16, 1e-27);
    expect(loop!.simultaneous).toBe(true);
    // per link: phase 1e-15 over 14 d at the uptime 0.7·0.7 of its clocks, and 1e-19 systematic
    const T = 14 * 86400 * 0.49;
    expectWithin(loop!.closure.u, Math.sqrt(4 * ((1e-15 / T) ** 2 + 1e-38)), 1e-25);
  });
  test('measured one after the other, the statistics stay', () => {
    const [loop] = adjust(ring(true)).loops;
    expect(loop!.simultaneous).toBe(false);
    expectWithin(loop!.closure.u, Math.sqrt(4 * (5e-16 ** 2 + 1e-38)), 1e-24);
  });
  test('a tree has none', () => {
    const value = lattice();
    expect(adjustPlanned(read({ ...value, links: (value['links'] as Loose[]).slice(4) })).loops).toEqual([]);
  });
});

test('an outlier is named first and stays in', () => {
  const value = lattice() as { sites: { determinations: { h?: { value: string } }[] }[] } & Loose;
  const spoiled = structuredClone(value);
  (spoiled.sites[2]!.determinations[1] as unknown as { C: { value: string } }).C.value = '4003.0000 ± 0.03 m²/s²';
  const measured = (v: Loose) =>
    read({ ...v, measurements: ['l01', 'l13', 'l32', 'l20'].map((link) => ({ link, y: '0.00(10)e-17' })) });
  const clean = adjust(measured(value));
  const bad = adjust(measured(spoiled));
  expect(bad.observations).toHaveLength(clean.observations.length);
  expect(bad.outliers.length).toBeGreaterThan(0);
  expect(bad.warnings.some((w) => w.code === 'outlier')).toBe(true);
});

test('covariance of the unknowns has the reported u on its diagonal', () => {
  const a = adjustPlanned(read(lattice({ tilt: true })));
  a.sites.forEach((s) => {
    const i = a.covariance.unknowns.indexOf(`sites.${s.id}.W`);
    expectWithin(Math.sqrt(a.covariance.matrix[i]![i]!), s.uAfter, 1e-12);
  });
  expect(a.covariance.unknowns.slice(-3)).toEqual(['datums.d.offset', 'datums.d.tilt.north', 'datums.d.tilt.east']);
  expectWithin(
    a.observations.reduce((s, o) => s + (o.redundancy ?? 0), 0),
    a.dof,
    1e-8,
  );
});
