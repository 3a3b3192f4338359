import { css } from 'lit';

/** Class of the line that a link is drawn as: fibre solid, satellite long and short, any other kind short dashes. The kind
 *  always stands in words beside it. */
export const linkLineClass = (kind: string | null): string =>
  kind === 'fibre' ? 's-link' : kind === 'satellite' ? 's-link s-sat' : 's-link s-other';

/** How a kind is drawn, for a key. */
export const linkLineWords = (kind: string | null): string =>
  kind === null ? 'link, kind not stated' : `link, ${kind}`;

export const linkLineStyles = css`
  .s-link {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: var(--p-w-link);
  }
  .s-sat {
    stroke-dasharray: 9 4 2 4;
  }
  .s-other {
    stroke-dasharray: 6 4;
  }
  .s-gap {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 1px;
    stroke-dasharray: 1 4;
  }
  .s-slash {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 1.25px;
  }
  .s-rib {
    fill: var(--p-band);
    fill-opacity: 0.85;
  }
  .held .s-link,
  .held .s-gap,
  .held .s-slash,
  .s-link.held {
    stroke: var(--p-accent);
  }
  .held .s-link,
  .s-link.held {
    stroke-width: 2.5px;
  }
  .held .s-rib {
    fill: var(--p-accent-band);
  }
  .held .s-edge {
    stroke: var(--p-accent);
  }
  .held .s-ring {
    stroke: var(--p-accent);
  }
  .held .s-dot {
    fill: var(--p-accent);
  }
  text.held,
  .held text.id,
  .held text .id {
    fill: var(--p-accent);
  }
  .mark {
    cursor: pointer;
  }
  .mark:focus {
    outline: none;
  }
  .hit {
    fill: transparent;
    stroke: transparent;
    stroke-width: 24px;
    pointer-events: all;
  }
  .focus {
    fill: none;
    stroke: none;
  }
  .mark:focus-visible .focus {
    stroke: var(--p-accent);
    stroke-width: 2px;
  }
  .pointed .s-link {
    stroke-width: 3px;
  }
  .pointed text {
    font-weight: 700;
  }
  @media print {
    .held .s-link,
    .held .s-gap,
    .held .s-slash,
    .s-link.held {
      stroke: var(--p-ink);
    }
  }
`;
