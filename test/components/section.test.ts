import { expect, html, nextFrame } from '@open-wc/testing';
import { emulateMedia, sendKeys, setViewport } from '@web/test-runner-commands';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import type { PlumbSection } from '../../components/section/plumb-section.js';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/section/plumb-section.define.js';
import { multiples, roundStep, stepLabel } from '../../components/charts/round-step.js';
import { sectionScale } from '../../components/charts/section-scale.js';
import { fetchExample } from './example.js';
import { boxed, button, overflowing, words } from './within.js';

const inline = (text: string) => {
  const script = document.createElement('script');
  script.type = 'application/json';
  script.textContent = text;
  return script;
};

/** Laid out, measured and drawn for its width. */
async function settled(section: PlumbSection): Promise<void> {
  for (let i = 0; i < 3; i++) await nextFrame();
  await section.updateComplete;
}

async function shown(text: string, widthPx = 1216): Promise<{ campaign: PlumbCampaign; section: PlumbSection }> {
  const campaign = await boxed<PlumbCampaign>(
    html`<plumb-campaign>${inline(text)}<plumb-section>fallback</plumb-section></plumb-campaign>`,
    widthPx,
  );
  const section = campaign.querySelector<PlumbSection>('plumb-section')!;
  await settled(section);
  return { campaign, section };
}

const mark = (section: PlumbSection, key: string): SVGGElement =>
  section.shadowRoot!.querySelector<SVGGElement>(`[data-mark="${key}"][role]`)!;

/** y of a horizontal line or of the centre of a circle inside a mark. */
const number = (element: Element | null, attribute: string): number => Number(element?.getAttribute(attribute));

