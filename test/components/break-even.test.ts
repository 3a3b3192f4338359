import { expect, html, nextFrame } from '@open-wc/testing';
import { emulateMedia } from '@web/test-runner-commands';
import '../../components/break-even/plumb-break-even.define.js';
import '../../components/campaign/plumb-campaign.define.js';
import type { PlumbBreakEven } from '../../components/break-even/plumb-break-even.js';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import { fetchExample } from './example.js';
import { boxed, overflowing, words } from './within.js';

async function breakEven(
  text: string,
  widthPx = 1200,
  attributes = { b: '1.5 mm/√km', k: '0.1 mm/km' },
): Promise<PlumbBreakEven> {
  const host = await boxed<PlumbCampaign>(
    html`<plumb-campaign
      ><script type="application/json">${text}</script
      ><plumb-break-even b=${attributes.b} k=${attributes.k}></plumb-break-even
    ></plumb-campaign>`,
    widthPx,
  );
  const element = host.querySelector<PlumbBreakEven>('plumb-break-even')!;
  for (let i = 0; i < 50 && !element.shadowRoot!.querySelector('.say, .flt'); i++)
    await new Promise((r) => setTimeout(r, 20));
  // the width is told in a frame of its own
  for (let i = 0; i < 3; i++) await nextFrame();
  await element.updateComplete;
  return element;
}

const row = (element: PlumbBreakEven, id: string): string[] =>
  [...element.shadowRoot!.querySelectorAll('tbody tr')]
    .map((tr) => [...tr.children].map((c) => c.textContent!.replace(/\s+/g, ' ').trim()))
    .find(([name]) => name!.startsWith(id))!;

describe('plumb-break-even', () => {
  let three: string;
  before(async () => {
    three = await fetchExample();
  });

  it('says where the clocks pass the other methods; the smallest is bold', async () => {
    const element = await breakEven(three);
    // b²d + k²d² = u² at u = 21.7 mm: 132 km
    expect(words(element, '.say')).to.include('pass levelling beyond 132 km');
    expect(row(element, 'hr').slice(0, 5)).to.deep.equal(['hr 44.8 km', '22 mm', '11 mm', '19 mm', '132 km']);
    expect(row(element, 'rp')[5]).to.equal('never');
    expect(words(element, 'tr:first-child .smallest')).to.equal('11 mm');
    expect(words(element, '.note')).to.include('b = 1.5 mm/√km, k = 0.10 mm/km, as given');
  });

  it('draws three curves, a dot for each link, crossings where they are', async () => {
    const element = await breakEven(three);
    const svg = element.shadowRoot!.querySelector('svg[role=img]')!;
    const count = (selector: string) => svg.querySelectorAll(selector).length;
    expect([
      count('.s-curve'),
      count('.s-level-line'),
      count('.s-gnss-line'),
      count('.s-solid'),
      count('.s-open'),
    ]).to.deep.equal([1, 1, 1, 3, 2]);
    const right = [...svg.querySelectorAll('.s-open')].map((c) => Number(c.getAttribute('cx'))).at(-1)!;
    // 132.1 km on 1 … 1000 km
    expect(right).to.be.closeTo(58 + ((720 - 62 - 58) * Math.log10(132.1)) / 3, 0.5);
  });

  it('takes other numbers from its fields, and says which cannot be read', async () => {
    const element = await breakEven(three);
    const field = (name: string, text: string) => {
      const input = element.shadowRoot!.querySelector<HTMLInputElement>(`#${name}`)!;
      input.value = text;
      input.dispatchEvent(new Event('change', { bubbles: true }));
      return element.updateComplete;
    };
    await field('k', '1 mm/km');
    expect(row(element, 'hr')[2]).to.equal('46 mm');
    await field('b', '1,5 mm/√km');
    expect(words(element, '.flt')).to.include('levelling b').and.include('1,5 mm/√km').and.include('decimal point');
    expect(element.shadowRoot!.querySelector('#b')!.getAttribute('aria-invalid')).to.equal('true');
    await field('b', '');
    expect(row(element, 'hr')[2]).to.equal('45 mm');
  });

  it('compares with nothing where nothing is stated', async () => {
    const campaign = JSON.parse(three);
    for (const site of campaign.sites) site.determinations = [{ kind: 'potential', W: '62636000.0(1) m²/s²' }];
    const bare = { ...campaign, measurements: [], correlations: [] };
    const element = await breakEven(JSON.stringify(bare), 1200, { b: '', k: '' });
    element.b = null;
    element.k = null;
    await element.updateComplete;
    expect(words(element, '.say')).to.include('nothing to compare the clocks with');
    expect(row(element, 'hr').slice(2, 4)).to.deep.equal(['none', 'none']);
  });

  it('asks for a time where the campaign has no window', async () => {
    const campaign = JSON.parse(three);
    delete campaign.window;
    const element = await breakEven(JSON.stringify(campaign));
    expect(words(element, '.say')).to.include('no window');
    element.time = '10 d';
    await element.updateComplete;
    expect(words(element, '.note')).to.include('over 10 d on the wall');
  });

  it('fits 360 px and is accessible there and in the dark', async () => {
    const element = await breakEven(three, 360);
    expect(overflowing(element)).to.deep.equal([]);
    await expect(element).to.be.accessible();
    await emulateMedia({ colorScheme: 'dark' });
    await expect(element).to.be.accessible();
    await emulateMedia({ colorScheme: 'light' });
  }).timeout(20_000);
});
