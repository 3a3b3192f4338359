import { type CSSResultGroup, html, nothing, type PropertyValues, type TemplateResult } from 'lit';
import { repeat } from 'lit/directives/repeat.js';
import { evaluationOf } from '../../lib/answers/evaluate.js';
import { type Weighed, type Weights, weightsOf } from '../../lib/answers/weights.js';
import {
  type CampaignFile,
  type Edit,
  type FilePath,
  isObject,
  pathText,
  valueAt,
} from '../../lib/campaign/edit/index.js';
import type { Fault } from '../../lib/campaign/fault.js';
import { CampaignError } from '../../lib/campaign/fault.js';
import { importSites } from '../../lib/campaign/import/import-table.js';
import { campaignSchema } from '../../lib/campaign/schema/index.js';
import { writeCampaign } from '../../lib/campaign/write.js';
import { formatConcise, formatScaled } from '../../lib/quantity/index.js';
import { verdictSentence } from '../../lib/report/evaluation-report.js';
import { limitSentence } from '../../lib/report/limit.js';
import { shareScale } from '../charts/share-bar.js';
import type { PlumbMove } from '../map/plumb-map.js';
import { PlumbElement } from '../plumb-element.js';
import { quantityText } from '../shared/number.js';
import { computedBy } from '../shared/provenance.js';
import { sentenceCase } from '../shared/rich-text.js';
import { warningList } from '../shared/warnings.js';
import { oncePerCampaign, solvedOf } from '../state/answers.js';
import { type AnsweredCampaign, CampaignProvider } from '../state/campaign-context.js';
import { type FormContext, objectForm } from './desk-form.js';
import { DESK_LISTS, type DeskList, FILE_SKIP, itemsOf, newItem, rowSummary } from './desk-lists.js';
import {
  BLANK,
  type DeskSession,
  sessionFrom,
  sessionOf,
  titleOf,
  withBackTo,
  withEdit,
  withRedo,
  withUndo,
} from './desk-session.js';
import { deskStyles } from './desk-styles.js';
import { find } from './find.js';
import { Keeper, type Keeping, type KeptCampaign } from './keeper.js';

/** How long after an edit the campaign is kept. */
const KEEP_AFTER_MS = 400;
const evaluationFor = oncePerCampaign((campaign) => evaluationOf(solvedOf(campaign)));

/** The planner as one place to work: the campaign in tables, each value beside what it weighs in the answer in hand; undo without
 *  limit; kept in the browser; nothing lost by an edit that cannot be read.
 *
 *  `<plumb-desk src="campaign.json"></plumb-desk>`, a campaign in a child `<script type="application/json">`, or empty.
 *
 * @slot Fallback: what the page shows without script.
 * @fires plumb-select A reader has taken a link in hand; detail: `link`.
 * @csspart base The sheet. */
export class PlumbDesk extends PlumbElement {
  static override properties = {
    src: { type: String },
    link: { type: String },
    session: { state: true },
    open: { state: true },
    pending: { state: true },
    weighed: { state: true },
    search: { state: true },
    keeping: { state: true },
    notice: { state: true },
    asJson: { state: true },
    library: { state: true },
    dropping: { state: true },
  };
  static override styles: CSSResultGroup = [PlumbElement.styles, deskStyles];

  /** Address of the campaign it begins with, where nothing newer is kept. */
  declare src: string | null;
  /** Id of the link in hand. */
  declare link: string | null;
  declare session: DeskSession;
  /** path of the open row */
  declare open: string | null;
  declare pending: ReadonlySet<string>;
  declare weighed: Weighed;
  declare search: string;
  declare keeping: Keeping;
  declare notice: string | null;
  declare asJson: string | null;
  declare library: readonly KeptCampaign[] | null;
  declare dropping: boolean;

  readonly #provider = new CampaignProvider(this);
  readonly #keeper = new Keeper();
  #start: CampaignFile = BLANK;
  #id: string = crypto.randomUUID();
  #revision = 0;
  #timer: ReturnType<typeof setTimeout> | undefined;
  #keepingNow: Promise<void> = Promise.resolve();

