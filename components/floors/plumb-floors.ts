import { type CSSResultGroup, html, nothing, type TemplateResult } from 'lit';
import { type FloorsAnswer, floors } from '../../lib/answers/floors.js';
import { FLOORS_OPTIONS, readFloorsOptions } from '../../lib/answers/floors-options.js';
import { RECOMMENDED_FREQUENCIES } from '../../lib/clocks/recommended-frequencies.js';
import { formatConcise, formatEstimate } from '../../lib/quantity/index.js';
import { twoLevels } from '../charts/two-levels.js';
import { PlumbElement } from '../plumb-element.js';
import { ArticleElement, type Reading } from '../shared/article-element.js';
import { articleStyles } from '../shared/article-styles.js';
import { alignedNumber, pointColumn, quantityText } from '../shared/number.js';
import { computedBy } from '../shared/provenance.js';
import { type RichText, richText } from '../shared/rich-text.js';
import { warningList } from '../shared/warnings.js';
import * as words from './floors-words.js';

const TRANSITIONS = RECOMMENDED_FREQUENCIES.map(({ transition }) => transition);

interface Shown {
  readonly floors: FloorsAnswer;
  readonly asGiven: Readonly<Record<string, string>>;
}

/** The inter-floor check, for a page of a laboratory's wiki: how fast a clock runs against one on another floor.
 *
 *  `<plumb-floors dh="12.348(3) m" g="9.8125(1) m/s²" transition="87Sr"></plumb-floors>`
 *
 * @slot Fallback: what the page shows without script, and while no value is given.
 * @fires plumb-change A reader has typed a value; detail: `name`, `text`, `answer`.
 * @csspart base The sheet.
 * @cssproperty [--plumb-font-text=inherit] Typeface; symbols keep their own.
 * @cssproperty [--plumb-paper] Ground; likewise `--plumb-ink` and the other colours. */
export class PlumbFloors extends ArticleElement<Shown> {
  static override properties = {
    dh: { type: String },
    g: { type: String },
    lat: { type: String },
    height: { type: String },
    gradient: { type: String },
    transition: { type: String },
    measured: { type: String },
    upper: { type: String },
    lower: { type: String },
  };
  static override styles: CSSResultGroup = [PlumbElement.styles, articleStyles];

  /** Height of the upper floor over the lower, m, as in `12.348(3) m`; negative counts downward. */
  declare dh: string | null;
  /** Gravity at the floor the height counts from, m/s². */
  declare g: string | null;
  /** Geodetic latitude in degrees: with `height` in place of `g`, or beside it as a check. */
  declare lat: string | null;
  /** Height of that floor over the sea, m. */
  declare height: string | null;
  /** Decrease of gravity with height, s⁻²; default 3.086e-6 with 10 %. */
  declare gradient: string | null;
  /** Clock transition whose offset is wanted in hertz, as in `87Sr`. */
  declare transition: string | null;
  /** Measured fractional offset of the upper clock, every correction applied except gravity's. */
  declare measured: string | null;
  /** Name of the upper floor. */
  declare upper: string | null;
  /** Name of the lower floor. */
  declare lower: string | null;

  protected override readonly names = FLOORS_OPTIONS;
  protected override readonly example = { dh: '12.348(3) m', g: '9.8125(1) m/s²', transition: '87Sr' };
  protected override readonly wanted =
    'How fast a clock runs against one on another floor: write the height between them, and gravity or the place.';

  protected override read(texts: Readonly<Record<string, string | null>>): Reading<Shown> {
    const reading = readFloorsOptions(texts);
    if (!reading.ok) return reading;
    return { ok: true, answer: { floors: floors(reading.input), asGiven: reading.asGiven } };
  }

