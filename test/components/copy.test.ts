import { aTimeout, expect, html, nextFrame } from '@open-wc/testing';
import { setViewport } from '@web/test-runner-commands';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import type { PlumbCopy } from '../../components/copy/plumb-copy.js';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/copy/plumb-copy.define.js';
import { readFragment } from '../../lib/campaign/fragment.js';
import { readCampaign } from '../../lib/campaign/read.js';
import { fetchExample } from './example.js';
import { boxed, button, overflowing, words } from './within.js';

async function shown(text: string, widthPx = 900) {
  const script = document.createElement('script');
  script.type = 'application/json';
  script.textContent = text;
  const campaign = await boxed<PlumbCampaign>(
    html`<plumb-campaign>${script}<plumb-copy show="section,links"></plumb-copy></plumb-campaign>`,
    widthPx,
  );
  const copy = campaign.querySelector<PlumbCopy>('plumb-copy')!;
  await nextFrame();
  await copy.updateComplete;
  button(copy, 'Copy for this wiki…').click();
  await copy.updateComplete;
  return { campaign, copy };
}

const area = (copy: PlumbCopy) => copy.shadowRoot!.querySelector('textarea')!;

async function as(copy: PlumbCopy, name: string): Promise<string> {
  const choice = [...copy.shadowRoot!.querySelectorAll('label')].find((label) => label.textContent?.trim() === name)!;
  choice.querySelector('input')!.click();
  copy.text = '';
  for (let i = 0; i < 100 && copy.text === ''; i++) await aTimeout(10);
  await copy.updateComplete;
  return area(copy).value;
}

describe('plumb-copy', () => {
  afterEach(() => setViewport({ width: 1280, height: 900 }));

  it('gives script and elements with the campaign inside', async () => {
    const text = await fetchExample();
    const { copy } = await shown(text);
    for (let i = 0; i < 100 && copy.text === ''; i++) await aTimeout(10);
    await copy.updateComplete;
    const written = area(copy).value;
    const inside = /<script type="application\/json">\n([\s\S]*?)\n<\/script>/.exec(written)![1]!;
    expect(readCampaign(inside).campaign.links.map(({ id }) => id)).to.deep.equal(['hr', 'rp', 'ph']);
    expect(written).to.contain('<plumb-section></plumb-section>');
  });

  it('gives a frame whose address carries the campaign, and warns of one that is too long', async () => {
    // a note that does not pack
    const note = Array.from({ length: 1200 }, (_, i) =>
      String.fromCharCode(97 + (Math.floor(26 * ((Math.sin(i * 12.9898) * 43758.5453) % 1) + 26) % 26)),
    ).join('');
    const text = JSON.stringify({ ...JSON.parse(await fetchExample()), note });
    const { campaign, copy } = await shown(text);
    campaign.link = 'rp';
    await campaign.updateComplete;
    const written = await as(copy, 'iframe');
    const address = /src="([^"]+)"/.exec(written)![1]!.replaceAll('&amp;', '&');
    expect(address).to.match(/^http.+\/standalone\.html#link=rp&show=section,links&plumb1=/);
    const state = readFragment(new URL(address).hash)!;
    expect(state.link).to.equal('rp');
    expect(readCampaign(state.campaign).campaign.sites).to.have.length(3);
    expect(words(copy, '.note')).to.match(/Caution: the address has 2\d{3} characters/);
    expect(words(copy, '.note')).to.contain(String(address.length));
  });

  it('does not warn of a short address', async () => {
    const { copy } = await shown(await fetchExample());
    await as(copy, 'iframe');
    expect(words(copy, '.note')).to.match(/^The address has \d{3,4} characters\.$/);
  });

  it('gives the tables in four markups, inputs and cautions inside', async () => {
    const { copy } = await shown(await fetchExample());
    expect(await as(copy, 'Markdown')).to.match(/^# Three sites, two routes[\s\S]*\| rp \|[\s\S]*laser safety officer/);
    expect(await as(copy, 'MediaWiki')).to.match(/\{\| class="wikitable"[\s\S]*sites\.ridge\.determinations\.0\.zeta/);
    expect(await as(copy, 'HTML table')).to.match(/<table>[\s\S]*Not a legal height/);
    expect(await as(copy, 'LaTeX')).to.match(/\\begin\{t[\s\S]*computed by Plumbtick/);
  });

  it('gives the section as an SVG that stands alone', async () => {
    const { copy } = await shown(await fetchExample());
    const written = await as(copy, 'SVG of the section');
    const file = new DOMParser().parseFromString(written, 'image/svg+xml');
    expect(file.querySelector('parsererror')).to.equal(null);
    expect(file.documentElement.localName).to.equal('svg');
    expect(written).not.to.match(/var\(|NaN|<!--|tabindex|data-mark/);
    expect(file.querySelector('desc')!.textContent).to.match(/30 times the height scale.*computed by Plumbtick/);
    expect(file.querySelectorAll('circle.s-ring')).to.have.length(3);
    expect(written).to.contain('#16212a');
    // it loads as an image
    const image = new Image();
    image.src = URL.createObjectURL(new Blob([written], { type: 'image/svg+xml' }));
    await image.decode();
    expect(image.naturalWidth).to.be.greaterThan(800);
  });

  it('copies, or marks the text where the clipboard is closed', async () => {
    const { copy } = await shown(await fetchExample());
    await as(copy, 'Markdown');
    button(copy, 'Copy').click(); // the first button opens and closes
    await copy.updateComplete;
    button(copy, 'Copy for this wiki…').click();
    await copy.updateComplete;
    const buttons = [...copy.shadowRoot!.querySelectorAll('button')];
    buttons.at(-1)!.click();
    for (let i = 0; i < 50 && copy.copied === null; i++) await aTimeout(10);
    await copy.updateComplete;
    expect(words(copy, '[role="status"]')).to.match(/^(copied|marked; copy it with Ctrl\+C)$/);
  });

  it('is accessible and whole at 328 px', async () => {
    await setViewport({ width: 360, height: 800 });
    const { copy } = await shown(await fetchExample(), 328);
    await as(copy, 'iframe');
    expect(overflowing(copy)).to.deep.equal([]);
    await expect(copy).to.be.accessible();
  }).timeout(20_000);
});
