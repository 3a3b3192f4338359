import { html, nothing, type PropertyDeclarations, type TemplateResult } from 'lit';
import { CampaignError, type Fault } from '../../lib/campaign/fault.js';
import { PlumbElement } from '../plumb-element.js';
import { type AnsweredCampaign, CampaignConsumer } from '../state/campaign-context.js';
import { selectEvent } from '../state/in-hand.js';
import { computedBy } from './provenance.js';
import { sentenceCase } from './rich-text.js';

/** An element that shows one side of the campaign round it: its states, the link in hand, who computed it and when. */
export abstract class CampaignElement extends PlumbElement {
  static override properties: PropertyDeclarations = { link: { type: String } };

  /** Id of the link in hand; without it the one that a reader has taken in hand in the campaign round the element. */
  declare link: string | null;

  protected readonly campaign = new CampaignConsumer(this);

  constructor() {
    super();
    this.link = null;
  }

  /** Whether the line below says who computed it and when. */
  protected get signed(): boolean {
    return true;
  }

  /** What the element shows of a campaign that can be computed. */
  protected abstract answered(answered: AnsweredCampaign): TemplateResult;

  /** Id of the link in hand; null: none, or one that the campaign does not have. */
  protected linkInHand({ campaign }: AnsweredCampaign): string | null {
    const id = this.link ?? this.campaign.inHand;
    return campaign.links.some((link) => link.id === id) ? id : null;
  }

  /** A reader takes a link in hand, or lays down the one he has. */
  protected take(link: string | null): void {
    if (this.link !== null) this.link = link;
    this.dispatchEvent(selectEvent(link));
  }

  #shown(answered: AnsweredCampaign): TemplateResult {
    try {
      return html`${this.answered(answered)}
        ${!this.signed ? nothing : html`<p class="by" part="provenance">${sentenceCase(computedBy())}.</p>`}`;
    } catch (error) {
      // what this element asks for, the campaign may lack: a window, for one
      if (!(error instanceof CampaignError)) throw error;
      return this.#refused(error.faults);
    }
  }

  #refused(faults: readonly Fault[]): TemplateResult {
    return html`<div class="flt">
      <p class="hd">Not computed</p>
      ${faults.map(
        ({ path, found, expected }) => html`<dl>
          <dt>where</dt>
          <dd>${path}</dd>
          <dt>read</dt>
          <dd><b>${found}</b></dd>
          <dt>write</dt>
          <dd>${expected}</dd>
        </dl>`,
      )}
    </div>`;
  }

  protected override content(): TemplateResult {
    const { state } = this.campaign;
    if (state === null)
      return html`<slot></slot>
        <p class="note no-print">
          No campaign is loaded. Put the element inside
          <code>&lt;plumb-campaign src="campaign.json"&gt;</code>.
        </p>`;
    if (state.status === 'ready') return this.#shown(state);
    if (state.status === 'failed')
      return state.lastGood
        ? html`<div class="stale">
            <p class="tagc">before the last change of the campaign, which cannot be read</p>
            ${this.#shown(state.lastGood)}
          </div>`
        : html`<div class="flt"><p class="hd">Not computed: the campaign cannot be read</p></div>
            <slot></slot>`;
    return html`<slot></slot>${nothing}`;
  }
}
