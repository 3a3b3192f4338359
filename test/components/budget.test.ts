import workerSource from 'inline-worker:../../components/worker/trials.worker.ts';
import { aTimeout, expect, fixture, html, oneEvent } from '@open-wc/testing';
import { emulateMedia, sendKeys, setViewport } from '@web/test-runner-commands';
import type { PlumbBudget } from '../../components/budget/plumb-budget.js';
import '../../components/budget/plumb-budget.define.js';
import '../../components/campaign/plumb-campaign.define.js';
import { runTrials, runTrialsInSlices } from '../../components/worker/run-trials.js';
import { readCampaign } from '../../lib/campaign/read.js';
import { fetchExample } from './example.js';
import { boxed, button, overflowing, words } from './within.js';

const three = await fetchExample();

const inline = (text: string) => {
  const script = document.createElement('script');
  script.type = 'application/json';
  script.textContent = text;
  return script;
};

/** Link rp of the example; no trials unless a test wants them. */
async function shown(link: string | null = 'rp', trials = 'none'): Promise<PlumbBudget> {
  const box = await fixture<HTMLElement>(html`<plumb-campaign>
    ${inline(three)}<plumb-budget link=${link ?? ''} trials=${trials}>fallback</plumb-budget>
  </plumb-campaign>`);
  const element = box.querySelector<PlumbBudget>('plumb-budget')!;
  if (link === null) element.link = null;
  await element.updateComplete;
  return element;
}

const $$ = <T extends Element>(element: PlumbBudget, selector: string): T[] => [
  ...element.shadowRoot!.querySelectorAll<T>(selector),
];
const one = <T extends Element>(element: PlumbBudget, selector: string): T => {
  const [found, ...more] = $$<T>(element, selector);
  if (!found || more.length > 0) throw new Error(`${more.length + (found ? 1 : 0)} of ${selector}`);
  return found;
};

/** A row by the words it begins with. */
function row(element: PlumbBudget, beginning: string): HTMLTableRowElement {
  const found = $$<HTMLTableRowElement>(element, '.budget tbody tr').find((tr) =>
    tr.cells[0]!.textContent!.replace(/\s+/g, ' ').trim().startsWith(beginning),
  );
  if (!found) throw new Error(`no row ${beginning}`);
  return found;
}
const cell = (tr: HTMLTableRowElement, className: string): string =>
  tr.querySelector(`.${className}`)!.textContent!.replace(/\s+/g, ' ').trim();

async function typeU(element: PlumbBudget, name: string, text: string): Promise<void> {
  const input = one<HTMLInputElement>(element, `.c-u input[aria-label^="u of ${name}"]`);
  input.value = text;
  input.dispatchEvent(new Event('input', { bubbles: true }));
  await element.updateComplete;
}

async function setFactor(element: PlumbBudget, beginning: string, index: 0 | 1 | 2): Promise<void> {
  row(element, beginning).querySelectorAll<HTMLInputElement>('.fac input')[index]!.click();
  await element.updateComplete;
}

/** Folded rows are not made before they are asked for. */
async function openGroups(element: PlumbBudget): Promise<void> {
  for (const word of $$<HTMLElement>(element, '.budget [aria-expanded="false"]')) word.click();
  await element.updateComplete;
}

const TIE = 'Clock r1, tie door to atoms';

