import type { ReactiveController, ReactiveControllerHost } from 'lit';
import type { Prediction } from '../../lib/answers/prediction.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import type { Fault, Warning } from '../../lib/campaign/fault.js';
import type {} from './in-hand.js';

/** A campaign with what follows from it. */
export interface AnsweredCampaign {
  readonly campaign: Campaign;
  readonly prediction: Prediction;
  /** of reading and of prediction */
  readonly warnings: readonly Warning[];
}

/** What a `<plumb-campaign>` hands to the elements inside it. Replaced, never changed. */
export type CampaignState =
  | { readonly status: 'empty' }
  | { readonly status: 'working' }
  | { readonly status: 'failed'; readonly faults: readonly Fault[]; readonly lastGood: AnsweredCampaign | null }
  | ({ readonly status: 'ready' } & AnsweredCampaign);

/** @param inHand id of the link that the reader has taken in hand; null: none */
type Listener = (state: CampaignState, inHand: string | null) => void;

/** Asked by an element, answered by the nearest `<plumb-campaign>` above it. */
export class CampaignRequest extends Event {
  static readonly type = 'plumb-campaign-request';
  /** @param subscribe called once by the provider with a way to unsubscribe */
  constructor(
    readonly listener: Listener,
    readonly subscribed: (unsubscribe: () => void) => void,
  ) {
    super(CampaignRequest.type, { bubbles: true, composed: true });
  }
}

/** Says that a provider has come: elements that found none before ask again. */
const PROVIDER = 'plumb-campaign-provider';

/** Hands the state to the elements below. */
export class CampaignProvider {
  readonly #listeners = new Set<Listener>();
  #state: CampaignState = { status: 'empty' };
  #inHand: string | null = null;

  constructor(host: HTMLElement) {
    host.addEventListener(CampaignRequest.type, (event) => {
      if (!(event instanceof CampaignRequest)) return;
      event.stopPropagation();
      this.#listeners.add(event.listener);
      event.subscribed(() => this.#listeners.delete(event.listener));
      event.listener(this.#state, this.#inHand);
    });
    host.addEventListener('plumb-select', (event) => {
      // after everyone on the page had the chance to refuse
      if (!event.defaultPrevented) this.inHand = event.detail.link;
    });
  }

  announce(): void {
    document.dispatchEvent(new Event(PROVIDER));
  }

  get state(): CampaignState {
    return this.#state;
  }

  set state(state: CampaignState) {
    this.#state = state;
    this.#tell();
  }

  get inHand(): string | null {
    return this.#inHand;
  }

  set inHand(link: string | null) {
    if (link === this.#inHand) return;
    this.#inHand = link;
    this.#tell();
  }

  #tell(): void {
    for (const listener of this.#listeners) listener(this.#state, this.#inHand);
  }
}

/** Keeps an element in step with the campaign round it; `state` null: there is none. */
export class CampaignConsumer implements ReactiveController {
  state: CampaignState | null = null;
  /** id of the link that the reader has taken in hand; it may have left the campaign since */
  inHand: string | null = null;
  readonly #host: ReactiveControllerHost & HTMLElement;
  #unsubscribe: (() => void) | null = null;

  constructor(host: ReactiveControllerHost & HTMLElement) {
    this.#host = host;
    host.addController(this);
  }

  readonly #ask = (): void => {
    if (this.#unsubscribe) return;
    const listener: Listener = (state, inHand) => {
      this.state = state;
      this.inHand = inHand;
      this.#host.requestUpdate();
    };
    this.#host.dispatchEvent(
      new CampaignRequest(listener, (unsubscribe) => {
        this.#unsubscribe = unsubscribe;
      }),
    );
  };

  hostConnected(): void {
    document.addEventListener(PROVIDER, this.#ask);
    this.#ask();
  }

  hostDisconnected(): void {
    document.removeEventListener(PROVIDER, this.#ask);
    this.#unsubscribe?.();
    this.#unsubscribe = null;
    this.state = null;
    this.inHand = null;
  }
}
