import { expect, nextFrame } from '@open-wc/testing';
import '../../components/index.js';
import type { PlumbElement } from '../../components/plumb-element.js';
import { fetchExample } from './example.js';

const TAGS = ['section', 'links', 'budget', 'averaging', 'tide', 'map', 'break-even', 'network', 'report', 'copy'].map(
  (name) => `plumb-${name}`,
);

/** A host that reaches for everything it can reach. */
const HOSTILE = `
  .hostile * { font: italic 900 31px/3 fantasy !important; letter-spacing: 9px; color: red; text-transform: uppercase; }
  .hostile { direction: rtl; text-align: center; text-indent: 40px; word-spacing: 20px; letter-spacing: 4px; white-space: pre;
    text-transform: uppercase; text-shadow: 2px 2px red; font-style: italic; hyphens: auto; word-break: break-all; }
  .hostile div { display: none; } .hostile svg { width: 5px; height: 5px; transform: rotate(20deg); }
  .hostile table, .hostile td, .hostile th { border: 9px solid red; padding: 33px; display: block; }
  .hostile button, .hostile input { all: unset; display: none; } .hostile p { margin: 90px; }`;

async function built(hostile: boolean): Promise<HTMLElement> {
  const box = document.createElement('div');
  box.style.width = '900px';
  box.style.background = '#ffffff';
  if (hostile) box.className = 'hostile';
  const script = document.createElement('script');
  script.type = 'application/json';
  script.textContent = await fetchExample();
  const campaign = document.createElement('plumb-campaign');
  campaign.append(script, ...TAGS.map((tag) => document.createElement(tag)));
  const floors = document.createElement('plumb-floors');
  floors.setAttribute('dh', '12.348(3) m');
  floors.setAttribute('g', '9.8125(1) m/s²');
  box.append(campaign, floors);
  document.body.append(box);
  for (let i = 0; i < 6; i++) await nextFrame();
  return box;
}

/** Where everything in an element lies, from its own corner. */
function layout(element: PlumbElement): readonly string[] {
  const { left, top } = element.shadowRoot!.querySelector('.plumb')!.getBoundingClientRect();
  // the trials of the budget run at their own pace: its tables are enough
  const all = element.localName === 'plumb-budget' ? 'table, table *' : '.plumb *';
  return [...element.shadowRoot!.querySelectorAll(all)].map((node) => {
    if (node.getClientRects().length === 0) return `${node.localName} hidden`;
    const box = node.getBoundingClientRect();
    return `${node.localName} ${[box.left - left, box.top - top, box.width, box.height].map(Math.round).join(' ')}`;
  });
}

describe('in a page that means no good', () => {
  const style = document.createElement('style');
  style.textContent = HOSTILE;

  before(() => document.head.append(style));
  after(() => style.remove());

  it('every element lies as it lies in a quiet page, right to left and under a hostile style sheet', async () => {
    const quiet = await built(false);
    const hostile = await built(true);
    for (const tag of TAGS) {
      const [there, here] = [quiet, hostile].map((box) => box.querySelector<PlumbElement>(tag)!) as [
        PlumbElement,
        PlumbElement,
      ];
      expect(there.shadowRoot!.querySelectorAll('.flt'), tag).to.have.length(0);
      const [expected, found] = [layout(there), layout(here)];
      const different = found.filter((line, i) => line !== expected[i]);
      expect(different, tag).to.deep.equal([]);
      expect(found.length, tag).to.equal(expected.length);
    }
    // the small ones take the typeface of the page, that is all
    const floors = hostile.querySelector<PlumbElement>('plumb-floors')!;
    const sentence = getComputedStyle(floors.shadowRoot!.querySelector('.s1')!);
    expect(sentence.direction).to.equal('ltr');
    expect(sentence.textTransform).to.equal('none');
    expect(sentence.fontFamily).to.equal('fantasy');
    quiet.remove();
    hostile.remove();
  }).timeout(60_000);
});
