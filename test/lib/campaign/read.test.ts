import { describe, expect, it } from 'vitest';
import type { Determination, Measured } from '../../../lib/campaign/campaign.js';
import { readCampaign, readCampaignValue } from '../../../lib/campaign/read.js';
import { RECOMMENDED_FREQUENCIES, recommendedFrequency } from '../../../lib/clocks/recommended-frequencies.js';
import { degToRad } from '../../../lib/quantity/index.js';
import { EVERYTHING } from './every-key.js';
import { file, PARTS } from './fault-cases.js';

const { campaign } = readCampaign(EVERYTHING);
const [a, b] = campaign.sites;
const [k, l] = campaign.clocks;
const kl = campaign.links[0];

/** Value and u, each the double nearest to the decimal number that stands here. */
const numbers = (m: Measured | null | undefined) => [m?.value, m?.u];
const determination = <K extends Determination['kind']>(kind: K) =>
  a?.determinations.find((d) => d.kind === kind) as Extract<Determination, { kind: K }> | undefined;

describe('what a file says, in SI', () => {
  it('campaign', () => {
    expect(campaign.tide).toBe('free');
    expect([campaign.targetM, campaign.effectM]).toEqual([0.01, 0.2]);
    expect(campaign.love).toEqual({ h2: 0.6078, k2: 0.3, note: 'n2' });
    // MJD 61528 is 2027-05-03
    expect(campaign.window).toEqual({
      startMs: Date.UTC(2027, 4, 3) + 500,
      endMs: Date.UTC(2027, 4, 3) + 72 * 86_400_000,
      note: 'n1',
    });
    expect(campaign.sources).toEqual([
      { id: 's', name: 'S', correlation: 0 },
      { id: 't', correlationLengthM: 80_000, date: 'd1' },
      { id: 'u' },
    ]);
  });

  it('datums and transitions', () => {
    const [d] = campaign.datums;
    expect(numbers(d?.W0)).toEqual([62636853.4, 0.5]);
    expect(d?.W0.tide).toBe('zero');
    expect([d?.estimateOffset, d?.estimateTilt]).toEqual([true, true]);
    expect(d?.origin?.latitudeRad).toBe(degToRad(-33.3));
    expect(d?.origin?.longitudeRad).toBe(degToRad(151.2));
    const [sr, x] = campaign.transitions;
    expect([...numbers(sr?.offset), sr?.offset?.distribution, sr?.offset?.dof]).toEqual([0, 1e-18, 't', 4]);
    expect([sr?.frequency, x?.offset, x?.frequency?.value]).toEqual([null, null, 4.1e14]);
  });

  it('sites', () => {
    expect([a?.latitudeRad, a?.longitudeRad]).toEqual([degToRad(-1e-7), degToRad(359.9999999)]);
    expect(numbers(a?.g)).toEqual([9.79, 0.02]);
    expect(numbers(a?.gradient)).toEqual([3.084e-6, 9e-9]);
    expect(numbers(a?.variable)).toEqual([0, 0.08]);
    expect([a?.candidate, a?.cost, b?.candidate, b?.cost]).toEqual([true, 0, false, null]);
    expect(numbers(a?.h)).toEqual([143.216, 0.005]);
    expect(a?.h?.parts).toEqual([
      { u: 0.003, source: 's', note: 'n5' },
      { u: 0.004, source: null },
    ]);
    expect(a?.h?.tide).toBe('mean');
    expect([b?.h, b?.g, b?.gradient, b?.variable, b?.determinations]).toEqual([null, null, null, null, []]);
    expect(b?.latitudeRad).toBeCloseTo(degToRad(52 + 17 / 60 + 41.2 / 3600), 15);
  });

  it('determinations', () => {
    expect(determination('potential')).toMatchObject({ check: true, candidate: false, cost: null, note: 'n6' });
    const c = determination('geopotential-number');
    expect([...numbers(c?.C), c?.datum, c?.candidate, c?.cost, c?.check]).toEqual([140.3, 0.3, 'tt', true, 3, false]);
    expect([determination('normal-height')?.H.value, determination('normal-height')?.datum]).toEqual([143.216, 'ihrs']);
    const o = determination('orthometric-height');
    expect([...numbers(o?.g), o?.datum]).toEqual([9.8, 3e-5, 'd']);
    expect(determination('dynamic-height')?.gammaRef?.value).toBe(9.806199);
    const q = determination('gnss-quasigeoid');
    expect([...numbers(q?.zeta), q?.zeta.text, q?.h]).toEqual([0.043812, 0.019, '43.812 mm', null]);
    expect(q?.zeta.parts).toEqual([{ u: 0.019, source: 't' }]);
    const n = determination('gnss-geoid');
    expect([n?.h?.value, ...numbers(n?.meanGravityFactor), n?.datum]).toEqual([143.2, 4.2e-7, 4e-8, 'u0-grs80']);
    const f = determination('levelled-from');
    expect([f?.site, f?.dH.value, f?.lengthM, f?.k?.value, f?.g]).toEqual(['b', -3.2, 12_000, 1e-7, null]);
    expect((f?.b?.value ?? 0) / (1e-3 / Math.sqrt(1000))).toBeCloseTo(1, 14);
  });

  it('clocks and links', () => {
    expect(k?.systematic).toEqual([
      { u: 1.2e-18, source: 'u', dof: 7, name: 'bbr', note: 'n8' },
      { u: 3e-19, source: null, dof: null },
    ]);
    expect(l?.systematic).toEqual([{ u: 2e-18, source: 'u', dof: null }]);
    expect(k?.stability).toEqual({ white: 2e-16, flicker: 0, phase: 0, note: 'n9' });
    expect(k?.tie.map((t) => [t.name, t.dH.value, t.dH.u])).toEqual([
      ['up', 1.2, 0.1],
      [undefined, -2, 0],
    ]);
    const day = 86_400_000;
    const may = (n: number) => Date.UTC(2027, 4, n);
    expect(k?.available?.map((i) => [i.startMs, i.endMs])).toEqual([
      [may(5), may(9) + (10 / 24) * day],
      [may(3), may(4) + day / 4],
    ]);
    // from half a second after MJD 61528: 1.25 d less that, and 4 d 10 h
    const covered = (1.25 + 4 + 10 / 24) * 86_400 - 0.5;
    expect(k?.uptime).toBeCloseTo(covered / (72 * 86_400 - 0.5), 14);
    expect([l?.uptime, l?.available, l?.tie]).toEqual([0, null, []]);
    expect(kl).toMatchObject({
      from: 'k',
      to: 'l',
      kind: 'own word',
      lengthM: 0,
      segments: 3,
      uptime: 0.5,
      candidate: false,
    });
    expect(kl?.stability).toEqual({ white: 0, flicker: 1e-20, phase: 1e-15 });
    expect(kl?.systematic).toEqual([{ u: 3e-19, source: null, dof: null }]);
  });

  it('measurements', () => {
    const [m, n, third] = campaign.measurements;
    expect([m?.id, m?.y.tide, m?.includesSystematic, m?.check]).toEqual(['m', 'zero', false, false]);
    expect([m?.startMs, m?.endMs]).toEqual([Date.UTC(2027, 4, 3), Date.UTC(2027, 4, 5)]);
    expect([n?.y.tide, n?.includesSystematic, n?.check, n?.startMs]).toEqual(['free', true, true, null]);
    expect([third?.id, third?.y.tide, third?.y.text, third?.y.u]).toEqual([null, null, null, 0]);
    expect(campaign.correlations).toEqual([{ between: ['m', 'n'], rho: -0.41, note: 'n11' }]);
  });

  it('what is not said: the defaults', () => {
    const { campaign: bare, warnings } = readCampaign('{"format": "plumbtick-campaign/1", "sites": []}');
    expect(warnings).toEqual([]);
    expect(bare).toEqual({
      format: 'plumbtick-campaign/1',
      tide: 'mean',
      window: null,
      targetM: null,
      effectM: null,
      love: { h2: 0.6078, k2: 0.3019 },
      sources: [],
      datums: [],
      transitions: [],
      sites: [],
      clocks: [],
      links: [],
      measurements: [],
      correlations: [],
    });
    const small = readCampaign(file()).campaign;
    expect(small.links[0]).toMatchObject({
      kind: null,
      lengthM: null,
      segments: 1,
      uptime: 1,
      systematic: [],
      available: null,
    });
    expect(small.clocks[1]).toMatchObject({ uptime: 1, stability: { white: 0, flicker: 0, phase: 0 } });
  });

  it('availability without a window is a share of its own span', () => {
    const available =
      '"available": [{ "start": 61530, "end": 61531 }, { "start": 61528, "end": 61529 }, { "start": 61528.5, "end": 61529 }]';
    const read = readCampaign(file({ window: '"title": "x"', k: PARTS.k.replace('"uptime": 0.7', available) }));
    expect(read.campaign.clocks[0]?.uptime).toBeCloseTo(2 / 3, 14);
  });

  it('a value in memory is read like its file', () => {
    expect(readCampaignValue(JSON.parse(EVERYTHING)).campaign).toEqual(campaign);
    expect(readCampaign(`\ufeff${EVERYTHING}`).campaign).toEqual(campaign);
  });
});

