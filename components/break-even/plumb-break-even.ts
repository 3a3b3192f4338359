import { type CSSResultGroup, html, nothing, type TemplateResult } from 'lit';
import {
  type BreakEven,
  type BreakEvenOptions,
  breakEvenOf,
  type LinkBreakEven,
} from '../../lib/answers/break-even.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatLength, type QuantityKind, readExact } from '../../lib/quantity/index.js';
import { breakEvenSentences, clocksNote, gnssNote, levellingNote } from '../../lib/report/break-even-report.js';
import { partText } from '../../lib/report/plan-words.js';
import { PlumbElement } from '../plumb-element.js';
import { CampaignElement } from '../shared/campaign-element.js';
import { quantityText } from '../shared/number.js';
import { WidthController } from '../shared/width-controller.js';
import { solvedOf } from '../state/answers.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { breakEvenFigure } from './break-even-figure.js';
import { breakEvenStyles } from './break-even-styles.js';

const BESIDE_PX = 1120;
const DRAWING_PX = 720;

/** What a reader can state here instead of what the campaign says. */
const FIELDS = [
  { name: 'time', label: 'time on the wall', kind: 'duration', example: '20 d' },
  { name: 'b', label: 'levelling b', kind: 'root-length', example: '1.5 mm/√km' },
  { name: 'k', label: 'levelling k', kind: 'length-ratio', example: '0.1 mm/km' },
] as const satisfies readonly { name: string; label: string; kind: QuantityKind; example: string }[];
type FieldName = (typeof FIELDS)[number]['name'];

/** Clocks against the classical methods: the standard uncertainty of a height difference by the clocks, by levelling and by GNSS
 *  with a (quasi)geoid against distance, this campaign's links as dots, and the distances from which the clocks are better.
 *
 *  Inside a `<plumb-campaign>`. Models come from the attributes, else from `methods` in the campaign, else from its own lines and
 *  determinations; never from a published figure by itself.
 *
 * @slot Fallback: what the page shows without script.
 * @fires plumb-select - A reader takes a link in hand; `detail.link` is its id.
 * @csspart base The sheet.
 * @csspart provenance The line that says who computed it and when. */
export class PlumbBreakEven extends CampaignElement {
  static override properties = {
    ...CampaignElement.properties,
    time: { type: String },
    b: { type: String },
    k: { type: String },
  };
  static override styles: CSSResultGroup = [PlumbElement.styles, breakEvenStyles];

  /** Time of the comparison on the wall, such as `20 d`; without it the window. */
  declare time: string | null;
  /** Random error of levelling, such as `1.5 mm/√km`. */
  declare b: string | null;
  /** Systematic error of levelling, such as `0.1 mm/km`. */
  declare k: string | null;

  readonly #width = new WidthController(this);
  #last: { readonly campaign: Campaign; readonly key: string; readonly answer: BreakEven } | null = null;

  constructor() {
    super();
    this.time = null;
    this.b = null;
    this.k = null;
  }

  #answer(campaign: Campaign, options: BreakEvenOptions): BreakEven {
    const key = JSON.stringify(options);
    if (this.#last?.campaign !== campaign || this.#last.key !== key)
      this.#last = { campaign, key, answer: breakEvenOf(solvedOf(campaign), options) };
    return this.#last.answer;
  }

  protected override answered(answered: AnsweredCampaign): TemplateResult {
    const { campaign } = answered;
    const { options, faults } = this.#options();
    if (faults.length > 0) return html`${refused(faults)} ${this.#form()}`;
    if (options.timeS === undefined && campaign.window === null)
      return html`<p class="say">The campaign has no window: state here how long the clocks are compared for.</p>
        ${this.#form()}`;
    const answer = this.#answer(campaign, options);
    if (answer.links.length === 0) return html`<p class="say">The campaign has no links between clocks.</p>`;
    const held = this.linkInHand(answered);
    const main = answer.links.find(({ id }) => id === held) ?? firstToShow(answer);
    const nothingToCompare = answer.levelling === null && answer.gnss === null;
    const { width } = this.#width;
    const sentence = nothingToCompare
      ? 'There is nothing to compare the clocks with: state b and k of levelling here, or "methods" in the campaign.'
      : breakEvenSentences({ ...answer, links: [main] }, campaign).join(' ');
    return html`<p class="say">${sentence}</p>
      <div class="plate">
        <div>
          ${
            main.clocks === null
              ? html`<p>There is nothing to draw: no link of the campaign ever runs.</p>`
              : breakEvenFigure({
                  answer,
                  main,
                  inHand: held === main.id,
                  width: width >= BESIDE_PX ? DRAWING_PX : Math.min(width, DRAWING_PX),
                })
          }
        </div>
        <div>${this.#table(answer, main, held)} ${this.#form()} ${notes(answer, main, campaign)}</div>
      </div>`;
  }

