// How long a reader waits in the uncertainty panel: from an edit to the next painted frame, in the browser of the tests, for a
// campaign of 50 sites and 200 links. No other program is known that shows the same. One frame is 16.7 ms.
import { readFileSync } from 'node:fs';
import puppeteer from 'puppeteer-core';
import { browserLaunch } from '../../scripts/browser-path.mjs';

export const name = 'uncertainty panel';

/** A chain of sites with GNSS and quasigeoid, levelling at every fifth, shared sources throughout. */
function campaign(siteCount, linkCount) {
  const ids = Array.from({ length: siteCount }, (_, i) => `s${i}`);
  return JSON.stringify({
    format: 'plumbtick-campaign/1',
    window: { start: '2027-09-06T00:00:00Z', end: '2027-09-27T00:00:00Z' },
    target: '3 cm',
    sources: [{ id: 'gnss', correlation: 0.3 }, { id: 'quasigeoid', correlationLength: '80 km' }, { id: 'levelling' }],
    datums: [{ id: 'd', W0: { value: '62636853.0(5) m²/s²', tide: 'mean' } }],
    sites: ids.map((id, i) => ({
      id,
      lat: 45 + (i % 40) * 0.2,
      lon: 5 + Math.floor(i / 40) * 0.3,
      g: '9.8070000(30) m/s²',
      h: { value: `${100 + i}.000(8) m`, tide: 'free', source: 'gnss' },
      determinations: [
        { kind: 'gnss-quasigeoid', zeta: { value: '45.000(20) m', tide: 'zero', source: 'quasigeoid' } },
        ...(i % 5 === 0
          ? [
              {
                kind: 'normal-height',
                datum: 'd',
                H: { value: `${55 + i}.000(30) m`, tide: 'mean', source: 'levelling' },
              },
            ]
          : []),
      ],
    })),
    clocks: ids.map((id) => ({
      id: `c-${id}`,
      site: id,
      transition: '87Sr',
      tie: [{ dH: '1.200(1) m' }],
      systematic: '1e-18',
      stability: { white: '1e-16' },
    })),
    links: Array.from({ length: linkCount }, (_, i) => ({
      id: `l${i}`,
      from: `c-s${i % siteCount}`,
      to: `c-s${(i + 1 + Math.floor(i / siteCount)) % siteCount}`,
    })),
  });
}

/** Runs in the page: medians of the times from an edit to the next painted frame, ms. */
async function measure() {
  const painted = () =>
    new Promise((resolve) => {
      requestAnimationFrame(() => {
        const { port1, port2 } = new MessageChannel();
        port1.onmessage = resolve;
        port2.postMessage(null);
      });
    });
  const panel = document.querySelector('plumb-budget');
  const median = (times) => times.sort((a, b) => a - b)[Math.floor(times.length / 2)];
  const rest = (ms) => new Promise((resolve) => setTimeout(resolve, ms));
  await rest(1500);
  const tries = [];
  for (let i = 0; i < 41; i++) {
    const radios = panel.shadowRoot.querySelector('.fac').querySelectorAll('input');
    await rest(40);
    const started = performance.now();
    radios[i % 2 === 0 ? 0 : 2].click();
    await panel.updateComplete;
    const worked = performance.now() - started;
    await painted();
    tries.push([worked, performance.now() - started]);
  }
  const script = document.querySelector('script[type="application/json"]');
  const edits = [];
  for (let i = 0; i < 15; i++) {
    await rest(400);
    const text = script.textContent.replace(/100\.000\(\d+\)/, `100.000(${8 + (i % 2)})`);
    const started = performance.now();
    script.textContent = text;
    await Promise.resolve();
    await panel.updateComplete;
    const worked = performance.now() - started;
    await painted();
    edits.push([worked, performance.now() - started]);
  }
  const both = (pairs) => ({ worked: median(pairs.map(([w]) => w)), painted: median(pairs.map(([, p]) => p)) });
  return { tries: both(tries), edits: both(edits) };
}

const ms = (value) => `${value.toPrecision(3)} ms`;

export async function run() {
  const browser = await puppeteer.launch(await browserLaunch());
  try {
    const page = await browser.newPage();
    await page.setViewport({ width: 1240, height: 900 });
    const script = readFileSync(new URL('../../dist/plumbtick.js', import.meta.url), 'utf8').replace(
      /<\/script/gi,
      '<\\/script',
    );
    await page.setContent(
      `<!doctype html><html lang="en"><meta charset="utf-8"><title>panel</title><plumb-campaign><script type="application/json">${campaign(50, 200)}</script><plumb-budget link="l3" trials="none"></plumb-budget></plumb-campaign><script>${script}</script>`,
    );
    const { tries, edits } = await page.evaluate(measure);
    const row = (label, { worked, painted }) => ({
      case: `50 sites, 200 links: ${label}`,
      ours: `${ms(painted)} to paint, ${ms(worked)} of it work`,
      reference: null,
      ratio: null,
      note: '',
    });
    return [row('what if, one factor', tries), row('campaign edited', edits)];
  } finally {
    await browser.close();
  }
}