  constructor() {
    super();
    this.src = null;
    this.link = null;
    this.session = sessionOf(BLANK);
    this.open = null;
    this.pending = new Set();
    this.weighed = 'prediction';
    this.search = '';
    this.keeping = { state: 'unkept' };
    this.notice = null;
    this.asJson = null;
    this.library = null;
    this.dropping = false;
    this.addEventListener('plumb-select', (event) => {
      this.link = event.detail.link;
    });
    this.addEventListener('plumb-move', (event) => this.#moveSite(event.detail));
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.#provider.announce();
    window.addEventListener('keydown', this.#keys);
    window.addEventListener('hashchange', this.#followFragment);
    window.addEventListener('pagehide', this.#keepBeforeLeaving);
    void this.#begin();
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    window.removeEventListener('keydown', this.#keys);
    window.removeEventListener('hashchange', this.#followFragment);
    window.removeEventListener('pagehide', this.#keepBeforeLeaving);
    this.#keepBeforeLeaving();
  }

  /** The campaign as a file, as it stands. */
  get file(): CampaignFile {
    return this.session.history.present;
  }

  /** Done when everything so far is kept, or refused to be. */
  async settled(): Promise<void> {
    await this.updateComplete;
    if (this.#timer !== undefined) this.#keepBeforeLeaving();
    await this.#keepingNow;
  }

  async #begin(): Promise<void> {
    // a script in the head runs before the parser has reached the children
    if (document.readyState === 'loading')
      await new Promise((resolve) => document.addEventListener('DOMContentLoaded', resolve, { once: true }));
    const inline = [...this.children].find((c) => c instanceof HTMLScriptElement && c.type === 'application/json');
    const kept = await this.#keeper.list();
    const mine = kept.find((k) => k.id === this.#idOfPage());
    if (mine) this.#take(mine);
    else if (inline?.textContent) this.#openText(inline.textContent);
    else if (this.src) await this.#fetch(this.src);
    this.#followFragment();
  }

  /** A page that names its campaign keeps it under the page's own name; a blank desk begins anew. */
  #idOfPage(): string {
    return this.id !== '' ? `desk:${this.id}` : this.src ? `src:${new URL(this.src, this.baseURI).href}` : 'desk';
  }

  async #fetch(src: string): Promise<void> {
    try {
      const response = await fetch(new URL(src, this.baseURI));
      if (!response.ok) throw new Error(`the server answered ${response.status}`);
      this.#openText(await response.text());
    } catch (error) {
      this.notice = `${src} could not be read: ${error instanceof Error ? error.message : error}`;
    }
  }

  /** Opens a file's text as a campaign of its own; text that is no JSON is said and nothing is lost. */
  #openText(text: string): void {
    let file: CampaignFile;
    try {
      file = JSON.parse(text) as CampaignFile;
    } catch (error) {
      this.notice = `The file is no JSON: ${error instanceof Error ? error.message : error}`;
      return;
    }
    this.#begun(file, sessionOf(file), this.#idOfPage(), 0);
  }

  #take(kept: KeptCampaign): void {
    this.#begun(kept.start, sessionFrom(kept.start, kept.edits), kept.id, kept.revision);
    this.keeping = { state: 'kept', at: kept.savedAt };
  }

  #begun(start: CampaignFile, session: DeskSession, id: string, revision: number): void {
    this.#start = start;
    this.#id = id;
    this.#revision = revision;
    this.session = session;
    this.open = null;
    this.pending = new Set();
    this.library = null;
    this.notice = null;
  }

  #edit(edit: Edit): void {
    const { session, refused } = withEdit(this.session, edit);
    this.notice = refused;
    if (session === this.session) return;
    this.session = session;
    if (edit.kind === 'set')
      this.pending = new Set([...this.pending].filter((p) => p !== pathText(this.file, edit.path)));
    this.#keepSoon();
  }

  #move(session: DeskSession): void {
    if (session === this.session) return;
    this.session = session;
    this.#keepSoon();
  }

  #keepSoon(): void {
    this.keeping = { state: 'unkept' };
    clearTimeout(this.#timer);
    this.#timer = setTimeout(() => {
      this.#timer = undefined;
      this.#keepingNow = this.#keepingNow.then(() => this.#keep());
    }, KEEP_AFTER_MS);
  }

  readonly #keepBeforeLeaving = (): void => {
    if (this.#timer === undefined) return;
    clearTimeout(this.#timer);
    this.#timer = undefined;
    this.#keepingNow = this.#keepingNow.then(() => this.#keep());
  };

  async #keep(): Promise<void> {
    const { past, present } = this.session.history;
    const at = new Date().toISOString();
    const kept = (id: string, revision: number): KeptCampaign => ({
      id,
      title: titleOf(present),
      start: this.#start,
      edits: past.map((c) => c.edit),
      present,
      revision,
      savedAt: at,
    });
    try {
      const revision = await this.#keeper.keep(kept(this.#id, this.#revision));
      if (revision !== null) {
        this.#revision = revision;
        this.keeping = { state: 'kept', at };
        return;
      }
      // another tab has gone on with this campaign: both are kept, this one under a name of its own
      this.#id = `${this.#idOfPage()} ${crypto.randomUUID()}`;
      this.#revision = (await this.#keeper.keep(kept(this.#id, 0))) ?? 0;
      this.keeping = { state: 'branched', at };
    } catch (error) {
      this.keeping = { state: 'refused', why: error instanceof Error ? error.message : String(error) };
    }
  }

  readonly #keys = (event: KeyboardEvent): void => {
    const inField = event
      .composedPath()
      .some((n) => n instanceof HTMLInputElement || n instanceof HTMLTextAreaElement || n instanceof HTMLSelectElement);
    const command = event.ctrlKey || event.metaKey;
    if (command && event.key.toLowerCase() === 'z' && !inField) {
      event.preventDefault();
      this.#move(event.shiftKey ? withRedo(this.session) : withUndo(this.session));
    } else if (event.key === '/' && !inField && !command) {
      event.preventDefault();
      this.renderRoot.querySelector<HTMLInputElement>('#find')?.focus();
    }
  };

  /** `#at=sites.cellar.h` opens that row and goes to that field. */
  readonly #followFragment = (): void => {
    const at = new URLSearchParams(location.hash.slice(1)).get('at');
    if (at) void this.#goTo(at);
  };

  async #goTo(text: string): Promise<void> {
    const [list, item] = text.split('.');
    if (item !== undefined) this.open = `${list}.${item}`;
    this.search = '';
    await this.updateComplete;
    const field = [...this.renderRoot.querySelectorAll<HTMLElement>('[data-path]')].find(
      (f) => f.dataset['path'] === text,
    );
    (field ?? this.renderRoot.querySelector<HTMLElement>(`[data-row="${CSS.escape(this.open ?? '')}"]`))?.focus();
  }

  protected override willUpdate(changed: PropertyValues): void {
    if (changed.has('session')) {
      const { answered, faults, lastGood } = this.session;
      this.#provider.state = answered ? { status: 'ready', ...answered } : { status: 'failed', faults, lastGood };
    }
    this.#provider.inHand = this.link;
  }

  get #answered(): AnsweredCampaign | null {
    return this.session.answered ?? this.session.lastGood;
  }

  #linkIndex(): number {
    const links = this.#answered?.campaign.links ?? [];
    const chosen = links.findIndex((l) => l.id === this.link);
    return chosen >= 0 ? chosen : links.length > 0 ? 0 : -1;
  }

  #weights(): Weights | null {
    const answered = this.#answered;
    const link = this.#linkIndex();
    return answered && link >= 0 ? weightsOf(solvedOf(answered.campaign), link, this.weighed) : null;
  }

  protected override content(): TemplateResult {
    const weights = this.#weights();
    const faults = byPath(this.session.faults);
    const shares = weights?.byPath ?? new Map<string, number>();
    const context: FormContext = {
      file: this.file,
      faults,
      shares,
      scale: shareScale([...shares.values()]),
      pending: this.pending,
      edit: (edit) => this.#edit(edit),
      open: (path) => {
        this.pending = new Set([...this.pending, path]);
        void this.#goTo(path);
      },
    };
    return html`<div
      class=${this.dropping ? 'desk dropping' : 'desk'}
      @dragover=${(e: DragEvent) => {
        e.preventDefault();
        this.dropping = true;
      }}
      @dragleave=${() => {
        this.dropping = false;
      }}
      @drop=${(e: DragEvent) => {
        e.preventDefault();
        this.dropping = false;
        const file = e.dataTransfer?.files[0];
        if (file) void this.#openFile(file);
      }}
    >
      ${this.#top()} ${this.library ? this.#libraryList(this.library) : nothing}
      ${
        this.asJson !== null
          ? this.#json(this.asJson)
          : html`<div class="columns">
              ${this.#register(weights)}
              <div class="tables">${this.#tables(context)}</div>
              <div class="answer" aria-live="polite">${this.#answer(weights)}</div>
            </div>`
      }
      ${this.#plates()}
    </div>`;
  }

  #top(): TemplateResult {
    const { past, future } = this.session.history;
    const last = past.at(-1);
    return html`<div class="top">
        <h1>${titleOf(this.file)}</h1>
        ${this.#finder()}
        <button type="button" class="btn" ?disabled=${!last} @click=${() => this.#move(withUndo(this.session))}>
          Undo${last ? ` ${cut(last.words)}` : ''}
        </button>
        <button type="button" class="btn" ?disabled=${future.length === 0} @click=${() => this.#move(withRedo(this.session))}>Redo</button>
        <button type="button" class="btn" @click=${() => this.#showLibrary()}>Campaigns</button>
        <label class="btn"
          >Open a file<input class="only-spoken" type="file" accept=".json,.csv,.tsv,.txt" @change=${(e: Event) => {
            const input = e.target as HTMLInputElement;
            const file = input.files?.[0];
            if (file) void this.#openFile(file);
            input.value = '';
          }}
        /></label>
        <button type="button" class="btn" @click=${() => this.#download()}>Save as a file</button>
        <button type="button" class="btn" @click=${() => this.#toggleJson()}>${this.asJson === null ? 'As JSON' : 'As tables'}</button>
        <p class=${this.keeping.state === 'kept' || this.keeping.state === 'unkept' ? 'kept' : 'kept caution-line'} role="status">
          ${keepingWords(this.keeping, past.length)} ${missingWords(this.session)}
        </p>
      </div>
      ${this.notice ? html`<p class="fault-note" role="alert">${this.notice}</p>` : nothing}`;
  }

  #finder(): TemplateResult {
    const found = this.search === '' ? [] : find(this.file, this.search);
    return html`<div class="finder no-print">
      <input
        id="find"
        type="text"
        placeholder="find: /"
        aria-label="find a value by name, place or text"
        .value=${this.search}
        @input=${(e: Event) => {
          this.search = (e.target as HTMLInputElement).value;
        }}
        @keydown=${(e: KeyboardEvent) => {
          if (e.key === 'Escape') this.search = '';
          if (e.key === 'Enter' && found[0]) void this.#goTo(found[0].text);
        }}
      />
      ${
        this.search === ''
          ? nothing
          : html`<ul>
              ${
                found.length === 0
                  ? html`<li><span class="dim">nothing with these words</span></li>`
                  : found.map(
                      (f) => html`<li>
                        <button type="button" @click=${() => void this.#goTo(f.text)}><span>${f.text}</span><b>${cut(f.value)}</b></button>
                      </li>`,
                    )
              }
            </ul>`
      }
    </div>`;
  }

  #register(weights: Weights | null): TemplateResult {
    const answered = this.#answered;
    return html`<nav class="register no-print" aria-label="Register">
      <h2>given</h2>
      <ul>
        ${DESK_LISTS.map(
          ({ list, title }) =>
            html`<li><a href=${`#at=${list}`} @click=${(e: Event) => this.#scrollTo(e, list)}>${title.toLowerCase()}</a><span>${itemsOf(this.file, list).length}</span></li>`,
        )}
      </ul>
      <h2>found</h2>
      <ul>
        <li><span>faults</span><span>${this.session.faults.length}</span></li>
        <li><span>cautions</span><span>${answered?.warnings.length ?? 0}</span></li>
      </ul>
      <h2>weighed</h2>
      <ul>
        ${(['prediction', 'comparison'] as const).map(
          (what) => html`<li>
            <label><input type="radio" name="weighed" ?checked=${this.weighed === what} @change=${() => {
              this.weighed = what;
            }} />${what}</label>
          </li>`,
        )}
        ${weights && weights.statistics > 0 ? html`<li><span>statistics</span><span>${(100 * weights.statistics).toFixed(0)}&nbsp;%</span></li>` : nothing}
      </ul>
    </nav>`;
  }

  #scrollTo(event: Event, list: string): void {
    event.preventDefault();
    this.renderRoot.querySelector(`#list-${list}`)?.scrollIntoView({ block: 'start' });
  }

  #tables(context: FormContext): TemplateResult {
    return html`<section aria-labelledby="list-campaign">
        <div class="table-title"><h2 id="list-campaign">Campaign</h2></div>
        ${objectForm(context, campaignSchema.keys, [], 'campaign', FILE_SKIP)} ${topFaults(context)}
      </section>
      ${DESK_LISTS.map((list) => this.#table(context, list))}`;
  }

  #table(context: FormContext, desk: DeskList): TemplateResult {
    const items = itemsOf(this.file, desk.list);
    return html`<section aria-labelledby=${`list-${desk.list}`}>
      <div class="table-title">
        <h2 id=${`list-${desk.list}`}>${desk.title}</h2>
        <span class="dim">${items.length}</span>
        <button type="button" class="word" @click=${() => this.#add(desk)}>add a ${desk.one}</button>
      </div>
      ${repeat(
        items,
        (item, i) => (isObject(item) && typeof item['id'] === 'string' ? item['id'] : i),
        (item, i) => this.#row(context, desk, [desk.list, i], item),
      )}
    </section>`;
  }

  #row(context: FormContext, desk: DeskList, path: FilePath, item: CampaignFile): TemplateResult {
    const at = pathText(this.file, path);
    const isOpen = this.open === at;
    const own = [...context.shares].filter(([p]) => p === at || p.startsWith(`${at}.`));
    const share = own.reduce((s, [, x]) => s + x, 0);
    const wrong = [...context.faults.keys()].some((p) => p === at || p.startsWith(`${at}.`));
    const id = isObject(item) && typeof item['id'] === 'string' ? item['id'] : `${desk.one} ${String(path[1])}`;
    return html`<div class=${`row ${isOpen ? 'open' : ''} ${wrong ? 'wrong' : ''}`}>
      <button
        type="button"
        class="row-head"
        data-row=${at}
        aria-expanded=${isOpen ? 'true' : 'false'}
        @click=${() => {
          this.open = isOpen ? null : at;
          if (desk.list === 'links' && !isOpen) this.link = id;
        }}
      >
        <b>${id}</b><span class="sum">${rowSummary(desk.list, item)}</span>
        <span>${own.length > 0 ? `${(100 * share).toFixed(share < 0.1 ? 1 : 0)}\u00a0% of the variance` : ''}</span>
      </button>
      ${
        isOpen
          ? html`${objectForm(context, desk.descriptor.keys, path, desk.descriptor.name)} ${ownFaults(context, at)}
              <p>
                <button type="button" class="word" @click=${() => {
                  this.open = null;
                  this.#edit({ kind: 'remove', path });
                }}>remove this ${desk.one}</button>
              </p>`
          : nothing
      }
    </div>`;
  }

  #add(desk: DeskList): void {
    const value = newItem(this.file, desk);
    this.#edit({ kind: 'insert', path: [desk.list], value });
    const at = pathText(this.file, [desk.list, itemsOf(this.file, desk.list).length - 1]);
    this.open = at;
    void this.updateComplete.then(() => {
      const row = [...this.renderRoot.querySelectorAll<HTMLElement>('[data-row]')].find((r) => r.dataset['row'] === at);
      row?.parentElement?.querySelector<HTMLInputElement>('input')?.focus();
    });
  }

  #answer(weights: Weights | null): TemplateResult {
    const answered = this.#answered;
    const index = this.#linkIndex();
    if (!answered || index < 0) return html`<h2>Answer</h2><p class="note">${whatIsMissing(this.file)}</p>`;
    const { campaign, prediction } = answered;
    const link = prediction.links[index]!;
    const evaluation = campaign.measurements.length > 0 ? evaluationFor(campaign) : null;
    const verdicts = evaluation?.links.filter((l) => l.id === link.id) ?? [];
    const body = html`<label class="field">
        <span class="label">link in hand</span>
        <select
          aria-label="link in hand"
          @change=${(e: Event) => {
            this.link = (e.target as HTMLSelectElement).value;
          }}
        >
          ${campaign.links.map((l) => html`<option value=${l.id} ?selected=${l.id === link.id}>${l.id}</option>`)}
        </select>
      </label>
      ${
        link.y && link.dH && link.dW
          ? html`<p class="say">
                Link ${link.id} is predicted to ${quantityText(formatScaled(link.y.value, link.y.u, -18, { sign: 'always' }))} × 1e-18.
                ${limitSentence(link.budget)}
              </p>
              <table>
                <thead><tr><th scope="col">length / m</th><th scope="col">Δ<i class="s">W</i> / m²/s²</th><th scope="col"><i class="s">y</i> / 1e-18</th></tr></thead>
                <tbody><tr>
                  <td>${quantityText(formatConcise(link.dH.value, link.dH.u, { sign: 'always' }))}</td>
                  <td>${quantityText(formatConcise(link.dW.value, link.dW.u, { sign: 'always' }))}</td>
                  <td>${quantityText(formatScaled(link.y.value, link.y.u, -18, { sign: 'always' }))}</td>
                </tr></tbody>
              </table>`
          : html`<p class="say">Link ${link.id}: <b>not computed</b>, its ends have no common level.</p>`
      }
      ${verdicts.map((v) => html`<p class="note">${verdictSentence(v, evaluation!, campaign)}</p>`)}
      ${weights && this.weighed === 'comparison' ? html`<p class="note">The margin weighs the comparison: systematics, statistics and the frequency ratio included.</p>` : nothing}`;
    return html`${this.session.answered ? body : html`<div class="stale"><p class="tagc">before the last edit, which cannot be read</p>${body}</div>`}
      ${this.#changes()}
      ${warningList(answered.warnings.slice(0, 4).map((w) => ({ ...w, message: `${w.path}: ${w.message}` })))}
      <p class="by">${sentenceCase(computedBy())}.</p>`;
  }

  #changes(): TemplateResult | typeof nothing {
    const { past } = this.session.history;
    if (past.length === 0) return nothing;
    const shown = past
      .map((change, i) => ({ change, i }))
      .slice(-12)
      .reverse();
    return html`<h2>Changes</h2>
      <ul class="changes">
        ${shown.map(
          ({ change, i }, n) => html`<li>
            <span>${cut(change.words, 60)}</span>
            ${
              n === 0
                ? html`<button type="button" class="word" @click=${() => this.#move(withUndo(this.session))}>Undo</button>`
                : html`<button type="button" class="word" @click=${() => this.#move(withBackTo(this.session, i + 1))}>back to here</button>`
            }
          </li>`,
        )}
      </ul>`;
  }

  /** The other sides of the campaign, whole, under the tables. */
  #plates(): TemplateResult | typeof nothing {
    if (!this.#answered || this.#answered.campaign.links.length === 0) return nothing;
    return html`<plumb-section></plumb-section><plumb-links></plumb-links><plumb-budget></plumb-budget>
      <plumb-averaging></plumb-averaging><plumb-map editable></plumb-map>
      ${this.#answered.campaign.window ? html`<plumb-tide></plumb-tide>` : nothing} <plumb-network></plumb-network>
      <plumb-copy show="section,links,budget"></plumb-copy>`;
  }

  /** A site dragged on the map: one change, one undo. Heights do not follow. */
  #moveSite({ site, latitude, longitude }: PlumbMove): void {
    const index = itemsOf(this.file, 'sites').findIndex((one) => isObject(one) && one['id'] === site);
    const value = itemsOf(this.file, 'sites')[index];
    if (!isObject(value)) return;
    if (value['lat'] === undefined || value['lon'] === undefined)
      this.notice = `Site ${site} has its place in a coordinate system of its own: change it in its row.`;
    else this.#edit({ kind: 'set', path: ['sites', index], value: { ...value, lat: latitude, lon: longitude } });
  }

  #toggleJson(): void {
    this.asJson = this.asJson === null ? JSON.stringify(this.file, null, 2) : null;
  }

  #json(text: string): TemplateResult {
    return html`<section>
      <div class="table-title"><h2>The campaign as JSON</h2></div>
      <textarea
        aria-label="the campaign as JSON"
        spellcheck="false"
        .value=${text}
        @input=${(e: Event) => {
          this.asJson = (e.target as HTMLTextAreaElement).value;
        }}
      ></textarea>
      <p>
        <button type="button" class="btn" @click=${() => this.#takeJson(text)}>Take this</button>
        <button type="button" class="btn" @click=${() => this.#toggleJson()}>Leave it</button>
      </p>
      ${this.session.faults.map((f) => html`<p class="fault-note"><b>${f.path}</b>: <b>read</b> ${f.found}. <b>write</b> ${f.expected}</p>`)}
    </section>`;
  }

  #takeJson(text: string): void {
    try {
      const value = JSON.parse(text) as CampaignFile;
      this.#edit({ kind: 'replace', value, words: 'edited as JSON' });
      if (this.session.faults.length === 0) this.asJson = null;
    } catch (error) {
      this.notice = `This is no JSON yet, and nothing was changed: ${error instanceof Error ? error.message : error}`;
    }
  }

  async #openFile(file: File): Promise<void> {
    const text = await file.text();
    if (/\.(csv|tsv|txt)$/i.test(file.name)) {
      try {
        const imported = JSON.parse(writeCampaign(importSites(text))) as { sites?: readonly CampaignFile[] };
        const sites = [...itemsOf(this.file, 'sites'), ...(imported.sites ?? [])];
        this.#edit({ kind: 'set', path: ['sites'], value: sites });
      } catch (error) {
        if (!(error instanceof CampaignError)) throw error;
        this.notice = `${file.name}: ${error.faults.map((f) => `line ${f.line ?? '?'}, column ${f.column ?? '?'}: read ${f.found}; write ${f.expected}`).join('. ')}`;
      }
      return;
    }
    this.#id = crypto.randomUUID();
    let value: CampaignFile;
    try {
      value = JSON.parse(text) as CampaignFile;
    } catch (error) {
      this.notice = `${file.name} is no JSON: ${error instanceof Error ? error.message : error}. Nothing was changed.`;
      return;
    }
    this.#begun(value, sessionOf(value), this.#id, 0);
    this.#keepSoon();
  }

  #download(): void {
    const blob = new Blob([`${JSON.stringify(this.file, null, 2)}\n`], { type: 'application/json' });
    const url = URL.createObjectURL(blob);
    const anchor = document.createElement('a');
    anchor.href = url;
    anchor.download = `${
      titleOf(this.file)
        .toLowerCase()
        .replace(/[^a-z0-9]+/g, '-') || 'campaign'
    }.json`;
    anchor.click();
    URL.revokeObjectURL(url);
  }

  async #showLibrary(): Promise<void> {
    this.library = this.library ? null : await this.#keeper.list();
  }

  #libraryList(kept: readonly KeptCampaign[]): TemplateResult {
    return html`<section>
      <div class="table-title"><h2>Campaigns kept in this browser</h2></div>
      ${kept.length === 0 ? html`<p class="note">None is kept, or this browser refuses to keep any.</p>` : nothing}
      <ul class="changes">
        ${kept.map(
          (k) => html`<li>
            <span>${k.title}, ${k.savedAt.slice(0, 16).replace('T', ' ')}</span>
            <span>
              <button type="button" class="word" @click=${() => this.#take(k)}>open</button>
            </span>
          </li>`,
        )}
      </ul>
      <p>
        <button type="button" class="btn" @click=${() => {
          this.#begun(BLANK, sessionOf(BLANK), crypto.randomUUID(), 0);
          this.keeping = { state: 'unkept' };
        }}>Begin a blank one</button>
      </p>
    </section>`;
  }
}