  #table({ links, levelling, gnss }: BreakEven, main: LinkBreakEven, held: string | null): TemplateResult {
    const length = (l: LinkBreakEven, method: 'clocks' | 'levelling' | 'gnss', head: string) => html`<td
      role="cell"
      class="num ${l.best === method ? 'smallest' : ''}"
      data-k=${head}
    >
      ${l[method] === null ? html`<span class="none">none</span>` : quantityText(formatLength(l[method], 2))}
    </td>`;
    const beyond = (l: LinkBreakEven, method: 'levelling' | 'gnss', model: object | null, head: string) =>
      html`<td role="cell" class="num" data-k=${head}>
        ${model === null || l.clocks === null ? html`<span class="none">none</span>` : passedAt(l.beyond[method])}
      </td>`;
    return html`<table role="table">
      <caption class="only-spoken">
        Standard uncertainty of the height difference by each method
      </caption>
      <thead role="rowgroup">
        <tr role="row">
          <th scope="col" role="columnheader">link</th>
          <th scope="col" role="columnheader" class="num">clocks</th>
          <th scope="col" role="columnheader" class="num">levelling</th>
          <th scope="col" role="columnheader" class="num">GNSS</th>
          <th scope="col" role="columnheader" class="num">passes levelling at</th>
          <th scope="col" role="columnheader" class="num">passes GNSS at</th>
        </tr>
      </thead>
      <tbody role="rowgroup">
        ${links.map(
          (l) => html`<tr role="row" class=${l.id === held ? 'held' : ''}>
            <th scope="row" role="rowheader">
              <button
                type="button"
                class="pick"
                aria-pressed=${l.id === main.id ? 'true' : 'false'}
                @click=${() => this.take(l.id === held ? null : l.id)}
              >
                ${l.id}
              </button>
              <span class="nb">${formatLength(l.distance)}</span>
            </th>
            ${length(l, 'clocks', 'clocks')} ${length(l, 'levelling', 'levelling')} ${length(l, 'gnss', 'GNSS')}
            ${beyond(l, 'levelling', levelling, 'passes levelling at')} ${beyond(l, 'gnss', gnss, 'passes GNSS at')}
          </tr>`,
        )}
      </tbody>
    </table>`;
  }

  #form(): TemplateResult {
    const take = (name: FieldName) => (event: Event) => {
      const text = (event.target as HTMLInputElement).value.trim();
      this[name] = text === '' ? null : text;
    };
    return html`<form class="no-print" @submit=${(event: Event) => event.preventDefault()}>
      ${FIELDS.map(
        ({ name, label, example }) => html`<div>
          <label for=${name}>${label}</label>
          <input
            id=${name}
            class="field"
            placeholder=${example}
            autocomplete="off"
            .value=${this[name] ?? ''}
            aria-invalid=${this.#read(name) === 'fault' ? 'true' : nothing}
            @change=${take(name)}
          />
        </div>`,
      )}
    </form>`;
  }

  #read(name: FieldName): number | null | 'fault' {
    const { kind } = FIELDS.find((f) => f.name === name)!;
    const text = this[name];
    if (text === null) return null;
    const read = readExact(text, kind);
    return read.ok && read.value >= 0 && !(name === 'time' && read.value === 0) ? read.value : 'fault';
  }

  #options(): { readonly options: BreakEvenOptions; readonly faults: readonly FieldFault[] } {
    const faults = FIELDS.flatMap(({ name, label, kind, example }): FieldFault[] => {
      if (this.#read(name) !== 'fault') return [];
      const read = readExact(this[name]!, kind);
      return [
        { label, text: this[name]!, expected: read.ok ? `a number above 0: ${example}` : read.problems[0]!.expected },
      ];
    });
    const value = (name: FieldName) => {
      const read = this.#read(name);
      return read === 'fault' ? null : read;
    };
    const [timeS, bRootM, k] = [value('time'), value('b'), value('k')];
    return {
      faults,
      options: {
        ...(timeS === null ? {} : { timeS }),
        ...(bRootM === null && k === null
          ? {}
          : { levelling: { bRootM: bRootM ?? 0, k: k ?? 0, detour: 1, origin: 'option' } }),
      },
    };
  }
}

interface FieldFault {
  readonly label: string;
  readonly text: string;
  readonly expected: string;
}

const refused = (faults: readonly FieldFault[]): TemplateResult =>
  html`<div class="flt" role="alert">
    <p class="hd">Not computed</p>
    ${faults.map(
      ({ label, text, expected }) => html`<dl>
        <dt>where</dt>
        <dd>${label}</dd>
        <dt>read</dt>
        <dd><b>${text}</b></dd>
        <dt>write</dt>
        <dd>${expected}</dd>
      </dl>`,
    )}
  </div>`;

const passedAt = (distanceM: number | null): string =>
  distanceM === null ? 'never' : distanceM === 0 ? 'any distance' : formatLength(distanceM);

/** The link with the most certain clocks: those one would build more of. */
function firstToShow({ links }: BreakEven): LinkBreakEven {
  const running = links.filter(({ clocks }) => clocks !== null);
  return running.reduce((a, b) => (b.clocks! < a.clocks! ? b : a), running[0] ?? links[0]!);
}

function notes(answer: BreakEven, main: LinkBreakEven, campaign: Campaign): TemplateResult {
  const without =
    main.limit && main.withoutLimit !== null && main.limit.share > 0.5
      ? ` Without the ${partText(main.limit, campaign)} link ${main.id} would be ${formatLength(main.withoutLimit, 2)} (open dot).`
      : '';
  return html`<p class="note">
    Smallest in bold. ${levellingNote(answer.levelling)} ${gnssNote(answer.gnss)} ${clocksNote(answer)}${without}
  </p>`;
}
