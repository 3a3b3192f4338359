import { aTimeout, expect, fixture, html, oneEvent } from '@open-wc/testing';
import { emulateMedia, sendKeys, setViewport } from '@web/test-runner-commands';
import { define } from '../../components/define.js';
import { PlumbFloors } from '../../components/floors/plumb-floors.js';
import '../../components/floors/plumb-floors.define.js';
import { version } from '../../lib/constants/version.js';
import { boxed, button, field, overflowing, type, words } from './within.js';

const given = html`<plumb-floors
  dh="12.348(3) m"
  g="9.818611(3) m/s²"
  transition="87Sr"
  measured="1.3493(8)e-15"
  upper="upper bench"
  lower="lower bench"
  >Computed by a script.</plumb-floors
>`;

// g·Δ − ½·Γ·Δ² = 9.818611·12.348 − ½·3.086e-6·12.348² = 121.23997 m²/s², over c² 1.348977e-15, by hand
const Y = '1.34898(33)e-15';

describe('plumb-floors', () => {
  afterEach(async () => {
    await emulateMedia({ media: 'screen' });
    await setViewport({ width: 800, height: 600 });
  });

  it('says the finding first, then terms, sum and offset', async () => {
    const element = await fixture<PlumbFloors>(given);
    expect(words(element, '.s1')).to.equal(`The upper clock runs fast by ${Y}; the measurement agrees.`);
    const rows = [...element.shadowRoot!.querySelectorAll<HTMLTableRowElement>('.values tbody:last-of-type tr')].map(
      (row) => [...row.cells].map((cell) => cell.textContent?.trim()).join(' '),
    );
    expect(rows).to.deep.equal([
      'g·ΔH 121.2402 m²/s²',
      '−½ Γ·ΔH² −0.0002 m²/s²',
      'ΔW 121.240(29) m²/s²',
      'y = ΔW/c² 1348.98(33) 1e-18',
      'offset of 87Sr 0.57902(14) Hz',
    ]);
    expect(element.answer?.floors.y.value).to.be.closeTo(1.348977e-15, 1e-21);
  });

  it('gives shift and correction as two lines with two names', async () => {
    const element = await fixture<PlumbFloors>(given);
    expect(words(element, '.ans')).to.contain(`shift upper clock +${Y}, seen from the lower`);
    expect(words(element, '.ans')).to.contain(`correction −${Y} to the upper clock’s fractional frequency`);
    expect(words(element, '.ans')).to.match(/measured 1.3493\(8\)e-15, difference \+3\.\d\(8\.\d\)e-19, agree/);
  });

  it('draws two levels to scale with u at a stated multiple', async () => {
    const element = await fixture<PlumbFloors>(given);
    const figure = element.shadowRoot!.querySelector('svg.levels')!;
    expect(figure.getAttribute('aria-label')).to.equal('upper bench 12.348(3) m above lower bench');
    // half a band of 3 mm · 200 on a scale of 126 px for 12.348 m: 6.1 px
    expect(figure.textContent).to.contain('drawn 200 times');
    expect(Number(figure.querySelector('.s-band')?.getAttribute('height'))).to.be.closeTo(12.24, 0.01);
  });

  it('draws a height that its uncertainty covers as one level, and says so', async () => {
    const element = await fixture<PlumbFloors>(html`<plumb-floors dh="1(1) cm" g="9.81"></plumb-floors>`);
    const figure = element.shadowRoot!.querySelector('svg.levels')!;
    expect(figure.textContent).to.contain('1(1) cm, not to scale');
    const band = figure.querySelector('.s-band')!;
    expect(Number(band.getAttribute('height'))).to.equal(22);
    expect(Number(band.getAttribute('y'))).to.be.within(0, 206 - 22);
  });

  it('names version and day in the line to cite', async () => {
    const element = await fixture<PlumbFloors>(given);
    const now = new Date();
    const day = [now.getFullYear(), now.getMonth() + 1, now.getDate()].map((n) => String(n).padStart(2, '0')).join('-');
    expect(words(element, '.cite p')).to.contain(
      `Upper bench minus lower bench: y = ${Y} for 12.348(3) m, g = 9.818611(3) m/s², default gradient; computed by Plumbtick ${version} on ${day}.`,
    );
  });

  it('copies the line, or marks it where the clipboard is closed', async () => {
    const element = await fixture<PlumbFloors>(given);
    const clipboard = Object.getOwnPropertyDescriptor(Navigator.prototype, 'clipboard')!;
    let copied = '';
    const give = (value: unknown) =>
      Object.defineProperty(Navigator.prototype, 'clipboard', { configurable: true, get: () => value });
    try {
      const writeText = async (text: string) => {
        copied = text;
      };
      give({ writeText });
      button(element, 'Copy this line').click();
      await expectSoon(() => words(element, '.cite [role=status]') === 'copied');
      expect(copied).to.match(/^Upper bench minus lower bench: y = 1\.34898\(33\)e-15 for/);
      give(undefined);
      button(element, 'Copy this line').click();
      await expectSoon(() => words(element, '.cite [role=status]').startsWith('marked'));
    } finally {
      Object.defineProperty(Navigator.prototype, 'clipboard', clipboard);
    }
  });

  it('answers while a value is typed, marks it as edited and puts the old one back', async () => {
    const element = await fixture<PlumbFloors>(given);
    setTimeout(() => void type(element, 'dh', '24.696(3) m'));
    const { detail } = await oneEvent(element, 'plumb-change');
    expect(detail.name).to.equal('dh');
    expect(detail.answer.floors.y.value).to.be.closeTo(2 * 1.348977e-15, 1e-20);
    expect(words(element, '.s1')).to.contain('2.69795(33)e-15');
    expect(words(element, '#n-dh')).to.equal('edited, was 12.348(3) m Undo');
    button(element, 'Undo').click();
    await element.updateComplete;
    expect(words(element, '.s1')).to.contain(Y);
    expect(element.shadowRoot!.querySelectorAll('#n-dh').length).to.equal(0);
    await aTimeout(20);
    expect(element.shadowRoot!.activeElement?.id).to.equal('f-dh');
  });

  it('keeps the last good answer as stale while a typed value cannot be read, and writes it right on request', async () => {
    const element = await fixture<PlumbFloors>(given);
    await type(element, 'dh', '24,696(3) m');
    expect(words(element, '.stale')).to.contain(Y);
    expect(words(element, '.was-good')).to.contain('121.240(29)');
    expect(words(element, '.stale .tagc')).to.equal('before the last edit, which cannot be read');
    expect(element.shadowRoot!.querySelectorAll('.cite').length).to.equal(0);
    expect(element.answer).to.equal(null);
    const fault = element.shadowRoot!.querySelector('#n-dh [role=alert]')!;
    expect(fault.querySelector('.bad')?.textContent).to.equal(',');
    expect(fault.textContent).to.contain('24.696 or 24696');
    expect(field(element, 'dh').getAttribute('aria-invalid')).to.equal('true');
    expect(field(element, 'dh').getAttribute('aria-describedby')).to.equal('n-dh');
    await expect(element).to.be.accessible();
    button(element, 'Go to the field').click();
    await aTimeout(20);
    expect(element.shadowRoot!.activeElement?.id).to.equal('f-dh');
    button(element, 'Write 24.696(3) m').click();
    await element.updateComplete;
    expect(words(element, '.s1')).to.contain('2.69795(33)e-15');
  }).timeout(20_000);

  it('waits with a fault until the typing pauses', async () => {
    const element = await fixture<PlumbFloors>(given);
    const one = field(element, 'dh');
    one.value = '24.6(';
    one.dispatchEvent(new Event('input', { bubbles: true }));
    await element.updateComplete;
    expect(element.shadowRoot!.querySelectorAll('.stale').length).to.equal(0);
    await expectSoon(() => element.shadowRoot!.querySelector('.stale') !== null);
    expect(words(element, '#n-dh')).to.contain('open bracket');
  });

  it('shows every attribute at fault as read, and no number in place of the one that is missing', async () => {
    const element = await fixture<PlumbFloors>(
      html`<plumb-floors dh="12,348(3) m" g="9.818611(3) m/s²" transition="87St">old value: 1.35e-15</plumb-floors>`,
    );
    expect(words(element, 'pre')).to.equal('<plumb-floors dh="12,348(3) m" g="9.818611(3) m/s²" transition="87St">');
    expect([...element.shadowRoot!.querySelectorAll('pre .bad')].map((bad) => bad.textContent)).to.deep.equal([
      ',',
      '87St',
    ]);
    expect(words(element, '.flt .hd')).to.equal('Not computed: 2 attributes cannot be read');
    expect(words(element, '.flt')).to.contain(
      'dh 12,348(3) m why decimal comma; it could mean 12.348 or 12348 write dh="12.348(3) m"',
    );
    expect(words(element, '.flt')).to.contain('write transition="87Sr"');
    // there since the page was loaded: not announced
    expect(element.shadowRoot!.querySelectorAll('[role=alert]').length).to.equal(0);
    expect(element.shadowRoot!.querySelectorAll('slot').length).to.equal(0);
    expect(words(element)).not.to.match(/e-1\d/);
    await expect(element).to.be.accessible();
    element.dh = '12.348(3) m';
    element.transition = '87Sr';
    await element.updateComplete;
    expect(words(element, '.s1')).to.contain(Y);
    element.dh = 'high';
    await element.updateComplete;
    expect(element.shadowRoot!.querySelector('.flt')?.getAttribute('role')).to.equal('alert');
    expect(element.shadowRoot!.querySelectorAll('.stale').length).to.equal(0);
  }).timeout(20_000);

  it('keeps the page’s own words while nothing is given, and computes once something is typed', async () => {
    const element = await fixture<PlumbFloors>(
      html`<plumb-floors><p>No script: ask the time office.</p></plumb-floors>`,
    );
    expect(element.shadowRoot!.querySelectorAll('slot').length).to.equal(1);
    expect(words(element, '.s1')).to.contain('write the height');
    expect(element.shadowRoot!.querySelectorAll('.flt').length).to.equal(0);
    await expect(element).to.be.accessible();
    await type(element, 'dh', '3.2(1) m');
    expect(words(element, '#n-g')).to.contain('still wanted: gravity at the lower floor');
    await type(element, 'lat', '52.3');
    await type(element, 'height', '80 m');
    expect(words(element, '.s1')).to.contain('3.49(11)e-16');
    expect(words(element, '.warnings')).to.contain('Caution: g is normal gravity');
  }).timeout(20_000);

  it('fills in an example', async () => {
    const element = await fixture<PlumbFloors>(html`<plumb-floors></plumb-floors>`);
    button(element, 'Fill in an example').click();
    await element.updateComplete;
    expect(words(element, '.s1')).to.contain('The upper clock runs fast by');
  });

  it('tells a floor below, one level, and a measurement that differs', async () => {
    const below = await fixture<PlumbFloors>(
      html`<plumb-floors dh="-12.348(3) m" g="9.818611(3)" measured="1.3493(8)e-15"></plumb-floors>`,
    );
    expect(words(below, '.s1')).to.contain(`The lower clock runs slow by ${Y}; the measurement differs by +2.69`);
    expect(words(below, '.ans')).to.contain('differ. It fits with the sign turned');
    expect(below.shadowRoot!.querySelector('svg')?.getAttribute('aria-label')).to.equal(
      'lower floor −12.348(3) m below upper floor',
    );
    const level = await fixture<PlumbFloors>(html`<plumb-floors dh="0 m" g="9.81"></plumb-floors>`);
    expect(words(level, '.s1')).to.contain('Both clocks stand on one level');
    const poor = await fixture<PlumbFloors>(
      html`<plumb-floors dh="12.348(3) m" g="9.818611(3)" measured="1.3(9)e-15"></plumb-floors>`,
    );
    expect(words(poor, '.ans')).to.contain(
      'inconclusive. Only 2.5e-15 or more would have shown; the whole offset is 1.3e-15',
    );
  });

  it('is worked by keyboard alone', async () => {
    const element = await fixture<PlumbFloors>(given);
    const focused = () => {
      const active = element.shadowRoot!.activeElement;
      return active?.id || active?.textContent?.trim();
    };
    const order: (string | undefined)[] = [];
    field(element, 'dh').focus();
    for (let i = 0; i < 6; i++) {
      order.push(focused());
      await sendKeys({ press: 'Tab' });
    }
    expect(order).to.deep.equal(['f-dh', 'f-g', 'f-gradient', 'f-transition', 'f-measured', 'Copy this line']);
    field(element, 'dh').focus();
    field(element, 'dh').select();
    await sendKeys({ type: '1 m' });
    await element.updateComplete;
    expect(words(element, '.s1')).to.contain('1.09');
    await sendKeys({ press: 'Tab' });
    expect(focused()).to.equal('Undo');
    const ring = getComputedStyle(element.shadowRoot!.activeElement!);
    expect(`${ring.outlineStyle} ${ring.outlineWidth}`).to.equal('solid 2px');
    await sendKeys({ press: 'Enter' });
    await element.updateComplete;
    expect(words(element, '.s1')).to.contain(Y);
  }).timeout(20_000);

  it('is accessible, light and dark', async () => {
    await expect(await fixture(given)).to.be.accessible();
    const dark = document.createElement('div');
    dark.dataset['theme'] = 'dark';
    dark.style.background = '#10181d';
    await expect(await fixture(given, { parentNode: dark })).to.be.accessible();
  }).timeout(20_000);

  it('fits 360 px, with targets large enough for a thumb', async () => {
    await setViewport({ width: 360, height: 700 });
    const element = await boxed<PlumbFloors>(given, 328);
    expect(overflowing(element)).to.deep.equal([]);
    for (const control of element.shadowRoot!.querySelectorAll('input, select, button'))
      expect(control.getBoundingClientRect().height, control.id).to.be.at.least(38);
    await type(element, 'dh', '12,5 m');
    expect(overflowing(element)).to.deep.equal([]);
  }).timeout(20_000);

  it('prints its values and leaves out what only a screen can do', async () => {
    const element = await fixture<PlumbFloors>(given);
    await emulateMedia({ media: 'print' });
    const shown = (selector: string) =>
      getComputedStyle(element.shadowRoot!.querySelector(selector)!).display !== 'none';
    expect(shown('.btn')).to.equal(false);
    expect(shown('#f-dh')).to.equal(true);
    // not given: a line without a value is nothing to print
    const gradient = field(element, 'gradient').closest('tr')!;
    expect(getComputedStyle(gradient).display).to.equal('none');
  });

  it('stands beside a second copy of the script', () => {
    expect(() => define('plumb-floors', class extends HTMLElement {})).not.to.throw();
    expect(customElements.get('plumb-floors')).to.equal(PlumbFloors);
  });
});

async function expectSoon(test: () => boolean): Promise<void> {
  const started = performance.now();
  while (!test()) {
    if (performance.now() - started > 3000) throw new Error(`not within 3 s: ${test}`);
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
}
