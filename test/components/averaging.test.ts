import { expect, html, nextFrame, oneEvent } from '@open-wc/testing';
import { emulateMedia, sendKeys } from '@web/test-runner-commands';
import '../../components/averaging/plumb-averaging.define.js';
import '../../components/campaign/plumb-campaign.define.js';
import type { PlumbAveraging } from '../../components/averaging/plumb-averaging.js';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import { fetchExample } from './example.js';
import { boxed, overflowing, words } from './within.js';

async function averaging(text: string, widthPx = 1200): Promise<PlumbAveraging> {
  const host = await boxed<PlumbCampaign>(
    html`<plumb-campaign><script type="application/json">${text}</script><plumb-averaging></plumb-averaging></plumb-campaign>`,
    widthPx,
  );
  const element = host.querySelector<PlumbAveraging>('plumb-averaging')!;
  for (let i = 0; i < 50 && !element.shadowRoot!.querySelector('.say'); i++)
    await new Promise((r) => setTimeout(r, 20));
  // the width is told in a frame of its own
  for (let i = 0; i < 3; i++) await nextFrame();
  await element.updateComplete;
  return element;
}

const drawing = (element: PlumbAveraging) => element.shadowRoot!.querySelector<SVGSVGElement>('svg[role=img]')!;
const row = (element: PlumbAveraging, id: string): string[] =>
  [...element.shadowRoot!.querySelectorAll('tbody tr')]
    .map((tr) => [...tr.children].map((c) => c.textContent!.replace(/\s+/g, ' ').trim()))
    .find(([name]) => name === id)!;

// three-sites.plan.json: hr reaches 3 cm after 69 712 s (0.81 d) and shows 96 mm; rp and ph never
describe('plumb-averaging', () => {
  let three: string;
  before(async () => {
    three = await fetchExample();
  });

  it('says when the target is met, what limits, and what could be seen', async () => {
    const element = await averaging(three);
    expect(words(element, '.say')).to.match(
      /^Link hr reaches 30 mm after 0\.81 d, on 1 June 2027; systematic of r1 limits/,
    );
    expect(words(element, '.say')).to.include('A discrepancy of 96 mm against the prediction would show');
    expect(row(element, 'hr').slice(1)).to.deep.equal([
      '0.81 d1 June 2027',
      '22 mm',
      '21 mm',
      '96 mm',
      'systematic of r1',
    ]);
    expect(row(element, 'ph').slice(1, 3)).to.deep.equal(['never', '500 mm']);
    expect(words(element, '.note')).to.include('What limits hr: white noise of r1 up to 1.2 d, then systematic of r1.');
  });

  it('draws one link heavy, the others thin, target, floor, window and the crossing', async () => {
    const svg = drawing(await averaging(three));
    const count = (selector: string) => svg.querySelectorAll(selector).length;
    expect([
      count('.s-curve'),
      count('.s-thin'),
      count('.s-target'),
      count('.s-floor'),
      count('.s-window'),
    ]).to.deep.equal([1, 2, 1, 1, 1]);
    // the crossing lies on the curve: 0.807 d of 0.01 … 100 d, between the ends of the axis
    const circle = svg.querySelector('.s-open')!;
    const frame = svg.getBBox();
    expect(frame.width).to.be.lessThan(760);
    const [left, right] = [58, 720 - 62];
    const expected = left + ((right - left) * Math.log10(69_712.5 / 86_400 / 0.01)) / 4;
    expect(Number(circle.getAttribute('cx'))).to.be.closeTo(expected, 0.1);
    const strips = [...svg.querySelectorAll('.s-seg')].map((s) => Number(s.getAttribute('width')));
    expect(strips.reduce((a, b) => a + b, 0)).to.be.closeTo(right - left, 1e-6);
  });

  it('a link is taken in hand by keyboard, and the page hears of it', async () => {
    const element = await averaging(three);
    const button = [...element.shadowRoot!.querySelectorAll<HTMLButtonElement>('.pick')].find((b) =>
      b.textContent!.includes('rp'),
    )!;
    button.focus();
    const heard = oneEvent(element, 'plumb-select');
    await sendKeys({ press: 'Enter' });
    expect(((await heard) as CustomEvent<{ link: string }>).detail.link).to.equal('rp');
    await element.updateComplete;
    expect(words(element, '.say')).to.match(/^Link rp never reaches 30 mm: its floor is 69 mm, and offset of 171Yb/);
    expect(drawing(element).querySelectorAll('.s-open').length).to.equal(0);
    expect(button.getAttribute('aria-pressed')).to.equal('true');
  });

  it('shows a flywheel’s bridging as points, and says what it brings', async () => {
    const campaign = JSON.parse(three);
    campaign.clocks[1].uptime = 0.1;
    campaign.clocks[1].flywheel = { stability: { flicker: '1e-16' }, cycle: '1 d' };
    const element = await averaging(JSON.stringify(campaign));
    expect(drawing(element).querySelectorAll('.s-hollow').length).to.be.greaterThan(3);
    expect(words(element, '.note')).to.match(/Gaps of r1 bridged \(open dots\): .+ instead of .+ over the window/);
  });

  it('has words for what is missing', async () => {
    const campaign = JSON.parse(three);
    delete campaign.target;
    delete campaign.effect;
    delete campaign.window;
    const element = await averaging(JSON.stringify({ ...campaign, measurements: [], correlations: [] }));
    expect(row(element, 'hr')[1]).to.equal('none');
    const never = JSON.parse(three);
    for (const link of never.links) link.uptime = 0;
    expect(words(await averaging(JSON.stringify(never))))
      .to.include('never runs')
      .and.include('nothing to draw');
    const without = await averaging(JSON.stringify({ ...never, links: [], measurements: [], correlations: [] }));
    expect(words(without)).to.include('no links between clocks');
    const alone = await boxed<PlumbAveraging>(html`<plumb-averaging>Fallback</plumb-averaging>`, 600);
    expect(words(alone)).to.include('No campaign is loaded');
  });

  it('fits 360 px and is accessible there, in the dark and on paper', async () => {
    const element = await averaging(three, 360);
    expect(overflowing(element)).to.deep.equal([]);
    await expect(element).to.be.accessible();
    await emulateMedia({ colorScheme: 'dark' });
    await expect(element).to.be.accessible();
    await emulateMedia({ colorScheme: 'light', media: 'print' });
    expect(getComputedStyle(element.shadowRoot!.querySelector('.by')!).display).to.not.equal('none');
    await emulateMedia({ media: 'screen' });
  }).timeout(20_000);
});
