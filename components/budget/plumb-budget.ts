import { type CSSResultGroup, html, nothing, type PropertyValues, type TemplateResult } from 'lit';
import type { GroupedBudget } from '../../lib/answers/budget-groups.js';
import { type Limits, limitsOf } from '../../lib/answers/limits.js';
import { type LinkQuestions, linkQuestions } from '../../lib/answers/questions.js';
import { validationSentence } from '../../lib/answers/validation-sentence.js';
import { type LinkUncertainty, linkUncertainty, whatIf } from '../../lib/answers/what-if.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { CampaignError, type Fault } from '../../lib/campaign/fault.js';
import { type BudgetExport, changeText } from '../../lib/report/budget-export.js';
import { LENGTH_NOTE, referencePotentialNote, SIGN_NOTE, tideNote } from '../../lib/report/conventions.js';
import { faultInPlace } from '../campaign/fault-in-place.js';
import { PlumbElement } from '../plumb-element.js';
import { CampaignElement } from '../shared/campaign-element.js';
import { copyLine } from '../shared/copy-line.js';
import { computedBy } from '../shared/provenance.js';
import { richText, sentenceCase } from '../shared/rich-text.js';
import { WidthController } from '../shared/width-controller.js';
import { solvedOf } from '../state/answers.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { OwnCampaign } from '../state/own-campaign.js';
import { budgetStyles } from './budget-styles.js';
import { type BudgetTableContext, budgetTable, groupKey } from './budget-table.js';
import { coverageNote, outlookWords, sentence } from './budget-words.js';
import { type ExportForm, exportText, exportView, save } from './export-view.js';
import { questionsView } from './questions-view.js';
import { scalesTable } from './scales-table.js';
import { OWN_TRIALS, TrialsController } from './trials-controller.js';
import { trialsView } from './trials-view.js';
import { whatIfBox } from './what-if-box.js';
import { changesOf, type Edits, type EditTarget, withFactor, without, withText } from './what-if-edits.js';

/** Edits that follow each other faster than this share one answer to the questions. */
const SETTLE_MS = 250;

const printing = matchMedia('print');
const PRINT_EVENTS = ['beforeprint', 'afterprint'] as const;

/** Everything that is shown of one link, as stated. */
interface Shown {
  readonly campaign: Campaign;
  readonly link: number;
  readonly uncertainty: LinkUncertainty;
  readonly limits: Limits;
}

/** Detail of `plumb-what-if`: a reader has changed an uncertainty to try it; the campaign stays as it is. */
export interface PlumbWhatIf {
  readonly link: string;
  /** u of the length equivalent as stated and as it would be, m; null: what was typed cannot be computed */
  readonly uM: number;
  readonly uIfM: number | null;
}

declare global {
  interface HTMLElementEventMap {
    'plumb-what-if': CustomEvent<PlumbWhatIf>;
  }
}

/** The uncertainty of one link: what limits it, what would help, what if something were known better, and whether the linear
 *  answer is right.
 *
 *  Inside a `<plumb-campaign>`, or alone with the campaign in a child `<script type="application/json">` or in `json`:
 *  `<plumb-campaign src="campaign.json"><plumb-budget link="rp"></plumb-budget></plumb-campaign>`
 *
 * @slot Fallback: what the page shows without script.
 * @fires plumb-select A reader has chosen another link; detail: `link`.
 * @fires plumb-what-if A reader has tried another uncertainty; detail: `link`, `uM`, `uIfM`.
 * @csspart base The sheet.
 * @csspart provenance The line that says who computed it and when.
 * @cssproperty [--plumb-paper] Ground; likewise `--plumb-ink` and the other colours. */
export class PlumbBudget extends CampaignElement {
  static override properties = {
    ...CampaignElement.properties,
    json: { type: String },
    trials: { type: String },
  };
  static override styles: CSSResultGroup = [PlumbElement.styles, budgetStyles];

  /** A campaign as text, where the element stands alone. */
  declare json: string | null;
  /** How many Monte Carlo trials are run unasked: a whole number, 100000 if not given; `none`. */
  declare trials: string | null;

  readonly #width = new WidthController(this);
  readonly #own = new OwnCampaign(this, this.campaign, () => this.json);
  readonly #trials = new TrialsController(this);
  #shown: Shown | null = null;
  #questions: { readonly of: Shown; readonly questions: LinkQuestions | null } | null = null;
  #later: ReturnType<typeof setTimeout> | undefined;
  #edits: Edits = new Map();
  #changed: { readonly uncertainty: LinkUncertainty | null; readonly faults: readonly Fault[] } | null = null;
  #open: ReadonlySet<string> | null = null;
  #row: string | null = null;
  #form: ExportForm = 'Markdown';
  #isExporting = false;
  #copied = '';
  #isPrinting = false;

