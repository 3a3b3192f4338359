import { execFileSync } from 'node:child_process';
import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import http from 'node:http';
import type { AddressInfo } from 'node:net';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { deflateSync } from 'node:zlib';
import type { Browser, Page } from 'puppeteer-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { writeFragment } from '../../lib/campaign/fragment.js';
import { wikiText } from '../../lib/report/wiki-forms.js';
import { launch, watchedPage } from './browser.js';

const root = fileURLToPath(new URL('../..', import.meta.url));
const folder = path.join(root, 'node_modules', '.cache', `ways-${process.pid}`);
const campaign = readFileSync(path.join(root, 'test/data/examples/three-sites.json'), 'utf8');
const report = {
  title: 'Three sites',
  sentences: ['hr agrees.'],
  tables: [],
  conventions: [],
  cautions: [],
  provenance: 'by hand',
};
const pack = async (bytes: Uint8Array) => new Uint8Array(deflateSync(bytes, { level: 9 }));
const fragment = (show: readonly string[]) => writeFragment({ campaign, link: 'rp', show }, pack);
/** As a strict site would set it. */
const POLICY = "default-src 'none'; script-src 'self'; style-src 'self'";

let browser: Browser;
let server: http.Server;
let origin: string;
/** pages by their address, with the policy they are served under */
const pages = new Map<string, { readonly body: string; readonly policy?: string }>();

