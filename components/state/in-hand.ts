/** Detail of `plumb-select`: a reader takes a link in hand. `link` null: lays it down. */
export interface PlumbSelect {
  readonly link: string | null;
}

declare global {
  interface HTMLElementEventMap {
    'plumb-select': CustomEvent<PlumbSelect>;
  }
}

/** Says that a reader has taken a link in hand; the nearest `<plumb-campaign>` hands it to all elements inside. */
export const selectEvent = (link: string | null): CustomEvent<PlumbSelect> =>
  new CustomEvent<PlumbSelect>('plumb-select', { detail: { link }, bubbles: true, composed: true, cancelable: true });
