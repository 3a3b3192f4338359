import { readFileSync } from 'node:fs';
import { deflateSync } from 'node:zlib';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { hasFragment, MOST_BYTES, readFragment, writeFragment } from '../../../lib/campaign/fragment.js';
import { readCampaign } from '../../../lib/campaign/read.js';

const example = readFileSync(new URL('../../data/examples/three-sites.json', import.meta.url), 'utf8');
/** zlib of Node: not the code that reads it back */
const zlib = async (bytes: Uint8Array) => new Uint8Array(deflateSync(bytes, { level: 9 }));
const state = { campaign: example, link: 'rp', show: ['section', 'links'] };

const fault = (hash: string) => {
  try {
    readFragment(hash);
  } catch (error) {
    if (error instanceof CampaignError) return error.faults[0]!;
    throw error;
  }
  throw new Error('read');
};

describe('a campaign in an address', () => {
  it('comes back as it went, packed or not', async () => {
    for (const pack of [zlib, null]) {
      const read = readFragment(`#${await writeFragment(state, pack)}`)!;
      expect(read.link).toBe('rp');
      expect(read.show).toEqual(['section', 'links']);
      expect(JSON.parse(read.campaign)).toEqual(JSON.parse(example));
      expect(readCampaign(read.campaign).campaign).toEqual(readCampaign(JSON.stringify(JSON.parse(example))).campaign);
    }
  });

  it('is the same for the same campaign, however the file was laid out', async () => {
    const one = await writeFragment(state, zlib);
    expect(await writeFragment({ ...state, campaign: JSON.stringify(JSON.parse(example), null, 7) }, zlib)).toBe(one);
    expect(one).toMatch(/^link=rp&show=section,links&plumb1=\d+\.\d+\.[\w-]+$/);
  });

  it('is packed to less than half', async () => {
    expect((await writeFragment(state, zlib)).length).toBeLessThan(JSON.stringify(JSON.parse(example)).length / 1.8);
  });

  it('an address of an earlier day is read: version 1, written on 2026-12-01', () => {
    // {"a":"W₀ ½"} as a zlib stream by Python's zlib.compress(…, 9), base64.urlsafe_b64encode without =
    const hash = '#link=a%20b&plumb1=15.31.eNqrVkpUslIKf9TUoHBor1ItACrEBfY';
    const read = readFragment(hash);
    expect(read).toEqual({ campaign: '{"a":"W₀ ½"}', link: 'a b', show: [] });
  });

  it('says that it was cut off, wherever it was', async () => {
    const whole = `#${await writeFragment(state, zlib)}`;
    const begin = whole.indexOf('plumb1=') + 'plumb1='.length;
    for (let at = begin; at < whole.length; at += 1 + Math.floor((at - begin) / 9)) {
      const { code, path } = fault(whole.slice(0, at));
      expect([code, path]).toEqual(['cut-off', 'address']);
    }
    expect(fault(whole.slice(0, -100)).found).toMatch(/^\d+ of \d+ characters$/);
  });

  it('says that it was damaged: a changed character, something added', async () => {
    const whole = `#${await writeFragment(state, zlib)}`;
    for (const at of [30, 200, 900]) {
      const place = whole.indexOf('plumb1=') + at;
      const other = whole[place] === 'A' ? 'B' : 'A';
      expect(fault(whole.slice(0, place) + other + whole.slice(place + 1)).code).toBe('damaged');
    }
    expect(fault(`${whole}x`).code).toBe('damaged');
    expect(fault('#plumb1=5.4.!!!!').code).toBe('damaged');
    expect(fault('#link=%E0%A4%A&plumb1=0.0.').code).toBe('damaged');
  });

  it('refuses a newer version and what would unpack to more than it may, without unpacking it', async () => {
    expect(fault('#plumb2=1.1.A')).toMatchObject({ code: 'newer-version', found: 'plumb2' });
    expect(fault(`#plumb1=${MOST_BYTES + 1}.4.AAAA`).code).toBe('too-large');
    // a bomb that understates its size: 40 MB of zeros said to be 100 bytes
    const bomb = deflateSync(Buffer.alloc(40_000_000), { level: 9 });
    const data = bomb.toString('base64url');
    const before = process.memoryUsage().arrayBuffers;
    expect(fault(`#plumb1=100.${data.length}.${data}`).code).toBe('damaged');
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(5_000_000);
  });

  it('knows an address without a state', () => {
    expect(readFragment('')).toBe(null);
    expect(readFragment('#section-2')).toBe(null);
    expect(hasFragment('#link=a&plumb9=x')).toBe(true);
    expect(hasFragment('#nplumb1=x')).toBe(false);
  });

  it('any JSON, any link, packed or not', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.jsonValue(),
        fc.string({ minLength: 1, unit: 'grapheme' }),
        fc.boolean(),
        async (value, link, packed) => {
          const written = await writeFragment(
            { campaign: JSON.stringify(value), link, show: [] },
            packed ? zlib : null,
          );
          const read = readFragment(written)!;
          expect(read.link).toBe(link);
          expect(read.campaign).toBe(JSON.stringify(value));
        },
      ),
      { numRuns: 60 },
    );
  });
});