describe('plumb-section', () => {
  afterEach(async () => {
    await emulateMedia({ media: 'screen' });
    await setViewport({ width: 1280, height: 900 });
  });

  it('says who lies above whom and what the tie is', async () => {
    const { section } = await shown(await fetchExample());
    // test/data/examples: ridge is 851 m above plain and 861 m above harbour; the steps −2.4470(8) m and +1.31(2) m
    expect(words(section, '.say')).to.equal(
      'ridge lies 851 m above plain and 861 m above harbour. The tie of r1, from marker to atoms, is 1.137 m downward, known to 20 mm.',
    );
    expect(words(section, '.by')).to.match(/^Computed by Plumbtick \S+ on \d{4}-\d\d-\d\d\.$/);
    expect(words(section, '.note')).to.contain('no terrain is drawn');
  });

  it('places markers and atoms by their potential, all on one scale across the break', async () => {
    const { section } = await shown(await fetchExample());
    const y = (id: string) => number(mark(section, `clock ${id}`).querySelector('.s-ring'), 'cy');
    const ground = (id: string) => number(mark(section, `site ${id}`).querySelector('.s-ground'), 'y1');
    // of the independent solver's values: W of the markers and of the atoms, m²/s²
    const expected = JSON.parse(await (await fetch('/test/data/examples/three-sites.predict.json')).text());
    const W = (list: { id: string; W: { value: number } }[], id: string) => list.find((one) => one.id === id)!.W.value;
    const pxPerUnit = (ground('ridge') - y('r1')) / (W(expected.sites, 'ridge') - W(expected.clocks, 'r1'));
    expect(pxPerUnit).to.be.greaterThan(0.5);
    const harbour = (ground('harbour') - y('h1')) / (W(expected.sites, 'harbour') - W(expected.clocks, 'h1'));
    expect(Math.abs(harbour - pxPerUnit)).to.be.lessThan(0.01);
    // p1 stands at its marker
    expect(Math.abs(ground('plain') - y('p1'))).to.be.lessThan(0.01);
    // below the break too, from site to site
    const across = (ground('harbour') - ground('plain')) / (W(expected.sites, 'harbour') - W(expected.sites, 'plain'));
    expect(Math.abs(across - pxPerUnit)).to.be.lessThan(0.01);
    expect(section.shadowRoot!.querySelector('.fig')!.textContent).to.match(
      /82\d\d.*left out|8\s?2\d0 m²\/s² \(84\d m\) left out/,
    );
  });

  it('draws uncertainty 30 times the height scale and says so', async () => {
    const { section } = await shown(await fetchExample());
    const expected = JSON.parse(await (await fetch('/test/data/examples/three-sites.predict.json')).text());
    const band = mark(section, 'site ridge').querySelector('.s-band');
    const clock = mark(section, 'clock r1').querySelector('.s-ring');
    const ridge = expected.sites.find(({ id }: { id: string }) => id === 'ridge').W;
    const r1 = expected.clocks.find(({ id }: { id: string }) => id === 'r1').W;
    const pxPerUnit =
      (number(mark(section, 'site ridge').querySelector('.s-ground'), 'y1') - number(clock, 'cy')) /
      (ridge.value - r1.value);
    expect(Math.abs(number(band, 'height') - 2 * 30 * ridge.u * pxPerUnit)).to.be.lessThan(0.2);
    expect(words(section, '.key-row')).to.contain('30 times the height scale');
  });

  it('a link is taken in hand by pointer and by keyboard, and every element of the campaign is told', async () => {
    const { campaign, section } = await shown(await fetchExample());
    const told: (string | null)[] = [];
    campaign.addEventListener('plumb-select', (event) => told.push(event.detail.link));
    mark(section, 'link rp').dispatchEvent(new MouseEvent('click', { bubbles: true, composed: true }));
    await section.updateComplete;
    expect(mark(section, 'link rp').getAttribute('aria-pressed')).to.equal('true');
    expect(words(section, '.reading')).to.contain(
      'rp r1 to p1, fibre, 640 km −850.012(44) m −8343.76(44) m²/s² −92836.8(4.8)e-18',
    );
    // one stop for Tab, the arrows go from mark to mark
    const stops = section.shadowRoot!.querySelectorAll('[data-mark][tabindex="0"]');
    expect(stops).to.have.length(1);
    (stops[0] as SVGGElement).focus();
    await sendKeys({ press: 'End' });
    await sendKeys({ press: 'Home' });
    await sendKeys({ press: 'ArrowLeft' });
    await sendKeys({ press: 'ArrowRight' });
    expect(section.shadowRoot!.activeElement?.getAttribute('data-mark')).to.equal('site harbour');
    for (let i = 0; i < 3; i++) await sendKeys({ press: 'ArrowDown' });
    expect(section.shadowRoot!.activeElement?.getAttribute('data-mark')).to.equal('link hr');
    await section.updateComplete;
    expect(words(section, '.reading')).to.contain('hr h1 to r1, fibre, 70 km 858.539(27) m');
    await sendKeys({ press: 'Enter' });
    await section.updateComplete;
    expect(mark(section, 'link hr').getAttribute('aria-pressed')).to.equal('true');
    await sendKeys({ press: 'Escape' });
    await section.updateComplete;
    expect(section.shadowRoot!.querySelectorAll('[aria-pressed="true"]')).to.have.length(0);
    expect(told).to.deep.equal(['rp', 'hr', null]);
  });

  it('speaks every mark with its numbers', async () => {
    const { section } = await shown(await fetchExample());
    expect(mark(section, 'link rp').getAttribute('aria-label')?.replace(/\s/g, ' ')).to.equal(
      'link rp, r1 to p1, fibre, 640 km: length −850.012(44) m, −8343.76(44) m²/s², −92836.8(4.8)e-18',
    );
    expect(mark(section, 'site ridge').getAttribute('aria-label')).to.match(
      /^site ridge, W 62628341\.03\(35\) m²\/s², C 8512\.37\(35\)/,
    );
    expect(mark(section, 'clock r1').getAttribute('aria-label')).to.contain('length −1.137(20) m');
  });

  it('the same as a table', async () => {
    const { section } = await shown(await fetchExample());
    button(section, 'show as a table').click();
    await section.updateComplete;
    const rows = [...section.shadowRoot!.querySelectorAll('tbody tr')].map((row) =>
      [...row.children].map((cell) => cell.textContent?.replace(/\s+/g, ' ').trim()),
    );
    expect(rows.find(([name]) => name === 'ridge')!.slice(0, 3)).to.deep.equal([
      'ridge',
      '62628341.03(35)',
      '8512.37(35)',
    ]);
    expect(rows).to.deep.include(['rp r1 to p1, fibre, 640 km', '−850.012(44)', '−8343.76(44)', '−92836.8(4.8)']);
    // two digits of u, one where the file gives one
    expect(rows).to.deep.include(['bolt to door', '−2.4470(8)', '−24.021(8)', '−267.27(9)']);
    await expect(section).to.be.accessible();
  }).timeout(30_000);

  it('puts the loupe on the clock that is chosen', async () => {
    const { section } = await shown(await fetchExample());
    expect(words(section, '.fig')).to.contain('Tie of clock r1');
    mark(section, 'clock h1').dispatchEvent(new MouseEvent('click', { bubbles: true, composed: true }));
    await section.updateComplete;
    expect(words(section, '.fig')).to.contain('Tie of clock h1');
  });

  it('two ends on one level are shown under the loupe, to the millimetre', async () => {
    const site = (id: string, lon: number, W: string) =>
      `{ "id": "${id}", "lat": 50, "lon": ${lon}, "g": 9.81, "determinations": [{ "kind": "potential", "W": "${W} m²/s²" }] }`;
    const { section } = await shown(`{ "format": "plumbtick-campaign/1",
      "sites": [${site('a', 8, '62630000.000(50)')}, ${site('b', 9, '62629999.902(50)')}],
      "clocks": [{ "id": "ca", "site": "a", "transition": "87Sr" }, { "id": "cb", "site": "b", "transition": "87Sr" }],
      "links": [{ "id": "ab", "from": "ca", "to": "cb" }] }`);
    // 0.098 m²/s² over 9.81 m/s²: 10.0 mm; u = √2·0.05/9.81 = 7.2 mm
    expect(words(section, '.fig')).to.contain('+10.0(7.2) mm');
    expect(words(section, '.say')).to.equal('b lies on one level with a to 7.2 mm.');
  });

  it('a site without a level is named, not drawn', async () => {
    const { section } = await shown(`{ "format": "plumbtick-campaign/1",
      "sites": [{ "id": "a", "lat": 50, "lon": 8, "g": 9.81, "determinations": [{ "kind": "potential", "W": "62630000(1) m²/s²" }] },
                { "id": "b", "lat": 50, "lon": 9, "g": 9.81, "determinations": [] }],
      "clocks": [{ "id": "ca", "site": "a", "transition": "87Sr" }, { "id": "cb", "site": "b", "transition": "87Sr" }],
      "links": [{ "id": "ab", "from": "ca", "to": "cb" }] }`);
    expect(mark(section, 'site b')).to.equal(null);
    expect(words(section, '.note')).to.contain('Not drawn, for only differences to their neighbours are known: b.');
    expect(section.shadowRoot!.innerHTML).not.to.contain('NaN');
  });

  it('no number of the drawing is lost, whatever the campaign', async () => {
    for (const name of ['three-sites', 'other-kinds', 'triangle'])
      for (const width of [1216, 800, 328]) {
        const { section } = await shown(await fetchExample(name), width);
        expect(section.shadowRoot!.innerHTML, `${name} ${width}`).not.to.match(/NaN|Infinity|undefined/);
      }
  }).timeout(30_000);

  it('is drawn anew for 328 px: two scales, ids, the numbers in lists below', async () => {
    await setViewport({ width: 360, height: 800 });
    const { section } = await shown(await fetchExample(), 328);
    expect(overflowing(section)).to.deep.equal([]);
    const heads = words(section, '.fig');
    expect(heads).to.contain('C/g').and.to.contain('C/c²');
    expect(heads).not.to.contain('m²/s²');
    expect(words(section, '.lists')).to.contain('rp r1 to p1, fibre, 640 km');
    const smallest = Math.min(
      ...[...section.shadowRoot!.querySelectorAll('svg text')].map((text) =>
        Number.parseFloat(getComputedStyle(text).fontSize),
      ),
    );
    expect(smallest).to.be.at.least(11);
    await expect(section).to.be.accessible();
  }).timeout(30_000);

  it('is accessible, light, dark and with a link in hand', async () => {
    const { campaign, section } = await shown(await fetchExample());
    await expect(section).to.be.accessible();
    campaign.link = 'rp';
    campaign.dataset['theme'] = 'dark';
    await campaign.updateComplete;
    await section.updateComplete;
    await expect(section).to.be.accessible();
  }).timeout(30_000);

  it('prints in the print palette, without controls, to the width of the paper', async () => {
    const { section } = await shown(await fetchExample());
    await emulateMedia({ media: 'print' });
    await settled(section);
    const paper = getComputedStyle(section.shadowRoot!.querySelector('.plumb')!).getPropertyValue('--p-paper').trim();
    expect(paper).to.equal('#ffffff');
    expect(getComputedStyle(section.shadowRoot!.querySelector('.disclose')!).display).to.equal('none');
    const figure = section.shadowRoot!.querySelector('.fig')!;
    const right = Math.max(...[...figure.querySelectorAll('svg')].map((svg) => svg.getBoundingClientRect().right));
    expect(right - section.getBoundingClientRect().left).to.be.at.most(674);
  });

  it('a hundred sites are scrolled inside the plate, the scales stay', async () => {
    const sites = Array.from({ length: 30 }, (_, i) => i);
    const text = JSON.stringify({
      format: 'plumbtick-campaign/1',
      sites: sites.map((i) => ({
        id: `s${i}`,
        lat: 45 + i / 10,
        lon: 8,
        g: 9.81,
        determinations: [{ kind: 'potential', W: `${62_630_000 - 37 * ((i * 7) % 30)}.0(1) m²/s²` }],
      })),
      clocks: sites.map((i) => ({ id: `c${i}`, site: `s${i}`, transition: '87Sr' })),
      links: sites.slice(1).map((i) => ({ id: `l${i}`, from: `c${i - 1}`, to: `c${i}` })),
    });
    const { section } = await shown(text);
    const scroll = section.shadowRoot!.querySelector('.scroll')!;
    expect(scroll.scrollWidth).to.be.greaterThan(2 * scroll.clientWidth);
    expect(section.getBoundingClientRect().width).to.be.at.most(1216);
    await expect(section).to.be.accessible();
  }).timeout(30_000);
});

