import {
  type CSSResultGroup,
  css,
  html,
  nothing,
  type PropertyDeclarations,
  type PropertyValues,
  type TemplateResult,
} from 'lit';
import { LONG_ADDRESS } from '../../lib/campaign/fragment.js';
import { writeCampaign } from '../../lib/campaign/write.js';
import type { CampaignReport } from '../../lib/report/campaign-report.js';
import { type WikiForm, wikiText } from '../../lib/report/wiki-forms.js';
import { SHOWABLE } from '../embed/plumb-embed.js';
import { PlumbElement } from '../plumb-element.js';
import { reportOf } from '../report/report-of.js';
import { sectionSvg } from '../section/section-svg.js';
import { CampaignElement } from '../shared/campaign-element.js';
import { copyLine } from '../shared/copy-line.js';
import { computedBy } from '../shared/provenance.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { addressOf } from '../state/fragment.js';

type Form = WikiForm | 'svg';

const FORMS: readonly (readonly [form: Form, name: string, what: string])[] = [
  [
    'script',
    'script and elements',
    'For a wiki that allows a script of your own. Live: hover, keyboard, dark mode, print.',
  ],
  [
    'iframe',
    'iframe',
    'For a wiki that allows frames. The campaign is in the address behind its #; it is sent to no server.',
  ],
  ['markdown', 'Markdown', 'Tables with inputs and conventions, as they are today.'],
  ['mediawiki', 'MediaWiki', 'Tables with inputs and conventions, as they are today.'],
  ['html', 'HTML table', 'Tables without script and style.'],
  ['latex', 'LaTeX', 'Tables for a paper or a proposal.'],
  ['svg', 'SVG of the section', 'The drawing as a file, with what was drawn in words inside.'],
];

/** Ways into a wiki, ready to copy: script and elements, a frame, tables as Markdown, MediaWiki, HTML and LaTeX, the section as SVG.
 *
 *  Inside a `<plumb-campaign>`: `<plumb-copy show="section,links"></plumb-copy>`.
 *
 * @slot Fallback: what the page shows without script.
 * @csspart base The sheet.
 * @csspart provenance The line that says who computed it and when. */
export class PlumbCopy extends CampaignElement {
  static override properties: PropertyDeclarations = {
    show: { type: String },
    page: { type: String },
    script: { type: String },
    open: { state: true },
    form: { state: true },
    text: { state: true },
    address: { state: true },
    copied: { state: true },
  };
  static override styles: CSSResultGroup = [
    PlumbElement.styles,
    css`
      .ways {
        margin-top: var(--p-space-4);
        font-family: var(--p-font-figure);
      }
      .panel {
        border-left: var(--p-w-bar) solid var(--p-line);
        padding: 2px 0 2px 14px;
        margin-top: var(--p-space-3);
        font-size: var(--p-size-3);
        line-height: 1.45;
      }
      fieldset {
        border: 0;
        padding: 0;
        margin: 0 0 var(--p-space-3);
        display: flex;
        flex-wrap: wrap;
        gap: 4px 18px;
      }
      legend {
        padding: 0;
        margin-bottom: 4px;
        color: var(--p-ink-2);
      }
      .choice {
        display: inline-flex;
        align-items: center;
        gap: 6px;
        min-height: 24px;
        cursor: pointer;
      }
      .choice input {
        accent-color: var(--p-ink);
        margin: 0;
        width: 16px;
        height: 16px;
      }
      .choice input:checked + span {
        font-weight: 700;
      }
      .line {
        display: flex;
        gap: 8px;
        align-items: baseline;
        margin-bottom: var(--p-space-3);
      }
      .line .field {
        max-width: 34em;
      }
      textarea {
        display: block;
        width: 100%;
        height: 15em;
        resize: vertical;
        font-family: var(--p-font-code);
        font-size: 12px;
        line-height: 1.5;
        color: var(--p-ink);
        background: var(--p-paper);
        border: 1px solid var(--p-line);
        border-radius: 0;
        padding: 8px;
        white-space: pre;
        overflow: auto;
      }
      .act {
        display: flex;
        flex-wrap: wrap;
        gap: 8px 16px;
        align-items: center;
        margin-top: 8px;
      }
      @media print {
        :host {
          display: none;
        }
      }
    `,
  ];

  /** Names of the elements to show, without `plumb-`, by commas. */
  declare show: string;
  /** Address of the single offline page on the server of the wiki. */
  declare page: string;
  /** Address of the script on the server of the wiki. */
  declare script: string;
  declare open: boolean;
  declare form: Form;
  declare text: string;
  declare address: string;
  declare copied: string | null;

