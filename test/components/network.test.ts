import { expect } from '@open-wc/testing';
import { html } from 'lit';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/network/plumb-network.define.js';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import type { PlumbNetwork } from '../../components/network/plumb-network.js';
import { boxed, overflowing, words } from './within.js';

const campaign = (candidate: boolean) =>
  JSON.stringify({
    format: 'plumbtick-campaign/1',
    window: { start: '2027-06-01T00:00:00Z', end: '2027-06-15T00:00:00Z' },
    sites: ['a', 'b', 'c'].map((id, i) => ({
      id,
      name: `Place ${id}`,
      lat: 47 + 0.8 * i,
      lon: 8 + 0.4 * ((2 * i) % 3),
      g: 9.81,
      determinations: [{ kind: 'normal-height', H: { value: `${100 * i}.00(${i + 1}) m`, tide: 'mean' } }],
    })),
    clocks: ['a', 'b', 'c'].map((id) => ({
      id: `k${id}`,
      site: id,
      transition: '87Sr',
      systematic: '2e-18',
      stability: { white: '2e-16' },
    })),
    links: [
      { id: 'ab', from: 'ka', to: 'kb', kind: 'fibre' },
      { id: 'bc', from: 'kb', to: 'kc', kind: 'satellite', stability: { white: '1e-15' } },
      ...(candidate ? [{ id: 'ca', from: 'kc', to: 'ka', kind: 'fibre', candidate: true }] : []),
    ],
    measurements: [{ link: 'ab', y: '1.09(1)e-14' }],
  });

async function network(widthPx = 1000, candidate = true): Promise<PlumbNetwork> {
  const host = await boxed<PlumbCampaign>(
    html`<plumb-campaign
      ><script type="application/json">
        ${campaign(candidate)}</script
      ><plumb-network></plumb-network
    ></plumb-campaign>`,
    widthPx,
  );
  const element = host.querySelector<PlumbNetwork>('plumb-network')!;
  for (let i = 0; i < 50 && !element.shadowRoot!.querySelector('table'); i++)
    await new Promise((r) => setTimeout(r, 20));
  await element.updateComplete;
  return element;
}

describe('plumb-network', () => {
  it('says what the links bring and where the network is weakest', async () => {
    const element = await network();
    expect(words(element, '.say')).to.match(/least certain site, Place c, comes from 30 mm to \d+ mm\. Weakest is /);
    expect(words(element, 'table')).to.include('link ab').and.include('link bc').and.include('H of a');
    expect(words(element, 'table')).to.include('links.ca');
  });
  it('draws each line by its control and each candidate dashed', async () => {
    const element = await network();
    const root = element.shadowRoot!;
    expect(root.querySelectorAll('svg[role=img] .s-cand').length).to.equal(1);
    const weights = [...root.querySelectorAll('svg[role=img] path.s-ctl')].map((p) =>
      Number(p.getAttribute('stroke-width')),
    );
    expect(weights.length).to.equal(5);
    for (const w of weights) expect(w).to.be.within(0.5, 4.5);
    expect(new Set(weights).size).to.be.greaterThan(1);
  });
  it('takes only what was measured when asked', async () => {
    const element = await network();
    const radio = element.shadowRoot!.querySelectorAll<HTMLInputElement>('input[type=radio]')[1]!;
    radio.click();
    await element.updateComplete;
    expect(words(element, 'table')).to.include('link ab').and.not.include('link bc');
    expect(words(element, '.note')).to.include('Only what was measured');
  });
  it('has nothing to say of candidates where there are none', async () => {
    const element = await network(1000, false);
    expect(element.shadowRoot!.querySelector('#cand')).to.equal(null);
  });
  it('is accessible, and fits 360 px', async () => {
    const element = await network(360);
    await expect(element).to.be.accessible();
    expect(overflowing(element)).to.deep.equal([]);
    expect(element.shadowRoot!.querySelector('svg[role=img]')!.getBoundingClientRect().width).to.be.at.most(360);
  });
  it('without a campaign says what to do', async () => {
    const element = await boxed<PlumbNetwork>(html`<plumb-network>Fallback</plumb-network>`, 600);
    expect(words(element)).to.include('No campaign is loaded');
  });
});
