import { aTimeout, expect } from '@open-wc/testing';
import { sendKeys } from '@web/test-runner-commands';
import { html } from 'lit';
import '../../components/desk/plumb-desk.define.js';
import type { PlumbDesk } from '../../components/desk/plumb-desk.js';
import { isObject, type JsonValue, valueAt } from '../../lib/campaign/edit/index.js';
import { boxed, overflowing, words } from './within.js';

const CAMPAIGN = JSON.stringify({
  format: 'plumbtick-campaign/1',
  title: 'Two rooms',
  effect: '5 cm',
  sites: ['a', 'b'].map((id, i) => ({
    id,
    lat: 47,
    lon: 8 + i,
    g: 9.81,
    determinations: [{ kind: 'normal-height', H: { value: `${100 + 50 * i}.00(${i + 1}) m`, tide: 'mean' } }],
  })),
  clocks: ['a', 'b'].map((id) => ({ id: `k${id}`, site: id, transition: '87Sr' })),
  links: [{ id: 'ab', from: 'ka', to: 'kb' }],
});

let serial = 0;
const freshId = () => `t${Date.now()}-${serial++}`;

async function desk(id = freshId(), text = CAMPAIGN, widthPx = 1300): Promise<PlumbDesk> {
  const element = await boxed<PlumbDesk>(
    html`<plumb-desk id=${id}><script type="application/json">${text}</script></plumb-desk>`,
    widthPx,
  );
  for (let i = 0; i < 100 && element.session.history.present === undefined; i++) await aTimeout(10);
  for (let i = 0; i < 100 && !words(element, 'h1').includes('Two') && text === CAMPAIGN; i++) await aTimeout(20);
  await element.updateComplete;
  return element;
}

const fieldAt = (element: PlumbDesk, path: string) =>
  [...element.shadowRoot!.querySelectorAll<HTMLInputElement>('input[data-path]')].find(
    (f) => f.dataset['path'] === path,
  )!;

async function typeAt(element: PlumbDesk, path: string, text: string): Promise<void> {
  const field = fieldAt(element, path);
  field.value = text;
  field.dispatchEvent(new Event('change', { bubbles: true }));
  await element.updateComplete;
}

const pressed = (element: PlumbDesk, name: string) =>
  [...element.shadowRoot!.querySelectorAll('button')].find((b) => b.textContent?.trim().startsWith(name))!;

const openRow = async (element: PlumbDesk, row: string) => {
  element.open = row;
  await element.updateComplete;
};

