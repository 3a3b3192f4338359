import { describe, expect, it } from 'vitest';
import type { ByteSource } from '../../../../lib/earth/file-bytes/byte-source.js';
import { gridExcerpt, openGeoidGrid } from '../../../../lib/earth/geoid-grid/index.js';
import { faultOf, gtx, open, text, valueAt } from './grid-fixtures.js';

const small = gtx([50, 10, 0.5, 0.25], 3, 4, (r, c) => 10 * r + c);

describe('GTX files', () => {
  it('has its first value in the south-west, rows northwards', async () => {
    const grid = await open(small);
    expect(grid).toMatchObject({
      format: 'gtx',
      registration: 'nodes',
      firstLatitudeDeg: 50,
      latitudeStepDeg: 0.5,
      warnings: [],
    });
    expect(await valueAt(grid, 50, 10)).toBe(0);
    expect(await valueAt(grid, 51, 10)).toBe(20);
    expect(await valueAt(grid, 50, 10.75)).toBe(3);
    expect(await valueAt(grid, 50.25, 10.125)).toBeCloseTo(5.5, 12);
    expect(await valueAt(grid, 50.25, 370.125)).toBeCloseTo(5.5, 12);
  });

  it('tells the byte order from the head', async () => {
    const grid = await open(gtx([50, 10, 0.5, 0.25], 3, 4, (r, c) => 10 * r + c, true));
    expect(await valueAt(grid, 51, 10.25)).toBe(21);
    expect(grid.warnings.map((w) => w.code)).toEqual(['byte-order']);
  });

  it.each([-88.8888, -9999, 1e30, Number.NaN, Number.POSITIVE_INFINITY])('takes %f for no value', async (none) => {
    const grid = await open(gtx([50, 10, 0.5, 0.25], 3, 4, (r, c) => (r === 1 && c === 1 ? none : 5)));
    expect((await faultOf(() => valueAt(grid, 50.25, 10.125))).code).toBe('nodata');
    expect(await valueAt(grid, 50.25, 10.625)).toBe(5);
  });

  it('keeps −88.9 m, which is a geoid height', async () => {
    expect(await valueAt(await open(gtx([50, 10, 0.5, 0.25], 3, 4, () => -88.9)), 50.1, 10.1)).toBeCloseTo(-88.9, 4);
  });

  it('goes round the Earth, with and without its first meridian again at the end', async () => {
    for (const columns of [8, 9]) {
      const grid = await open(gtx([-90, -180, 45, 45], 5, columns, (r, c) => r + 10 * (c % 8)));
      expect(grid.period).toBe(8);
      expect(await valueAt(grid, -90, 157.5)).toBeCloseTo(35, 12);
      expect(await valueAt(grid, 90, -22.5)).toBeCloseTo(39, 12);
      expect(await valueAt(grid, 0, 180)).toBeCloseTo(2, 12);
      // sixteen nodes across the seam
      expect((await gridExcerpt(grid, 0.1, 179)).longitudesDeg).toEqual([90, 135, 180, 225]);
      expect((await gridExcerpt(grid, 0.1, 179)).valuesM[1]).toEqual([62, 72, 2, 12]);
    }
  });

  it('warns of nodes at half steps', async () => {
    const grid = await open(gtx([50.125, 10.125, 0.25, 0.25], 3, 4, () => 40));
    expect(grid.warnings.map((w) => w.code)).toEqual(['half-step-nodes']);
    expect(grid.warnings[0]!.message).toContain('14 km');
  });

  describe('refuses', () => {
    it('a file that is cut, and one that is too long', async () => {
      expect(await faultOf(() => open(small.slice(0, -1)))).toMatchObject({
        code: 'file-truncated',
        found: '87 bytes',
      });
      expect((await faultOf(() => open(small.slice(0, 60)))).code).toBe('file-truncated');
      expect((await faultOf(() => open(Uint8Array.from([...small, 0, 0, 0, 0])))).code).toBe('wrong-size');
    });

    it('a head that claims 2 GB and more, without making room', async () => {
      const huge = small.slice();
      new DataView(huge.buffer).setInt32(32, 2 ** 31 - 1);
      new DataView(huge.buffer).setInt32(36, 2 ** 31 - 1);
      const before = process.memoryUsage().arrayBuffers;
      expect((await faultOf(() => open(huge))).code).toBe('file-truncated');
      expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1 << 20);
    });

    it('a global grid half a cell off', async () => {
      const fault = await faultOf(() => open(gtx([-90.125, -180.125, 0.25, 0.25], 721, 4, () => 0)));
      expect(fault.code).toBe('registration');
      expect(fault.expected).toContain('half a step off');
      expect((await faultOf(() => open(gtx([-90, 0, 45, 45], 6, 4, () => 0)))).code).toBe('registration');
    });

    it('sizes and steps that are none, and other files', async () => {
      for (const bytes of [
        gtx([50, 10, -0.5, 0.25], 3, 4, () => 0),
        gtx([50, 10, 0, 0.25], 3, 4, () => 0),
        gtx([Number.NaN, 10, 0.5, 0.25], 3, 4, () => 0),
        gtx([500, 10, 0.5, 0.25], 3, 4, () => 0),
        Uint8Array.from([0x50, 0x4b, 3, 4, ...new Uint8Array(60)]),
        new Uint8Array(0),
        new Uint8Array(100),
      ])
        expect((await faultOf(() => open(bytes))).code).toBe('not-a-grid');
      expect((await faultOf(() => open(text('{"format": "plumbtick-campaign/1"}')))).code).toBe('not-isg');
    });

    it('places outside, never extrapolated', async () => {
      const grid = await open(small);
      for (const [lat, lon] of [
        [49.999, 10.1],
        [51.001, 10.1],
        [50.1, 9.999],
        [50.1, 10.751],
        [50.1, -169],
      ] as const) {
        const fault = await faultOf(() => valueAt(grid, lat, lon));
        expect(fault).toMatchObject({ code: 'outside-grid', expected: 'latitude 50 … 51, longitude 10 … 10.75' });
      }
      expect((await faultOf(() => valueAt(grid, 95, 10))).code).toBe('position');
      expect((await faultOf(() => valueAt(grid, Number.NaN, 10))).code).toBe('position');
    });
  });

  it('reads no more of a large file than the head and sixteen values', async () => {
    const rows = 20_000;
    const columns = 40_000;
    let bytesRead = 0;
    const head = gtx([-30, 0, 0.003, 0.006], 2, 2, () => 0).slice(0, 40);
    new DataView(head.buffer).setInt32(32, rows);
    new DataView(head.buffer).setInt32(36, columns);
    const source: ByteSource = {
      name: 'large.gtx',
      size: 40 + 4 * rows * columns,
      read: (offset, length) => {
        const bytes = new Uint8Array(length);
        if (offset > 0) bytesRead += length;
        for (let i = 0; i < 40 && offset + i < 40; i++) bytes[i] = head[offset + i]!;
        return Promise.resolve(bytes);
      },
    };
    expect(await valueAt(await openGeoidGrid(source), 10, 100)).toBe(0);
    expect(bytesRead).toBe(64);
  });
});
