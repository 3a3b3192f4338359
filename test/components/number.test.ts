import { expect, fixture, html } from '@open-wc/testing';
import { alignedNumber, pointColumn, quantityText } from '../../components/shared/number.js';
import { num, plainText, richText, sym } from '../../components/shared/rich-text.js';
import { sharedStyles } from '../../components/theme/shared-styles.js';
import { parseQuantity } from '../../lib/quantity/index.js';

const groupsOf = (element: Element): string[] => [...element.querySelectorAll('.g')].map((g) => g.textContent ?? '');

describe('numbers', () => {
  it('are grouped from five digits on, by spans and not by characters', async () => {
    for (const [text, groups] of [
      ['\u221292836.8(4.8)', ['92']],
      ['1.34898(33)e-15', ['348']],
      ['62636853.4(5) m²/s²', ['62', '636']],
      ['8343.76(44)', []],
      ['9.818611(3) m/s²', ['818']],
      ['0.57902(14)', ['579']],
      ['not computed', []],
    ] as const) {
      const shown = await fixture(html`<p>${quantityText(text)}</p>`);
      expect(groupsOf(shown), text).to.deep.equal(groups);
      expect(shown.textContent, text).to.equal(text);
    }
  });

  it('can be copied and read back', async () => {
    const shown = await fixture(html`<p>${quantityText('\u2212850123.0126(44) m')}</p>`);
    const { value, u } = parseQuantity(shown.textContent ?? '', 'length');
    expect(value).to.equal(-850123.0126);
    expect(u).to.equal(0.0044);
  });

  it('line up on the decimal point', async () => {
    const texts = ['121.2402', '\u22120.0002', '1348.98(33)', '15', '0.57902(14)', '93783.1(2.9)'];
    const column = pointColumn(texts);
    const table = await fixture<HTMLTableElement>(
      html`<table>
        ${texts.map((text) => html`<tr><td>${alignedNumber(text, column)}</td></tr>`)}
      </table>`,
    );
    document.adoptedStyleSheets = [...document.adoptedStyleSheets, sharedStyles.styleSheet!];
    try {
      const points = [...table.querySelectorAll('.i')].map((part) => part.getBoundingClientRect().right);
      expect(new Set(points.map((x) => Math.round(x))).size).to.equal(1);
      for (const part of table.querySelectorAll('.r'))
        expect((part as HTMLElement).scrollWidth, part.textContent ?? '').to.be.at.most(part.clientWidth + 1);
    } finally {
      document.adoptedStyleSheets = document.adoptedStyleSheets.slice(0, -1);
    }
  });

  it('stand in lines that are shown and copied alike', async () => {
    const line = ['Offset: ', sym('W', '0'), ' is ', num('62636853.4 m²/s²'), '.'];
    expect(plainText(line)).to.equal('Offset: W0 is 62636853.4 m²/s².');
    const shown = await fixture(html`<p>${richText(line)}</p>`);
    expect(shown.querySelector('i.s')?.textContent).to.equal('W');
    expect(shown.querySelector('sub')?.textContent).to.equal('0');
    expect(shown.textContent).to.equal(plainText(line));
  });
});
