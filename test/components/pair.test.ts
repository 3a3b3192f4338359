import { aTimeout, expect, fixture, html } from '@open-wc/testing';
import { emulateMedia, setViewport } from '@web/test-runner-commands';
import type { PlumbPair } from '../../components/pair/plumb-pair.js';
import '../../components/pair/plumb-pair.define.js';
import { boxed, button, field, overflowing, type, words } from './within.js';

const given = html`<plumb-pair
  a-name="Harbour"
  a-lat="58.9712"
  a-lon="5.7305"
  a-h="51.3370(60) m"
  a-zeta="45.120(15) m"
  a-g="9.818611(3) m/s²"
  b-name="Ridge"
  b-lat="58.8102"
  b-lon="6.4421"
  b-h="912.4402(70) m"
  b-zeta="45.377(18) m"
  b-g="9.816602(4) m/s²"
  correlation="0.48"
  h-tide="free"
  geoid-tide="zero"
  transition="87Sr"
  >Ridge is 860.8 m above Harbour.</plumb-pair
>`;

describe('plumb-pair', () => {
  afterEach(async () => {
    await emulateMedia({ media: 'screen' });
    await setViewport({ width: 800, height: 600 });
  });

  // test/data/examples, three-sites: W of the two gnss-quasigeoid determinations by an independent solver,
  // 62636791.91035726 − 62628341.08492449 = 8450.82543 m²/s², over c² 9.402811e-14
  it('gives potential, offset, both heights and hertz', async () => {
    const element = await fixture<PlumbPair>(given);
    expect(words(element, '.s1')).to.equal(
      'A clock at Ridge runs fast by 9.40281(21)e-14 against one at Harbour, known to 19 mm of height. What limits is the quasigeoid at both sites, with 77 % of the variance.',
    );
    const rows = [...element.shadowRoot!.querySelectorAll<HTMLTableRowElement>('.body .values tr')].map((row) =>
      [...row.cells].map((cell) => cell.textContent?.trim()).join(' '),
    );
    expect(rows).to.deep.equal([
      'ΔW 8450.83(19) m²/s²',
      'y 94028.1(2.1) 1e-18',
      'normal height +860.846(19) m',
      'length equivalent 860.783(19) m',
      'offset of 87Sr 40.35950(91) Hz',
    ]);
    expect(element.shadowRoot!.querySelectorAll('.warnings').length).to.equal(0);
    expect(words(element, '.note')).to.contain('The sites are 44.8 km apart.');
  });

  it('shows what the uncertainty is made of, the shared model as one with its parts', async () => {
    const element = await fixture<PlumbPair>(given);
    const rows = [...element.shadowRoot!.querySelectorAll<HTMLTableRowElement>('.budget tbody tr')];
    expect(
      rows.map((row) => `${row.cells[0]?.textContent?.replace(/\s+/g, ' ').trim()} ${row.cells[4]?.textContent}`),
    ).to.deep.equal([
      'quasigeoid shared, ρ 0.48 77.3',
      'Ridge, ζ 51.8',
      'Harbour, ζ 25.5',
      'Ridge, h 13.1',
      'Harbour, h 9.6',
    ]);
    const bar = (row: HTMLTableRowElement) => row.querySelector('rect')!;
    expect(rows.map((row) => bar(row).getAttribute('class'))).to.deep.equal([
      's-grp',
      's-bar',
      's-bar',
      's-bar',
      's-bar',
    ]);
    // one zero and one scale for all rows
    const width = (row: HTMLTableRowElement) => Number.parseFloat(bar(row).getAttribute('width')!);
    expect(width(rows[0]!)).to.be.closeTo(100, 0.01);
    expect(width(rows[1]!) / width(rows[3]!)).to.be.closeTo(51.8 / 13.1, 0.05);
    for (const svg of element.shadowRoot!.querySelectorAll('[style]'))
      expect.fail(`style attribute on ${svg.localName}`);
  });

  it('draws a negative share left of zero, outlined', async () => {
    const element = await fixture<PlumbPair>(given);
    await type(element, 'correlation', '0.95');
    const negative = [...element.shadowRoot!.querySelectorAll('.budget tr.neg')];
    expect(negative).to.have.length(1);
    expect(negative[0]!.querySelector('small')?.textContent).to.contain('part of the other’s away');
    const rect = negative[0]!.querySelector('rect')!;
    expect(rect.getAttribute('class')).to.equal('s-neg');
    const zero = Number.parseFloat(negative[0]!.querySelector('line')!.getAttribute('x1')!);
    const right = Number.parseFloat(rect.getAttribute('x')!) + Number.parseFloat(rect.getAttribute('width')!);
    expect(right).to.be.closeTo(zero, 0.02);
    expect(negative[0]!.querySelector('.share')?.textContent).to.match(/^−\d/);
  });

  it('says with its size what was left unsaid', async () => {
    const element = await fixture<PlumbPair>(html`<plumb-pair
      a-lat="58.9712" a-lon="5.7305" a-h="51.3370(60) m" a-zeta="45.120(15) m"
      b-lat="58.8102" b-lon="6.4421" b-h="912.4402(70) m" b-zeta="45.377(18) m"></plumb-pair>`);
    const warnings = words(element, '.warnings');
    expect(warnings).to.contain('with ρ = 0.9 u would be 12 mm instead of 25 mm. Write correlation="0"');
    expect(warnings).to.contain('Write h-tide="free" or what is right');
    expect(warnings).to.contain('no gravity given for A and B');
    expect(words(element, '.s1')).to.contain('A clock at B runs fast');
  });

  it('is edited in a form that one word opens', async () => {
    const element = await fixture<PlumbPair>(given);
    const form = element.shadowRoot!.querySelector('#inputs')!;
    expect(getComputedStyle(form).display).to.equal('none');
    const word = button(element, 'show inputs');
    expect(word.getAttribute('aria-expanded')).to.equal('false');
    word.click();
    await element.updateComplete;
    expect(word.getAttribute('aria-expanded')).to.equal('true');
    expect(getComputedStyle(form).display).to.equal('block');
    await type(element, 'b-h', '922.4402(70) m');
    expect(words(element, '.body .values')).to.contain('+870.846(19)');
    expect(words(element, '#n-b-h')).to.equal('edited, was 912.4402(70) m Undo');
    await type(element, 'b-h', '922,4402(70) m');
    expect(words(element, '.stale .tagc')).to.equal('before the last edit, which cannot be read');
    expect(words(element, '#n-b-h')).to.contain('Write 922.4402(70) m');
    await expect(element).to.be.accessible();
    button(element, 'Go to the field').click();
    await element.updateComplete;
    await aTimeout(20);
    expect(element.shadowRoot!.activeElement?.id).to.equal('f-b-h');
  }).timeout(20_000);

  it('opens the form for a fault that stands in it', async () => {
    const element = await fixture<PlumbPair>(given);
    button(element, 'show inputs').click();
    await element.updateComplete;
    await type(element, 'b-h', 'high');
    button(element, 'hide inputs').click();
    await element.updateComplete;
    button(element, 'Go to the field').click();
    await element.updateComplete;
    await aTimeout(20);
    expect(element.shadowRoot!.activeElement?.id).to.equal('f-b-h');
  });

  it('shows every attribute at fault as read', async () => {
    const element = await fixture<PlumbPair>(html`<plumb-pair
      a-lat="58.9712" a-lon="5.7305" a-h="51.3370(60) m" a-zeta="45,120(15) m"
      b-lat="98.8102" b-h="912.4402(70) m" b-zeta="45.377(18) m" tide="men">860.8 m</plumb-pair>`);
    expect(words(element, '.flt .hd')).to.equal('Not computed: 4 attributes cannot be read');
    const text = words(element, '.flt');
    expect(text).to.contain(
      'a-zeta 45,120(15) m why decimal comma; it could mean 45.120 or 45120 write a-zeta="45.120(15) m"',
    );
    expect(text).to.contain('b-lat 98.8102 why out of range; expected a latitude');
    expect(text).to.contain('b-lon nothing why missing; expected the longitude of B');
    expect(text).to.contain('write tide="mean"');
    expect(words(element)).not.to.match(/e-1\d/);
    await expect(element).to.be.accessible();
  }).timeout(20_000);

  it('keeps the page’s own words while nothing is given', async () => {
    const element = await fixture<PlumbPair>(html`<plumb-pair>Ridge is 860.8 m above Harbour.</plumb-pair>`);
    expect(element.shadowRoot!.querySelectorAll('slot').length).to.equal(1);
    await expect(element).to.be.accessible();
    button(element, 'Fill in an example').click();
    await element.updateComplete;
    expect(words(element, '.s1')).to.contain('A clock at Ridge runs fast by');
  }).timeout(20_000);

  it('is accessible, light and dark', async () => {
    await expect(await fixture(given)).to.be.accessible();
    const dark = document.createElement('div');
    dark.dataset['theme'] = 'dark';
    dark.style.background = '#10181d';
    const element = await fixture<PlumbPair>(given, { parentNode: dark });
    button(element, 'show inputs').click();
    await element.updateComplete;
    await expect(element).to.be.accessible();
  }).timeout(20_000);

  it('fits 360 px', async () => {
    await setViewport({ width: 360, height: 700 });
    const element = await boxed<PlumbPair>(given, 328);
    button(element, 'show inputs').click();
    await element.updateComplete;
    expect(overflowing(element)).to.deep.equal([]);
  });

  it('prints its inputs, open or not', async () => {
    const element = await fixture<PlumbPair>(given);
    await emulateMedia({ media: 'print' });
    expect(getComputedStyle(element.shadowRoot!.querySelector('#inputs')!).display).to.equal('block');
    expect(getComputedStyle(button(element, 'show inputs')).display).to.equal('none');
    expect(getComputedStyle(field(element, 'a-n').closest('tr')!).display).to.equal('none');
  });
});
