// Builds dist/: the library and the elements as ES modules, one classic script for a <script> tag, the command line,
// the JSON Schema of the campaign file and one HTML page that works from disk. `--types` also writes the declarations;
// `--cli FILE` builds the command line alone, `--out FOLDER` everything into a folder other than dist/.
// Files are written beside and renamed, so that a page or a test never reads half of one.
import { execFileSync } from 'node:child_process';
import crypto from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import * as esbuild from 'esbuild';
import { inlineWorker } from './esbuild-plugins.mjs';
import { smallPackages, smallTemplates } from './smaller.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
const { version } = JSON.parse(fs.readFileSync(path.join(root, 'package.json'), 'utf8'));
/** In a page that is not declared as UTF-8 the byte order mark is what keeps Δ and ² whole: tagged templates can't be escaped. */
const byteOrderMark = '\uFEFF';

const common = {
  absWorkingDir: root,
  bundle: true,
  write: false,
  target: 'es2022',
  charset: 'utf8',
  logLevel: 'warning',
  define: { __PLUMBTICK_VERSION__: JSON.stringify(version) },
  plugins: [inlineWorker],
  outdir: 'dist',
};

/** What a <script> tag loads. */
const classicScript = { format: 'iife', minify: true, legalComments: 'eof' };
const classicNames = ['plumbtick.js', 'plumb-floors.js', 'plumb-pair.js'];

/** The command line in one file, that of its packages included. */
const commandLine = {
  ...common,
  entryPoints: { cli: 'lib/cli/index.ts' },
  format: 'esm',
  platform: 'node',
  target: 'node20',
  minifySyntax: true, // not the names: they stand in messages
  minifyWhitespace: true,
  legalComments: 'inline',
  banner: {
    // bundled CommonJS packages may call require
    js: '#!/usr/bin/env node\nimport { createRequire as __createRequire } from "node:module"; const require = __createRequire(import.meta.url);',
  },
};

/** Text of the self-contained page: the script inline, under a policy that allows this script alone and no request at all. */
function standalonePage(script) {
  const inline = script.replace(/<\/script/gi, '<\\/script').replace(/<!--/g, '<\\!--');
  const hash = crypto.createHash('sha256').update(inline, 'utf8').digest('base64');
  const template = fs.readFileSync(path.join(root, 'scripts', 'standalone.template.html'), 'utf8');
  const put = (page, mark, text) => {
    if (!page.includes(mark)) throw new Error(`scripts/standalone.template.html has lost its ${mark}`);
    return page.replaceAll(mark, () => text);
  };
  const page = put(put(template, 'SCRIPT-HASH', `sha256-${hash}`), 'VERSION', version);
  return put(page, '<!-- SCRIPT -->', `<script>${inline}</script>`); // last: nothing inside the script is a mark
}

function write(file, contents, mode = 0o644) {
  fs.mkdirSync(path.dirname(file), { recursive: true });
  const beside = `${file}.${process.pid}.tmp`;
  fs.writeFileSync(beside, contents, { mode });
  fs.renameSync(beside, file);
}

function files(folder) {
  if (!fs.existsSync(folder)) return [];
  return fs.readdirSync(folder, { withFileTypes: true, recursive: true }).flatMap((entry) => {
    return entry.isFile() ? [path.join(entry.parentPath, entry.name)] : [];
  });
}

const ownFolder = path.join(root, 'dist');

export async function build({ types = false, dist = ownFolder } = {}) {
  const results = await Promise.all([
    esbuild.build({
      ...common,
      plugins: [inlineWorker, smallTemplates],
      entryPoints: { index: 'lib/index.ts', components: 'components/index.ts' },
      format: 'esm',
      packages: 'external',
      splitting: true,
      sourcemap: true,
      legalComments: 'inline',
    }),
    esbuild.build({
      ...common,
      ...classicScript,
      plugins: [inlineWorker, smallTemplates, smallPackages({ lines: true })],
      entryPoints: { plumbtick: 'components/index.ts' },
      globalName: 'plumbtick',
    }),
    // for a page that wants one of the small elements alone
    esbuild.build({
      ...common,
      ...classicScript,
      plugins: [inlineWorker, smallTemplates, smallPackages({ lines: false })],
      entryPoints: {
        'plumb-floors': 'components/floors/plumb-floors.define.ts',
        'plumb-pair': 'components/pair/plumb-pair.define.ts',
      },
    }),
    esbuild.build(commandLine),
  ]);
  const written = new Set();
  const put = (file, contents, mode) => {
    write(file, contents, mode);
    written.add(file);
  };
  for (const { path: file, text } of results.flatMap((result) => result.outputFiles)) {
    const name = path.basename(file);
    const target = path.join(dist, name);
    if (classicNames.includes(name)) {
      put(target, byteOrderMark + text);
      if (name === 'plumbtick.js') put(path.join(dist, 'standalone.html'), standalonePage(text));
    } else put(target, text, name === 'cli.js' ? 0o755 : 0o644);
  }
  const { campaignJsonSchema } = await import(`${pathToFileURL(path.join(dist, 'index.js'))}?${Date.now()}`);
  put(path.join(dist, 'plumbtick-campaign.schema.json'), `${JSON.stringify(campaignJsonSchema(), null, 2)}\n`);

  const declarations = path.join(dist, 'types');
  // what an earlier build left; never in a folder that may hold something else
  for (const file of dist === ownFolder ? files(dist) : [])
    if (!written.has(file) && !file.startsWith(declarations) && !file.endsWith('.tmp'))
      fs.rmSync(file, { force: true });
  if (types) {
    fs.rmSync(declarations, { recursive: true, force: true });
    execFileSync(process.execPath, [path.join(root, 'node_modules/typescript/bin/tsc'), '-p', 'tsconfig.build.json'], {
      cwd: root,
      stdio: 'inherit',
    });
  }
  return [...written].sort();
}

/** Only the command line, to a file of its own: for its tests, which then need no build before. */
async function buildCommandLine(file) {
  const { outputFiles } = await esbuild.build(commandLine);
  write(path.resolve(file), outputFiles[0].text, 0o755);
}

if (process.argv[1] && pathToFileURL(process.argv[1]).href === import.meta.url) {
  try {
    const started = performance.now();
    const only = process.argv.indexOf('--cli');
    const folder = process.argv.indexOf('--out');
    if (only > 0) {
      await buildCommandLine(process.argv[only + 1]);
      process.exit(0);
    }
    const written = await build({
      types: process.argv.includes('--types'),
      ...(folder > 0 ? { dist: path.resolve(process.argv[folder + 1]) } : {}),
    });
    for (const file of written.filter((name) => !name.endsWith('.map')))
      console.log(`${path.relative(root, file).padEnd(44)} ${String(fs.statSync(file).size).padStart(8)} B`);
    console.log(`built ${version} in ${((performance.now() - started) / 1000).toFixed(1)} s`);
  } catch (error) {
    // esbuild and tsc have already said on standard error what is wrong and where
    if (!error.errors && error.status === undefined) console.error(error);
    process.exitCode = 1;
  }
}