describe('plumb-desk', () => {
  // normal gravity of GRS80 at 47° and 125 m is 9.8076 m/s² (Moritz 2000): 50 m are 490.38 m²/s², 5456.2e-18
  it('shows the campaign in tables and the answer beside it', async () => {
    const element = await desk();
    expect(words(element, '.answer')).to.match(/Link ab is predicted to \+5456\.2/);
    expect(words(element, '.tables')).to.include('a').and.include('kb');
    await expect(element).to.be.accessible();
  });
  it('an edit moves the answer at once, and undo takes it back', async () => {
    const element = await desk();
    await openRow(element, 'sites.b');
    const before = words(element, '.answer table');
    await typeAt(element, 'sites.b.determinations.0.H', '160.00(2) m');
    expect(words(element, '.answer table')).to.not.equal(before);
    pressed(element, 'Undo').click();
    await element.updateComplete;
    expect(words(element, '.answer table')).to.equal(before);
  });
  it('an edit that cannot be read stays as typed, marked, beside the last good answer', async () => {
    const element = await desk();
    await openRow(element, 'sites.b');
    const before = words(element, '.answer table');
    await typeAt(element, 'sites.b.determinations.0.H', '160,00(2) m');
    expect(fieldAt(element, 'sites.b.determinations.0.H').value).to.equal('160,00(2) m');
    expect(words(element, '.answer')).to.include('before the last edit, which cannot be read');
    expect(words(element, '.answer table')).to.equal(before);
    const right = pressed(element, 'Write 160.00(2) m');
    right.click();
    await element.updateComplete;
    expect(element.session.faults).to.have.length(0);
    expect(words(element, '.answer')).to.not.include('before the last edit');
  });
  it('a reload loses nothing, undo included', async () => {
    const id = freshId();
    const element = await desk(id);
    await openRow(element, 'sites.b');
    await typeAt(element, 'sites.b.determinations.0.H', '170.00(2) m');
    await element.settled();
    expect(element.keeping.state).to.equal('kept');
    element.remove();
    const again = await desk(id);
    expect(valueAt(again.file, ['sites', 1, 'determinations', 0, 'H', 'value'])).to.equal('170.00(2) m');
    expect(again.session.history.past).to.have.length(1);
  });
  it('two tabs do not destroy each other’s work', async () => {
    const id = freshId();
    const one = await desk(id);
    await openRow(one, 'sites.b');
    await typeAt(one, 'sites.b.determinations.0.H', '170.00(2) m');
    await one.settled();
    const two = await desk(id);
    await typeAt(one, 'sites.b.determinations.0.H', '171.00(2) m');
    await one.settled();
    await openRow(two, 'sites.a');
    await typeAt(two, 'sites.a.determinations.0.H', '99.00(2) m');
    await two.settled();
    expect(two.keeping.state).to.equal('branched');
    one.remove();
    const again = await desk(id);
    expect(valueAt(again.file, ['sites', 1, 'determinations', 0, 'H', 'value'])).to.equal('171.00(2) m');
  });
  it('storage that refuses is said in words, with what to do', async () => {
    const real = Object.getOwnPropertyDescriptor(window, 'indexedDB');
    Object.defineProperty(window, 'indexedDB', {
      configurable: true,
      get: () => {
        throw new DOMException('denied', 'SecurityError');
      },
    });
    try {
      const element = await desk();
      await openRow(element, 'sites.b');
      await typeAt(element, 'sites.b.determinations.0.H', '170.00(2) m');
      await element.settled();
      await element.updateComplete;
      expect(words(element, '.kept')).to.match(/refuses.*Save it as a file/);
    } finally {
      if (real) Object.defineProperty(window, 'indexedDB', real);
      else delete (window as { indexedDB?: unknown }).indexedDB;
    }
  });
  it('a whole comparison is made from nothing by keyboard alone', async function () {
    this.timeout(60_000);
    const element = await desk(freshId(), '{"format":"plumbtick-campaign/1","title":"","sites":[]}');
    const root = element.shadowRoot!;
    const into = async (path: string, text: string) => {
      fieldAt(element, path).focus();
      await sendKeys({ down: 'Control' });
      await sendKeys({ press: 'a' });
      await sendKeys({ up: 'Control' });
      await sendKeys({ type: text });
      await sendKeys({ press: 'Tab' });
      await element.updateComplete;
    };
    const press = async (name: string) => {
      pressed(element, name).focus();
      await sendKeys({ press: 'Enter' });
      await element.updateComplete;
      await aTimeout(0);
    };
    const choose = async (label: string, value: string) => {
      const select = [...root.querySelectorAll<HTMLSelectElement>('select')].find(
        (s) => s.getAttribute('aria-label') === label,
      )!;
      select.focus();
      const text = [...select.options].find((o) => o.value === value)!.textContent!.trim();
      await sendKeys({ type: text });
      await sendKeys({ press: 'Tab' });
      await element.updateComplete;
    };
    for (const [i, H] of ['100.00(1) m', '150.00(2) m'].entries()) {
      const site = `site-${i + 1}`;
      await press('add a site');
      // what a site cannot do without has its field already, with the fault beside it
      await into(`sites.${site}.lat`, '47');
      await into(`sites.${site}.lon`, `${8 + i}`);
      await choose(`add to sites.${site}`, 'g');
      await into(`sites.${site}.g`, '9.81');
      await press('add to determinations');
      await choose(`sites.${site}.determinations.0.kind`, 'normal-height');
      await into(`sites.${site}.determinations.0.H`, H);
    }
    for (const i of [1, 2]) {
      await press('add a clock');
      await choose(`clocks.clock-${i}.site`, `site-${i}`);
      await choose(`clocks.clock-${i}.transition`, '87Sr');
    }
    await press('add a link');
    await choose('links.link-1.from', 'clock-1');
    await choose('links.link-1.to', 'clock-2');
    expect(element.session.faults, JSON.stringify(element.session.faults)).to.have.length(0);
    expect(words(element, '.answer')).to.match(/Link link-1 is predicted to/);
    expect(isObject(element.file as JsonValue)).to.equal(true);
  });
  it('finds a value by words and goes to it', async () => {
    const element = await desk();
    const finder = element.shadowRoot!.querySelector<HTMLInputElement>('#find')!;
    finder.value = 'b H 150';
    finder.dispatchEvent(new Event('input', { bubbles: true }));
    await element.updateComplete;
    expect(words(element, '.finder ul')).to.include('sites.b.determinations.0.H');
    finder.dispatchEvent(new KeyboardEvent('keydown', { key: 'Enter', bubbles: true }));
    await aTimeout(50);
    expect(element.open).to.equal('sites.b');
  });
  it('JSON that cannot be parsed changes nothing', async () => {
    const element = await desk();
    pressed(element, 'As JSON').click();
    await element.updateComplete;
    element.asJson = '{"format": ';
    await element.updateComplete;
    pressed(element, 'Take this').click();
    await element.updateComplete;
    expect(element.notice).to.include('no JSON yet');
    expect(words(element, 'h1')).to.include('Two rooms');
  });
  it('fits 360 px', async () => {
    const element = await desk(freshId(), CAMPAIGN, 360);
    await openRow(element, 'sites.b');
    expect(overflowing(element)).to.deep.equal([]);
  });
});
