import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { degreesOf } from '../../../lib/campaign/from-campaign.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { writeCampaign } from '../../../lib/campaign/write.js';
import { degToRad } from '../../../lib/quantity/index.js';
import { EVERYTHING } from './every-key.js';
import { file } from './fault-cases.js';

const example = (name: string): string =>
  readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8');

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
