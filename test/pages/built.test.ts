import { execFileSync } from 'node:child_process';
import crypto from 'node:crypto';
import { accessSync, constants, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import type { Browser } from 'puppeteer-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launch, watchedPage } from './browser.js';

const root = fileURLToPath(new URL('../..', import.meta.url));
/** Inside the project, so that what is built finds its packages; not dist/, which someone may be using. */
const folder = path.join(root, 'node_modules', '.cache', `built-${process.pid}`);
const built = (name: string) => readFileSync(path.join(folder, name));
const { version } = JSON.parse(readFileSync(path.join(root, 'package.json'), 'utf8')) as { version: string };

beforeAll(() => {
  execFileSync(process.execPath, ['scripts/build.mjs', '--out', folder], { cwd: root });
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('what is built', () => {
  it('the single script starts with a byte order mark, without which a page in another encoding breaks Δ and ²', () => {
    expect([...built('plumbtick.js').subarray(0, 3)]).toEqual([0xef, 0xbb, 0xbf]);
  });

  it('the command line can be started by its name', () => {
    expect(built('cli.js').toString('utf8').split('\n', 1)[0]).toBe('#!/usr/bin/env node');
    accessSync(path.join(folder, 'cli.js'), constants.X_OK);
    expect(execFileSync(path.join(folder, 'cli.js'), ['--version'], { encoding: 'utf8' })).toBe(`${version}\n`);
  });

  it('the library can be imported, knows its version and is the one behind the schema', async () => {
    const library = (await import(/* @vite-ignore */ pathToFileURL(path.join(folder, 'index.js')).href)) as {
      version: string;
      campaignJsonSchema(): unknown;
    };
    expect(library.version).toBe(version);
    expect(JSON.parse(built('plumbtick-campaign.schema.json').toString('utf8'))).toEqual(library.campaignJsonSchema());
  });

  it('the self-contained page allows its own script by hash, and no request', () => {
    const page = built('standalone.html').toString('utf8');
    const script = /<script>([\s\S]*)<\/script>/.exec(page)?.[1] ?? '';
    const hash = crypto.createHash('sha256').update(script, 'utf8').digest('base64');
    expect(page).toContain(`script-src 'sha256-${hash}'`);
    expect(page).toContain("default-src 'none'");
    expect(page).not.toContain('connect-src');
    expect(script.length).toBeGreaterThan(built('plumbtick.js').length / 2);
    expect(page.match(/<\/script/gi)).toHaveLength(1);
  });
});

describe('opened from disk in a browser', () => {
  let browser: Browser;
  beforeAll(async () => {
    browser = await launch();
  });
  afterAll(() => browser.close());

  it('the self-contained page computes, asks for nothing and has nothing to complain of', async () => {
    const { page, complaints, requests } = await watchedPage(browser);
    await page.goto(pathToFileURL(path.join(folder, 'standalone.html')).href);
    await page.waitForFunction(() =>
      document.querySelector('plumb-floors')?.shadowRoot?.textContent?.includes('1348.14'),
    );
    expect(complaints).toEqual([]);
    expect(requests).toHaveLength(1);
    await page.close();
  });

  it('a page with one classic script tag works, in a page that is not declared as UTF-8 too', async () => {
    const { page, complaints } = await watchedPage(browser);
    const name = path.join(folder, 'latin1.html');
    writeFileSync(
      name,
      '<!doctype html><meta charset="iso-8859-1"><script src="plumbtick.js"></script>' +
        '<plumb-floors dh="12.348(3) m" g="9.8125(1) m/s&sup2;"></plumb-floors>',
    );
    await page.goto(pathToFileURL(name).href);
    await page.waitForFunction(() =>
      document.querySelector('plumb-floors')?.shadowRoot?.textContent?.includes('1348.14'),
    );
    const text = await page.evaluate(() => document.querySelector('plumb-floors')?.shadowRoot?.textContent ?? '');
    expect(text).toContain('m²/s²');
    expect(text).not.toContain('Â');
    expect(complaints).toEqual([]);
    await page.close();
  });
});