describe('plumb-budget', () => {
  afterEach(async () => {
    await emulateMedia({ media: 'screen' });
    await setViewport({ width: 800, height: 600 });
  });

  describe('shows', () => {
    it('in a sentence: what limits, what halving it would bring, what would not help', async () => {
      const element = await shown();
      // three-sites.predict.json: u(dH) of rp is 44.3 mm
      expect(words(element, '.say')).to.match(
        /^Link rp is predicted to 44 mm; 48 % of the variance is datum north, W0\. Halving its u would bring \d\d mm; better .*gravity.* would not help\.$/,
      );
    });

    it('three scales with u and U, k and degrees of freedom', async () => {
      const element = await shown();
      const rows = $$<HTMLTableRowElement>(element, '.tri tbody tr').map((tr) =>
        [...tr.cells].map((td) => td.textContent!.replace(/\s+/g, '').trim()),
      );
      // three-sites.predict.json: dH −850.01190(4434), dW −8343.75507(43521), y −9.283680(484)e-14; U = 1.96·u
      expect(rows).to.deep.equal([
        ['predicted', '\u2212850.012(44)', '\u22128343.76(44)', '\u221292836.8(4.8)'],
        ['u', '0.044', '0.44', '4.8'],
        ['U', '0.087', '0.85', '9.5'],
      ]);
      expect(words(element, '.trinote')).to.equal('U with k = 1.96, 95 %, normal');
    });

    it('every input under its source by falling share; sources outlined, a negative share left of zero with its reason', async () => {
      const element = await shown();
      const shares = $$<HTMLTableRowElement>(element, '.budget')[0]!.querySelectorAll<HTMLTableRowElement>(
        'tbody tr:not(.kid):not(.rest)',
      );
      const numbers = [...shares].map((tr) => Number(cell(tr, 'c-sh').replace('\u2212', '-')));
      expect(numbers).to.deep.equal([...numbers].sort((a, b) => b - a));
      expect(Math.abs(numbers.reduce((s, x) => s + x, 0) - 100)).to.be.lessThan(0.5);
      expect(row(element, 'Datum').querySelector('rect')!.getAttribute('class')).to.equal('s-bar');
      const source = row(element, 'Quasigeoid');
      expect(source.querySelector('rect')!.getAttribute('class')).to.equal('s-grp');
      await openGroups(element);
      const negative = row(element, 'Harbour, ζ');
      expect(cell(negative, 'c-sh')).to.equal('\u22120.7');
      expect(negative.textContent).to.contain('takes part of the others’ away');
      const bar = negative.querySelector('rect')!;
      expect(bar.getAttribute('class')).to.equal('s-neg');
      const zero = negative.querySelector('line.s-axis')!.getAttribute('x1')!;
      const end = Number.parseFloat(bar.getAttribute('x')!) + Number.parseFloat(bar.getAttribute('width')!);
      expect(Math.abs(end - Number.parseFloat(zero))).to.be.lessThan(0.02);
    });

    it('the cancellation inside a source: independent, wholly common, what is left', async () => {
      const element = await shown();
      await openGroups(element);
      const cancel = $$<HTMLTableRowElement>(element, 'tr.cancel').find((tr) => tr.textContent!.includes('2.8e-18'))!;
      expect(cancel.textContent!.replace(/\s+/g, ' ')).to.match(
        /what cancels: independent they would make 2\.8e-18, wholly common \d\.\d+e-18; 2\.5e-18 is left/,
      );
      expect(cancel.querySelectorAll('rect.s-bar').length).to.equal(3);
    });

    it('what only the comparison contains, what it could show and when the target is met', async () => {
      const element = await shown('hr');
      const text = words(element, '.comparison');
      // of an independent solver
      const { links } = JSON.parse(await (await fetch('/test/data/examples/three-sites.plan.json')).text());
      const mm = Math.round(1000 * links[0].smallestDetectable);
      expect((links[0].timeToTarget / 86400).toFixed(2)).to.equal('0.81');
      expect(text).to.contain(`Over the window a discrepancy of ${mm} mm or more would show`);
      expect(text).to.match(/The target of 30 mm is met after 0\.81 d/);
      expect(text).to.contain('systematic');
    });

    it('the questions, answered after the numbers stand', async () => {
      const element = await shown();
      await aTimeout(200);
      await element.updateComplete;
      const text = words(element, '.three');
      expect(text).to.contain('Half the u of datum');
      expect(text).to.contain('No. g and its gradient at the two ends make');
      expect(text).to.contain('If a tide label is wrong');
      expect(text).to.contain('A better value there alone would not help');
      button(element, 'show numbers').click();
      await element.updateComplete;
      expect(one(element, '#q-help').className).to.equal('');
    });

    it('the first link without one in hand, and another when it is chosen', async () => {
      const element = await shown(null);
      expect(words(element, '.say')).to.match(/^Link hr /);
      const select = one<HTMLSelectElement>(element, 'h2 select');
      setTimeout(() => {
        select.value = 'ph';
        select.dispatchEvent(new Event('change'));
      });
      const { detail } = await oneEvent(element, 'plumb-select');
      expect(detail).to.deep.equal({ link: 'ph' });
      await element.updateComplete;
      expect(words(element, '.say')).to.match(/^Link ph /);
    });
  });

  describe('what if', () => {
    it('a factor: u moves at once, the stated value struck beside it, every bar with a tick; the campaign stays', async () => {
      const element = await shown();
      const before = element.uM!;
      expect(before.whatIf).to.equal(null);
      setTimeout(() => void setFactor(element, TIE, 0));
      const { detail } = await oneEvent(element, 'plumb-what-if');
      expect(detail.link).to.equal('rp');
      expect(detail.uM).to.equal(before.stated);
      expect(detail.uIfM).to.be.lessThan(before.stated);
      const tie = row(element, TIE);
      expect(tie.className).to.contain('ed');
      expect(cell(tie, 'c-uy')).to.match(/^\u22122\.18 \u22121\.09$/);
      expect(words(element, '.whatif')).to.match(/u\(y\) 4\.84 now 4\.46e-18, 41 mm, U 80 mm/);
      const bars = $$(element, '.budget')[0]!.querySelectorAll('.c-bar svg.bar');
      for (const bar of bars) expect(bar.querySelectorAll('line.s-wi').length).to.equal(1);
      expect(element.uM!.stated).to.equal(before.stated);
      expect(words(element, '.tri')).to.contain('0.044');
      button(element, 'Put back').click();
      await element.updateComplete;
      expect(element.uM).to.deep.equal(before);
      expect($$(element, 'line.s-wi').length).to.equal(0);
    });

    it('a value typed over, of an input and of a source; Esc puts it back', async () => {
      const element = await shown();
      await typeU(element, 'quasigeoid', '1 cm');
      expect(words(element, '.whatif')).to.contain('quasigeoid: u = 10 mm');
      const geoid = element.uM!.whatIf!;
      expect(geoid).to.be.lessThan(element.uM!.stated);
      await typeU(element, 'clock r1, tie door to atoms', '1 mm');
      expect(element.uM!.whatIf!).to.be.lessThan(geoid);
      expect($$(element, '.whatif li').length).to.equal(2);
      const field = one<HTMLInputElement>(element, '.c-u input[aria-label^="u of clock r1, tie door to atoms"]');
      field.focus();
      await sendKeys({ press: 'Escape' });
      await element.updateComplete;
      expect(element.uM!.whatIf).to.equal(geoid);
    });

    it('what cannot be read stays as typed, with read, why and write; the rest stays computed', async () => {
      const element = await shown();
      await setFactor(element, 'Datum', 0);
      const good = element.uM!.whatIf;
      await typeU(element, 'clock r1, tie door to atoms', '3 kg');
      const field = one<HTMLInputElement>(element, '.c-u input[aria-label^="u of clock r1, tie door to atoms"]');
      expect(field.value).to.equal('3 kg');
      expect(field.getAttribute('aria-invalid')).to.equal('true');
      const fault = element.shadowRoot!.getElementById(field.getAttribute('aria-describedby')!)!;
      expect(fault.getAttribute('role')).to.equal('alert');
      expect(fault.textContent).to.contain('unknown unit');
      expect(element.uM!.whatIf).to.equal(good);
    });

    it('a correlation; one that no errors can have is refused in words', async () => {
      const element = await shown();
      await openGroups(element);
      const field = $$<HTMLInputElement>(element, 'tr.cancel input')[0]!;
      field.value = '1000 km';
      field.dispatchEvent(new Event('input', { bubbles: true }));
      await element.updateComplete;
      expect(element.uM!.whatIf!).to.not.equal(element.uM!.stated);
      expect(words(element, '.whatif')).to.contain('correlation length 1000 km');
      field.value = '-3 km';
      field.dispatchEvent(new Event('input', { bubbles: true }));
      await element.updateComplete;
      expect(field.getAttribute('aria-invalid')).to.equal('true');
      expect(element.uM!.whatIf).to.equal(null);
    });

    it('systematics and frequency ratios move what the comparison could show, not the prediction', async () => {
      const element = await shown('rp');
      await setFactor(element, 'Offset of 171Yb', 0);
      expect(element.uM!.whatIf).to.equal(element.uM!.stated);
      expect(words(element, '.whatif')).to.match(/smallest discrepancy that would show 230 mm now 170 mm/);
    });

    it('stays when another link is taken in hand: it is a change of the whole campaign', async () => {
      const element = await shown('rp');
      await setFactor(element, 'Datum', 0);
      element.link = 'ph';
      await element.updateComplete;
      expect(element.uM!.whatIf!).to.be.lessThan(element.uM!.stated);
    });
  });

  describe('trials', () => {
    const task = { campaign: readCampaign(three).campaign, link: 1, trials: 20_000, seed: 1 } as const;
    const control = (signal = new AbortController().signal) => ({ signal, onProgress: () => undefined });

    it('run in a worker and on the page alike, to the last bit', async () => {
      const [a, b] = await Promise.all([runTrials(task, control()), runTrialsInSlices(task, control())]);
      expect(a).to.deep.equal(b);
      expect(a.outputs[0]!.name).to.equal('rp');
      expect(a.trials).to.equal(20_000);
    });

    it('come out of a worker, and out of the page where a policy refuses one at once or later', async () => {
      const address = URL.createObjectURL(new Blob([workerSource], { type: 'text/javascript' }));
      const worker = new Worker(address);
      worker.postMessage(task);
      const kinds = new Set<string>();
      await new Promise<void>((resolve) => {
        worker.onmessage = ({ data }: MessageEvent<{ kind: string }>) => {
          kinds.add(data.kind);
          if (data.kind !== 'progress') resolve();
        };
      });
      worker.terminate();
      expect([...kinds].at(-1)).to.equal('result');

      const expected = await runTrialsInSlices(task, control());
      const { Worker: real } = window;
      const refused = [
        class {
          constructor() {
            throw new DOMException('refused', 'SecurityError');
          }
        },
        class extends EventTarget {
          onerror: ((event: Event) => void) | null = null;
          postMessage() {
            setTimeout(() => this.onerror?.(new Event('error', { cancelable: true })), 20);
          }
          terminate() {}
        },
      ];
      try {
        for (const stand of refused) {
          window.Worker = stand as unknown as typeof Worker;
          expect(await runTrials(task, control())).to.deep.equal(expected);
        }
      } finally {
        window.Worker = real;
      }
    });

    it('can be cancelled, both ways', async () => {
      for (const run of [runTrials, runTrialsInSlices]) {
        const abort = new AbortController();
        const running = run({ ...task, trials: 50_000_000 }, control(abort.signal));
        setTimeout(() => abort.abort(), 60);
        let name = '';
        await running.catch((error: Error) => {
          name = error.name;
        });
        expect(name).to.equal('AbortError');
      }
    });

    it('leave the page alive: no slice takes long', async () => {
      let longest = 0;
      let last = performance.now();
      let going = true;
      const tick = () => {
        const now = performance.now();
        longest = Math.max(longest, now - last);
        last = now;
        if (going) setTimeout(tick, 0);
      };
      tick();
      await runTrialsInSlices({ ...task, trials: 200_000 }, control());
      going = false;
      // a slice is 8 ms and one sequence of trials more; a busy machine is no fault
      expect(longest).to.be.lessThan(1500);
    });

    it('stand beside the linear result with both intervals and a verdict', async () => {
      const element = await shown('rp', '20000');
      for (let i = 0; i < 200 && $$(element, 'svg.hist').length === 0; i++) await aTimeout(50);
      const figure = one(element, 'svg.hist');
      expect(figure.getAttribute('role')).to.equal('img');
      // 95 % of a normal with u = 4.84e-18: ±9.49; 20 000 trials know the ends to about 0.1
      const [, low, high, fromText, toText] =
        /Linear 95.%: (\S+) to (\S+); trials 95.%: (\S+) to (\S+)\./.exec(figure.getAttribute('aria-label')!) ?? [];
      expect([low, high]).to.deep.equal(['\u22129.49', '+9.49']);
      const [from, to] = [fromText!, toText!].map((t) => Number(t.replace('\u2212', '-')));
      expect(Math.abs(from! + 9.49)).to.be.lessThan(0.4);
      expect(Math.abs(to! - 9.49)).to.be.lessThan(0.4);
      expect(words(element, '.two')).to.match(
        /The linear result holds as far as so many trials can tell Monte Carlo with 20000 trials, seed 1: u = 4\.8\de-18/,
      );
    });

    it('more of them when asked, with progress and cancel', async () => {
      const element = await shown('rp');
      expect($$(element, 'svg.hist').length).to.equal(0);
      button(element, 'Run 100').click();
      for (let i = 0; i < 200 && $$(element, 'svg.hist').length === 0; i++) await aTimeout(50);
      expect($$(element, 'svg.hist').length).to.equal(1);
    });
  });

  describe('goes out', () => {
    it('as text in every form, and as a figure', async () => {
      const element = await shown();
      button(element, 'export this budget').click();
      await element.updateComplete;
      const beginnings: [string, RegExp][] = [
        ['Markdown', /^# Uncertainty of link rp/],
        ['MediaWiki', /^== Uncertainty of link rp/],
        ['LaTeX', /^% Computed by Plumbtick/],
        ['HTML', /^<section>/],
        ['CSV', /^quantity,length \/ m/],
        ['SVG', /^<svg xmlns/],
      ];
      for (const [form, beginning] of beginnings) {
        const radio = $$<HTMLLabelElement>(element, '.export label').find((l) => l.textContent === form)!;
        radio.querySelector('input')!.click();
        await element.updateComplete;
        const text = one(element, '.export pre').textContent!;
        expect(text).to.match(beginning);
        expect(text).to.match(/Computed by Plumbtick \d/);
        expect(text).to.contain('Permanent tide');
      }
    });

    it('changed, with what was changed in it', async () => {
      const element = await shown();
      await setFactor(element, TIE, 0);
      button(element, 'Copy the changed budget').click();
      await aTimeout(100);
      await element.updateComplete;
      const text = one(element, '.export pre').textContent!;
      expect(text).to.contain('What if, not as stated: clock r1, tie door to atoms: u times 0.5');
      expect(words(element, '.whatif')).to.match(/copied|marked; copy it/);
    });
  });

  describe('alone', () => {
    it('with the campaign in a child, and in an attribute', async () => {
      const child = await fixture<PlumbBudget>(html`<plumb-budget trials="none">${inline(three)}</plumb-budget>`);
      await child.updateComplete;
      expect(words(child, '.say')).to.match(/^Link hr is predicted/);
      one<HTMLSelectElement>(child, 'h2 select').value = 'rp';
      one<HTMLSelectElement>(child, 'h2 select').dispatchEvent(new Event('change'));
      await child.updateComplete;
      expect(words(child, '.say')).to.match(/^Link rp is predicted/);
      const attribute = await fixture<PlumbBudget>(
        html`<plumb-budget trials="none" link="ph" json=${three}></plumb-budget>`,
      );
      expect(words(attribute, '.say')).to.match(/^Link ph is predicted/);
    });

    it('says where its own text cannot be read', async () => {
      const element = await fixture<PlumbBudget>(
        html`<plumb-budget json=${three.replace('"lat"', '"latt"')}></plumb-budget>`,
      );
      expect(words(element, '.flt')).to.contain('Not computed: the campaign cannot be read');
      expect(words(element, '.flt')).to.contain('latt');
      expect(words(element)).to.not.contain('NaN');
    });

    it('without anything: the fallback, and what to do', async () => {
      const element = await fixture<PlumbBudget>(html`<plumb-budget><p>fallback</p></plumb-budget>`);
      expect(element.textContent).to.equal('fallback');
      expect(words(element)).to.contain('No campaign is loaded');
    });
  });

  describe('for everyone', () => {
    it('axe, as it opens and with everything open', async () => {
      const element = await shown('rp', '1000');
      await aTimeout(600);
      await element.updateComplete;
      await expect(element).to.be.accessible();
      for (const word of $$<HTMLElement>(element, '[aria-expanded="false"]')) word.click();
      await setFactor(element, TIE, 0);
      await typeU(element, 'quasigeoid', '3 kg');
      await expect(element).to.be.accessible();
    });

    it('axe in the dark', async () => {
      await emulateMedia({ colorScheme: 'dark' });
      const box = document.createElement('div');
      box.dataset['theme'] = 'dark';
      box.style.background = '#10181d';
      const element = await fixture<PlumbBudget>(html`<plumb-budget trials="none" json=${three}></plumb-budget>`, {
        parentNode: box,
      });
      await aTimeout(50);
      await expect(element).to.be.accessible();
      await emulateMedia({ colorScheme: 'light' });
    });

    it('all controls by keyboard, in order, factors as one group of radio inputs', async () => {
      const element = await shown();
      const tie = row(element, TIE);
      const [half, stated] = tie.querySelectorAll<HTMLInputElement>('.fac input');
      expect(half!.type).to.equal('radio');
      expect(half!.name).to.equal(stated!.name);
      stated!.focus();
      await sendKeys({ press: 'ArrowLeft' });
      await element.updateComplete;
      expect(element.uM!.whatIf!).to.be.lessThan(element.uM!.stated);
      expect($$(element, '[tabindex]:not([tabindex="0"])').length).to.equal(0);
    });

    it('a screen reader is told of a change, and gets every number of the bars as text', async () => {
      const element = await shown();
      expect(one(element, '.whatif').getAttribute('role')).to.equal('status');
      for (const svg of $$(element, '.budget svg')) expect(svg.getAttribute('aria-hidden')).to.equal('true');
      for (const tr of $$<HTMLTableRowElement>(element, '.budget tbody tr:not(.rest):not(.cancel):not(.why)'))
        expect(cell(tr, 'c-sh')).to.match(/^\u2212?\d+\.\d$/);
    });

    it('at 360 px nothing sticks out; the row in hand shows its control', async () => {
      await setViewport({ width: 360, height: 800 });
      const element = await boxed<PlumbBudget>(
        html`<plumb-budget link="rp" trials="1000" json=${three}></plumb-budget>`,
        328,
      );
      await aTimeout(700);
      await element.updateComplete;
      expect(overflowing(element)).to.deep.equal([]);
      const tie = row(element, TIE);
      const control = tie.querySelector<HTMLElement>('.c-ctl')!;
      expect(getComputedStyle(control).display).to.equal('none');
      [...tie.querySelectorAll<HTMLElement>('.word')].find((b) => b.textContent!.includes('what if'))!.click();
      await element.updateComplete;
      expect(getComputedStyle(control).display).to.equal('block');
      await setFactor(element, TIE, 2);
      expect(overflowing(element)).to.deep.equal([]);
      await expect(element).to.be.accessible();
    });

    it('prints stated values with all groups open, no controls', async () => {
      const element = await shown();
      await setFactor(element, TIE, 0);
      const kids = $$(element, 'tr.kid').length;
      await emulateMedia({ media: 'print' });
      await aTimeout(50);
      await element.updateComplete;
      expect($$(element, 'tr.kid').length).to.be.greaterThan(kids);
      expect($$<HTMLElement>(element, 'tr.kid').every((tr) => getComputedStyle(tr).display === 'table-row')).to.equal(
        true,
      );
      for (const hidden of $$<HTMLElement>(element, '.fac, .whatif, .btn, .word, .now, input'))
        expect(hidden.checkVisibility()).to.equal(false);
      const was = row(element, TIE).querySelector<HTMLElement>('.c-uy .was')!;
      expect(getComputedStyle(was).textDecorationLine).to.equal('none');
      const stated = row(element, TIE).querySelector<HTMLElement>('.c-u .only-print')!;
      expect(stated.checkVisibility()).to.equal(true);
      expect(stated.textContent).to.equal('20\u00a0mm');
    });

    it('carries no style attribute', async () => {
      const element = await shown('rp', '1000');
      await aTimeout(600);
      expect($$(element, '[style]').length).to.equal(0);
    });
  });
});
