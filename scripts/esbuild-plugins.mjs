import path from 'node:path';
import * as esbuild from 'esbuild';
import { smallPackages } from './smaller.mjs';
/** import src from 'inline-worker:./x.worker.ts' -> the worker bundled as one classic script, as a string */
export const inlineWorker = {
  name: 'inline-worker',
  setup(b) {
    b.onResolve({ filter: /^inline-worker:/ }, (a) => ({
      path: path.resolve(a.resolveDir, a.path.slice(14)),
      namespace: 'inline-worker',
    }));
    b.onLoad({ filter: /.*/, namespace: 'inline-worker' }, async (a) => {
      const r = await esbuild.build({
        entryPoints: [a.path],
        bundle: true,
        minify: true,
        format: 'iife',
        target: 'es2022',
        charset: 'ascii', // the text goes through the page's own encoding
        define: b.initialOptions.define,
        external: b.initialOptions.external,
        legalComments: 'none', // the licences stand once, in the bundle that carries it
        plugins: [smallPackages({ lines: false })],
        write: false,
      });
      return { contents: r.outputFiles[0].text, loader: 'text', watchFiles: [a.path] };
    });
  },
};
