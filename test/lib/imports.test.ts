import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import ts from 'typescript';
import { describe, expect, it } from 'vitest';

const root = fileURLToPath(new URL('../..', import.meta.url));

interface Source {
  /** relative to the project, with forward slashes */
  readonly file: string;
  /** without comments */
  readonly code: string;
  readonly imports: readonly string[];
}

const sources = (folder: string): Source[] =>
  readdirSync(path.join(root, folder), { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile() && entry.name.endsWith('.ts'))
    .map((entry) => {
      const file = path.relative(root, path.join(entry.parentPath, entry.name)).replaceAll(path.sep, '/');
      const text = readFileSync(path.join(root, file), 'utf8');
      const imports = ts
        .preProcessFile(text, true, true)
        .importedFiles.map(({ fileName: to }) =>
          to.startsWith('.') ? path.posix.join(path.posix.dirname(file), to) : to,
        );
      const code = text.replace(/\/\*[\s\S]*?\*\//g, '').replace(/(^|\s)\/\/.*$/gm, '$1');
      return { file, code, imports };
    });

const lib = sources('lib');
const pure = lib.filter(({ file }) => !file.startsWith('lib/cli/'));
const components = sources('components');
const offending = (of: readonly Source[], bad: (to: string) => boolean) =>
  of.flatMap(({ file, imports }) => imports.filter(bad).map((to) => `${file} imports ${to}`));

describe('imports point one way', () => {
  it('the search itself finds imports', () => {
    expect(pure.length).toBeGreaterThan(50);
    expect(offending(pure, (to) => to === 'lib/campaign/fault.js').length).toBeGreaterThan(5);
  });

  it('lib/ knows neither elements nor the command line, nor Node', () => {
    expect(offending(pure, (to) => /^(components|lib\/cli)\/|^node:/.test(to))).toEqual([]);
  });

  it('elements know lib/, never the command line or Node', () => {
    expect(offending(components, (to) => /^(lib\/cli\/|node:)/.test(to))).toEqual([]);
  });

  it('answers know no files and no tables', () => {
    const answers = pure.filter(({ file }) => file.startsWith('lib/answers/'));
    expect(offending(answers, (to) => to.startsWith('lib/report/'))).toEqual([]);
  });

  it('lib/ takes a package only where it computes with it', () => {
    const packages = ['decimal.js', 'geographiclib-geodesic', 'proj4', 'astronomy-engine'];
    expect(offending(lib, (to) => !/^(lib\/|node:)/.test(to) && !packages.includes(to))).toEqual([]);
  });
});

describe('lib/ is a function of its arguments', () => {
  it.each([
    ['the clock', /\bDate\.now\b|\bnew Date\(\)|\bperformance\.now\b/],
    ['unseeded randomness', /\bMath\.random\b|\bcrypto\./],
    ['the network', /\bfetch\(|\bXMLHttpRequest\b|\bWebSocket\b/],
    ['the environment', /\bprocess\.|\bglobalThis\b|\blocalStorage\b/],
  ])('it never asks %s', (_, pattern) => {
    expect(pure.filter(({ code }) => pattern.test(code)).map(({ file }) => file)).toEqual([]);
  });
});
