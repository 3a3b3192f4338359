import { type CSSResultGroup, html, nothing, type PropertyValues, type TemplateResult } from 'lit';
import { CampaignError, type Fault, faultAt } from '../../lib/campaign/fault.js';
import { hasFragment, readFragment } from '../../lib/campaign/fragment.js';
import { withPlaces } from '../../lib/campaign/locate.js';
import { readCampaign } from '../../lib/campaign/read.js';
import { PlumbElement } from '../plumb-element.js';
import { warningList } from '../shared/warnings.js';
import { predictionFor } from '../state/answers.js';
import { type AnsweredCampaign, CampaignProvider, type CampaignState } from '../state/campaign-context.js';
import { campaignStyles } from './campaign-styles.js';
import { faultInPlace } from './fault-in-place.js';

/** Nothing is said about a campaign that is read faster than this. */
const PATIENCE_MS = 200;
/** More faults than this are counted, not listed. */
const MAX_FAULTS = 50;
/** More warnings than this stand behind a word. */
const MAX_WARNINGS = 3;

/** Holds a campaign for the elements inside it and shows in place what is wrong with the file.
 *
 *  `<plumb-campaign src="campaign.json"><plumb-links></plumb-links></plumb-campaign>`, or the campaign itself in a child
 *  `<script type="application/json">`, which also works from disk; with `fragment` from behind the # of the page's address.
 *
 * @slot The elements that show the campaign.
 * @fires plumb-select A reader has taken a link in hand; detail: `link`, its id or null.
 * @csspart base The sheet.
 * @cssproperty [--plumb-paper] Ground; likewise `--plumb-ink` and the other colours. */
export class PlumbCampaign extends PlumbElement {
  static override properties = {
    src: { type: String },
    link: { type: String },
    fragment: { type: Boolean },
    allWarnings: { state: true },
    slow: { state: true },
  };
  static override styles: CSSResultGroup = [PlumbElement.styles, campaignStyles];

  /** Address of the campaign file, relative to the page. */
  declare src: string | null;
  /** Id of the link in hand at first; a reader may take another one. */
  declare link: string | null;
  /** Takes the campaign, and the link in hand, from behind the # of the page's address. */
  declare fragment: boolean;
  declare allWarnings: boolean;
  declare slow: boolean;

  readonly #provider = new CampaignProvider(this);
  readonly #observer = new MutationObserver(() => this.#load());
  #text: string | null = null;
  #lastGood: AnsweredCampaign | null = null;
  #loading: AbortController | null = null;
  #faultsAreLate = false;
  #lastLoad: { src: string | null; inline: string | null; hash: string | null } | null = null;

  constructor() {
    super();
    this.src = null;
    this.link = null;
    this.fragment = false;
    this.allWarnings = false;
    this.slow = false;
  }

  /** What the elements inside are given. */
  get state(): CampaignState {
    return this.#provider.state;
  }

  override connectedCallback(): void {
    super.connectedCallback();
    this.#observer.observe(this, { childList: true, characterData: true, subtree: true });
    // a script may run before the parser has reached the children
    if (document.readyState === 'loading')
      document.addEventListener('DOMContentLoaded', () => this.#load(), { once: true });
    window.addEventListener('hashchange', this.#followAddress);
    this.#provider.announce();
    if (this.hasUpdated) this.#load();
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#observer.disconnect();
    window.removeEventListener('hashchange', this.#followAddress);
    this.#loading?.abort();
  }

  protected override willUpdate(changed: PropertyValues): void {
    if (changed.has('link')) this.#provider.inHand = this.link;
    if (changed.has('src') || changed.has('fragment') || !this.hasUpdated) this.#load();
  }

  readonly #followAddress = (): void => {
    if (this.fragment) this.#load();
  };

  #inlineText(): string | null {
    const script = [...this.children].find(
      (child) => child instanceof HTMLScriptElement && child.type === 'application/json',
    );
    return script?.textContent ?? null;
  }

  #load(): void {
    const inline = this.#inlineText();
    const { src } = this;
    const hash = this.fragment && hasFragment(location.hash) ? location.hash : null;
    const last = this.#lastLoad;
    if (last && last.src === src && last.inline === inline && last.hash === hash) return;
    this.#lastLoad = { src, inline, hash };
    this.#loading?.abort();
    this.#loading = null;
    // what a reader was sent wins over what the page would show without it
    if (hash !== null) this.#takeFragment(hash);
    else if (inline !== null && src) {
      this.#fail(null, [faultAt('two-campaigns', 'src', src, 'either src or a campaign inside the element, not both')]);
    } else if (inline !== null) this.#take(inline);
    else if (src) void this.#fetch(src);
    else this.#set({ status: 'empty' });
  }

