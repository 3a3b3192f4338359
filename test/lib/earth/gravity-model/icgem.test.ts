import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CampaignError } from '../../../../lib/campaign/fault.js';
import { DecimalScanner } from '../../../../lib/earth/file-bytes/decimal-scanner.js';
import { coefficientIndex, IcgemReader, parseIcgem, readIcgem } from '../../../../lib/earth/gravity-model/index.js';
import { gfcPieces, syntheticModel } from '../../../data/gravity-model/synthetic-model.mjs';

const bytes = (text: string) => new TextEncoder().encode(text);
const faultOf = (read: () => unknown) => {
  try {
    read();
  } catch (error) {
    if (error instanceof CampaignError) return error.faults[0]!;
    throw error;
  }
  throw new Error('nothing was refused');
};

const HEAD = {
  product_type: 'gravity_field',
  modelname: 'TEST',
  earth_gravity_constant: '0.3986004415D+15',
  radius: '6378136.3',
  max_degree: '2',
  errors: 'no',
  norm: 'fully_normalized',
  tide_system: 'zero_tide',
};
const ROWS = ['gfc 0 0 1.0 0.0', 'gfc 2 0 -4.84D-04 0', 'gfc 2 1 -2e-10 1.4e-9', 'gfc 2 2 2.4e-06 -1.4e-06'];
const file = (
  head: Partial<Record<keyof typeof HEAD | 'format', string | null>> = {},
  rows: readonly string[] = ROWS,
  end = '\n',
) =>
  bytes(
    [
      'begin_of_head',
      ...Object.entries({ ...HEAD, ...head }).flatMap(([k, v]) => (v === null ? [] : [`${k}   ${v}`])),
      'end_of_head ===',
      ...rows,
    ].join('\n') + end,
  );

