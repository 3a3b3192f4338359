import { expect, html, nextFrame } from '@open-wc/testing';
import { emulateMedia, sendKeys, setViewport } from '@web/test-runner-commands';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import { timeTicks, timeTitle } from '../../components/charts/time-axis.js';
import type { PlumbTide } from '../../components/tide/plumb-tide.js';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/tide/plumb-tide.define.js';
import { tide } from '../../lib/answers/tide.js';
import { readCampaign } from '../../lib/campaign/read.js';
import { fetchExample } from './example.js';
import { boxed, overflowing, words } from './within.js';

async function shown(text: string, widthPx = 1216) {
  const script = document.createElement('script');
  script.type = 'application/json';
  script.textContent = text;
  const campaign = await boxed<PlumbCampaign>(
    html`<plumb-campaign>${script}<plumb-tide>fallback</plumb-tide></plumb-campaign>`,
    widthPx,
  );
  const element = campaign.querySelector<PlumbTide>('plumb-tide')!;
  for (let i = 0; i < 3; i++) await nextFrame();
  await element.updateComplete;
  return { campaign, element };
}

describe('plumb-tide', () => {
  afterEach(async () => {
    await emulateMedia({ media: 'screen' });
    await setViewport({ width: 1280, height: 900 });
  });

  it('says how far the tide moves a link and what averaging leaves, as lib/ computes it', async () => {
    const text = await fetchExample();
    const { campaign, element } = await shown(text);
    const answer = tide(readCampaign(text).campaign);
    campaign.link = 'rp';
    await campaign.updateComplete;
    await element.updateComplete;
    const rp = answer.links.find(({ id }) => id === 'rp')!;
    const units = (y: number) => String(Number((Math.abs(y) * 1e18).toPrecision(2)));
    expect(words(element, '.say')).to.contain(
      `moves rp by up to ${units(Math.max(rp.max, -rp.min))}e-18, rms ${units(rp.rms)}e-18.`,
    );
    expect(words(element, '.say')).to.contain(
      `${units(rp.left!.mean)}e-18 or 2 mm is left, harmless for a target of 30 mm.`,
    );
    const row = [...element.shadowRoot!.querySelectorAll('tbody tr')].find((one) => one.textContent?.includes('rp'))!;
    const cells = [...row.querySelectorAll('td')].map((cell) => cell.textContent?.trim());
    expect(cells[2]).to.equal((rp.rms * 1e18).toFixed(2));
    expect(cells.at(-1)).to.equal('not needed');
    expect(element.shadowRoot!.querySelectorAll('.fig .s-tide.held')).to.have.length(1);
  });

  it('draws the curve to its scale', async () => {
    const text = await fetchExample();
    const { element } = await shown(text);
    const answer = tide(readCampaign(text).campaign);
    const figure = element.shadowRoot!.querySelector('.fig')!;
    // px of the labelled values of the left axis
    const labels = [...figure.querySelectorAll('text')].filter(
      (one) => /^[+−]?\d+$/.test(one.textContent ?? '') && one.getAttribute('text-anchor') === 'end',
    );
    const at = (label: string) => Number(labels.find((one) => one.textContent === label)!.getAttribute('y')) - 4;
    const pxPerUnit = (at('0') - at('+2')) / 2;
    const path = figure.querySelector('.s-tide.spoken')!.getAttribute('d')!;
    const ys = path
      .slice(1)
      .split('L')
      .map((point) => Number(point.split(' ')[1]));
    const most = Math.max(...answer.links.map(({ max, min }) => Math.max(max, -min)));
    const drawn = Math.max(...ys.map((y) => Math.abs(at('0') - y)));
    expect(Math.abs(drawn / pxPerUnit - most * 1e18)).to.be.lessThan(0.02);
  });

  it('reads the curve by the arrow keys', async () => {
    const { element } = await shown(await fetchExample());
    element.shadowRoot!.querySelector<SVGSVGElement>('.fig')!.focus();
    await sendKeys({ press: 'End' });
    await element.updateComplete;
    expect(words(element, '.reading')).to.match(/^2027-06-21 00:00 UTC, (rp|ph|hr) [+−]\d\.\d\de-18/);
    await sendKeys({ press: 'Home' });
    await sendKeys({ press: 'ArrowRight' });
    await element.updateComplete;
    expect(words(element, '.reading')).to.match(/^2027-06-01 00:\d\d UTC/);
    await sendKeys({ press: 'Escape' });
    await element.updateComplete;
    expect(words(element, '.reading')).to.equal('');
  });

  it('names what the campaign lacks where it has no window', async () => {
    const file = JSON.parse(await fetchExample());
    delete file.window;
    const { element } = await shown(JSON.stringify(file));
    expect(words(element, '.flt')).to.match(/^Not computed where window read no window write "window":/);
  });

  it('clocks on one site feel one tide', async () => {
    const file = JSON.parse(await fetchExample());
    file.clocks.push({ ...file.clocks[0], id: 'second' });
    file.links = [{ id: 'bench', from: file.clocks[0].id, to: 'second' }];
    file.measurements = [];
    delete file.correlations;
    const { element } = await shown(JSON.stringify(file));
    expect(words(element, '.say')).to.equal('Both clocks stand on one piece of crust: the tide moves both alike.');
    expect(element.shadowRoot!.innerHTML).not.to.match(/NaN|Infinity/);
  });

  it('is accessible light, dark and at 328 px, and prints in ink', async () => {
    const { campaign, element } = await shown(await fetchExample());
    await expect(element).to.be.accessible();
    campaign.dataset['theme'] = 'dark';
    campaign.link = 'rp';
    await nextFrame();
    await element.updateComplete;
    await expect(element).to.be.accessible();
    await emulateMedia({ media: 'print' });
    expect(getComputedStyle(element.shadowRoot!.querySelector('.fig .s-tide.held')!).stroke).to.equal('rgb(0, 0, 0)');
    await emulateMedia({ media: 'screen' });
    await setViewport({ width: 360, height: 800 });
    const narrow = await shown(await fetchExample(), 328);
    expect(overflowing(narrow.element)).to.deep.equal([]);
    await expect(narrow.element).to.be.accessible();
  }).timeout(40_000);
});

describe('the axis of time', () => {
  const day = 86_400_000;
  const start = Date.UTC(2027, 8, 28, 6);

  it('days where there is room, every fifth where there is not, months and years beyond', () => {
    const labels = (days: number, widthPx: number) =>
      timeTicks(start, start + days * day, widthPx / (days * day), 50).map(({ label }) => label);
    expect(labels(4, 240)).to.deep.equal(['29', '30', 'Oct', '2']);
    expect(labels(40, 400)).to.deep.equal(['Oct', '6', '11', '16', '21', '26', 'Nov', '6']);
    expect(labels(120, 400)).to.deep.equal(['Oct', 'Nov', 'Dec', '2028']);
    expect(labels(0.5, 400)).to.deep.equal(['06 h', '09 h', '12 h', '15 h', '18 h']);
  });

  it('names the stretch', () => {
    expect(timeTitle(start, start + day)).to.equal('September 2027, UTC');
    expect(timeTitle(start, start + 10 * day)).to.equal('September to October 2027, UTC');
    expect(timeTitle(start, start + 120 * day)).to.equal('September 2027 to January 2028, UTC');
    // up to midnight of the first is still the month before
    expect(timeTitle(start, Date.UTC(2027, 9, 1))).to.equal('September 2027, UTC');
  });
});
