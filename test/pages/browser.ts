import type { Browser, LaunchOptions, Page } from 'puppeteer-core';
import puppeteer from 'puppeteer-core';

const { browserLaunch } = (await import(
  /* @vite-ignore */ new URL('../../scripts/browser-path.mjs', import.meta.url).href
)) as { browserLaunch(): Promise<LaunchOptions> };

export const launch = async (): Promise<Browser> => puppeteer.launch({ ...(await browserLaunch()), headless: true });

/** A page and everything on it that a reader of its console or network panel would frown at. */
export interface WatchedPage {
  readonly page: Page;
  readonly complaints: string[];
  readonly requests: string[];
}

export async function watchedPage(browser: Browser): Promise<WatchedPage> {
  const page = await browser.newPage();
  const complaints: string[] = [];
  const requests: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warn')
      complaints.push(`${message.type()}: ${message.text()}`);
  });
  page.on('pageerror', (error) => complaints.push(`uncaught: ${String(error)}`));
  page.on('requestfailed', (request) => complaints.push(`failed: ${request.url()}`));
  page.on('response', (response) => {
    if (response.status() >= 400 && !response.url().endsWith('/favicon.ico'))
      complaints.push(`${response.status()}: ${response.url()}`);
  });
  page.on('request', (request) => requests.push(request.url()));
  await page.evaluateOnNewDocument(() => {
    document.addEventListener('securitypolicyviolation', (event) =>
      console.error(`refused by the policy: ${event.violatedDirective} ${event.blockedURI} ${event.sample}`),
    );
  });
  return { page, complaints, requests };
}
