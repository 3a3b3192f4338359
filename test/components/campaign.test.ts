import { aTimeout, expect, fixture, html } from '@open-wc/testing';
import { emulateMedia, setViewport } from '@web/test-runner-commands';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import type { PlumbLinks } from '../../components/links/plumb-links.js';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/links/plumb-links.define.js';
import { boxed, button, overflowing, words } from './within.js';

// files of test/data/examples, whose expected numbers are an independent solver's
const THREE = '/test/data/examples/three-sites.json';

async function loaded(
  src: string,
  template = html`<plumb-campaign src=${src}><plumb-links>fallback</plumb-links></plumb-campaign>`,
) {
  const element = await fixture<PlumbCampaign>(template);
  const links = element.querySelector<PlumbLinks>('plumb-links')!;
  for (let i = 0; i < 100 && element.state.status === 'working'; i++) await aTimeout(20);
  await element.updateComplete;
  await links.updateComplete;
  return { element, links };
}

const inline = (text: string) => {
  const script = document.createElement('script');
  script.type = 'application/json';
  script.textContent = text;
  return script;
};

const cells = (links: PlumbLinks): string[][] =>
  [...links.shadowRoot!.querySelectorAll<HTMLTableRowElement>('tbody tr')].map((row) =>
    [...row.cells].map((cell) => cell.textContent?.replace(/\s+/g, ' ').trim() ?? ''),
  );

const SMALL = `{
 "format": "plumbtick-campaign/1",
 "sites": [
  { "id": "a", "lat": 50, "lon": 8, "g": 9.81, "determinations": [{ "kind": "potential", "W": "62636000.0(1) m²/s²" }] },
  { "id": "b", "lat": 50, "lon": 9, "g": 9.81, "determinations": [{ "kind": "potential", "W": "62626190.0(2) m²/s²" }] }
 ],
 "clocks": [
  { "id": "ca", "site": "a", "transition": "87Sr" },
  { "id": "cb", "site": "b", "transition": "87Sr" }
 ],
 "links": [{ "id": "ab", "from": "ca", "to": "cb" }]
}`;

