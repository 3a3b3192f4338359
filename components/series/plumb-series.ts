import { type CSSResultGroup, html, nothing, type PropertyValues, type TemplateResult } from 'lit';
import { type SeriesView, seriesView } from '../../lib/answers/series-view.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { CampaignError, type Fault, faultAt } from '../../lib/campaign/fault.js';
import { type FrequencySeries, FrequencySeriesParser, readColumnWords } from '../../lib/clocks/series/index.js';
import { formatDuration, formatLength, formatScaled } from '../../lib/quantity/index.js';
import { PlumbElement } from '../plumb-element.js';
import { quantityText } from '../shared/number.js';
import { computedBy } from '../shared/provenance.js';
import { sentenceCase } from '../shared/rich-text.js';
import { warningList } from '../shared/warnings.js';
import { WidthController } from '../shared/width-controller.js';
import { CampaignConsumer } from '../state/campaign-context.js';
import { deviationFigure, powerOf, runningFigure, timeFigure, zeroName } from './series-figures.js';
import { seriesStyles } from './series-styles.js';

/** From here on the two lower drawings stand side by side, px. */
const BESIDE_PX = 900;
const GAP_PX = 28;

type Source =
  | { readonly status: 'empty' }
  | { readonly status: 'working' }
  | { readonly status: 'failed'; readonly faults: readonly Fault[] }
  | { readonly status: 'read'; readonly data: FrequencySeries };

/** Measured frequency data: samples against time with gaps left empty, the deviation with its intervals, the mean as it grew.
 *
 *  Data from `src`, or in a child `<script type="text/plain">`. Inside a `<plumb-campaign>` with `measurement`, an id of it, the
 *  mean is reduced as that measurement's y and stands beside the prediction.
 *
 * @slot Fallback: what the page shows without script.
 * @csspart base The sheet.
 * @csspart provenance The line that says who computed it and when. */
export class PlumbSeries extends PlumbElement {
  static override properties = {
    src: { type: String },
    columns: { type: String },
    measurement: { type: String },
  };
  static override styles: CSSResultGroup = [PlumbElement.styles, seriesStyles];

  /** Address of the file, relative to the page. */
  declare src: string | null;
  /** Words for its columns, such as `mjd y u`, where they cannot be told. */
  declare columns: string | null;
  /** Id, or position, of the measurement in the campaign round the element. */
  declare measurement: string | null;

  readonly #campaign = new CampaignConsumer(this);
  readonly #width = new WidthController(this);
  readonly #observer = new MutationObserver(() => this.#load());
  #source: Source = { status: 'empty' };
  #loading: AbortController | null = null;
  #last: string | null = null;
  #known: { data: FrequencySeries; campaign: Campaign | null; measurement: string | null; view: SeriesView } | null =
    null;

