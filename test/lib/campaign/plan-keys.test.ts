import { describe, expect, it } from 'vitest';
import { readCampaign } from '../../../lib/campaign/read.js';
import { geodesicDistanceM } from '../../../lib/earth/geodesic-distance.js';
import { expectWithin } from '../../expect-within.js';
import { file, PARTS } from './fault-cases.js';
import { faultsOf } from './faults-of.js';

const withClock = (more: string): string => file({ k: PARTS.k.replace('"uptime": 0.7', more) });
const withLink = (more: string): string =>
  file({ link: `{ "id": "kl", "from": "k", "to": "l", "kind": "fibre", ${more} }` });
const line = (more: string): string => file({ b: PARTS.b.replace('"dH": "5(1) m"', more) });

/** code, path, and the text at line and column */
const faults = (text: string): readonly (readonly string[])[] =>
  faultsOf(() => readCampaign(text)).map((f) => [
    f.code,
    f.path,
    text
      .split('\n')
      [f.line! - 1]!.slice(f.column! - 1)
      .slice(0, 12),
  ]);

describe('flywheel', () => {
  it('is refused while nothing says when the clock runs, or two things do', () => {
    expect(faults(withClock('"flywheel": { "stability": { "flicker": 2e-15 } }'))).toEqual([
      ['missing-key', 'clocks.k.flywheel.cycle', '{ "stability'],
    ]);
    const both = withClock(
      '"available": [{ "start": 61528, "end": 61529 }], "flywheel": { "stability": {}, "cycle": "1 d" }',
    );
    expect(faults(both)).toEqual([['exclusive-keys', 'clocks.k.flywheel.cycle', '"1 d" } },']]);
  });

  it('is read in SI', () => {
    const { campaign } = readCampaign(
      withClock(
        '"uptime": 0.5, "flywheel": { "stability": { "white": "1e-13", "randomWalk": 3e-19 }, "driftPerDay": 1e-17, "cycle": "12 h" }',
      ),
    );
    expect(campaign.clocks[0]!.flywheel).toEqual({
      white: 1e-13,
      flicker: 0,
      randomWalk: 3e-19,
      phase: 0,
      driftPerDay: 1e-17,
      cycleS: 43_200,
    });
  });
});

describe('fibre', () => {
  it('stands in place of a measured phase noise', () => {
    expect(
      faults(withLink('"fibre": { "noise": 10, "bandwidth": "10 Hz" }, "stability": { "phase": "1e-15" }')),
    ).toEqual([['exclusive-keys', 'links.kl.stability.phase', '"1e-15" } }']]);
  });

  it('takes the geodesic for its length where none is stated, and says so', () => {
    const { campaign, warnings } = readCampaign(withLink('"fibre": { "noise": 10, "bandwidth": "10 Hz" }'));
    const [a, b] = campaign.sites;
    const { fibre } = campaign.links[0]!;
    expect(fibre!.lengthIsGeodesic).toBe(true);
    expectWithin(fibre!.lengthM, geodesicDistanceM(a!, b!), 1e-6);
    expectWithin(fibre!.noiseRad2HzPerM, 0.01, 1e-17);
    expect(warnings.find((w) => w.code === 'link-length-default')?.message).toContain('180\u00a0km');
    const stated = readCampaign(withLink('"length": "250 km", "fibre": { "noise": 10, "bandwidth": "10 Hz" }'));
    expect(stated.campaign.links[0]!.fibre!.lengthM).toBe(250_000);
    expect(stated.warnings.map((w) => w.code)).not.toContain('link-length-default');
  });
});

describe('transported', () => {
  const entry = '"sideBySide": [{ "when": "before", "y": "1(2)e-17", "dH": 0.3 }]';
  it('names an end of its link', () => {
    const text = file({
      link: `{ "id": "kl", "from": "k", "to": "l", "transported": { "clock": "m", ${entry} } }`,
      l: `${PARTS.l},\n{ "id": "m", "site": "b", "transition": "87Sr" }`,
    });
    expect(faults(text)).toEqual([['not-one-of', 'links.kl.transported.clock', '"m", "sideBy']]);
  });
  it('has an offset or a planned time, not both', () => {
    const text = withLink(`"transported": { "clock": "l", ${entry.replace('"dH"', '"time": "1 d", "dH"')} }`);
    expect(faults(text)).toEqual([['exclusive-keys', 'links.kl.transported.sideBySide.0.time', '"time": "1 d']]);
  });
});

describe('levelling line', () => {
  it('states the uncertainty of dH once', () => {
    expect(faults(line('"dH": "5(1) m", "length": "10 km", "k": "0.1 mm/km"'))).toEqual([
      ['u-twice', 'sites.b.determinations.0.dH', '"5(1) m", "l'],
    ]);
  });
  it('has b and k without an uncertainty, their source kept', () => {
    expect(faults(line('"dH": 5, "length": "10 km", "b": "1.0(2) mm/√km"'))).toEqual([
      ['uncertainty-not-expected', 'sites.b.determinations.0.b', '"1.0(2) mm/√'],
    ]);
    const d = readCampaign(line('"dH": 5, "length": "10 km", "k": { "value": "0.1 mm/km", "source": "plain" }'))
      .campaign.sites[1]!.determinations[0]!;
    expect(d).toMatchObject({ lengthM: 10_000, k: { value: 1e-7, u: 0, source: 'plain' } });
    expect(faults(line('"dH": 5, "length": "10 km", "k": { "value": 1, "unit": "mm/km", "u": 1 }'))).toEqual([
      ['unknown-key', 'sites.b.determinations.0.k.u', '"u": 1 } }] '],
    ]);
  });
  it('warns where several lines leave open whether their systematic error is one', () => {
    const two = PARTS.b.replace(
      '"dH": "5(1) m" }',
      '"dH": 5, "length": "10 km", "k": "0.1 mm/km" }, { "kind": "levelled-from", "site": "a", "dH": 5, "length": "12 km", "k": "0.1 mm/km" }',
    );
    const warnings = (b: string) => readCampaign(file({ b })).warnings.map((w) => `${w.code} ${w.path}`);
    expect(warnings(two)).toContain('levelling-k-source sites.b.determinations.0.k');
    const named = two.replaceAll('"0.1 mm/km"', '{ "value": "0.1 mm/km", "source": "plain" }');
    expect(warnings(named).join()).not.toContain('levelling-k-source');
  });
});