const cut = (text: string, most = 36): string => (text.length > most ? `${text.slice(0, most - 1)}…` : text);

function byPath(faults: readonly Fault[]): ReadonlyMap<string, readonly Fault[]> {
  const map = new Map<string, Fault[]>();
  for (const f of faults) map.set(f.path, [...(map.get(f.path) ?? []), f]);
  return map;
}

/** Faults of the file as a whole, and of places no field stands for. */
function topFaults(context: FormContext): TemplateResult {
  const known = new Set(DESK_LISTS.map(({ list }) => list as string));
  const top = [...context.faults].filter(([path]) => path === '' || known.has(path));
  return html`${top.flatMap(([path, faults]) =>
    faults.map(
      (f) =>
        html`<p class="fault-note"><b>${path || 'file'}</b>: <b>read</b> ${f.found}. <b>write</b> ${f.expected}</p>`,
    ),
  )}`;
}

/** Faults of the row itself and of keys it lacks. */
function ownFaults(context: FormContext, at: string): TemplateResult {
  const value = (path: string) => context.faults.get(path) ?? [];
  return html`${value(at).map((f) => html`<p class="fault-note"><b>read</b> ${f.found}. <b>write</b> ${f.expected}</p>`)}`;
}

function keepingWords(keeping: Keeping, changes: number): string {
  switch (keeping.state) {
    case 'kept':
      return `Kept in this browser at ${keeping.at.slice(11, 16)} UTC, with ${changes} ${changes === 1 ? 'change' : 'changes'} that can be undone.`;
    case 'unkept':
      return changes === 0 ? 'Nothing changed yet.' : 'Being kept …';
    case 'branched':
      return 'Another tab has gone on with this campaign: this one is kept beside it as a campaign of its own.';
    case 'refused':
      return `Not kept: this browser refuses (${keeping.why}). Save it as a file before you leave.`;
  }
}

const missingWords = (session: DeskSession): string =>
  session.faults.length === 0
    ? ''
    : `The file has ${session.faults.length} ${session.faults.length === 1 ? 'fault' : 'faults'}: nothing typed is lost, and the answer is that of the last state that could be read.`;

function whatIsMissing(file: CampaignFile): string {
  const missing = (['sites', 'clocks', 'links'] as const).filter((list) => itemsOf(file, list).length === 0);
  if (missing.length > 0) return `No link can be predicted yet. Missing: ${missing.join(', ')}.`;
  return valueAt(file, ['links']) === undefined
    ? 'No link yet.'
    : 'The campaign cannot be read yet; the faults stand at their fields.';
}