  constructor() {
    super();
    this.json = null;
    this.trials = null;
  }

  readonly #onPrint = (event: Event): void => {
    this.#isPrinting = event.type === 'beforeprint';
    this.requestUpdate();
  };

  override connectedCallback(): void {
    super.connectedCallback();
    for (const type of PRINT_EVENTS) window.addEventListener(type, this.#onPrint);
    printing.addEventListener('change', this.#onPrint);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    clearTimeout(this.#later);
    for (const type of PRINT_EVENTS) window.removeEventListener(type, this.#onPrint);
    printing.removeEventListener('change', this.#onPrint);
  }

  /** u of the length equivalent of the link in hand, m, as stated and with what was changed; null: nothing shown, or not changed. */
  get uM(): { readonly stated: number; readonly whatIf: number | null } | null {
    return (
      this.#shown && {
        stated: this.#shown.uncertainty.dH.u,
        whatIf: this.#changed?.uncertainty?.dH.u ?? null,
      }
    );
  }

  protected override willUpdate(changed: PropertyValues): void {
    if (changed.has('json')) this.#own.refresh();
    const { state } = this.campaign;
    const answered = state?.status === 'ready' ? state : state?.status === 'failed' ? state.lastGood : null;
    this.#look(answered);
  }

  /** Takes up the link in hand; what was tried stays, for a change is of the whole campaign. */
  #look(answered: AnsweredCampaign | null): void {
    if (!answered) {
      this.#shown = null;
      this.#trials.clear();
      return;
    }
    const { campaign } = answered;
    const id = this.linkInHand(answered) ?? campaign.links[0]?.id;
    const link = campaign.links.findIndex((one) => one.id === id);
    if (this.#shown?.campaign === campaign && this.#shown.link === link) return;
    const before = this.#shown;
    const solved = solvedOf(campaign);
    const uncertainty = link < 0 ? null : linkUncertainty(solved, link);
    this.#shown = uncertainty && { campaign, link, uncertainty, limits: limitsOf(solved, link, uncertainty) };
    if (before?.campaign.links[before.link]?.id !== id) this.#open = null;
    if (before && before.campaign !== campaign) this.#edits = stillThere(this.#edits, solvedOf(campaign).model);
    this.#try();
    if (this.#shown) {
      this.#trials.want(campaign, link, this.#ownTrials());
      clearTimeout(this.#later);
      // not before the numbers themselves are on the screen, and not between two keystrokes
      this.#later = setTimeout(() => this.#answerQuestions(), before ? SETTLE_MS : 0);
    } else this.#trials.clear();
  }

  #ownTrials(): number {
    if (this.trials === 'none') return 0;
    const stated = Number(this.trials ?? OWN_TRIALS);
    return Number.isSafeInteger(stated) && stated >= 100 ? stated : OWN_TRIALS;
  }

  #answerQuestions(): void {
    const shown = this.#shown;
    if (!shown || this.#questions?.of === shown) return;
    this.#questions = { of: shown, questions: linkQuestions(solvedOf(shown.campaign), shown.link) };
    this.requestUpdate();
  }

  // --- what a reader tries

  /** Solves with the changes; the campaign stays. */
  #try(): void {
    const changes = changesOf(this.#edits);
    if (!this.#shown || changes.length === 0) {
      this.#changed = null;
      return;
    }
    const { campaign, link } = this.#shown;
    try {
      this.#changed = { uncertainty: whatIf(solvedOf(campaign), link, changes), faults: [] };
    } catch (error) {
      if (!(error instanceof CampaignError)) throw error;
      this.#changed = { uncertainty: null, faults: error.faults };
    }
  }

  #edit(edits: Edits): void {
    this.#edits = edits;
    this.#copied = '';
    this.#try();
    this.requestUpdate();
    void this.updateComplete.then(() => {
      const shown = this.#shown;
      if (!shown) return;
      const detail: PlumbWhatIf = {
        link: shown.uncertainty.id,
        uM: shown.uncertainty.dH.u,
        uIfM: this.#changed?.uncertainty?.dH.u ?? (this.#changed ? null : shown.uncertainty.dH.u),
      };
      this.dispatchEvent(new CustomEvent('plumb-what-if', { detail, bubbles: true, composed: true }));
    });
  }

  readonly #factor = (target: EditTarget, factor: number): void => this.#edit(withFactor(this.#edits, target, factor));

  readonly #type = (target: EditTarget, text: string, stated: string): void =>
    this.#edit(withText(this.#edits, target, text, stated));

  readonly #toggle = (key: string): void => {
    const open = new Set(this.#openOf(this.#shown!));
    if (!open.delete(key)) open.add(key);
    this.#open = open;
    this.requestUpdate();
  };

  readonly #take = (row: string): void => {
    this.#row = this.#row === row ? null : row;
    this.requestUpdate();
  };

  /** The largest group shows its inputs until a reader hides them. */
  #openOf({ uncertainty }: Shown): ReadonlySet<string> {
    const [largest] = uncertainty.budget.groups;
    return this.#open ?? new Set(largest ? [groupKey(largest)] : []);
  }

  #budgetExport({ campaign, uncertainty }: Shown): BudgetExport {
    const changed = this.#changed?.uncertainty ?? null;
    const { result } = this.#trials;
    const output = this.#trials.isCurrent ? result?.outputs[0] : undefined;
    return {
      campaign,
      uncertainty,
      whatIf: changed && { changes: changesOf(this.#edits), uncertainty: changed },
      trials:
        output && result
          ? {
              trials: result.trials,
              seed: result.seed,
              low: output.interval.low,
              high: output.interval.high,
              sentence: validationSentence(output, result),
            }
          : null,
      provenance: sentenceCase(computedBy()),
    };
  }

  async #copy(shown: Shown): Promise<void> {
    if (!this.#isExporting) {
      this.#isExporting = true;
      this.requestUpdate();
      await this.updateComplete;
    }
    const text = this.renderRoot.querySelector('.export pre');
    if (!text) return;
    const done = await copyLine(exportText(this.#form, this.#budgetExport(shown)), text);
    this.#copied = done === 'copied' ? 'copied' : 'marked; copy it with Ctrl+C';
    this.requestUpdate();
  }

  // --- what is shown

  #chooser({ campaign, link }: Shown): TemplateResult {
    const { id, from, to } = campaign.links[link]!;
    const name = (clock: string) => {
      const site = campaign.clocks.find((one) => one.id === clock)?.site;
      return campaign.sites.find((one) => one.id === site)?.name ?? site ?? clock;
    };
    return html`<h2>
      Uncertainty of link
      ${
        campaign.links.length > 1
          ? html`<span class="only-print">${id}</span
              ><select
                class="field no-print"
                aria-label="link"
                @change=${(event: Event) => this.#choose((event.target as HTMLSelectElement).value)}
              >
                ${campaign.links.map((one) => html`<option value=${one.id} ?selected=${one.id === id}>${one.id}</option>`)}
              </select>`
          : id
      }, ${name(from)} to ${name(to)}
    </h2>`;
  }

  #choose(link: string): void {
    this.take(link);
    // nobody round the element hands the choice back
    if (this.#own.isInForce) this.campaign.inHand = link;
    this.requestUpdate();
  }

  #tableContext(
    shown: Shown,
    part: Pick<BudgetTableContext, 'stated' | 'changed' | 'id' | 'caption' | 'shareHead' | 'hasSensitivity'>,
  ): BudgetTableContext {
    return {
      ...part,
      campaign: shown.campaign,
      model: solvedOf(shown.campaign).model,
      edits: this.#edits,
      open: this.#openOf(shown),
      isPrinting: printing.matches || this.#isPrinting,
      inHand: this.#row,
      factor: this.#factor,
      type: this.#type,
      toggle: this.#toggle,
      take: this.#take,
    };
  }

  #comparison(shown: Shown): TemplateResult | typeof nothing {
    const { campaign, uncertainty } = shown;
    const { systematic } = uncertainty.outlook;
    if (systematic.groups.length === 0) return nothing;
    return html`<section class="comparison" aria-label="Only in the comparison">
      <h3>Only in the comparison</h3>
      <p>
        Clocks, link and frequency ratio do not enter the prediction; a measured offset is compared with it through them.
        ${richText(outlookWords(campaign, uncertainty))}
      </p>
      ${budgetTable(
        this.#tableContext(shown, {
          stated: systematic,
          changed: ifMoved(systematic, this.#changed?.uncertainty?.outlook.systematic),
          id: 'k',
          caption: 'What only the comparison contains',
          shareHead: 'share of the systematics',
          hasSensitivity: false,
        }),
      )}
    </section>`;
  }

  protected override answered({ campaign, prediction }: AnsweredCampaign): TemplateResult {
    if (prediction.links.length === 0)
      return html`<p class="say">The campaign has no links between clocks.</p>
        <p class="note">A link names two clocks: <code>"links": [{"id": "ab", "from": "clock-a", "to": "clock-b"}]</code>.</p>`;
    const shown = this.#shown;
    if (!shown) {
      const id = this.linkInHand({ campaign } as AnsweredCampaign) ?? campaign.links[0]!.id;
      return html`<p class="say">Link ${id} has no prediction: its ends have no common level.</p>`;
    }
    const { uncertainty } = shown;
    const changed = this.#changed?.uncertainty ?? null;
    const exact = uncertainty.budget.groups.length === 0;
    const questions = this.#questions?.of.uncertainty.id === uncertainty.id ? this.#questions.questions : null;
    return html`${this.#chooser(shown)}
      <p class="say">${richText(sentence(campaign, uncertainty, shown.limits))}</p>
      <div class="bhead">
        <div>
          ${scalesTable(uncertainty)}
          <p class="trinote">${richText(coverageNote(uncertainty))}</p>
        </div>
        ${exact ? nothing : this.#whatIf(shown)}
      </div>
      ${
        exact
          ? nothing
          : budgetTable(
              this.#tableContext(shown, {
                stated: uncertainty.budget,
                changed: ifMoved(uncertainty.budget, changed?.budget),
                id: 'b',
                caption: `What the uncertainty of link ${uncertainty.id} is made of`,
                shareHead: 'share of the variance',
                hasSensitivity: true,
              }),
            )
      }
      ${this.#comparison(shown)} ${trialsView(this.#trials, uncertainty, this.#figureWidth(), changed !== null)}
      ${exact ? nothing : questionsView({ campaign, open: this.#openOf(shown), toggle: this.#toggle }, questions)}
      ${this.#exporting(shown)}
      <p class="note">
        A share is cov(<i class="s">y</i>, <i class="s">c</i>·<i class="s">x</i>)/<i class="s">u</i>²(<i class="s">y</i>): shares
        add up to 100 %, and one can be negative. Outlined: a shared source, its inputs below it. Weights of redundant
        determinations follow what is tried. ${tideNote(campaign.tide)} ${referencePotentialNote(campaign)} ${SIGN_NOTE} ${sentenceCase(LENGTH_NOTE)}
      </p>`;
  }

  #figureWidth(): number {
    const { width } = this.#width;
    return width < 656 ? Math.max(280, Math.min(480, width)) : width < 1120 ? 328 : 520;
  }

  #whatIf(shown: Shown): TemplateResult {
    return whatIfBox({
      campaign: shown.campaign,
      stated: shown.uncertainty,
      changed: this.#changed?.uncertainty ?? null,
      faults: this.#changed?.faults ?? [],
      edits: this.#edits,
      status: this.#copied,
      words: (change) => changeText({ campaign: shown.campaign, uncertainty: shown.uncertainty }, change),
      putBack: (key) => this.#edit(key === null ? new Map() : without(this.#edits, key)),
      copy: () => void this.#copy(shown),
    });
  }

  #exporting(shown: Shown): TemplateResult {
    return html`<p class="no-print disclose">
        <button
          type="button"
          class="word"
          aria-expanded=${this.#isExporting ? 'true' : 'false'}
          @click=${() => {
            this.#isExporting = !this.#isExporting;
            this.#copied = '';
            this.requestUpdate();
          }}
        >
          ${this.#isExporting ? 'hide export' : 'export this budget'}
        </button>
      </p>
      ${
        this.#isExporting
          ? exportView({
              form: this.#form,
              text: exportText(this.#form, this.#budgetExport(shown)),
              status: this.#copied,
              choose: (form) => {
                this.#form = form;
                this.#copied = '';
                this.requestUpdate();
              },
              copy: () => void this.#copy(shown),
              save: () => save(this.#form, exportText(this.#form, this.#budgetExport(shown)), shown.uncertainty.id),
            })
          : nothing
      }`;
  }

  protected override content(): TemplateResult {
    const { state } = this.campaign;
    if (state?.status !== 'failed' || !this.#own.isInForce) return super.content();
    return html`<div class="flt">
        <p class="hd">Not computed: the campaign cannot be read</p>
        ${state.faults.map((fault) => faultInPlace(fault, this.#own.lines))}
      </div>
      ${super.content()}`;
  }
}

/** A changed budget that differs from the stated one; else null, and no mark stands on its bars. */
const ifMoved = (stated: GroupedBudget, changed: GroupedBudget | undefined): GroupedBudget | null =>
  changed === undefined || changed.u === stated.u ? null : changed;

/** Changes whose input or source the campaign still has. */
function stillThere(edits: Edits, model: ReturnType<typeof solvedOf>['model']): Edits {
  const inputs = new Set(model.inputs.map(({ path }) => path));
  const sources = new Set(model.covariance.sources.map(({ id }) => id));
  return new Map(
    [...edits].filter(([, { target }]) =>
      target.kind === 'part' ? inputs.has(target.input) : sources.has(target.source),
    ),
  );
}
