import fs from 'node:fs';
import * as esbuild from 'esbuild';
import { inlineWorker } from './esbuild-plugins.mjs';

const common = {
  bundle: true,
  target: 'es2022',
  charset: 'utf8',
  legalComments: 'inline',
  logLevel: 'warning',
  plugins: [inlineWorker],
  metafile: true,
};
fs.rmSync('dist', { recursive: true, force: true });
await Promise.all([
  esbuild.build({
    ...common,
    entryPoints: { index: 'lib/index.ts', components: 'components/index.ts' },
    outdir: 'dist',
    format: 'esm',
    packages: 'external',
    splitting: true,
    sourcemap: true,
  }),
  esbuild.build({
    ...common,
    entryPoints: ['components/index.ts'],
    outfile: 'dist/plumbtick.js',
    format: 'iife',
    globalName: 'plumbtick',
    minify: true,
  }),
  esbuild.build({
    ...common,
    entryPoints: ['lib/cli/index.ts'],
    outfile: 'dist/cli.js',
    format: 'esm',
    platform: 'node',
    target: 'node20',
    banner: {
      js: '#!/usr/bin/env node\nimport { createRequire as __cr } from "node:module"; const require = __cr(import.meta.url);',
    },
    minifySyntax: true,
  }),
]);
fs.chmodSync('dist/cli.js', 0o755);
const js = fs
  .readFileSync('dist/plumbtick.js', 'utf8')
  .replace(/<\/script/gi, '<\\/script')
  .replace(/<!--/g, '<\\!--');
fs.writeFileSync(
  'dist/standalone.html',
  `<!doctype html><html lang="en"><meta charset="utf-8"><title>Plumbtick</title><body><plumb-desk></plumb-desk><script>${js}</script></body></html>`,
);
