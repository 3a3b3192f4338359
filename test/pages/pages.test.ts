import { readdirSync, readFileSync } from 'node:fs';
import type { Server } from 'node:http';
import { createRequire } from 'node:module';
import type { AxeResults } from 'axe-core';
import type { Browser } from 'puppeteer-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launch, watchedPage } from './browser.js';

const { serve } = (await import(/* @vite-ignore */ new URL('../../scripts/server.mjs', import.meta.url).href)) as {
  serve(options: { port: number }): Promise<{ server: Server; address: string }>;
};

const pages = readdirSync(new URL('../../sites', import.meta.url)).filter((name) => name.endsWith('.html'));
const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

// The pages that `npm start` serves, with what is built in dist/, as a new reader opens them.
describe.each(pages)('%s', (name) => {
  let browser: Browser;
  let running: { server: Server; address: string };
  beforeAll(async () => {
    running = await serve({ port: 0 });
    browser = await launch();
  });
  afterAll(async () => {
    await browser.close();
    running.server.close();
    running.server.closeAllConnections();
  });

  const open = async (width: number, scheme: 'light' | 'dark') => {
    const watched = await watchedPage(browser);
    await watched.page.setViewport({ width, height: 900 });
    await watched.page.emulateMediaFeatures([{ name: 'prefers-color-scheme', value: scheme }]);
    await watched.page.goto(new URL(name, running.address).href, { waitUntil: 'networkidle0' });
    return watched;
  };

  it('has nothing to complain of, and asks nobody but its own server', async () => {
    const { page, complaints, requests } = await open(1280, 'light');
    expect(complaints).toEqual([]);
    for (const request of requests)
      expect(request.startsWith(running.address) || request.startsWith('data:'), request).toBe(true);
    const unknown = await page.evaluate(() =>
      [...document.querySelectorAll('*')]
        .map((e) => e.localName)
        .filter((n) => n.includes('-') && !customElements.get(n)),
    );
    expect(unknown).toEqual([]);
    await page.close();
  });

  it.each(['light', 'dark'] as const)('axe finds nothing, %s', async (scheme) => {
    const { page } = await open(1280, scheme);
    await page.evaluate(axe);
    const violations = await page.evaluate(async () => {
      const { axe } = window as unknown as { axe: { run(): Promise<AxeResults> } };
      return (await axe.run()).violations.map(
        ({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join('; ')}`,
      );
    });
    expect(violations).toEqual([]);
    await page.close();
  });

  it('fits a screen 360 px wide without sideways scrolling', async () => {
    const { page } = await open(360, 'light');
    expect(await page.evaluate(() => document.scrollingElement?.scrollWidth)).toBeLessThanOrEqual(360);
    await page.close();
  });
});
