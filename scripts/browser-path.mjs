// Where a browser for the tests comes from: CHROME_PATH, an installed one, else the headless shell that the npm package
// @sparticuz/chromium carries (Linux x64), unpacked inside node_modules with the libraries and the font that come with it.
import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import zlib from 'node:zlib';

const installed = [
  '/usr/bin/chromium',
  '/usr/bin/google-chrome',
  '/usr/bin/google-chrome-stable',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  'C:/Program Files/Google/Chrome/Application/chrome.exe',
];
const args = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export async function browserLaunch() {
  const own =
    process.env.TEST_BROWSER !== 'packed' && [process.env.CHROME_PATH, ...installed].find((p) => p && fs.existsSync(p));
  if (own) return { executablePath: own, args };

  const pkg = fileURLToPath(import.meta.resolve('@sparticuz/chromium')).split(`${path.sep}build${path.sep}`)[0];
  const { version } = JSON.parse(fs.readFileSync(path.join(pkg, 'package.json'), 'utf8'));
  const dir = fileURLToPath(new URL(`../node_modules/.cache/browser-${version}`, import.meta.url));
  fs.mkdirSync(dir, { recursive: true });
  const tmp = process.env.TMPDIR;
  process.env.TMPDIR = dir; // the package unpacks into the temp folder: keep that per project and version
  const { default: chromium } = await import('@sparticuz/chromium');
  const executablePath = await chromium.executablePath();
  if (tmp === undefined) delete process.env.TMPDIR;
  else process.env.TMPDIR = tmp;
  if (!fs.existsSync(path.join(dir, 'lib', 'libnss3.so'))) {
    const tar = zlib.brotliDecompressSync(fs.readFileSync(path.join(pkg, 'bin', 'al2023.tar.br')));
    execFileSync('tar', ['x', '-C', dir], { input: tar });
  }
  const conf = path.join(dir, 'fonts.conf'); // without a font the renderer dies
  fs.writeFileSync(
    conf,
    `<?xml version="1.0"?><!DOCTYPE fontconfig SYSTEM "fonts.dtd"><fontconfig><dir>${dir}/fonts</dir><dir>/usr/share/fonts</dir><cachedir>${dir}/fc</cachedir></fontconfig>`,
  );
  const libs = [path.join(dir, 'lib'), process.env.LD_LIBRARY_PATH].filter(Boolean).join(':');
  return { executablePath, args, env: { ...process.env, FONTCONFIG_FILE: conf, LD_LIBRARY_PATH: libs } };
}
