import { aTimeout, expect, fixture, html, nextFrame } from '@open-wc/testing';
import { emulateMedia } from '@web/test-runner-commands';
import '../../components/floors/plumb-floors.define.js';
import '../../components/links/plumb-links.define.js';
import type { PlumbElement } from '../../components/plumb-element.js';
import { sheet } from './within.js';

const INK = { light: 'rgb(22, 33, 42)', dark: 'rgb(231, 233, 228)', print: 'rgb(0, 0, 0)' };
const ink = (element: PlumbElement) => getComputedStyle(sheet(element)).color;
const floors = html`<plumb-floors dh="3.2(1) m" g="9.81 m/s²"></plumb-floors>`;

describe('palette', () => {
  afterEach(async () => {
    await emulateMedia({ colorScheme: 'light', media: 'screen' });
    document.documentElement.removeAttribute('data-theme');
  });

  it('follows the reader’s system where the page says nothing', async () => {
    await emulateMedia({ colorScheme: 'dark' });
    const element = await fixture<PlumbElement>(floors);
    expect(ink(element)).to.equal(INK.dark);
    // and paints its own ground, for the page's would not carry it
    expect(getComputedStyle(sheet(element)).backgroundColor).to.equal('rgb(16, 24, 29)');
    await emulateMedia({ colorScheme: 'light' });
    await aTimeout(100);
    await element.updateComplete;
    expect(ink(element)).to.equal(INK.light);
  });

  it('is set by data-theme, near or on the page, while it changes', async () => {
    await emulateMedia({ colorScheme: 'dark' });
    const element = await fixture<PlumbElement>(floors);
    document.documentElement.dataset['theme'] = 'light';
    await nextFrame();
    await element.updateComplete;
    expect(ink(element)).to.equal(INK.light);
    element.dataset['theme'] = 'dark';
    await nextFrame();
    await element.updateComplete;
    expect(ink(element)).to.equal(INK.dark);
  });

  it('follows the ground that the page paints, and leaves it as it is', async () => {
    await emulateMedia({ colorScheme: 'dark' });
    for (const [ground, wanted] of [
      ['#ffffff', INK.light],
      ['#101418', INK.dark],
    ] as const) {
      const box = document.createElement('div');
      box.style.background = ground;
      const element = await fixture<PlumbElement>(floors, { parentNode: box });
      expect(ink(element), ground).to.equal(wanted);
      expect(getComputedStyle(sheet(element)).backgroundColor, ground).to.equal('rgba(0, 0, 0, 0)');
    }
    const grey = document.createElement('div');
    grey.style.background = '#b0b0b0';
    const element = await fixture<PlumbElement>(floors, { parentNode: grey });
    expect(ink(element)).to.equal(INK.light);
    expect(getComputedStyle(sheet(element)).backgroundColor).to.equal('rgb(250, 250, 247)');
  });

  it('is that of paper in print, whatever the screen', async () => {
    document.documentElement.dataset['theme'] = 'dark';
    const element = await fixture<PlumbElement>(floors);
    expect(ink(element)).to.equal(INK.dark);
    await emulateMedia({ media: 'print' });
    expect(ink(element)).to.equal(INK.print);
    const copy = element.shadowRoot!.querySelector('.cite button')!;
    expect(getComputedStyle(copy).display).to.equal('none');
  });

  it('gives way to the page’s own custom properties', async () => {
    const box = document.createElement('div');
    box.style.setProperty('--plumb-ink', 'rgb(1, 2, 3)');
    const element = await fixture<PlumbElement>(floors, { parentNode: box });
    expect(ink(element)).to.equal('rgb(1, 2, 3)');
  });
});

describe('type', () => {
  const family = (element: PlumbElement, selector: string) =>
    getComputedStyle(element.shadowRoot!.querySelector(selector)!).fontFamily;

  it('is the article’s in an article, but for the symbols', async () => {
    const box = document.createElement('div');
    box.style.fontFamily = 'Courier';
    const element = await fixture<PlumbElement>(floors, { parentNode: box });
    for (const part of ['.s1', 'table', 'input', '.btn', 'svg text'])
      expect(family(element, part), part).to.equal('Courier');
    expect(family(element, 'i.s')).to.contain('Palatino');
    box.style.setProperty('--plumb-font-text', 'Georgia');
    expect(family(element, '.s1')).to.equal('Georgia');
  });

  it('is the sheet’s own elsewhere', async () => {
    const box = document.createElement('div');
    box.style.fontFamily = 'Courier';
    const element = await fixture<PlumbElement>(html`<plumb-links></plumb-links>`, { parentNode: box });
    expect(getComputedStyle(sheet(element)).fontFamily).to.contain('Palatino');
  });
});
