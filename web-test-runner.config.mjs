import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { esbuildPlugin } from '@web/dev-server-esbuild';
import { chromeLauncher } from '@web/test-runner-chrome';
import * as esbuild from 'esbuild';
import { browserLaunch } from './scripts/browser-path.mjs';

const root = fileURLToPath(new URL('.', import.meta.url));
const commonjs = ['geographiclib-geodesic']; // packages without an ES module: bundled on the fly
const bundle = async (options) =>
  (await esbuild.build({ bundle: true, write: false, target: 'es2022', absWorkingDir: root, ...options }))
    .outputFiles[0].text;
const bundled = {
  name: 'bundled',
  resolveImport({ source, context }) {
    if (commonjs.includes(source)) return `/__esm/${source}.js`;
    if (source.startsWith('inline-worker:'))
      return `/__worker${path.posix.join(path.posix.dirname(context.path), source.slice(14))}.js`;
  },
  async serve({ path: p }) {
    if (p.startsWith('/__esm/'))
      return {
        type: 'js',
        body: await bundle({
          format: 'esm',
          stdin: { contents: `export { default } from '${p.slice(7, -3)}'`, resolveDir: root },
        }),
      };
    if (p.startsWith('/__worker/'))
      return {
        type: 'js',
        body: `export default ${JSON.stringify(await bundle({ format: 'iife', entryPoints: [p.slice(10, -3)] }))}`,
      };
  },
};
export default {
  files: 'test/components/**/*.test.ts',
  nodeResolve: { exportConditions: ['production', 'default'] },
  plugins: [bundled, esbuildPlugin({ ts: true, target: 'es2022', tsconfig: path.join(root, 'tsconfig.json') })],
  coverage: true,
  coverageConfig: {
    include: ['components/**/*.ts', 'lib/**/*.ts'],
    threshold: { statements: 50, lines: 50, branches: 0, functions: 0 },
  },
  browsers: [chromeLauncher({ launchOptions: await browserLaunch() })],
};