describe('scale of the section', () => {
  const options = { top: 0, bottom: 400, padding: 30, paddingBelow: 30, breakHeight: 30, detail: 10, largestBand: 0 };

  it('breaks where kilometres would hide what is metres, and nowhere else', () => {
    const broken = sectionScale(
      [
        { from: 0, to: 10 },
        { from: 9000, to: 9010 },
      ],
      options,
    );
    expect(broken.breaks).to.have.length(1);
    expect(broken.pieces).to.have.length(2);
    const whole = sectionScale(
      [
        { from: 0, to: 10 },
        { from: 40, to: 50 },
      ],
      options,
    );
    expect(whole.breaks).to.have.length(0);
    const twice = sectionScale(
      [
        { from: 0, to: 10 },
        { from: 3000, to: 3010 },
        { from: 33_000, to: 33_010 },
      ],
      options,
    );
    expect(twice.breaks).to.have.length(2);
  });

  it('keeps one scale in all pieces, stays inside, and says what it leaves out', () => {
    const { pieces, breaks, pxPerUnit, toPx } = sectionScale(
      [
        { from: 0, to: 10 },
        { from: 9000, to: 9020 },
      ],
      options,
    );
    for (const { from, to, top, bottom } of pieces) {
      expect(Math.abs((bottom - top) / (to - from) - pxPerUnit)).to.be.lessThan(1e-9);
      expect(top).to.be.at.least(-1e-9);
      expect(bottom).to.be.at.most(400);
    }
    expect(Math.abs(breaks[0]!.leftOut - (pieces[1]!.from - pieces[0]!.to))).to.be.lessThan(1e-9);
    expect(Math.abs(toPx(0) - toPx(10) - 10 * pxPerUnit)).to.be.lessThan(1e-9);
    expect(Math.abs(toPx(9000) - toPx(9020) - 20 * pxPerUnit)).to.be.lessThan(1e-9);
    expect(toPx(9000)).to.be.lessThan(toPx(10));
  });

  it('round steps and their labels', () => {
    expect([0.3, 1, 1.5, 3, 7, 40].map(roundStep)).to.deep.equal([0.5, 1, 2, 5, 10, 50]);
    expect(multiples(0.1, 0.25, 0.55).map((value) => stepLabel(value, 0.1))).to.deep.equal(['0.3', '0.4', '0.5']);
    expect([-20, 0, 0.0000001].map((value) => stepLabel(value, 10))).to.deep.equal(['−20', '0', '0']);
  });
});
