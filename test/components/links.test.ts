import { expect, html, nextFrame } from '@open-wc/testing';
import { sendKeys, setViewport } from '@web/test-runner-commands';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import { type StripValue, stripReach } from '../../components/charts/residual-strip.js';
import type { PlumbLinks } from '../../components/links/plumb-links.js';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/links/plumb-links.define.js';
import { fetchExample } from './example.js';
import { boxed, overflowing, words } from './within.js';

async function shown(text: string, widthPx = 1216) {
  const script = document.createElement('script');
  script.type = 'application/json';
  script.textContent = text;
  const campaign = await boxed<PlumbCampaign>(
    html`<plumb-campaign>${script}<plumb-links>fallback</plumb-links></plumb-campaign>`,
    widthPx,
  );
  const links = campaign.querySelector<PlumbLinks>('plumb-links')!;
  await nextFrame();
  await links.updateComplete;
  return { campaign, links };
}

const rows = (links: PlumbLinks, table = '.links'): (string | undefined)[][] =>
  [...links.shadowRoot!.querySelectorAll<HTMLTableRowElement>(`${table} tbody tr`)].map((row) =>
    [...row.cells].map((cell) => cell.textContent?.replace(/\s+/g, ' ').trim()),
  );

/** The example with other values measured. */
const measured = (
  text: string,
  change: (file: { measurements: { y: string; link: string; use?: string }[] }) => void,
) => {
  const file = JSON.parse(text);
  change(file);
  return JSON.stringify(file);
};

