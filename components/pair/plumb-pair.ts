import { type CSSResultGroup, html, nothing, type TemplateResult } from 'lit';
import { type PairAnswer, type PairBudgetGroup, pair } from '../../lib/answers/pair.js';
import { PAIR_OPTIONS, readPairOptions } from '../../lib/answers/pair-options.js';
import type { BudgetRow } from '../../lib/answers/prediction.js';
import { CampaignError } from '../../lib/campaign/fault.js';
import { RECOMMENDED_FREQUENCIES } from '../../lib/clocks/recommended-frequencies.js';
import { formatConcise, formatEstimate, formatLength, formatScaled } from '../../lib/quantity/index.js';
import { type ShareScale, shareBar, shareScale } from '../charts/share-bar.js';
import { twoLevels } from '../charts/two-levels.js';
import { PlumbElement } from '../plumb-element.js';
import { ArticleElement, type Reading } from '../shared/article-element.js';
import { articleStyles } from '../shared/article-styles.js';
import { alignedNumber, pointColumn, quantityText } from '../shared/number.js';
import { computedBy } from '../shared/provenance.js';
import { type RichText, richText } from '../shared/rich-text.js';
import { warningList } from '../shared/warnings.js';
import * as words from './pair-words.js';

const TRANSITIONS = RECOMMENDED_FREQUENCIES.map(({ transition }) => transition);
const TIDES = ['mean', 'zero', 'free'];

/** Two sites by GNSS and a (quasi)geoid model, for a page of a laboratory's wiki: how fast a clock at B runs against one at A.
 *
 *  `<plumb-pair a-lat="58.9712" a-lon="5.7305" a-h="51.3370(60) m" a-zeta="45.120(15) m"
 *   b-lat="58.8102" b-lon="6.4421" b-h="912.4402(70) m" b-zeta="45.377(18) m" correlation="0.48"></plumb-pair>`
 *
 * @slot Fallback: what the page shows without script, and while no value is given.
 * @fires plumb-change A reader has typed a value; detail: `name`, `text`, `answer`.
 * @csspart base The sheet.
 * @cssproperty [--plumb-font-text=inherit] Typeface; symbols keep their own.
 * @cssproperty [--plumb-paper] Ground; likewise `--plumb-ink` and the other colours. */
export class PlumbPair extends ArticleElement<PairAnswer> {
  static override properties = {
    aName: { type: String, attribute: 'a-name' },
    aLat: { type: String, attribute: 'a-lat' },
    aLon: { type: String, attribute: 'a-lon' },
    aH: { type: String, attribute: 'a-h' },
    aZeta: { type: String, attribute: 'a-zeta' },
    aN: { type: String, attribute: 'a-n' },
    aG: { type: String, attribute: 'a-g' },
    bName: { type: String, attribute: 'b-name' },
    bLat: { type: String, attribute: 'b-lat' },
    bLon: { type: String, attribute: 'b-lon' },
    bH: { type: String, attribute: 'b-h' },
    bZeta: { type: String, attribute: 'b-zeta' },
    bN: { type: String, attribute: 'b-n' },
    bG: { type: String, attribute: 'b-g' },
    correlation: { type: String },
    tide: { type: String },
    hTide: { type: String, attribute: 'h-tide' },
    geoidTide: { type: String, attribute: 'geoid-tide' },
    transition: { type: String },
    open: { state: true },
  };
  static override styles: CSSResultGroup = [PlumbElement.styles, articleStyles];

  /** Name of site A; likewise `bName`. */
  declare aName: string | null;
  /** Geodetic latitude of A, degrees north or with a hemisphere letter; likewise `bLat`. */
  declare aLat: string | null;
  /** Longitude of A, degrees east; likewise `bLon`. */
  declare aLon: string | null;
  /** Ellipsoidal height of A, m, as in `51.3370(60) m`; likewise `bH`. */
  declare aH: string | null;
  /** Height anomaly at A, m; likewise `bZeta`. */
  declare aZeta: string | null;
  /** Geoid height at A, m, in place of `aZeta`; likewise `bN`. */
  declare aN: string | null;
  /** Gravity at A, m/s²; normal gravity if not given; likewise `bG`. */
  declare aG: string | null;
  declare bName: string | null;
  declare bLat: string | null;
  declare bLon: string | null;
  declare bH: string | null;
  declare bZeta: string | null;
  declare bN: string | null;
  declare bG: string | null;
  /** Correlation of the errors of the two ζ or N, −1…1. */
  declare correlation: string | null;
  /** Permanent-tide system of the potentials shown: `mean` (default), `zero`, `free`. */
  declare tide: string | null;
  /** System in which both h are given. */
  declare hTide: string | null;
  /** System in which both ζ or N are given. */
  declare geoidTide: string | null;
  /** Clock transition whose offset is wanted in hertz, as in `87Sr`. */
  declare transition: string | null;
  declare open: boolean;

