import { type CSSResultGroup, html, nothing, type PropertyDeclarations, type TemplateResult } from 'lit';
import { type LinkTide, type TideAnswer, tide } from '../../lib/answers/tide.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatDuration, formatLength } from '../../lib/quantity/index.js';
import { sizeText } from '../../lib/report/numbers.js';
import { instantText } from '../charts/time-axis.js';
import { PlumbElement } from '../plumb-element.js';
import { DrawingElement } from '../shared/drawing-element.js';
import { alignedNumber, pointColumn, quantityText } from '../shared/number.js';
import { num, plainText, type RichText, richText, word } from '../shared/rich-text.js';
import { warningList } from '../shared/warnings.js';
import { WidthController } from '../shared/width-controller.js';
import { oncePerCampaign } from '../state/answers.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { plotLeft, plotWidth, tideFigure, tideLine } from './tide-figure.js';
import { tideStyles } from './tide-styles.js';

/** Samples of the curve: every ten minutes, in long windows fewer, but never less than one an hour. */
const STEP_S = { least: 600, most: 3600 };
const SAMPLES = 2500;

const tideFor = oncePerCampaign((campaign: Campaign): TideAnswer => {
  const seconds = campaign.window ? (campaign.window.endMs - campaign.window.startMs) / 1000 : 0;
  const step = Math.min(STEP_S.most, Math.max(STEP_S.least, Math.ceil(seconds / SAMPLES / 60) * 60));
  return tide(campaign, step);
});

/** To one digit: what is left needs no more. */
const millimetres = (metres: number): string => `${Number((Math.abs(metres) * 1000).toPrecision(1))}\u00a0mm`;

const MOST_WIDTH_PX = 1280;
/** More curves than this are a thicket: the table has the others. */
const MOST_CURVES = 4;

/** What the solid-Earth tide adds to the offset of each link through the window of the campaign, and what averaging leaves of it.
 *
 *  Inside a `<plumb-campaign>` whose campaign states a `window`.
 *
 * @slot Fallback: what the page shows without script.
 * @fires plumb-select A reader has taken a link in hand; detail: `link`, its id or null.
 * @csspart base The sheet.
 * @csspart figure The curves.
 * @csspart provenance The line that says who computed it and when.
 * @cssproperty [--plumb-paper] Ground; likewise `--plumb-ink` and the other colours. */
export class PlumbTide extends DrawingElement {
  static override properties: PropertyDeclarations = { cursor: { state: true } };
  static override styles: CSSResultGroup = [PlumbElement.styles, tideStyles];

  declare cursor: number | null;

  readonly #width = new WidthController(this);

  constructor() {
    super();
    this.cursor = null;
  }