  constructor() {
    super();
    this.src = null;
    this.columns = null;
    this.measurement = null;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.#observer.observe(this, { childList: true, characterData: true, subtree: true });
    // a script may run before the parser has reached the children
    if (document.readyState === 'loading')
      document.addEventListener('DOMContentLoaded', () => this.#load(), { once: true });
    if (this.hasUpdated) this.#load();
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#observer.disconnect();
    this.#loading?.abort();
    this.#last = null;
  }

  protected override willUpdate(changed: PropertyValues): void {
    if (changed.has('src') || changed.has('columns') || !this.hasUpdated) this.#load();
  }

  #load(): void {
    const inline = [...this.children].find((c) => c instanceof HTMLScriptElement && c.type === 'text/plain');
    const text = inline?.textContent ?? null;
    const key = JSON.stringify([this.src, this.columns, text]);
    if (key === this.#last) return;
    this.#last = key;
    this.#loading?.abort();
    this.#loading = null;
    if (text !== null && this.src)
      this.#fail([faultAt('two-series', 'src', this.src, 'either src or data inside the element, not both')]);
    else if (text !== null) this.#read(async (parser) => parser.push(text.trim()));
    else if (this.src) this.#fetch(this.src);
    else this.#set({ status: 'empty' });
  }

  #fetch(src: string): void {
    const loading = new AbortController();
    this.#read(async (parser) => {
      const response = await fetch(new URL(src, this.baseURI), { signal: loading.signal });
      if (!response.ok)
        throw new CampaignError([
          faultAt('not-found', 'src', src, `frequency data at this address; the server answered ${response.status}`),
        ]);
      const reader = response.body!.getReader();
      for (let piece = await reader.read(); !piece.done; piece = await reader.read()) parser.push(piece.value);
    }, loading);
  }

  #read(fill: (parser: FrequencySeriesParser) => Promise<void>, loading = new AbortController()): void {
    this.#loading = loading;
    this.#set({ status: 'working' });
    const run = async () => {
      try {
        const words = this.columns === null ? null : readColumnWords(this.columns);
        if (words && 'faults' in words) throw new CampaignError(words.faults);
        const parser = new FrequencySeriesParser(words ? { columns: words.words } : {});
        await fill(parser);
        if (loading === this.#loading) this.#set({ status: 'read', data: parser.finish() });
      } catch (error) {
        if (loading !== this.#loading) return;
        if (error instanceof CampaignError) this.#fail(error.faults);
        else
          this.#fail([faultAt('not-read', 'src', this.src ?? 'the data', 'frequency data that this page may fetch')]);
      }
    };
    void run();
  }

  #fail(faults: readonly Fault[]): void {
    this.#set({ status: 'failed', faults });
  }

  #set(source: Source): void {
    this.#source = source;
    this.requestUpdate();
  }

  #view(data: FrequencySeries, campaign: Campaign | null): SeriesView {
    const { measurement } = this;
    const known = this.#known;
    if (known && known.data === data && known.campaign === campaign && known.measurement === measurement)
      return known.view;
    const place = campaign === null || measurement === null ? null : { campaign, measurement };
    const view = seriesView(data, this.src ?? 'the data', place);
    this.#known = { data, campaign, measurement, view };
    return view;
  }

  protected override content(): TemplateResult {
    const source = this.#source;
    if (source.status === 'empty')
      return html`<slot></slot>
        <p class="note no-print">
          No data. Name a file, <code>&lt;plumb-series src="run.csv"&gt;</code>, or put lines of date and y into a child
          <code>&lt;script type="text/plain"&gt;</code>.
        </p>`;
    if (source.status === 'working') return html`<p class="note" role="status">Reading the data …</p>`;
    if (source.status === 'failed') return refused(source.faults);
    const { state } = this.#campaign;
    let campaign: Campaign | null = null;
    if (this.measurement !== null) {
      if (state?.status === 'working') return html`<p class="note" role="status">Reading the campaign …</p>`;
      if (state?.status !== 'ready')
        return refused([
          faultAt(
            'no-campaign',
            'measurement',
            this.measurement,
            'a <plumb-campaign> round the element that can be read',
          ),
        ]);
      campaign = state.campaign;
    }
    try {
      return this.#shown(this.#view(source.data, campaign));
    } catch (error) {
      if (!(error instanceof CampaignError)) throw error;
      return refused(error.faults);
    }
  }

  #shown(view: SeriesView): TemplateResult {
    const { width } = this.#width;
    const half = width >= BESIDE_PX ? Math.floor((width - GAP_PX) / 2) : width;
    return html`<p class="say">${sentence(view)}</p>
      ${timeFigure(view, width)}
      <div class="under">
        <div>${deviationFigure(view, half)}</div>
        <div>${runningFigure(view, half)}</div>
      </div>
      ${notes(view)} ${deviationTable(view)} ${runningTable(view)} ${warningList(view.warnings)}
      <p class="by" part="provenance">${sentenceCase(computedBy())}.</p>`;
  }
}

const refused = (faults: readonly Fault[]): TemplateResult =>
  html`<div class="flt">
    <p class="hd">Not computed</p>
    ${faults.map(
      ({ path, line, found, expected }) => html`<dl>
        <dt>where</dt>
        <dd>${[path, line === null ? '' : `line ${line}`].filter((part) => part !== '').join(', ') || 'data'}</dd>
        <dt>read</dt>
        <dd><b>${found}</b></dd>
        <dt>write</dt>
        <dd>${expected}</dd>
      </dl>`,
    )}
  </div>`;