  protected override readonly names = PAIR_OPTIONS;
  protected override readonly example = {
    'a-name': 'Harbour',
    'a-lat': '58.9712',
    'a-lon': '5.7305',
    'a-h': '51.3370(60) m',
    'a-zeta': '45.120(15) m',
    'b-name': 'Ridge',
    'b-lat': '58.8102',
    'b-lon': '6.4421',
    'b-h': '912.4402(70) m',
    'b-zeta': '45.377(18) m',
    correlation: '0.48',
    'h-tide': 'free',
    'geoid-tide': 'zero',
  };
  protected override readonly wanted =
    'How fast a clock at one site runs against one at another: write where they are, their ellipsoidal heights and ζ or N.';

  constructor() {
    super();
    this.open = false;
  }

  protected override read(texts: Readonly<Record<string, string | null>>): Reading<PairAnswer> {
    const reading = readPairOptions(texts);
    if (!reading.ok) return reading;
    try {
      return { ok: true, answer: pair(reading.input) };
    } catch (error) {
      if (error instanceof CampaignError) return { ok: false, faults: error.faults };
      throw error;
    }
  }

  protected override sentence(answer: PairAnswer): RichText {
    return words.sentence(answer);
  }

  protected override citation(answer: PairAnswer): RichText {
    return words.citation(answer, this.text('correlation'));
  }

  protected override reveal(): void {
    this.open = true;
  }

  // --- values put in

