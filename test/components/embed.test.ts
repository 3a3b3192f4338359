import { aTimeout, expect, fixture, html, nextFrame } from '@open-wc/testing';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/embed/plumb-embed.define.js';
import '../../components/links/plumb-links.define.js';
import '../../components/section/plumb-section.define.js';
import type { PlumbEmbed } from '../../components/embed/plumb-embed.js';
import type { PlumbLinks } from '../../components/links/plumb-links.js';
import { addressOf } from '../../components/state/fragment.js';
import { fetchExample } from './example.js';
import { words } from './within.js';

const hashOf = async (show: readonly string[], link: string | null = null) =>
  new URL(await addressOf('https://wiki.example/p.html', { campaign: await fetchExample(), link, show })).hash;

async function goTo(hash: string): Promise<void> {
  location.hash = hash;
  await aTimeout(30);
}

async function embedded(hash: string): Promise<PlumbEmbed> {
  await goTo(hash);
  const element = await fixture<PlumbEmbed>(html`<plumb-embed><p>the page itself</p></plumb-embed>`);
  for (let i = 0; i < 3; i++) await nextFrame();
  return element;
}
const campaignOf = (embed: PlumbEmbed) => embed.shadowRoot!.querySelector<PlumbCampaign>('plumb-campaign');

describe('plumb-embed', () => {
  afterEach(async () => {
    await goTo('');
  });

  it('shows the page itself where the address carries nothing', async () => {
    const element = await embedded('');
    expect(element.shadowRoot!.querySelector('slot')).not.to.equal(null);
    expect(campaignOf(element)).to.equal(null);
  });

  it('shows the elements that the address names, with the link in hand, and follows the address', async () => {
    const element = await embedded(await hashOf(['links'], 'rp'));
    const links = campaignOf(element)!.querySelector<PlumbLinks>('plumb-links')!;
    await links.updateComplete;
    expect(campaignOf(element)!.children).to.have.length(1);
    expect(words(links, '.say')).to.contain('hr agrees with its prediction');
    expect(links.shadowRoot!.querySelector('.name.in-hand')!.textContent!.trim()).to.equal('rp');
    await goTo(await hashOf(['section', 'links']));
    await element.updateComplete;
    expect([...campaignOf(element)!.children].map(({ localName }) => localName)).to.deep.equal([
      'plumb-section',
      'plumb-links',
    ]);
    await goTo('');
    await element.updateComplete;
    expect(element.shadowRoot!.querySelector('slot')).not.to.equal(null);
  });

  it('says in place that an address was cut off', async () => {
    const hash = await hashOf(['links']);
    const element = await embedded(hash.slice(0, -50));
    const campaign = campaignOf(element)!;
    await campaign.updateComplete;
    expect(words(campaign, '.flt')).to.match(
      /at address read \d+ of \d+ characters why cut off; expected the whole address; it was cut off on its way/,
    );
    await expect(campaign).to.be.accessible();
  });

  it('says what it does not know to show', async () => {
    const element = await embedded(await hashOf(['links', 'weather']));
    expect(words(element, '.flt')).to.contain('Not shown: weather');
    expect(campaignOf(element)!.children).to.have.length(1);
  });
});

describe('plumb-campaign with fragment', () => {
  afterEach(async () => {
    await goTo('');
  });

  it('takes the campaign from the address only where it is told to', async () => {
    await goTo(await hashOf([]));
    const told = await fixture<PlumbCampaign>(html`<plumb-campaign fragment></plumb-campaign>`);
    const untold = await fixture<PlumbCampaign>(html`<plumb-campaign></plumb-campaign>`);
    expect(told.state.status).to.equal('ready');
    expect(untold.state.status).to.equal('empty');
  });
});