beforeAll(async () => {
  execFileSync(process.execPath, ['scripts/build.mjs', '--out', folder], { cwd: root });
  browser = await launch();
  server = http.createServer((request, response) => {
    const name = (request.url ?? '').split(/[?#]/, 1)[0]!.slice(1);
    const page = pages.get(name);
    if (page) {
      response.writeHead(200, {
        'Content-Type': 'text/html; charset=utf-8',
        ...(page.policy ? { 'Content-Security-Policy': page.policy } : {}),
      });
      response.end(page.body);
      return;
    }
    try {
      const body = readFileSync(path.join(folder, path.basename(name)));
      response.writeHead(200, {
        'Content-Type': name.endsWith('.js')
          ? 'text/javascript'
          : name.endsWith('.json')
            ? 'application/json'
            : 'text/html; charset=utf-8',
      });
      response.end(body);
    } catch {
      response.writeHead(404);
      response.end();
    }
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  origin = `http://127.0.0.1:${(server.address() as AddressInfo).port}`;
});
afterAll(async () => {
  await browser.close();
  server.close();
  server.closeAllConnections();
  rmSync(folder, { recursive: true, force: true });
});

const scriptForm = () =>
  wikiText('script', { campaign, report, show: ['section', 'links'], link: null, script: 'plumbtick.js', address: '' });

const text = (page: Page, tag: string, selector: string) =>
  page
    .waitForFunction(
      (t, s) => document.querySelector(t)?.shadowRoot?.querySelector(s)?.textContent?.replace(/\s+/g, ' ').trim(),
      {},
      tag,
      selector,
    )
    .then((handle) => handle.jsonValue());

describe('script and elements', () => {
  it('what the page gave to copy works under a policy that forbids every request', async () => {
    pages.set('strict.html', {
      body: `<!doctype html><html lang="en"><title>wiki</title>${scriptForm()}`,
      policy: POLICY,
    });
    const { page, complaints } = await watchedPage(browser);
    await page.goto(`${origin}/strict.html`);
    expect(await text(page, 'plumb-links', '.say')).toContain('hr agrees with its prediction');
    expect(await text(page, 'plumb-section', '.say')).toContain('ridge lies 851 m above plain');
    expect(complaints).toEqual([]);
    await page.close();
  });

  it('and a src says that this page may not read it, and what to do', async () => {
    pages.set('blocked.html', {
      body: '<!doctype html><html lang="en"><title>wiki</title><script src="plumbtick.js" defer></script><plumb-campaign src="three.json"><plumb-links>old table</plumb-links></plumb-campaign>',
      policy: POLICY,
    });
    pages.set('three.json', { body: campaign });
    const { page } = await watchedPage(browser);
    await page.goto(`${origin}/blocked.html`);
    const fault = await text(page, 'plumb-campaign', '.flt');
    expect(fault).toContain('read three.json why not read');
    expect(fault).toContain('at an address this page may read');
    await page.close();
  });

  it('works opened from disk', async () => {
    const file = path.join(folder, 'pasted.html');
    writeFileSync(file, `<!doctype html><meta charset="utf-8"><title>wiki</title>${scriptForm()}`);
    const { page, complaints } = await watchedPage(browser);
    await page.goto(pathToFileURL(file).href);
    expect(await text(page, 'plumb-links', '.say')).toContain('hr agrees with its prediction');
    expect(complaints).toEqual([]);
    await page.close();
  });

  it('prints whole: no control, the section no wider than the paper', async () => {
    const { page } = await watchedPage(browser);
    await page.goto(`${origin}/strict.html`);
    await text(page, 'plumb-section', '.say');
    const pdf = await page.pdf({ format: 'A4', margin: { top: '12mm', right: '16mm', bottom: '15mm', left: '16mm' } });
    expect(pdf.length).toBeGreaterThan(20_000);
    await page.emulateMediaType('print');
    const shown = await page.evaluate(
      () =>
        [...document.querySelectorAll('plumb-section, plumb-links')].flatMap((element) =>
          [...element.shadowRoot!.querySelectorAll('.btn, .word, .reading')].filter(
            (one) => one.getClientRects().length > 0,
          ),
        ).length,
    );
    expect(shown).toBe(0);
    await page.close();
  });
});

describe('a frame of the offline page', () => {
  it('without rights of its own shows the campaign of its address and tells its height, a number', async () => {
    const address = `${origin}/standalone.html#${await fragment(['links'])}`;
    const framed = wikiText('iframe', { campaign, report, show: ['links'], link: 'rp', script: '', address });
    pages.set('framed.html', {
      body: `<!doctype html><html lang="en" dir="rtl"><title>wiki</title><link rel="icon" href="data:,"><script>window.heard=[];addEventListener('message',(e)=>heard.push(e.data))</script>${framed}`,
    });
    const { page, complaints } = await watchedPage(browser);
    await page.goto(`${origin}/framed.html`);
    const element = await page.waitForSelector('iframe');
    const frame = (await element!.contentFrame())!;
    await frame.waitForFunction(() => {
      const campaignElement = document.querySelector('plumb-embed')?.shadowRoot?.querySelector('plumb-campaign');
      return campaignElement?.querySelector('plumb-links')?.shadowRoot?.textContent?.includes('hr agrees');
    });
    await page.waitForFunction(() => Number(document.querySelector('iframe')?.getAttribute('height')) !== 900);
    const heard = await page.evaluate(() => (window as unknown as { heard: unknown[] }).heard);
    expect(heard.length).toBeGreaterThan(0);
    expect(heard.every((data) => typeof data === 'number' && data > 100)).toBe(true);
    // the frame is now as high as what is in it: nothing is cut off, nothing much is left empty
    const gap = await frame.evaluate(() => window.innerHeight - document.body.getBoundingClientRect().bottom);
    expect(gap).toBeGreaterThanOrEqual(0);
    expect(gap).toBeLessThan(40);
    // no storage, no clipboard in there; nothing of it is complained of
    expect(complaints).toEqual([]);
    await page.close();
  });

  it('says in the frame that its address was cut off', async () => {
    const whole = await fragment(['links']);
    const { page } = await watchedPage(browser);
    await page.goto(`${origin}/standalone.html#${whole.slice(0, whole.length - 200)}`);
    await page.waitForFunction(() => {
      const campaignElement = document.querySelector('plumb-embed')?.shadowRoot?.querySelector('plumb-campaign');
      return campaignElement?.shadowRoot?.textContent?.includes('it was cut off on its way');
    });
    await page.close();
  });

  it('opened from disk with a campaign in its address', async () => {
    const { page, complaints, requests } = await watchedPage(browser);
    await page.goto(`${pathToFileURL(path.join(folder, 'standalone.html')).href}#${await fragment(['section'])}`);
    await page.waitForFunction(() => {
      const campaignElement = document.querySelector('plumb-embed')?.shadowRoot?.querySelector('plumb-campaign');
      return campaignElement?.querySelector('plumb-section')?.shadowRoot?.textContent?.includes('ridge lies');
    });
    expect(complaints).toEqual([]);
    expect(requests).toHaveLength(1);
    await page.close();
  });
});

describe('a static table', () => {
  it('the HTML form needs neither script nor style', async () => {
    const html = wikiText('html', {
      campaign,
      report: {
        ...report,
        tables: [
          {
            id: 't',
            title: 'Links',
            columns: [{ head: 'link', unit: null, kind: 'text' }],
            rows: [[{ kind: 'text', text: 'hr' }]],
            notes: [],
          },
        ],
      },
      show: [],
      link: null,
      script: '',
      address: '',
    });
    pages.set('static.html', {
      body: `<!doctype html><html lang="en"><title>wiki</title>${html}`,
      policy: "default-src 'none'",
    });
    const { page, complaints } = await watchedPage(browser);
    await page.goto(`${origin}/static.html`);
    expect(await page.$eval('table', (table) => table.textContent?.replace(/\s+/g, ' ').trim())).toContain('hr');
    expect(complaints).toEqual([]);
    await page.close();
  });
});
