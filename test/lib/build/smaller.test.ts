import { createRequire } from 'node:module';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { brotliCompressSync, gzipSync } from 'node:zlib';
import { Decimal } from 'decimal.js';
import * as esbuild from 'esbuild';
import fc from 'fast-check';
import geographiclib from 'geographiclib-geodesic';
import { describe, expect, test } from 'vitest';
// @ts-expect-error a script of the build, without types
import { minifiedCss, smallPackages, smallTemplates, withMinifiedCss } from '../../../scripts/smaller.mjs';

const root = fileURLToPath(new URL('../../..', import.meta.url));

/** A package as it goes into a page. */
async function small<T>(code: string, lines: boolean): Promise<T> {
  const { outputFiles } = await esbuild.build({
    stdin: { contents: code, resolveDir: root },
    bundle: true,
    minify: true,
    format: 'cjs',
    write: false,
    plugins: [smallPackages({ lines })],
  });
  const module = { exports: {} as { default: T } };
  new Function('module', 'exports', 'require', outputFiles[0]!.text)(
    module,
    module.exports,
    createRequire(path.join(root, 'package.json')),
  );
  return module.exports.default;
}

describe('decimal.js made smaller', async () => {
  const Small = await small<typeof Decimal>(
    "import { Decimal } from 'decimal.js'; export default Decimal.clone({ defaults: true, precision: 250, rounding: 6 })",
    false,
  );
  const Full = Decimal.clone({ defaults: true, precision: 250, rounding: 6 });
  const number = fc
    .tuple(fc.bigInt({ min: -(10n ** 40n), max: 10n ** 40n }), fc.integer({ min: -60, max: 60 }))
    .map(([digits, power]) => `${digits}e${power}`);

  test('computes, rounds, compares and prints alike', () => {
    fc.assert(
      fc.property(number, number, fc.integer({ min: 0, max: 30 }), (a, b, places) => {
        const all = (D: typeof Decimal) => {
          const [x, y] = [new D(a), new D(b)];
          return [
            x.plus(y),
            x.minus(y),
            x.times(y),
            y.isZero() ? 'none' : x.div(y),
            x.abs().sqrt(),
            x.neg(),
            x.toDecimalPlaces(places),
            x.toSignificantDigits(places + 1, 6),
            x.toFixed(places, 6),
            x.toNumber(),
            x.e,
            x.decimalPlaces(),
            x.precision(),
            [x.eq(y), x.gt(y), x.gte(y), x.lt(y), x.lte(y), x.isZero(), x.isNegative(), x.isFinite()].join(),
          ].map(String);
        };
        expect(all(Small)).toEqual(all(Full));
      }),
      { numRuns: 200 },
    );
  });

  test('takes numbers as before and refuses what is none', () => {
    for (const x of [0, -0, 1.5, -1e-300, 5e-324, Number.MAX_VALUE, NaN, Infinity])
      expect(new Small(x).toString()).toBe(new Full(x).toString());
    for (const text of ['', 'x', '1,5', '0x1f', '0b1']) expect(() => new Small(text)).toThrow(/Invalid argument/);
  });
});

describe('geographiclib-geodesic made smaller', async () => {
  const code = "import g from 'geographiclib-geodesic'; export default g";
  const [distances, lines] = await Promise.all([
    small<typeof geographiclib>(code, false),
    small<typeof geographiclib>(code, true),
  ]);
  const latitude = fc.double({ min: -90, max: 90, noNaN: true });
  const longitude = fc.double({ min: -180, max: 180, noNaN: true });
  const { a, f } = { a: 6_378_137, f: 1 / 298.257222101 };

  test('distances alike to the last bit, nearly antipodal points among them', () => {
    const of = (g: typeof geographiclib) => {
      const ellipsoid = new g.Geodesic.Geodesic(a, f);
      return (p: readonly [number, number, number, number]) => ellipsoid.Inverse(...p, g.Geodesic.DISTANCE).s12;
    };
    const [small, withLines, full] = [of(distances), of(lines), of(geographiclib)];
    fc.assert(
      fc.property(latitude, longitude, latitude, longitude, (p, l, q, m) => {
        const at = [p, l, q, m] as const;
        expect(small(at)).toBe(full(at));
        expect(withLines(at)).toBe(full(at));
      }),
      { numRuns: 300 },
    );
    for (const at of [
      [30, 0, -30, 179.9],
      [0, 0, 0, 180],
      [90, 0, -90, 0],
      [0, 0, 0, 0],
    ] as const)
      expect(small(at)).toBe(full(at));
  });

  test('points along a line alike', () => {
    const of = (g: typeof geographiclib) => {
      const { STANDARD, DISTANCE_IN } = g.Geodesic;
      const line = new g.Geodesic.Geodesic(a, f).InverseLine(50, 8, 46, 170, STANDARD | DISTANCE_IN);
      return [0, 0.3, 1].map((t) => line.Position(t * line.s13, STANDARD));
    };
    expect(of(lines)).toEqual(of(geographiclib));
  });
});

describe('style sheets made smaller', () => {
  test('white space and comments go, texts in quotes and spaces that mean something stay', () => {
    expect(
      minifiedCss(`
  /* a note */
  .a > .b:hover,
  .c :focus {
    content: ' %; { ';
    margin: 0 calc(1em + 2px);
    font: 12px/1 "A, B";
  }
`),
    ).toBe(` .a > .b:hover,.c :focus{content:' %; { ';margin:0 calc(1em + 2px);font:12px/1 "A, B"}`);
  });

  test('only in css templates, values put in untouched', () => {
    // biome-ignore lint/suspicious/noTemplateCurlyInString: a piece of source
    const source = 'const a = css`\n  .x {\n    width: ${  wide  };\n  }\n`; const b = html`<p>  a: b </p>`;';
    // biome-ignore lint/suspicious/noTemplateCurlyInString: a piece of source
    expect(withMinifiedCss(source)).toBe('const a = css` .x{width:${  wide  }}`; const b = html`<p>  a: b </p>`;');
  });
});

describe('what a page loads for one small element', () => {
  test.each([
    ['components/floors/plumb-floors.define.ts', 36_000, 33_000],
    ['components/pair/plumb-pair.define.ts', 63_000, 57_000],
  ])('%s stays under %i bytes by gzip, %i by brotli', async (entry, gzip, brotli) => {
    const { outputFiles } = await esbuild.build({
      absWorkingDir: root,
      entryPoints: [entry],
      bundle: true,
      minify: true,
      format: 'iife',
      target: 'es2022',
      charset: 'utf8',
      legalComments: 'eof',
      define: { __PLUMBTICK_VERSION__: '"0.0.0"' },
      write: false,
      plugins: [smallTemplates, smallPackages({ lines: false })],
    });
    const { contents } = outputFiles[0]!;
    expect(gzipSync(contents, { level: 9 }).length).toBeLessThan(gzip);
    expect(brotliCompressSync(contents).length).toBeLessThan(brotli);
  });
});
