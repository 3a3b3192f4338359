import type { ReactiveController, ReactiveControllerHost } from 'lit';
import { CampaignError, type Fault } from '../../lib/campaign/fault.js';
import { withPlaces } from '../../lib/campaign/locate.js';
import { readCampaign } from '../../lib/campaign/read.js';
import { predictionFor } from './answers.js';
import type { AnsweredCampaign, CampaignConsumer, CampaignState } from './campaign-context.js';

type Host = ReactiveControllerHost & HTMLElement;

/** Lets an element stand alone: where no `<plumb-campaign>` is round it, the campaign is the text of a child
 *  `<script type="application/json">`, or of an attribute. */
export class OwnCampaign implements ReactiveController {
  /** lines of the text, to show a fault in its place; null: no text of its own */
  lines: readonly string[] | null = null;
  readonly #host: Host;
  readonly #consumer: CampaignConsumer;
  readonly #attribute: () => string | null;
  readonly #observer = new MutationObserver(() => this.#read());
  #text: string | null = null;
  #lastGood: AnsweredCampaign | null = null;
  #state: CampaignState | null = null;

  /** @param attribute the campaign as an attribute says it; null: it does not */
  constructor(host: Host, consumer: CampaignConsumer, attribute: () => string | null) {
    this.#host = host;
    this.#consumer = consumer;
    this.#attribute = attribute;
    host.addController(this);
  }

  /** The state in force is the element's own. */
  get isInForce(): boolean {
    return this.#state !== null && this.#consumer.state === this.#state;
  }

  hostConnected(): void {
    this.#observer.observe(this.#host, { childList: true, characterData: true, subtree: true });
    // a script may run before the parser has reached the children
    if (document.readyState === 'loading')
      document.addEventListener('DOMContentLoaded', () => this.#read(), { once: true });
    this.#read();
  }

  hostDisconnected(): void {
    this.#observer.disconnect();
    this.#text = null;
    this.#state = null;
  }

  /** After the attribute has changed. */
  refresh(): void {
    this.#read();
  }

  #read(): void {
    if (this.#consumer.state !== null && !this.isInForce) return;
    const child = [...this.#host.children].find(
      (one) => one instanceof HTMLScriptElement && one.type === 'application/json',
    );
    const text = child?.textContent ?? this.#attribute();
    if (text === this.#text) return;
    this.#text = text;
    this.lines = text?.split(/\r\n|\r|\n/) ?? null;
    this.#state = text === null ? null : this.#stateOf(text);
    this.#consumer.state = this.#state;
    this.#host.requestUpdate();
  }

  #stateOf(text: string): CampaignState {
    try {
      const { campaign, warnings } = readCampaign(text);
      const prediction = predictionFor(campaign);
      this.#lastGood = { campaign, prediction, warnings: [...warnings, ...prediction.warnings] };
      return { status: 'ready', ...this.#lastGood };
    } catch (error) {
      if (!(error instanceof CampaignError)) throw error;
      return { status: 'failed', faults: placed(text, error.faults), lastGood: this.#lastGood };
    }
  }
}

const placed = (text: string, faults: readonly Fault[]): readonly Fault[] =>
  faults.some(({ line }) => line === null) ? withPlaces(text, faults) : faults;