  async #fetch(src: string): Promise<void> {
    const loading = new AbortController();
    this.#loading = loading;
    this.#set({ status: 'working' });
    const timer = setTimeout(() => {
      this.slow = true;
    }, PATIENCE_MS);
    try {
      const response = await fetch(new URL(src, this.baseURI), { signal: loading.signal });
      const text = await response.text();
      if (loading !== this.#loading) return;
      if (response.ok) this.#take(text);
      else
        this.#fail(null, [
          faultAt('not-found', 'src', src, `a campaign file at this address; the server answered ${response.status}`),
        ]);
    } catch {
      if (loading !== this.#loading) return;
      const why = loading.signal.aborted
        ? 'a campaign file; reading it was cancelled'
        : location.protocol === 'file:'
          ? 'the campaign inside the element, in a <script type="application/json">: a page opened from disk may not fetch a file'
          : 'a campaign file at an address this page may read';
      this.#fail(null, [faultAt('not-read', 'src', src, why)]);
    } finally {
      clearTimeout(timer);
      if (loading === this.#loading) this.slow = false;
    }
  }

  #takeFragment(hash: string): void {
    try {
      const state = readFragment(hash)!;
      this.#take(state.campaign);
      if (state.link !== null) this.#provider.inHand = state.link;
    } catch (error) {
      if (!(error instanceof CampaignError)) throw error;
      this.#fail(null, error.faults);
    }
  }

  #take(text: string): void {
    try {
      const { campaign, warnings } = readCampaign(text);
      const prediction = predictionFor(campaign);
      this.#lastGood = { campaign, prediction, warnings: [...warnings, ...prediction.warnings] };
      this.#text = text;
      this.#set({ status: 'ready', ...this.#lastGood });
    } catch (error) {
      if (!(error instanceof CampaignError)) throw error;
      this.#fail(text, placed(text, error.faults));
    }
  }

  #fail(text: string | null, faults: readonly Fault[]): void {
    this.#text = text;
    this.#faultsAreLate = this.hasUpdated && this.state.status === 'ready';
    this.#set({ status: 'failed', faults, lastGood: this.#lastGood });
  }

  #set(state: CampaignState): void {
    this.#provider.state = state;
    this.requestUpdate();
  }

  #faults(faults: readonly Fault[]): TemplateResult {
    const lines = this.#text?.split(/\r\n|\r|\n/) ?? null;
    const count = faults.length === 1 ? '1 fault' : `${faults.length} faults`;
    return html`<div class="flt" role=${this.#faultsAreLate ? 'alert' : nothing}>
      <p class="hd">Not computed: ${count} in the campaign</p>
      ${faults.slice(0, MAX_FAULTS).map((fault) => faultInPlace(fault, lines))}
      ${faults.length > MAX_FAULTS ? html`<p>and ${faults.length - MAX_FAULTS} more.</p>` : nothing}
    </div>`;
  }

  #warnings({ warnings }: AnsweredCampaign): TemplateResult {
    const shown = this.allWarnings ? warnings : warnings.slice(0, MAX_WARNINGS);
    const hidden = warnings.length - shown.length;
    const withPath = shown.map((warning) => ({
      ...warning,
      message: warning.path === '' ? warning.message : `${warning.path}: ${warning.message}`,
    }));
    return html`${warningList(withPath)}
    ${
      hidden > 0 || this.allWarnings
        ? html`<p class="more">
            <button
              type="button"
              class="word"
              aria-expanded=${this.allWarnings ? 'true' : 'false'}
              @click=${() => {
                this.allWarnings = !this.allWarnings;
              }}
            >
              ${this.allWarnings ? 'show fewer' : `show ${hidden} more`}
            </button>
          </p>`
        : nothing
    }`;
  }

  protected override content(): TemplateResult {
    const { state } = this;
    if (state.status === 'empty')
      return html`<slot></slot>
        <p class="note no-print">
          No campaign is loaded. Name a file, <code>src="campaign.json"</code>, or put the campaign into a
          <code>&lt;script type="application/json"&gt;</code> inside the element.
        </p>`;
    if (state.status === 'working')
      return html`<slot></slot> ${
        this.slow
          ? html`<p role="status">Reading ${this.src}</p>
              <p><button type="button" class="btn" @click=${() => this.#loading?.abort()}>Cancel</button></p>`
          : nothing
      }`;
    if (state.status === 'failed') return html`${this.#faults(state.faults)}<slot></slot>`;
    return html`<slot></slot>
      <div class="foot">
        ${this.#warnings(state)}
      </div>`;
  }
}

/** Line and column of faults found after reading; a text that is no JSON has them already. */
function placed(text: string, faults: readonly Fault[]): readonly Fault[] {
  return faults.some(({ line }) => line === null) ? withPlaces(text, faults) : faults;
}
