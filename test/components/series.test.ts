import { expect } from '@open-wc/testing';
import { html } from 'lit';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/series/plumb-series.define.js';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import type { PlumbSeries } from '../../components/series/plumb-series.js';
import { whiteFm } from '../lib/clocks/simulated-noise.js';
import { boxed, overflowing, words } from './within.js';

const PLANTED = 1.0884e-14;
/** Ten-minute samples from 1 June 2027 on, a gap of four hours in them. */
const rows = (noise = 4e-17, count = 288) =>
  [...whiteFm(count, noise, 11)]
    .flatMap((n, i) =>
      i >= 100 && i < 124 ? [] : [`${(61557 + i / 144).toFixed(8)} ${(PLANTED + n).toExponential(12)}`],
    )
    .join('\n');

const campaign = (more: object = {}) =>
  JSON.stringify({
    format: 'plumbtick-campaign/1',
    effect: '50 cm',
    sites: ['a', 'b'].map((id, i) => ({
      id,
      lat: 47 + 0.8 * i,
      lon: 8,
      g: 9.81,
      determinations: [{ kind: 'normal-height', H: { value: `${100 * i}.00(2) m`, tide: 'mean' } }],
    })),
    clocks: ['a', 'b'].map((id) => ({ id: `k${id}`, site: id, transition: '87Sr', systematic: '2e-18', ...more })),
    links: [{ id: 'ab', from: 'ka', to: 'kb' }],
    measurements: [{ id: 'm', link: 'ab', y: '1.0884(1)e-14' }],
  });

async function settled(element: PlumbSeries): Promise<PlumbSeries> {
  for (let i = 0; i < 100 && !element.shadowRoot!.querySelector('table, .flt'); i++)
    await new Promise((r) => setTimeout(r, 20));
  await element.updateComplete;
  return element;
}

const alone = async (text: string, widthPx = 1000) =>
  settled(
    await boxed<PlumbSeries>(html`<plumb-series><script type="text/plain">${text}</script></plumb-series>`, widthPx),
  );

async function inside(more: object = {}, measurement = 'm', widthPx = 1000): Promise<PlumbSeries> {
  const host = await boxed<PlumbCampaign>(
    html`<plumb-campaign
      ><script type="application/json">
        ${campaign(more)}</script
      ><plumb-series measurement=${measurement}><script type="text/plain">${rows()}</script></plumb-series
    ></plumb-campaign>`,
    widthPx,
  );
  return settled(host.querySelector<PlumbSeries>('plumb-series')!);
}

const drawings = (element: PlumbSeries) => [...element.shadowRoot!.querySelectorAll('svg[role=img]')];

describe('plumb-series', () => {
  it('shows data without a campaign: dots, gap empty, deviations, mean', async () => {
    const element = await alone(rows());
    expect(words(element, '.say')).to.match(/^The mean of 264 samples is \+10\.88\d+\(\d+\)e-15/);
    const [time, deviation, running] = drawings(element);
    const xs = [...time!.querySelectorAll('circle.s-solid')].map((c) => Number(c.getAttribute('cx')));
    expect(xs.length).to.equal(264);
    const steps = xs.slice(1).map((x, i) => x - xs[i]!);
    // one step is 25 samples long
    expect(Math.max(...steps) / Math.min(...steps)).to.be.within(20, 30);
    const table = element.shadowRoot!.querySelectorAll('table')[0]!;
    expect(deviation!.querySelectorAll('circle.s-solid').length).to.equal(table.tBodies[0]!.rows.length);
    expect(running!.querySelectorAll('path.s-u').length).to.equal(2);
    expect(words(element, '.note')).to.include('1.83 d of valid data, 4 h without');
  });
  it('draws many samples as one stroke per column of px, with the extremes in it', async () => {
    const element = await alone(rows(4e-17, 6000));
    const [time] = drawings(element);
    expect(time!.querySelectorAll('circle.s-solid').length).to.equal(0);
    const strokes = time!.querySelector('path.s-range')!.getAttribute('d')!.split('M').length - 1;
    expect(strokes).to.be.within(700, 1000);
  });
  it('stands beside the prediction inside a campaign, as the measurement it is', async () => {
    const element = await inside();
    expect(words(element, '.say'))
      .to.match(/^The mean (agrees|differs|lies)/)
      .and.to.match(/would have shown/);
    const [time, , running] = drawings(element);
    expect(time!.querySelectorAll('rect.s-band').length).to.equal(1);
    expect(running!.querySelectorAll('rect.s-band').length).to.equal(1);
    expect(words(element, '.warnings')).to.include('The tide was taken off');
  });
  it('shows what lies outside the stated validity as open dots', async () => {
    const element = await inside({ available: [{ start: '2027-06-01T00:00:00Z', end: '2027-06-02T12:00:00Z' }] });
    const [time] = drawings(element);
    expect(time!.querySelectorAll('circle.s-invalid').length).to.equal(72);
    expect(words(element, '.note')).to.include('72 samples outside the stated validity');
  });
  it('says what is wrong: the data, the measurement, no campaign round it', async () => {
    expect(words(await alone(`${rows()}\n61560.0 oops\n`), '.flt'))
      .to.include('line 265')
      .and.include('oops');
    expect(words(await inside({}, 'x'), '.flt')).to.include('one of m');
    const lonely = await settled(
      await boxed<PlumbSeries>(
        html`<plumb-series measurement="m"><script type="text/plain">${rows()}</script></plumb-series>`,
        600,
      ),
    );
    expect(words(lonely, '.flt')).to.include('<plumb-campaign>');
    const missing = await settled(
      await boxed<PlumbSeries>(html`<plumb-series src="/nowhere.csv"></plumb-series>`, 600),
    );
    expect(words(missing, '.flt')).to.include('404');
  });
  it('without data says what to do', async () => {
    const element = await boxed<PlumbSeries>(html`<plumb-series>Fallback</plumb-series>`, 600);
    expect(words(element)).to.include('No data.');
  });
  it('is accessible, and fits 360 px', async () => {
    const element = await inside({}, 'm', 360);
    await expect(element).to.be.accessible();
    expect(overflowing(element)).to.deep.equal([]);
  });
});