describe('doubts', () => {
  it('names a source that nothing names, and a kind of link that is nearly a known one', () => {
    const link = PARTS.link.replace('"to": "l"', '"to": "l", "kind": "fiber"');
    expect(readCampaign(file({ link })).warnings.map((w) => [w.code, w.path])).toEqual([
      ['unused-source', 'sources.1'],
      ['link-kind', 'links.kl.kind'],
    ]);
    for (const kind of ['microwave', 'fibre'])
      expect(readCampaign(file({ link: link.replace('fiber', kind) })).warnings.map((w) => w.code)).toEqual([
        'unused-source',
      ]);
  });
});

describe('recommended frequencies', () => {
  it('strontium: frequency and vacuum wavelength of the same list agree to the last digit', () => {
    // CIPM recommended values, 87Sr, 2021: 698 445 709.612 754 43 fm
    const hz = recommendedFrequency('87Sr')?.text ?? '';
    const product = BigInt(hz.replace('.', '')) * 69_844_570_961_275_443n;
    // c = 299 792 458 m/s in units of 10⁻² Hz times 10⁻⁸ fm = 10⁻²⁵ m/s; the wavelength's last digit is 4e12 of them
    const c = 299_792_458n * 10n ** 25n;
    const off = product - c;
    expect(off < 0n ? -off : off).toBeLessThan(BigInt(hz.replace('.', '')));
  });

  it('every text is its number, and every relative uncertainty stands in the decimals given', () => {
    expect(RECOMMENDED_FREQUENCIES.map((f) => f.transition)).toHaveLength(12);
    for (const f of RECOMMENDED_FREQUENCIES) {
      expect(Number(f.text)).toBe(f.frequencyHz);
      const lastDigitHz = 10 ** -(f.text.split('.')[1]?.length ?? 0);
      const uHz = f.frequencyHz * f.relativeStandardUncertainty;
      expect(uHz).toBeGreaterThan(lastDigitHz);
      expect(uHz).toBeLessThan(300 * lastDigitHz);
    }
    expect(recommendedFrequency('171Yb+')).toBeNull();
  });
});