  #made: { readonly answered: AnsweredCampaign; readonly key: string } | null = null;

  constructor() {
    super();
    this.show = 'section,links';
    this.page = 'standalone.html';
    this.script = 'plumbtick.js';
    this.open = false;
    this.form = 'script';
    this.text = '';
    this.address = '';
    this.copied = null;
  }

  #shown(): readonly string[] {
    const names = this.show.split(',').map((name) => name.trim());
    return SHOWABLE.filter((name) => names.includes(name));
  }

  protected override updated(changed: PropertyValues): void {
    super.updated(changed);
    const { state } = this.campaign;
    if (!this.open || state?.status !== 'ready') return;
    const inHand = this.linkInHand(state);
    const key = [this.form, this.show, this.page, this.script, inHand].join('\n');
    if (this.#made?.answered.campaign === state.campaign && this.#made.key === key) return;
    this.#made = { answered: state, key };
    void this.#make(state, inHand, key);
  }

  async #make(answered: AnsweredCampaign, link: string | null, key: string): Promise<void> {
    const campaign = writeCampaign(answered.campaign);
    const show = this.#shown();
    const address = await addressOf(new URL(this.page, document.baseURI).href, { campaign, link, show });
    const text =
      this.form === 'svg'
        ? sectionSvg(answered, computedBy())
        : wikiText(this.form, { campaign, link, show, address, script: this.script, report: this.#report(answered) });
    // another form may have been asked for in the meantime
    if (this.#made?.key !== key) return;
    this.address = address;
    this.text = text;
    this.copied = null;
  }

  #report(answered: AnsweredCampaign): CampaignReport {
    return reportOf(answered, computedBy());
  }

  async #copy(): Promise<void> {
    const area = this.renderRoot.querySelector('textarea');
    if (!area) return;
    if ((await copyLine(this.text, area)) === 'copied') this.copied = 'copied';
    else {
      area.select();
      this.copied = 'marked; copy it with Ctrl+C';
    }
  }

  #addressNote(): TemplateResult | typeof nothing {
    if (this.form !== 'iframe' || this.address === '') return nothing;
    const { length } = this.address;
    return length <= LONG_ADDRESS
      ? html`<p class="note">The address has ${length} characters.</p>`
      : html`<p class="note">
          <span class="caution">Caution:</span> the address has ${length} characters. Mail programs, old servers and some wikis cut off
          what is longer than ${LONG_ADDRESS}; the page then says so. Script and elements have no such limit.
        </p>`;
  }

  #place(): TemplateResult | typeof nothing {
    const [name, label] =
      this.form === 'iframe'
        ? (['page', 'address of the page'] as const)
        : (['script', 'address of the script'] as const);
    if (this.form !== 'iframe' && this.form !== 'script') return nothing;
    return html`<p class="line">
      <label for="place">${label}</label>
      <input
        id="place"
        class="field"
        type="text"
        spellcheck="false"
        autocomplete="off"
        .value=${this[name]}
        @change=${(event: Event) => {
          this[name] = (event.target as HTMLInputElement).value;
        }}
      />
    </p>`;
  }

  #panel(): TemplateResult {
    const what = FORMS.find(([form]) => form === this.form)![2];
    return html`<div class="panel" id="panel">
      <fieldset>
        <legend>as</legend>
        ${FORMS.map(
          ([form, name]) => html`<label class="choice"
            ><input
              type="radio"
              name="form"
              .checked=${form === this.form}
              @change=${() => {
                this.form = form;
              }}
            /><span>${name}</span></label
          >`,
        )}
      </fieldset>
      ${this.#place()}
      <p class="dim">${what}</p>
      <textarea readonly aria-label="Text to copy" spellcheck="false" .value=${this.text}></textarea>
      <div class="act">
        <button type="button" class="btn" @click=${() => void this.#copy()}>Copy</button>
        <span class="dim" role="status">${this.copied ?? ''}</span>
      </div>
      ${this.#addressNote()}
    </div>`;
  }

  protected override answered(_: AnsweredCampaign): TemplateResult {
    return html`<div class="ways"><button
        type="button"
        class="btn"
        aria-expanded=${this.open ? 'true' : 'false'}
        aria-controls=${this.open ? 'panel' : nothing}
        @click=${() => {
          this.open = !this.open;
        }}
      >
        Copy for this wiki…
      </button>
      ${this.open ? this.#panel() : nothing}</div>`;
  }

  protected override get signed(): boolean {
    return false;
  }
}