describe('ICGEM files', () => {
  const egm2008 = readFileSync(new URL('../../../data/icgem/EGM2008-first-rows.gfc', import.meta.url));

  it('reads the head and rows of EGM2008 as distributed', () => {
    const model = parseIcgem(egm2008, { maxDegree: 4 });
    expect(model).toMatchObject({
      name: 'EGM2008',
      format: 'icgem1.0',
      gmM3s2: 3.986004415e14,
      radiusM: 6378136.3,
      maxDegree: 4,
      maxDegreeOfFile: 2190,
      tide: 'free',
      errors: 'calibrated',
      warnings: [],
    });
    expect(model.cosine[0]).toBe(1);
    expect(model.cosine[coefficientIndex(2, 0)]).toBe(-0.484165143790815e-3);
    expect(model.sine[coefficientIndex(4, 4)]).toBe(0.308803882149194e-6);
    expect(model.cosineSigma![coefficientIndex(4, 4)]).toBe(Math.fround(0.5372877167e-11));
    expect(model.sineSigma![coefficientIndex(3, 1)]).toBe(Math.fround(0.5976692146e-11));
  });

  it('says to which degree a file that is cut short is complete', () => {
    const fault = faultOf(() => parseIcgem(egm2008));
    expect(fault.code).toBe('coefficients-missing');
    expect(fault.found).toContain('degree 5, order 0 is the first that is missing');
    expect(fault.expected).toContain('maxDegree 4 or less');
  });

  it.each([1, 7, 64, 1000, 1 << 20])('gives every coefficient to the last bit, in pieces of %i bytes', async (size) => {
    const source = syntheticModel(30);
    const all = bytes([...gfcPieces(source, { sigmas: true })].join(''));
    async function* pieces() {
      for (let at = 0; at < all.length; at += size) yield all.slice(at, at + size);
    }
    const shares: (number | null)[] = [];
    const model = await readIcgem(pieces(), { totalBytes: all.length, onProgress: (p) => shares.push(p.share) });
    expect(model.cosine).toEqual(source.cosine);
    expect(model.sine).toEqual(source.sine);
    expect(model.cosineSigma![coefficientIndex(30, 30)]).toBeCloseTo(source.sigma[coefficientIndex(30, 30)]!, 15);
    expect(shares.at(-1)).toBe(1);
    expect(shares.length).toBe(Math.ceil(all.length / size));
  });

  it('reads line ends of three kinds, even mixed, and counts lines right', () => {
    const text = new TextDecoder().decode(file());
    let i = 0;
    const mixed = text.replace(/\n/g, () => ['\n', '\r\n', '\r'][i++ % 3]!);
    expect(parseIcgem(bytes(mixed)).cosine).toEqual(parseIcgem(file()).cosine);
    const crlf = text.replace(/\n/g, '\r\n').replace('2.4e-06', '2.4x-06');
    for (const size of [1, 5, 1000]) {
      const reader = new IcgemReader();
      expect(
        faultOf(() => {
          const all = bytes(crlf);
          for (let at = 0; at < all.length; at += size) reader.push(all.slice(at, at + size));
        }).line,
      ).toBe(14);
    }
  });

  it('normalises coefficients that are not', () => {
    // C̄_20 = C_20/√5, C̄_22 = C_22·√(24·/(2·5)): Heiskanen & Moritz (1967), section 1-14
    const model = parseIcgem(
      file({ norm: 'unnormalized' }, [
        'gfc 0 0 1 0',
        'gfc 2 0 -1.08e-3 0',
        'gfc 2 1 1e-9 2e-9',
        'gfc 2 2 1.57e-6 -9e-7',
      ]),
    );
    expect(model.cosine[coefficientIndex(2, 0)]).toBeCloseTo(-1.08e-3 / Math.sqrt(5), 18);
    expect(model.cosine[coefficientIndex(2, 1)]).toBeCloseTo(1e-9 * Math.sqrt(6 / 10), 22);
    expect(model.sine[coefficientIndex(2, 2)]).toBeCloseTo(-9e-7 * Math.sqrt(24 / 10), 20);
  });

  it('reads icgem2.0, four columns of errors, and a tide system that is not stated', () => {
    const rows = ['gfc 0 0 1 0 0 0 0 0', ...[0, 1, 2].map((m) => `gfc 2 ${m} 1e-6 0 ${m + 1}e-12 2e-12 3e-15 4e-15`)];
    const model = parseIcgem(file({ format: 'icgem2.0', errors: 'calibrated_and_formal', tide_system: null }, rows));
    expect(model).toMatchObject({ format: 'icgem2.0', errors: 'calibrated', tide: 'unknown' });
    expect(model.cosineSigma![coefficientIndex(2, 2)]).toBe(Math.fround(3e-12));
    expect(model.warnings.map((w) => w.code)).toEqual(['tide-system-unknown']);
  });

  it('warns of what is doubtful', () => {
    const codes = (data: Uint8Array) => parseIcgem(data).warnings.map((w) => w.code);
    expect(codes(file({}, ROWS.slice(1)))).toEqual(['zero-degree-missing']);
    expect(codes(file({}, [...ROWS, 'gfc 1 1 1e-9 0']))).toEqual(['first-degree']);
    expect(codes(file({ errors: null }))).toEqual(['errors-not-stated']);
    expect(
      codes(
        file(
          {},
          ROWS.map((r) => `${r} 1e-12 1e-12`),
        ),
      ),
    ).toEqual(['extra-columns']);
    expect(codes(file({}, ROWS, ''))).toEqual(['no-last-line-end']);
  });

  describe('refuses', () => {
    it.each([
      ['gfct 2 0 -4.8e-4 0 20050101', /reference epoch \(gfct\) of degree 2, order 0/],
      ['trnd 2 1 1e-12 0', /linear trend \(trnd\)/],
      ['dot 3 0 1e-12 0', /linear trend \(dot\)/],
      ['acos 2 0 1e-12 0 1.0', /periodic cosine/],
      ['asin 2 0 1e-12 0 0.5', /periodic sine/],
    ])('a time-variable term: %s', (row, found) => {
      const fault = faultOf(() => parseIcgem(file({}, [...ROWS, row])));
      expect(fault).toMatchObject({ code: 'time-variable-model', line: 15 });
      expect(fault.found).toMatch(found);
    });

    it.each([
      ['gfc 2 3 1 1', 'degree 2, order 3'],
      ['gfc 3 0 1 1', 'degree 3'],
      ['gfc x 0 1 1', 'no degree'],
      ['gfc 2', 'no order'],
      ['gfc 2 2 1e-6', 'the end of the line'],
      ['gfc 2 2 1,5 3', '1,5'],
      ['gfc 2 2 nan 3', 'nan'],
      ['gfc 2 2 1e 3', '1e'],
      ['gfc 2 1 0 0', 'degree 2, order 1 again'],
      ['2 2 1 1', '2'],
      ['gfc 99999999999 2 1 1', 'no degree'],
    ])('the row %s', (row, found) => {
      expect(faultOf(() => parseIcgem(file({}, [...ROWS.slice(0, 3), row])))).toMatchObject({
        code: 'row',
        line: 14,
        found,
      });
    });

    it.each([
      ['product_type', 'topographic_gravity_field', 'header-value'],
      ['earth_gravity_constant', '4.9028e12', 'header-value'],
      ['earth_gravity_constant', null, 'header-key-missing'],
      ['radius', '6378.1363', 'header-value'],
      ['max_degree', '1e12', 'header-value'],
      ['max_degree', '-2', 'header-value'],
      ['max_degree', '2.5', 'header-value'],
      ['max_degree', '1', 'max_degree'],
      ['max_degree', '5540', 'max_degree'],
      ['errors', 'calibrted', 'header-value'],
      ['tide_system', 'zerotide', 'header-value'],
      ['norm', 'schmidt', 'header-value'],
    ] as const)('a head with %s %s', (key, value, code) => {
      expect(faultOf(() => parseIcgem(file({ [key]: value }, ROWS.slice(0, 1)))).code).toBe(code);
    });

    it('a file that is cut in a row, and says that it is', () => {
      const cut = file().slice(0, -9);
      expect(faultOf(() => parseIcgem(cut))).toMatchObject({ code: 'row', line: 14 });
      expect(faultOf(() => parseIcgem(cut)).found).toContain('the file is cut off');
    });

    it('a difference of two fields', () => {
      expect(faultOf(() => parseIcgem(file({}, ['gfc 0 0 0 0', ...ROWS.slice(1)]))).code).toBe('not-a-whole-field');
    });

    it('missing standard deviations', () => {
      expect(faultOf(() => parseIcgem(file({ errors: 'formal' }))).expected).toContain('2 standard deviations');
    });

    it('a file of another kind, without gathering it', () => {
      const grid = readFileSync(new URL('../../../data/isg/example-1.isg', import.meta.url));
      expect(faultOf(() => parseIcgem(grid))).toMatchObject({
        code: 'not-icgem',
        found: 'the head of a geoid grid in ISG format',
      });
      expect(faultOf(() => parseIcgem(bytes('lat lon N\n1 2 3\n'))).code).toBe('not-icgem');
      const reader = new IcgemReader();
      const fault = faultOf(() => {
        for (let i = 0; i < 100; i++) reader.push(new Uint8Array(1 << 16).fill(0x20));
      });
      expect(fault.code).toBe('not-icgem');
    });

    it('a claim of high degree by a small file, without making room for it', () => {
      const before = process.memoryUsage().arrayBuffers;
      expect(faultOf(() => parseIcgem(file({ max_degree: '2700' }))).found).toContain('degree 3, order 0');
      expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(4 << 20);
    });

    it('a degree limit that cannot be', () => {
      expect(faultOf(() => parseIcgem(file(), { maxDegree: 3 })).expected).toContain('at most 2');
      expect(faultOf(() => parseIcgem(file(), { maxDegree: 1.5 })).code).toBe('maxDegree');
    });
  });
});