describe('plumb-links with measurements', () => {
  afterEach(() => setViewport({ width: 1280, height: 900 }));

  it('sets measured beside predicted, offset of unlike transitions on a second line', async () => {
    const text = await fetchExample();
    const { links } = await shown(text);
    // three-sites.evaluate.json of an independent solver, y and u in 1e-18
    const expected = JSON.parse(await (await fetch('/test/data/examples/three-sites.evaluate.json')).text());
    const inUnits = (value: number) => value * 1e18;
    const number = (shown: string | undefined) => Number.parseFloat(shown!.replace('\u2212', '-'));
    for (const { id, measured: y, residual, verdict } of expected.links) {
      const row = rows(links).find(([name]) => name?.startsWith(id))!;
      const [, , , predicted, found, difference, millimetres, , words] = row;
      expect(Math.abs(number(found) - inUnits(y.value))).to.be.at.most(0.051);
      expect(Math.abs(number(difference) - inUnits(residual.value))).to.be.at.most(0.051);
      // c²/ḡ: 1e-18 is 9.155 mm at 9.817 m/s²
      const mm = (inUnits(residual.value) * 0.0898755179e3) / 9.817;
      expect(Math.abs(number(millimetres) - mm)).to.be.at.most(0.6);
      expect(words!.startsWith(verdict)).to.equal(true);
      if (id === 'rp') expect(predicted).to.match(/\+21\.0\(7\.0\)$/);
    }
    const unmeasured = rows(links).find(([name]) => name?.startsWith('ph'))!;
    expect(unmeasured.slice(4, 7)).to.deep.equal(['none', 'none', 'none']);
    expect(unmeasured.at(-1)).to.match(/^not measured Planned: .+ or more would show\.$/);
  });

  it('heads, sentence, and heights by the clocks', async () => {
    const { links } = await shown(await fetchExample());
    const heads = [...links.shadowRoot!.querySelectorAll('.links thead tr:last-child th')].map((th) =>
      th.textContent?.replace(/\s+/g, ' ').trim(),
    );
    expect(heads.slice(0, 7)).to.deep.equal([
      'link',
      'length / m',
      'ΔW / m²/s²',
      'y / 1e-18',
      'y / 1e-18',
      'y / 1e-18',
      'length / mm',
    ]);
    expect(words(links, '.say')).to.match(
      /^hr agrees with its prediction\. rp could not have told\. One link is not measured\.$/,
    );
    // three-sites.predict.json: dHNormal of hr 858.60242(2655); of evaluate.json: inferred by the clocks
    expect(rows(links, '.heights')[0]!.slice(0, 2)).to.deep.equal(['hr', '+858.602(27)']);
  });

  it('a verdict is a word with its reason: agree in plain ink, inconclusive italic, differ bold with the mistake that fits', async () => {
    const text = measured(await fetchExample(), (file) => {
      // 124.2e-18 less: the tie of r1, −11.16 m²/s², left out
      const hr = file.measurements.find(({ link }) => link === 'hr')!;
      hr.y = hr.y.replace(/^[\d.]+/, (y) => String((Number(y) * 1e-14 * 1e14 + 0.012).toFixed(7)));
    });
    const { links } = await shown(text);
    const verdict = links.shadowRoot!.querySelector('.v-differ')!;
    expect(verdict.textContent).to.equal('differ');
    const { fontWeight, fontStyle } = getComputedStyle(verdict);
    expect([fontWeight, fontStyle]).to.deep.equal(['700', 'normal']);
    expect(words(links, '.vd')).to.match(/differ \d+ times U\. .*mistakes? fits? in size and sign/);
    const unsure = links.shadowRoot!.querySelector('.v-inconclusive')!;
    expect(getComputedStyle(unsure).fontStyle).to.equal('italic');
    expect(words(links, '.vd')).to.match(
      /inconclusive Only .+ or more would have shown; the effect asked about is 200 mm\./,
    );
    await expect(links).to.be.accessible();
  }).timeout(30_000);

  it('draws one strip scale for the table: effect in accent, U as a bar, what is off as an arrow', async () => {
    const { links } = await shown(await fetchExample());
    const strips = [...links.shadowRoot!.querySelectorAll('svg.strip')];
    expect(strips).to.have.length(2);
    for (const strip of strips) {
      const ticks = [...strip.querySelectorAll('.s-effect')].map((tick) => Number.parseFloat(tick.getAttribute('x1')!));
      expect(ticks).to.have.length(2);
      expect(Math.abs(ticks[0]! + ticks[1]! - 100)).to.be.lessThan(0.02);
    }
    const reach = Number.parseFloat(links.shadowRoot!.querySelector('.axis span:last-child')!.textContent!.slice(1));
    const expected = JSON.parse(await (await fetch('/test/data/examples/three-sites.evaluate.json')).text());
    const hr = expected.links.find(({ id }: { id: string }) => id === 'hr').residual;
    const bar = strips[0]!.querySelector('.s-strip')!;
    expect(Math.abs(Number.parseFloat(bar.getAttribute('width')!) - (100 * 2 * hr.u) / reach)).to.be.lessThan(0.1);
    const dot = strips[0]!.querySelector('circle')!;
    expect(Math.abs(Number.parseFloat(dot.getAttribute('cx')!) - 50 - (50 * hr.value) / reach)).to.be.lessThan(0.1);
  });

  it('without effect and target says that agreement would say nothing', async () => {
    const text = measured(await fetchExample(), (file) => {
      delete (file as { effect?: string }).effect;
      delete (file as { target?: string }).target;
    });
    const { links } = await shown(text);
    expect(words(links, '.vd')).to.contain('no verdict');
    expect(words(links, '.vd')).to.contain('The file states no effect');
  });

  it('a measurement that is only compared is in no verdict, but named', async () => {
    const text = measured(await fetchExample(), (file) => {
      file.measurements.find(({ link }) => link === 'rp')!.use = 'check';
    });
    const { links } = await shown(text);
    expect(
      rows(links)
        .find(([name]) => name?.startsWith('rp'))!
        .at(-1),
    ).to.match(/^not measured/);
    expect(words(links, '.note')).to.match(/Compared but in no verdict: measurements\.1, difference .+e-18, z = /);
  });

  it('takes a link in hand by keyboard', async () => {
    const { campaign, links } = await shown(await fetchExample());
    const name = [...links.shadowRoot!.querySelectorAll<HTMLButtonElement>('.name')].find(
      (button) => button.textContent?.trim() === 'rp',
    )!;
    name.focus();
    await sendKeys({ press: 'Enter' });
    await links.updateComplete;
    expect(name.getAttribute('aria-pressed')).to.equal('true');
    campaign.link = 'hr';
    await campaign.updateComplete;
    await links.updateComplete;
    expect(name.getAttribute('aria-pressed')).to.equal('false');
  });

  it('stays whole at 328 and 800 px, light and dark', async () => {
    const text = await fetchExample();
    for (const width of [328, 800]) {
      await setViewport({ width: width + 32, height: 900 });
      const { campaign, links } = await shown(text, width);
      expect(overflowing(links), String(width)).to.deep.equal([]);
      campaign.dataset['theme'] = 'dark';
      await nextFrame();
      await expect(links).to.be.accessible();
    }
  }).timeout(40_000);
});

describe('reach of the strips', () => {
  const strip = (value: number, expanded: number, effect: number | null, kind: StripValue['kind']): StripValue => ({
    value,
    expanded,
    effect,
    kind,
  });

  it('holds every bar that agrees and every effect, not what could not have told or differs', () => {
    expect(stripReach([strip(2, 10, 20, 'agree')])).to.equal(50);
    expect(stripReach([strip(2, 10, 15, 'agree'), strip(500, 5, 15, 'differ')])).to.equal(20);
    expect(stripReach([strip(2, 10, 15, 'agree'), strip(30, 400, 15, 'inconclusive')])).to.equal(20);
    expect(stripReach([strip(40, 50, 15, 'agree')])).to.equal(100);
  });

  it('is never zero', () => {
    expect(stripReach([])).to.equal(1);
    expect(stripReach([strip(0, 0, null, 'open')])).to.equal(1);
    expect(stripReach([strip(3, 8, null, 'differ')])).to.equal(10);
  });
});