describe('plumb-campaign with plumb-links', () => {
  afterEach(async () => {
    await emulateMedia({ media: 'screen' });
    await setViewport({ width: 800, height: 600 });
  });

  it('loads a file for the elements inside, and shows every link on three scales', async () => {
    const { element, links } = await loaded(THREE);
    expect(element.state.status).to.equal('ready');
    // three-sites.predict.json: dW 8428.80115(26064), y 9.3783061(29)e-14, dH 858.53931(2655)
    expect(cells(links)[0]!.slice(0, 4)).to.deep.equal([
      'hr h1 to r1, fibre, 70 km',
      '858.539(27)',
      '8428.80(26)',
      '93783.1(2.9)',
    ]);
    expect(words(links, '.note')).to.contain('y > 0 when the second clock of a link (to) runs fast');
    expect(words(links, '.note')).to.contain('Over distance it is not a height difference');
    expect(words(links, '.by')).to.match(/^Computed by Plumbtick .+ on \d{4}-\d\d-\d\d\.$/);
    expect(words(element, '.foot')).to.contain('Caution: sites.ridge');
  });

  it('takes a campaign from the page itself, without a measured column where nothing was measured', async () => {
    const { element, links } = await loaded(
      '',
      html`<plumb-campaign>${inline(SMALL)}<plumb-links></plumb-links></plumb-campaign>`,
    );
    // 62636000 − 62626190 = 9810 m²/s², over g = 9.81: 1000 m; u = √(0.1² + 0.2²) m²/s²
    expect(cells(links)[0]!.slice(1, 3)).to.deep.equal(['1000.000(23)', '9810.00(22)']);
    expect(links.shadowRoot!.querySelectorAll('thead th')).to.have.length(5);
    element.querySelector('script')!.textContent = SMALL.replace('62626190.0', '62631095.0');
    await aTimeout(20);
    await links.updateComplete;
    expect(cells(links)[0]![2]).to.equal('4905.00(22)');
  });

  it('gives a link without a level as none, in words', async () => {
    const noLevel = SMALL.replace(
      /"determinations": \[\{ "kind": "potential", "W": "62626190[^\]]*\]/,
      '"determinations": []',
    );
    const { element, links } = await loaded(
      '',
      html`<plumb-campaign>${inline(noLevel)}<plumb-links></plumb-links></plumb-campaign>`,
    );
    expect(cells(links)[0]!.slice(1)).to.deep.equal(['none', 'none', 'none', 'none']);
    expect(words(links, '.say')).to.contain('ab: none, for its ends have no common level');
    expect(words(element, '.warnings')).to.contain('no determination in the fit');
  });

  it('shows what is wrong with the file in place: line, column, text, why, what to write', async () => {
    const bad = SMALL.replace('"lat": 50, "lon": 8', '"lat": 95, "lon": "8,5"').replace('"from": "ca"', '"fom": "ca"');
    const { element, links } = await loaded(
      '',
      html`<plumb-campaign>${inline(bad)}<plumb-links></plumb-links></plumb-campaign>`,
    );
    expect(words(element, '.flt .hd')).to.equal('Not computed: 4 faults in the campaign');
    const faults = words(element, '.flt');
    expect(faults).to.contain('line 4 sites.a.lat, column 23');
    expect(faults).to.contain('read 95 why out of range; expected a latitude');
    expect(faults).to.contain('line 4 sites.a.lon, column');
    expect(faults).to.contain('write 8.5');
    expect(faults).to.match(/line 11 links\.ab\.fom, column \d+/);
    const underlined = [...element.shadowRoot!.querySelectorAll('.bad')].map((bad) => bad.textContent);
    expect(underlined).to.include.members(['95', ',', '"fom"']);
    expect(words(links)).to.equal('Not computed: the campaign cannot be read');
    await expect(element).to.be.accessible();
    await expect(links).to.be.accessible();
  }).timeout(20_000);

  it('keeps the last good answer as stale when the campaign becomes unreadable, and announces it', async () => {
    const { element, links } = await loaded(
      '',
      html`<plumb-campaign>${inline(SMALL)}<plumb-links></plumb-links></plumb-campaign>`,
    );
    element.querySelector('script')!.textContent = SMALL.replace('"lat": 50,', '"lat": 50');
    await aTimeout(20);
    await element.updateComplete;
    await links.updateComplete;
    expect(element.shadowRoot!.querySelector('.flt')?.getAttribute('role')).to.equal('alert');
    expect(words(links, '.stale')).to.contain('before the last change of the campaign, which cannot be read');
    expect(words(links, '.stale')).to.contain('9810.00(22)');
  });

  it('says why a file is not there', async () => {
    const { element, links } = await loaded('/test/data/no-such-campaign.json');
    expect(words(element, '.flt')).to.contain('read /test/data/no-such-campaign.json why not found');
    expect(words(element, '.flt')).to.contain('404');
    expect(links.shadowRoot!.querySelectorAll('.flt').length).to.equal(1);
    const both = await loaded(
      '',
      html`<plumb-campaign src=${THREE}>${inline(SMALL)}<plumb-links></plumb-links></plumb-campaign>`,
    );
    expect(words(both.element, '.flt')).to.contain('not both');
  });

  it('says what is missing while it is empty, beside the page’s own words', async () => {
    const { element, links } = await loaded(
      '',
      html`<plumb-campaign><plumb-links>old table</plumb-links></plumb-campaign>`,
    );
    expect(words(element, '.note')).to.contain('No campaign is loaded');
    expect(links.shadowRoot!.querySelectorAll('slot').length).to.equal(1);
    const alone = await fixture<PlumbLinks>(html`<plumb-links>old table</plumb-links>`);
    expect(words(alone, '.note')).to.contain('Put the element inside');
    expect(alone.shadowRoot!.querySelectorAll('slot').length).to.equal(1);
    await expect(element).to.be.accessible();
  }).timeout(20_000);

  it('reaches elements that come before or after it, and lets go of those that leave', async () => {
    const { element } = await loaded(
      '',
      html`<plumb-campaign>${inline(SMALL)}<plumb-links></plumb-links></plumb-campaign>`,
    );
    const late = document.createElement('plumb-links');
    element.append(late);
    await late.updateComplete;
    expect(cells(late)).to.have.length(1);
    document.body.append(late);
    await late.updateComplete;
    expect(words(late, '.note')).to.contain('No campaign is loaded');
    late.remove();
  });

  it('shows a few warnings and the rest behind a word', async () => {
    const { element } = await loaded('/test/data/examples/other-kinds.json');
    expect(element.state.status).to.equal('ready');
    const many = SMALL.replaceAll('"g": 9.81, ', '')
      .replace(
        /\{ "kind": "potential", "W": "62636000[^}]*\}/,
        '{ "kind": "gnss-quasigeoid", "h": "100(1) m", "zeta": "40(1) m" }',
      )
      .replace(
        /\{ "kind": "potential", "W": "62626190[^}]*\}/,
        '{ "kind": "gnss-quasigeoid", "h": "1100(1) m", "zeta": "40(1) m" }',
      );
    const { element: warned } = await loaded(
      '',
      html`<plumb-campaign>${inline(many)}<plumb-links></plumb-links></plumb-campaign>`,
    );
    const state = warned.state;
    const count = state.status === 'ready' ? state.warnings.length : 0;
    expect(count).to.be.greaterThan(3);
    const shown = () => warned.shadowRoot!.querySelectorAll('.warnings li').length;
    expect(shown()).to.equal(3);
    button(warned, `show ${count - 3} more`).click();
    await warned.updateComplete;
    expect(shown()).to.equal(count);
  });

  it('is accessible, light and dark', async () => {
    const { element, links } = await loaded(THREE);
    await expect(element).to.be.accessible();
    await expect(links).to.be.accessible();
    element.dataset['theme'] = 'dark';
    await aTimeout(50);
    await expect(links).to.be.accessible();
  }).timeout(30_000);

  it('becomes labelled lists at 360 px and stays a table for a screen reader', async () => {
    await setViewport({ width: 360, height: 700 });
    const element = await boxed<PlumbCampaign>(
      html`<plumb-campaign>${inline(SMALL)}<plumb-links></plumb-links></plumb-campaign>`,
      328,
    );
    const links = element.querySelector<PlumbLinks>('plumb-links')!;
    await links.updateComplete;
    expect(overflowing(links)).to.deep.equal([]);
    const cell = links.shadowRoot!.querySelector('tbody td')!;
    expect(getComputedStyle(cell).display).to.equal('grid');
    expect(getComputedStyle(cell, '::before').content).to.equal('"length / m"');
    expect(cell.getAttribute('role')).to.equal('cell');
    await expect(links).to.be.accessible();
  }).timeout(20_000);
});