const offsetText = (value: number, u: number | null) => {
  const power = powerOf(Math.max(Math.abs(value), u ?? 0));
  return formatScaled(value, u, power, { sign: 'always' }) + (power === 0 ? '' : `e${power}`);
};

function sentence({ evaluation, answer }: SeriesView): TemplateResult {
  const mean = quantityText(offsetText(answer.mean.value, answer.mean.u));
  if (evaluation === null || evaluation.residual === null || evaluation.predicted === null)
    return html`The mean of ${answer.samples} samples is ${mean}, its uncertainty that of the noise alone.`;
  const by = quantityText(offsetText(evaluation.residual.value, evaluation.residual.u));
  const verdict =
    evaluation.verdict === null
      ? html`The mean lies ${by} from the prediction; no effect is stated to judge that by.`
      : evaluation.verdict === 'agree'
        ? html`The mean agrees with the prediction: ${by}.`
        : evaluation.verdict === 'differ'
          ? html`The mean differs from the prediction by ${by}.`
          : html`The mean lies ${by} from the prediction, which is inconclusive: a smaller difference than the one asked about would not have shown.`;
  return evaluation.smallestDetectableM === null
    ? verdict
    : html`${verdict} ${formatLength(evaluation.smallestDetectableM, 2)} would have shown.`;
}

function notes(view: SeriesView): TemplateResult {
  const { reduction, answer, outside } = view;
  const left =
    outside.length > 0
      ? ` ${outside.length} samples outside the stated validity are open dots, or lie beyond the frame; they do not count.`
      : '';
  const dropped =
    answer.dropped > 0 ? ` ${answer.dropped} rows of the file are invalid, repeated or without value.` : '';
  return html`<p class="note">
    Zero is the ${zeroName(view) === 'mean' ? 'mean' : 'prediction, its standard uncertainty the band'}. ${formatDuration(reduction.validS)} of
    valid data, ${formatDuration(reduction.deadS)} without.${left}${dropped} Open dot: u of the mean,
    ${answer.basis.words}.
  </p>`;
}

function deviationTable(view: SeriesView): TemplateResult | typeof nothing {
  const rows = view.answer.deviations.filter((d) => d.kind === 'oadev');
  if (rows.length === 0) return nothing;
  return html`<table>
    <caption class="only-spoken">
      Overlapping Allan deviation
    </caption>
    <thead>
      <tr>
        <th scope="col">τ</th>
        <th scope="col" class="num">σ(τ)</th>
        <th scope="col" class="num">68.3 %</th>
        <th scope="col" class="num">length</th>
        <th scope="col" class="num wide">noise</th>
      </tr>
    </thead>
    <tbody>
      ${rows.map(
        (d) => html`<tr>
          <th scope="row">${formatDuration(d.tau)}</th>
          <td class="num">${d.value.toExponential(2)}</td>
          <td class="num">${d.lo.toExponential(1)} to ${d.hi.toExponential(1)}</td>
          <td class="num">${formatLength(d.value * view.lengthPerY, 2)}</td>
          <td class="num wide">${d.noise}</td>
        </tr>`,
      )}
    </tbody>
  </table>`;
}

function runningTable({ running, used }: SeriesView): TemplateResult | typeof nothing {
  if (running.length === 0) return nothing;
  return html`<details>
    <summary>The mean as it grew, in numbers</summary>
    <table>
      <thead>
        <tr>
          <th scope="col">after</th>
          <th scope="col" class="num">mean</th>
        </tr>
      </thead>
      <tbody>
        ${running.map(
          ({ endS, mean, u }) => html`<tr>
            <th scope="row">${formatDuration(endS - used.startS[0]!)}</th>
            <td class="num">${quantityText(offsetText(mean, u))}</td>
          </tr>`,
        )}
      </tbody>
    </table>
  </details>`;
}