  #names(answer: FloorsAnswer): words.FloorNames {
    const upper = this.upper ?? 'upper floor';
    const lower = this.lower ?? 'lower floor';
    return answer.dH.value < 0 ? { from: upper, to: lower } : { from: lower, to: upper };
  }

  protected override sentence({ floors: answer }: Shown): RichText {
    return words.sentence(answer);
  }

  protected override citation({ floors: answer, asGiven }: Shown): RichText {
    return words.citation(answer, this.#names(answer), asGiven);
  }

  #inputs(): TemplateResult {
    const place = this.text('lat') !== null || this.text('height') !== null;
    const g = place && this.text('g') === null ? 'from latitude and height' : 'or latitude and height';
    return html`<tbody>
      ${this.fieldRow('dh', html`height Δ<i class="s">H</i>`, { placeholder: '12.348(3) m' })}
      ${this.fieldRow('g', html`gravity <i class="s">g</i>`, { placeholder: g })}
      ${
        place || this.text('g') === null
          ? html`${this.fieldRow('lat', 'latitude', { placeholder: '52.3' })}
            ${this.fieldRow('height', 'height above the sea', { placeholder: '80 m' })}`
          : nothing
      }
      ${this.fieldRow('gradient', html`gradient <i class="s">Γ</i>`, { placeholder: '3.086e-6 s⁻², u 10 %' })}
      ${this.fieldRow('transition', 'transition', { choices: TRANSITIONS })}
      ${this.fieldRow('measured', html`measured <i class="s">y</i>`, { placeholder: 'none' })}
    </tbody>`;
  }

  #results(answer: FloorsAnswer): TemplateResult {
    const { linear, quadratic, dW, y } = words.termTexts(answer);
    const hertz = Object.entries(answer.offsetHz).map(([id, { value, u }]) => [id, formatConcise(value, u)] as const);
    const column = pointColumn([linear, quadratic, dW, y, ...hertz.map(([, text]) => text)]);
    const cells = (text: string, unit: string) =>
      html`<td>${alignedNumber(text, column)}</td>
        <td class="u">${unit}</td>`;
    return html`<tbody class=${this.isStale ? 'was-good' : ''}>
      <tr><th scope="row"><i class="s">g</i>·Δ<i class="s">H</i></th>${cells(linear, 'm²/s²')}</tr>
      <tr><th scope="row">−½ <i class="s">Γ</i>·Δ<i class="s">H</i>²</th>${cells(quadratic, 'm²/s²')}</tr>
      <tr class="sum"><th scope="row">Δ<i class="s">W</i></th>${cells(dW, 'm²/s²')}</tr>
      <tr class="res"><th scope="row"><i class="s">y</i> = Δ<i class="s">W</i>/<i class="s">c</i>²</th>${cells(y, '1e-18')}</tr>
      ${hertz.map(([id, text]) => html`<tr><th scope="row">offset of ${id}</th>${cells(text, 'Hz')}</tr>`)}
    </tbody>`;
  }

  protected override figures(shown: Shown | null): TemplateResult {
    const table = html`<table class="values">
      <caption class="only-spoken">The two floors: values put in, and what follows from them</caption>
      ${this.#inputs()} ${shown ? this.#results(shown.floors) : nothing}
    </table>`;
    if (!shown) return html`<div class="body bare">${table}</div>`;
    const { dH } = shown.floors;
    const names = this.#names(shown.floors);
    return html`<div class="body">
      ${twoLevels({
        from: { label: names.from, marker: 'atoms' },
        to: { label: names.to, marker: 'atoms' },
        heightM: dH.value,
        uM: dH.u,
        heightText: shown.asGiven['dh'] ?? formatEstimate(dH, 'length', 'm'),
        sideBySide: false,
      })}
      ${table}
    </div>`;
  }

  protected override underFigures(shown: Shown): TemplateResult {
    const answer = shown.floors;
    const { measured } = answer;
    const reason = words.reason(answer);
    return html`<dl class="ans">
        <dt>shift</dt>
        <dd>${richText(words.shift(answer))}</dd>
        <dt>correction</dt>
        <dd>${richText(words.correction(answer))}</dd>
        ${
          measured
            ? html`<dt>measured</dt>
                <dd>
                  ${quantityText(shown.asGiven['measured'] ?? formatConcise(measured.y.value, measured.y.u))}, difference
                  ${quantityText(formatConcise(measured.difference.value, measured.difference.u, { sign: 'always' }))},
                  <span class="v-${measured.verdict}">${measured.verdict}</span>${reason ? html`. ${richText(reason)}` : nothing}
                </dd>`
            : nothing
        }
      </dl>
      ${this.cite(shown, computedBy())} ${warningList(answer.warnings)}
      <p class="note">
        <i class="s">y</i> &gt; 0: the ${words.clockWord(answer)} clock runs fast. A bracket is the standard uncertainty in
        the last digits. A height found this way is no official height; in shafts and near lasers the house’s own rules hold.
      </p>`;
  }
}
