import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { degreesOf } from '../../../lib/campaign/from-campaign.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { writeCampaign } from '../../../lib/campaign/write.js';
import { degToRad } from '../../../lib/quantity/index.js';
import { file } from './fault-cases.js';

const example = (name: string): string =>
  readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8');

const EVERYTHING = `{
  "format": "plumbtick-campaign/1", "title": "Every key", "note": "n0", "reference": "r0", "date": "d0", "tide": "free",
  "window": { "start": "2027-05-03T00:00:00.5Z", "end": 61600, "note": "n1" }, "target": 0.01, "effect": "20 cm",
  "love": { "k2": 0.3, "note": "n2" },
  "sources": [{ "id": "s", "name": "S", "correlation": 0 }, { "id": "t", "correlationLength": "80 km", "date": "d1" }, { "id": "u" }],
  "datums": [{ "id": "d", "name": "D", "W0": { "value": "62636853.4(5) m²/s²", "tide": "zero", "note": "n3" },
    "origin": { "lat": -33.3, "lon": "151°12'30\\"E", "note": "n4" }, "estimateOffset": true, "estimateTilt": true }],
  "transitions": [{ "id": "87Sr", "offset": { "value": 0, "u": 1e-18, "distribution": "t", "dof": 4 } }, { "id": "x", "frequency": "4.1e14 Hz" }],
  "sites": [
    { "id": "a", "name": "A", "lat": -1e-7, "lon": 359.9999999, "g": { "value": 979, "u": 2, "unit": "Gal" }, "gradient": "3084(9) E",
      "variable": "0.00(8) m²/s²", "candidate": true, "cost": 0,
      "h": { "value": "143.216 m", "parts": [{ "u": "3 mm", "source": "s", "note": "n5" }, { "u": 0 }, { "u": "4 mm" }], "tide": "mean" },
      "determinations": [
        { "kind": "potential", "W": 62636000, "use": "check", "note": "n6" },
        { "kind": "geopotential-number", "C": "14.03(3) gpu", "datum": "tt", "candidate": true, "cost": 3 },
        { "kind": "normal-height", "H": { "value": 143216, "unit": "mm" } },
        { "kind": "orthometric-height", "H": "143.2(1) m", "g": { "value": "9.8 m/s²", "u": "3 mGal" }, "datum": "d" },
        { "kind": "dynamic-height", "H": "143.2(1) m", "gammaRef": 9.806199 },
        { "kind": "gnss-quasigeoid", "zeta": { "value": "43.812", "u": 19, "unit": "mm", "source": "t" } },
        { "kind": "gnss-geoid", "h": "143.2", "N": "43(1) m", "meanGravityFactor": "4.2(4)e-7 s⁻²", "datum": "u0-grs80" },
        { "kind": "levelled-from", "site": "b", "dH": "-3.2 m", "length": "12 km", "b": "1 mm/√km", "k": { "value": "0.1 mm/km", "source": "u" } }] },
    { "id": "b", "lat": "52°17'41.2\\"N", "lon": -179.123456789 }],
  "clocks": [
    { "id": "k", "site": "a", "transition": "87Sr", "tie": [{ "name": "up", "dH": "1.2(1) m", "note": "n7" }, { "dH": -2 }],
      "systematic": [{ "u": "1.2e-18", "source": "u", "dof": 7, "name": "bbr", "note": "n8" }, { "u": 0 }, { "u": 3e-19 }],
      "stability": { "white": 2e-16, "note": "n9" }, "available": [{ "start": 61530, "end": "2027-05-09T12:00:00+02:00" }, { "start": 61528, "end": 61529.25 }] },
    { "id": "l", "site": "b", "transition": "x", "systematic": { "u": "2e-18", "source": "u" }, "stability": {}, "uptime": 0 }],
  "links": [{ "id": "kl", "name": "KL", "from": "k", "to": "l", "kind": "own word", "length": 0, "segments": 3, "systematic": "3e-19",
    "stability": { "white": 0, "flicker": "1e-20", "phase": "1e-15" }, "uptime": { "value": 0.5 } }],
  "measurements": [{ "id": "m", "link": "kl", "y": { "value": "2.1(2)e-14", "tide": "zero" }, "start": 61528, "end": 61530, "note": "n10" },
    { "id": "n", "link": "kl", "y": "2.2(2)e-14", "tide": "free", "includesSystematic": true, "use": "check" }, { "link": "kl", "y": 2e-14 }],
  "correlations": [{ "between": ["m", "n"], "rho": -0.41, "note": "n11" }]
}`;

describe('writeCampaign', () => {
  it.each([
    ['three-sites', example('three-sites')],
    ['other-kinds', example('other-kinds')],
    ['triangle', example('triangle')],
    ['the small one', file()],
    ['every key', EVERYTHING],
  ])('%s: reading what was written gives the same campaign, to the last bit', (_name, text) => {
    const { campaign } = readCampaign(text);
    const written = writeCampaign(campaign);
    expect(readCampaign(written).campaign).toEqual(campaign);
    expect(writeCampaign(readCampaign(written).campaign)).toBe(written);
  });

  it('keeps every remark and the texts as typed', () => {
    const written = writeCampaign(readCampaign(EVERYTHING).campaign);
    for (let i = 0; i <= 11; i++) expect(written).toContain(`"n${i}"`);
    for (const text of ['"-3.2 m"', '"3084(9) E"', '"14.03(3) gpu"', '"4.2(4)e-7 s⁻²"'])
      expect(written).toContain(text);
    expect(written).toContain('"lat": -33.3');
  });
});

describe('degreesOf', () => {
  it('finds the degrees that were written', () => {
    fc.assert(
      fc.property(fc.integer({ min: -1_800_000_000, max: 3_600_000_000 }), (n) => {
        const degrees = n / 1e7;
        expect(degToRad(degreesOf(degToRad(degrees)))).toBe(degToRad(degrees));
        expect(String(degreesOf(degToRad(degrees))).length).toBeLessThanOrEqual(String(degrees).length);
      }),
    );
    expect(degreesOf(degToRad(52.2961))).toBe(52.2961);
    expect(degreesOf(degToRad(0))).toBe(0);
  });
});