describe('decimal numbers from bytes', () => {
  const read = (text: string) => {
    const scanner = new DecimalScanner();
    const b = bytes(text);
    scanner.reset(b, 0, b.length);
    return scanner.number();
  };
  it('equals Number to the last bit', () => {
    const digits = fc.array(fc.integer({ min: 0, max: 9 }), { minLength: 1, maxLength: 19 }).map((d) => d.join(''));
    const number = fc
      .record({
        sign: fc.constantFrom('', '-', '+'),
        whole: digits,
        fraction: fc.option(digits),
        power: fc.option(fc.integer({ min: -50, max: 30 })),
      })
      .map(
        ({ sign, whole, fraction, power }) =>
          `${sign}${whole}${fraction === null ? '' : `.${fraction}`}${power === null ? '' : `e${power}`}`,
      );
    fc.assert(
      fc.property(number, (text) => {
        expect(read(text)).toBe(Number(text));
        expect(read(text.replace('e', 'D'))).toBe(Number(text));
      }),
      { numRuns: 3000, seed: 1 },
    );
    // fifteen digits and a small power, as such files have them
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 999999999999999 }), fc.integer({ min: 0, max: 29 }), (mantissa, power) => {
        const text = `0.${String(mantissa).padStart(15, '0')}e-${power}`;
        expect(read(text)).toBe(Number(text));
      }),
      { numRuns: 20_000, seed: 1 },
    );
  });
  it.each(['', '-', '.', 'e5', '1e', '1e+', '1.2.3', '1x', '--1', 'Infinity', 'NaN', '0x10', '1d'])(
    'refuses %j',
    (text) => {
      expect(read(text)).toBeNaN();
    },
  );
});
