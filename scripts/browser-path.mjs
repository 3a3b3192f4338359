// Where a browser for the tests comes from: CHROME_PATH, an installed one, else the headless shell that the npm package
// @sparticuz/chromium carries (Linux x64), unpacked once per version together with the libraries and the font it needs.
// TEST_BROWSER=packed takes the packed one even where another is installed.
import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import zlib from 'node:zlib';

/** Root has no sandbox of its own; the rest keeps the browser from asking the network for anything. */
const args = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

const home = os.homedir();
const placesByPlatform = {
  linux: (process.env.PATH ?? '')
    .split(':')
    .flatMap((folder) =>
      ['chromium', 'google-chrome', 'google-chrome-stable', 'chrome'].map((name) => path.join(folder, name)),
    ),
  darwin: ['/Applications', path.join(home, 'Applications')].flatMap((folder) => [
    path.join(folder, 'Google Chrome.app/Contents/MacOS/Google Chrome'),
    path.join(folder, 'Chromium.app/Contents/MacOS/Chromium'),
  ]),
  win32: [process.env.PROGRAMFILES, process.env['PROGRAMFILES(X86)'], process.env.LOCALAPPDATA].flatMap((folder) =>
    folder ? [path.join(folder, 'Google/Chrome/Application/chrome.exe')] : [],
  ),
};

/** A file of that name may be a stub that only tells how to install a browser: ask it for its version. */
function starts(file) {
  if (process.platform === 'win32') return true; // there the question would open a window
  try {
    return /\d+\.\d+/.test(
      execFileSync(file, ['--version'], { encoding: 'utf8', timeout: 20_000, stdio: ['ignore', 'pipe', 'ignore'] }),
    );
  } catch {
    return false;
  }
}

function installedBrowser() {
  const given = process.env.CHROME_PATH;
  if (given) {
    if (fs.existsSync(given)) return given;
    throw new Error(`CHROME_PATH is ${given}, but there is no such file. Correct it, or run: unset CHROME_PATH`);
  }
  return (placesByPlatform[process.platform] ?? []).find((file) => fs.existsSync(file) && starts(file));
}

/** Unpacks into a folder of its own and renames it at the end: a run that was stopped half-way leaves nothing behind that looks whole. */
async function unpack(dir, archives) {
  const beside = `${dir}.${process.pid}`;
  fs.mkdirSync(beside, { recursive: true });
  const temp = process.env.TMPDIR;
  process.env.TMPDIR = beside; // the package unpacks into the temp folder
  try {
    const { default: chromium } = await import('@sparticuz/chromium');
    await chromium.executablePath();
  } finally {
    if (temp === undefined) delete process.env.TMPDIR;
    else process.env.TMPDIR = temp;
  }
  if (!fs.existsSync(path.join(beside, 'lib', 'libnss3.so')))
    execFileSync('tar', ['x', '-C', beside], {
      input: zlib.brotliDecompressSync(fs.readFileSync(path.join(archives, 'al2023.tar.br'))),
    });
  fs.chmodSync(path.join(beside, 'chromium'), 0o755);
  try {
    fs.renameSync(beside, dir);
  } catch (error) {
    if (!fs.existsSync(path.join(dir, 'chromium'))) throw error;
    fs.rmSync(beside, { recursive: true, force: true }); // another run was quicker
  }
}

function cacheFolder(version) {
  const inProject = fileURLToPath(new URL('../node_modules/.cache', import.meta.url));
  try {
    fs.mkdirSync(inProject, { recursive: true });
    fs.accessSync(inProject, fs.constants.W_OK);
    return path.join(inProject, `browser-${version}`);
  } catch {
    // node_modules belongs to someone else
    return path.join(os.tmpdir(), `plumbtick-browser-${version}-${os.userInfo().uid}`);
  }
}

async function packedBrowser() {
  const pkg = fileURLToPath(import.meta.resolve('@sparticuz/chromium')).split(`${path.sep}build${path.sep}`)[0];
  const { version } = JSON.parse(fs.readFileSync(path.join(pkg, 'package.json'), 'utf8'));
  const dir = cacheFolder(version);
  const executablePath = path.join(dir, 'chromium');
  if (!fs.existsSync(executablePath)) await unpack(dir, path.join(pkg, 'bin'));
  const cache = fs.mkdtempSync(path.join(os.tmpdir(), 'plumbtick-fonts-'));
  process.on('exit', () => fs.rmSync(cache, { recursive: true, force: true }));
  const fonts = path.join(cache, 'fonts.conf'); // without a font the renderer dies
  fs.writeFileSync(
    fonts,
    `<?xml version="1.0"?><!DOCTYPE fontconfig SYSTEM "fonts.dtd"><fontconfig><dir>${dir}/fonts</dir><dir>/usr/share/fonts</dir><cachedir>${cache}</cachedir></fontconfig>`,
  );
  const libraries = [path.join(dir, 'lib'), process.env.LD_LIBRARY_PATH].filter(Boolean).join(':');
  return { executablePath, args, env: { ...process.env, FONTCONFIG_FILE: fonts, LD_LIBRARY_PATH: libraries } };
}

const installCommand = {
  linux: 'sudo apt-get install -y chromium   (or set CHROME_PATH to a Chrome or Chromium that you have)',
  darwin: 'brew install --cask google-chrome   (or set CHROME_PATH to a Chrome or Chromium that you have)',
  win32: 'winget install Google.Chrome   (or set CHROME_PATH to a Chrome or Chromium that you have)',
};

/** Launch options (executablePath, args, env) of the browser that the tests run in. */
export async function browserLaunch() {
  const installed = process.env.TEST_BROWSER === 'packed' ? undefined : installedBrowser();
  if (installed) return { executablePath: installed, args };
  if (process.platform === 'linux' && process.arch === 'x64') return packedBrowser();
  throw new Error(
    `The browser tests need Chrome or Chromium, and none was found (${process.platform} ${process.arch}).\nRun: ${installCommand[process.platform] ?? 'CHROME_PATH=/path/to/chromium npm test'}`,
  );
}