  #sentence(
    { links }: TideAnswer,
    { id, min, max, rms, left, lengthPerOffset, needsCorrecting }: LinkTide,
    targetM: number | null,
  ): RichText {
    const units = (y: number) => num(`${sizeText(Math.abs(y) * 1e18)}e-18`);
    if (rms === 0)
      return [
        links.length === 1 ? 'Both clocks stand' : 'The clocks of every link stand',
        ' on one piece of crust: the tide moves both alike.',
      ];
    const swing: RichText = [
      'The solid-Earth tide moves ',
      word(id),
      ' by up to ',
      units(Math.max(Math.abs(min), Math.abs(max))),
      ', rms ',
      units(rms),
      '.',
    ];
    if (left === null) return [...swing, ' Clocks and link never run together in the window, so nothing is averaged.'];
    const where = left.over === 'window' ? 'Averaged over the window of ' : 'Averaged over the stated availability of ';
    const verdict: RichText =
      needsCorrecting === null || targetM === null
        ? ['.']
        : [
            needsCorrecting ? ', too much for a target of ' : ', harmless for a target of ',
            num(formatLength(targetM, 2)),
            '.',
          ];
    return [
      ...swing,
      ` ${where}`,
      num(formatDuration(left.seconds)),
      ', ',
      units(left.mean),
      ' or ',
      num(millimetres(left.mean * lengthPerOffset)),
      ' is left',
      ...verdict,
    ];
  }

  readonly #leave = (): void => {
    this.cursor = null;
  };

  #pointAt(event: PointerEvent, width: number, samples: number): void {
    const { left } = (event.currentTarget as Element).getBoundingClientRect();
    const fraction = (event.clientX - left - plotLeft) / plotWidth(width);
    this.cursor =
      fraction < -0.02 || fraction > 1.02 ? null : Math.round(Math.min(1, Math.max(0, fraction)) * (samples - 1));
  }

  #step(event: KeyboardEvent, samples: number): void {
    const at = this.cursor ?? 0;
    const stride = event.shiftKey ? Math.round(samples / 20) : 1;
    const to = { ArrowRight: at + stride, ArrowLeft: at - stride, Home: 0, End: samples - 1 }[event.key];
    if (event.key === 'Escape') this.cursor = null;
    if (to === undefined) return;
    this.cursor = Math.min(samples - 1, Math.max(0, to));
    event.preventDefault();
  }

  #table({ links }: TideAnswer, inHand: string | null): TemplateResult {
    const units = (y: number) => {
      const text = (y * 1e18).toFixed(2);
      return Number(text) === 0 ? '0.00' : text.startsWith('-') ? `\u2212${text.slice(1)}` : `+${text}`;
    };
    const columns = [
      { head: 'lowest / 1e-18', texts: links.map(({ min }) => units(min)) },
      { head: 'highest / 1e-18', texts: links.map(({ max }) => units(max)) },
      { head: 'rms / 1e-18', texts: links.map(({ rms }) => (rms * 1e18).toFixed(2)) },
      { head: 'left / 1e-18', texts: links.map(({ left }) => (left ? units(left.mean) : 'none')) },
      {
        head: 'left / mm',
        texts: links.map(({ left, lengthPerOffset }) =>
          left ? units((left.mean * lengthPerOffset * 1000) / 1e18) : 'none',
        ),
      },
      { head: 'model leaves out up to / 1e-18', texts: links.map(({ omitted }) => (omitted * 1e18).toFixed(1)) },
    ];
    const widths = columns.map(({ texts }) => pointColumn(texts));
    const words = ({ needsCorrecting, left }: LinkTide) =>
      left === null
        ? 'never together'
        : needsCorrecting === null
          ? 'no target stated'
          : needsCorrecting
            ? 'needed'
            : 'not needed';
    return html`<table>
      <caption class="only-spoken">What the tide does to each link</caption>
      <thead>
        <tr>
          <th scope="col">link</th>
          ${columns.map(({ head }) => html`<th scope="col">${head}</th>`)}
          <th scope="col" class="vd">correction of the average</th>
        </tr>
      </thead>
      <tbody>
        ${links.map((link, i) => {
          const held = link.id === inHand;
          return html`<tr>
            <th scope="row">
              <button
                type="button"
                class="name ${held ? 'in-hand' : ''}"
                aria-pressed=${held ? 'true' : 'false'}
                @click=${() => this.take(held ? null : link.id)}
              >
                ${link.id}
              </button>
            </th>
            ${columns.map(({ head, texts }, k) => html`<td data-k=${head}>${alignedNumber(texts[i]!, widths[k]!)}</td>`)}
            <td class="vd" data-k="correction of the average">${words(link)}</td>
          </tr>`;
        })}
      </tbody>
    </table>`;
  }

  protected override answered(answered: AnsweredCampaign): TemplateResult {
    const { campaign } = answered;
    if (campaign.links.length === 0) return html`<p class="say">The campaign has no links between clocks.</p>`;
    const answer = tideFor(campaign);
    const inHand = this.linkInHand(answered);
    // the link in hand, and those that move most
    const ordered = [...answer.links].sort(
      (a, b) => Number(b.id === inHand) - Number(a.id === inHand) || b.rms - a.rms,
    );
    const spoken = ordered[0]!;
    const drawn = ordered.slice(0, this.#width.width < 656 ? 2 : MOST_CURVES);
    const times = answer.series.times.map((time) => Date.parse(time));
    const width = Math.min(this.#width.width, MOST_WIDTH_PX);
    const valuesOf = (id: string) => answer.series.links.find((link) => link.id === id)!.y.map((y) => y * 1e18);
    const curves = drawn
      .map(({ id }) => ({ id, values: valuesOf(id), held: id === inHand, spoken: id === spoken.id }))
      .reverse();
    const say = this.#sentence(answer, spoken, campaign.targetM);
    const height = width < 656 ? 216 : 260;
    const { cursor } = this;
    const drawing = html`<svg
        class="fig"
        part="figure"
        width=${width}
        height=${height}
        viewBox="0 0 ${width} ${height}"
        role="group"
        tabindex="0"
        aria-label=${`Tide over the window. ${plainText(say)} The arrow keys read the curve.`}
        @pointermove=${(event: PointerEvent) => this.#pointAt(event, width, times.length)}
        @pointerleave=${this.#leave}
        @blur=${this.#leave}
        @keydown=${(event: KeyboardEvent) => this.#step(event, times.length)}
      >
        ${tideFigure({ width, times, curves, cursor, millimetresPerUnit: spoken.lengthPerOffset * 1e-15 })}
      </svg>`;
    const key = html`<ul class="key-row">
        ${drawn.map(
          ({ id, rms }) => html`<li class=${id === inHand ? 'in-hand' : ''}>
            <svg width="44" height="12" aria-hidden="true"><path d="M0 6H44" class=${tideLine({ held: id === inHand, spoken: id === spoken.id })} /></svg>
            ${id}, rms ${sizeText(rms * 1e18)}e-18${id === inHand ? ', in hand' : ''}
          </li>`,
        )}
        ${ordered.length > drawn.length ? html`<li>${ordered.length - drawn.length} more links in the table</li>` : nothing}
      </ul>`;
    if (this.bare) return html`${drawing} ${key}`;
    return html`<p class="say">${richText(say)}</p>
      ${drawing}
      <p class="reading" aria-live="polite">
        ${
          cursor === null
            ? nothing
            : html`${instantText(times[cursor]!)}${[...curves]
                .reverse()
                .map(
                  ({ id, values, held }) =>
                    html`, <span class=${held ? 'in-hand' : ''}>${id}</span> ${quantityText(`${values[cursor]! < 0 ? '\u2212' : '+'}${Math.abs(values[cursor]!).toFixed(2)}e-18`)}`,
                )}`
        }
      </p>
      ${key}
      ${this.#table(answer, inHand)} ${warningList(answer.warnings)}
      <p class="note">
        Add <i class="s">y</i> to the offset of the mean tide to get what the clocks feel at an instant; subtract it from a measured
        offset to correct it. Moon to degree 3 and Sun to degree 2 on a solid Earth, without the permanent part. <i class="s">left</i>:
        the mean over the window, or over the time in which both clocks and the link are stated to run.
      </p>`;
  }
}
