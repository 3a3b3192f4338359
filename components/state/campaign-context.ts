import type { ReactiveController, ReactiveControllerHost } from 'lit';
import type { Prediction } from '../../lib/answers/prediction.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import type { Fault, Warning } from '../../lib/campaign/fault.js';

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

type Listener = (state: CampaignState) => void;

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

  constructor(host: HTMLElement) {
    host.addEventListener(CampaignRequest.type, (event) => {
      if (!(event instanceof CampaignRequest)) return;
      event.stopPropagation();
      this.#listeners.add(event.listener);
      event.subscribed(() => this.#listeners.delete(event.listener));
      event.listener(this.#state);
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
    for (const listener of this.#listeners) listener(state);
  }
}

/** Keeps an element in step with the campaign round it; `state` null: there is none. */
export class CampaignConsumer implements ReactiveController {
  state: CampaignState | null = null;
  readonly #host: ReactiveControllerHost & HTMLElement;
  #unsubscribe: (() => void) | null = null;

  constructor(host: ReactiveControllerHost & HTMLElement) {
    this.#host = host;
    host.addController(this);
  }

  readonly #ask = (): void => {
    if (this.#unsubscribe) return;
    const listener = (state: CampaignState) => {
      this.state = state;
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
  }
}
