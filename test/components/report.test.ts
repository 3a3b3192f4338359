import { expect, html, nextFrame } from '@open-wc/testing';
import { emulateMedia, setViewport } from '@web/test-runner-commands';
import type { PlumbCampaign } from '../../components/campaign/plumb-campaign.js';
import type { PlumbReport } from '../../components/report/plumb-report.js';
import type { PlumbSection } from '../../components/section/plumb-section.js';
import '../../components/campaign/plumb-campaign.define.js';
import '../../components/report/plumb-report.define.js';
import { fetchExample } from './example.js';
import { boxed, words } from './within.js';

async function shown(text: string, widthPx = 1216) {
  const script = document.createElement('script');
  script.type = 'application/json';
  script.textContent = text;
  const campaign = await boxed<PlumbCampaign>(
    html`<plumb-campaign>${script}<plumb-report>fallback</plumb-report></plumb-campaign>`,
    widthPx,
  );
  const report = campaign.querySelector<PlumbReport>('plumb-report')!;
  for (let i = 0; i < 3; i++) await nextFrame();
  await report.updateComplete;
  const section = report.shadowRoot!.querySelector<PlumbSection>('plumb-section');
  await section?.updateComplete;
  return { campaign, report, section: section! };
}

const papers = (report: PlumbReport): HTMLElement[] => [...report.shadowRoot!.querySelectorAll<HTMLElement>('.paper')];

describe('plumb-report', () => {
  afterEach(async () => {
    await emulateMedia({ media: 'screen' });
    await setViewport({ width: 1280, height: 900 });
  });

  it('holds question, answer, section, links, limits and cautions on the first sheet', async () => {
    const { report, section } = await shown(await fetchExample());
    const [first] = papers(report);
    const text = first!.textContent!.replace(/\s+/g, ' ');
    expect(text).to.contain('Three sites, two routes');
    expect(text).to.contain('Do the clocks agree with the heights, and would a discrepancy of 200 mm have shown?');
    expect(text).to.contain('hr agrees with its prediction');
    expect(text).to.contain('window2027-06-01 to 2027-06-21');
    expect(text).to.contain('Not a legal height');
    expect(text).to.contain('laser safety officer');
    expect(text).to.match(/datum north, W₀ 48 %/);
    expect(text).to.match(/computed by Plumbtick \S+ on \d{4}-\d\d-\d\d/);
    // the drawing alone, without a sentence of its own
    expect(section.shadowRoot!.querySelectorAll('[data-mark="link rp"]').length).to.be.greaterThan(0);
    expect(section.shadowRoot!.querySelector('.say')).to.equal(null);
  });

  it('has every input on the last sheet, and the conventions', async () => {
    const { report } = await shown(await fetchExample());
    const last = papers(report).at(-1)!.textContent!.replace(/\s+/g, ' ');
    expect(last).to.contain('All inputs as given');
    expect(last).to.contain('sites.ridge.determinations.0.zeta');
    expect(last).to.contain('W₀: north');
    expect(last).to.contain('Permanent tide: mean');
    expect(last).not.to.contain('--json');
  });

  it('nothing is in hand on paper, even where a link is in hand beside it', async () => {
    const { campaign, section } = await shown(await fetchExample());
    campaign.link = 'rp';
    await campaign.updateComplete;
    await section.updateComplete;
    expect(section.shadowRoot!.querySelectorAll('.held')).to.have.length(0);
  });

  it('is white paper in a dark page too', async () => {
    const { campaign, report, section } = await shown(await fetchExample());
    campaign.dataset['theme'] = 'dark';
    await nextFrame();
    await report.updateComplete;
    await section.updateComplete;
    const style = getComputedStyle(papers(report)[0]!);
    expect([style.backgroundColor, style.color]).to.deep.equal(['rgb(255, 255, 255)', 'rgb(0, 0, 0)']);
    const line = section.shadowRoot!.querySelector('.s-ground')!;
    expect(getComputedStyle(line).stroke).to.equal('rgb(0, 0, 0)');
    await expect(report).to.be.accessible();
  }).timeout(40_000);

  it('is not redrawn where it is narrower than its paper: contents, answer and Print', async () => {
    await setViewport({ width: 360, height: 800 });
    const { report } = await shown(await fetchExample(), 328);
    expect(papers(report).map((paper) => getComputedStyle(paper).display)).to.deep.equal(
      papers(report).map(() => 'none'),
    );
    expect(words(report, '.contents'))
      .to.contain('hr agrees with its prediction')
      .and.to.contain('Inputs, sources, references');
    expect(report.shadowRoot!.querySelector('.contents button')!.textContent!.trim()).to.equal('Print');
    await expect(report).to.be.accessible();
    await emulateMedia({ media: 'print' });
    expect(getComputedStyle(papers(report)[0]!).display).to.equal('block');
    expect(getComputedStyle(report.shadowRoot!.querySelector('.contents')!).display).to.equal('none');
  }).timeout(40_000);

  it('the first sheet fits on A4 for the examples', async () => {
    for (const name of ['three-sites', 'other-kinds', 'triangle']) {
      const { report } = await shown(await fetchExample(name));
      const sheet = papers(report)[0]!;
      const { paddingTop, paddingBottom } = getComputedStyle(sheet);
      const height =
        sheet.getBoundingClientRect().height - Number.parseFloat(paddingTop) - Number.parseFloat(paddingBottom);
      // A4 inside margins of 12 and 15 mm: 270 mm at 96 px per inch
      expect(height, name).to.be.at.most((270 / 25.4) * 96);
    }
  }).timeout(30_000);
});