  #siteRow(quantity: string, spoken: string, label: TemplateResult | string, placeholder: string): TemplateResult {
    const [a, b] = [`a-${quantity}`, `b-${quantity}`];
    const unused = this.text(a) === null && this.text(b) === null;
    return html`<tr class="in ${this.isEdited(a) || this.isEdited(b) ? 'ed' : ''} ${unused ? 'no-print' : ''}">
      <th scope="row">${label}</th>
      <td>${this.field(a, { placeholder, spoken: `${spoken} of A` })}</td>
      <td>${this.field(b, { placeholder, spoken: `${spoken} of B` })}</td>
    </tr>`;
  }

  #inputs(): TemplateResult {
    return html`<table class="values sites">
      <caption class="only-spoken">Values put in</caption>
      <thead>
        <tr>
          <th scope="col">site</th>
          <th scope="col">A</th>
          <th scope="col">B</th>
        </tr>
      </thead>
      <tbody>
        ${this.#siteRow('name', 'name', 'name', '')} ${this.#siteRow('lat', 'latitude', 'latitude', '52.2961')}
        ${this.#siteRow('lon', 'longitude', 'longitude', '10.4598')}
        ${this.#siteRow('h', 'ellipsoidal height', html`height <i class="s">h</i>`, '143.216(8) m')}
        ${this.#siteRow('zeta', 'height anomaly', html`height anomaly <i class="s">ζ</i>`, '43.812(19) m')}
        ${this.#siteRow('n', 'geoid height', html`or geoid height <i class="s">N</i>`, 'none')}
        ${this.#siteRow('g', 'gravity', html`gravity <i class="s">g</i>`, 'normal')}
      </tbody>
      <tbody>
        ${this.fieldRow(
          'correlation',
          html`correlation <i class="s">ρ</i> of <i class="s">ζ</i> or <i class="s">N</i>`,
          {
            placeholder: 'not known, taken as 0',
          },
        )}
        ${this.fieldRow('h-tide', html`tide system of <i class="s">h</i>`, { choices: TIDES, unset: 'not known, taken as free' })}
        ${this.fieldRow('geoid-tide', html`tide system of <i class="s">ζ</i> or <i class="s">N</i>`, {
          choices: TIDES,
          unset: 'not known, taken as zero',
        })}
        ${this.fieldRow('tide', html`tide system of Δ<i class="s">W</i>`, { choices: TIDES, unset: 'mean, by default' })}
        ${this.fieldRow('transition', 'transition', { choices: TRANSITIONS })}
      </tbody>
    </table>`;
  }

  #disclosed(): TemplateResult {
    return html`<p class="disclose">
        <button
          type="button"
          class="word"
          aria-expanded=${this.open ? 'true' : 'false'}
          aria-controls="inputs"
          @click=${() => {
            this.open = !this.open;
          }}
        >
          ${this.open ? 'hide inputs' : 'show inputs'}
        </button>
      </p>
      <div id="inputs" class=${this.open ? '' : 'closed'}>${this.#inputs()}</div>`;
  }

  // --- what follows

  #values(answer: PairAnswer): TemplateResult {
    const { dW, y, dHNormal, dH, offsetHz } = answer;
    const rows = [
      { name: html`Δ<i class="s">W</i>`, text: formatConcise(dW.value, dW.u), unit: 'm²/s²', className: '' },
      { name: html`<i class="s">y</i>`, text: formatScaled(y.value, y.u, -18), unit: '1e-18', className: 'res' },
      {
        name: 'normal height',
        text: formatConcise(dHNormal.value, dHNormal.u, { sign: 'always' }),
        unit: 'm',
        className: '',
      },
      { name: 'length equivalent', text: formatConcise(dH.value, dH.u), unit: 'm', className: '' },
      ...Object.entries(offsetHz).map(([id, { value, u }]) => ({
        name: `offset of ${id}`,
        text: formatConcise(value, u),
        unit: 'Hz',
        className: '',
      })),
    ];
    const column = pointColumn(rows.map(({ text }) => text));
    return html`<table class="values">
      <caption class="only-spoken">B seen from A</caption>
      <tbody class=${this.isStale ? 'was-good' : ''}>
        ${rows.map(
          ({ name, text, unit, className }) => html`<tr class=${className}>
            <th scope="row">${name}</th>
            <td>${alignedNumber(text, column)}</td>
            <td class="u">${unit}</td>
          </tr>`,
        )}
      </tbody>
    </table>`;
  }

  #budgetRow(answer: PairAnswer, row: BudgetRow, scale: ShareScale, className: string): TemplateResult {
    const isLength = /-(h|zeta|n)$/.test(row.input);
    const u = isLength
      ? formatLength(row.u, 2)
      : `${formatConcise(row.u, null, { significant: 1 })}\u00a0${row.input.endsWith('-g') ? 'm/s²' : 's⁻²'}`;
    return html`<tr class="${className} ${row.share < 0 ? 'neg' : ''}">
      <th scope="row">
        ${richText(words.inputName(answer, row.input))}${
          row.share < 0 ? html`<small class="dim">its error takes part of the other’s away</small>` : nothing
        }
      </th>
      <td class="own-u">${quantityText(u)}</td>
      <td>${quantityText(formatConcise(row.uy * 1e18, null, { significant: 2 }))}</td>
      <td class="bw">${shareBar(row.share, 'input', scale)}</td>
      <td class="share">${percent(row.share)}</td>
    </tr>`;
  }

  #group(answer: PairAnswer, group: PairBudgetGroup, scale: ShareScale): TemplateResult {
    if (!group.source) return html`${group.rows.map((row) => this.#budgetRow(answer, row, scale, ''))}`;
    const uy = group.uy === null ? 'none' : formatConcise(group.uy * 1e18, null, { significant: 2 });
    return html`<tr class="grp">
        <th scope="row">
          <b>${words.modelName(group)}</b>
          <span class="dim">shared, <i class="s">ρ</i> ${String(group.correlation).replace('-', '\u2212')}</span>
        </th>
        <td class="own-u"></td>
        <td>${quantityText(uy)}</td>
        <td class="bw">${shareBar(group.share, 'shared', scale)}</td>
        <td class="share">${percent(group.share)}</td>
      </tr>
      ${group.rows.map((row, i) => this.#budgetRow(answer, row, scale, i === group.rows.length - 1 ? 'kid last' : 'kid'))}`;
  }

  #budget(answer: PairAnswer): TemplateResult | typeof nothing {
    if (answer.groups.length === 0) return nothing;
    const scale = shareScale(answer.groups.flatMap(({ share, rows }) => [share, ...rows.map((row) => row.share)]));
    return html`<table class="budget">
      <caption class="only-spoken">What the uncertainty is made of</caption>
      <thead>
        <tr>
          <th scope="col">input</th>
          <th scope="col" class="own-u"><i class="s">u</i></th>
          <th scope="col"><i class="s">u</i>(<i class="s">y</i>) <span class="nb">/ 1e-18</span></th>
          <th scope="col" class="bw">share of the variance</th>
          <th scope="col">%</th>
        </tr>
      </thead>
      <tbody class=${this.isStale ? 'was-good' : ''}>${answer.groups.map((group) => this.#group(answer, group, scale))}</tbody>
    </table>`;
  }

  protected override figures(answer: PairAnswer | null): TemplateResult {
    if (!answer) return this.#inputs();
    const { dHNormal, sites } = answer;
    return html`<div class="body">
        ${twoLevels({
          from: { label: sites[0]!.name, marker: 'ground' },
          to: { label: sites[1]!.name, marker: 'ground' },
          heightM: dHNormal.value,
          uM: dHNormal.u,
          heightText: formatEstimate(dHNormal, 'length', 'm'),
          sideBySide: true,
        })}
        ${this.#values(answer)}
      </div>
      ${this.#budget(answer)} ${this.#disclosed()}`;
  }

  protected override underFigures(answer: PairAnswer): TemplateResult {
    return html`${this.cite(answer, computedBy())} ${warningList(answer.warnings)}
      <p class="note">
        The sites are ${formatLength(answer.distanceM)} apart. <i class="s">y</i> &gt; 0: the clock at
        ${answer.sites[1]!.name} runs fast; it is what a clock feels, mean tide. The length equivalent is
        Δ<i class="s">W</i> over mean gravity, a scale for reading; the height difference is that of normal heights. No
        official height.
      </p>`;
  }
}

/** A share in per cent, one decimal. */
const percent = (share: number): string => (100 * share).toFixed(1).replace('-', '\u2212');
