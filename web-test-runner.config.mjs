import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { esbuildPlugin } from '@web/dev-server-esbuild';
import { defaultReporter } from '@web/test-runner';
import { chromeLauncher } from '@web/test-runner-chrome';
import * as esbuild from 'esbuild';
import { browserLaunch } from './scripts/browser-path.mjs';
import { closingLine } from './scripts/browser-reporter.mjs';

const root = fileURLToPath(new URL('.', import.meta.url));
const { version } = JSON.parse(fs.readFileSync(path.join(root, 'package.json'), 'utf8'));
const define = { __PLUMBTICK_VERSION__: JSON.stringify(version) };
const commonjs = ['geographiclib-geodesic', 'proj4']; // packages that give the browser no ES module: bundled on the fly
const bundle = async (options) =>
  (await esbuild.build({ bundle: true, write: false, target: 'es2022', absWorkingDir: root, define, ...options }))
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

let launchOptions;
try {
  launchOptions = await browserLaunch();
} catch (error) {
  console.error(error.message);
  process.exit(1);
}

export default {
  files: 'test/components/**/*.test.ts',
  hostname: '127.0.0.1', // a bare machine may not know the name localhost
  nodeResolve: { exportConditions: ['production', 'default'] },
  plugins: [bundled, esbuildPlugin({ ts: true, target: 'es2022', tsconfig: path.join(root, 'tsconfig.json'), define })],
  // Coverage of the elements; lib/ is covered under vitest, where its tests are. The limits only catch an element without tests.
  coverage: true,
  coverageConfig: {
    include: ['components/**/*.ts'],
    reportDir: 'coverage/browser',
    threshold: { statements: 60, lines: 60, branches: 50, functions: 50 },
  },
  reporters: [defaultReporter(), closingLine()],
  // generous: a busy machine is no fault
  testFramework: { config: { timeout: 20_000 } },
  testsStartTimeout: 60_000,
  testsFinishTimeout: 300_000,
  browsers: [chromeLauncher({ launchOptions })],
};
