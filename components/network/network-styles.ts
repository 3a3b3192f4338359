import { css } from 'lit';
import { linkLineStyles } from '../charts/link-line.js';

export const networkStyles = css`
  ${linkLineStyles}
  .s-ctl {
    fill: none;
    stroke: var(--p-ink);
  }
  .s-none {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 1.5px;
    stroke-dasharray: 1.5 3;
  }
  .s-cand {
    fill: none;
    stroke: var(--p-ink-2);
    stroke-width: 1px;
    stroke-dasharray: 5 3;
  }
  .site-name {
    font-family: var(--p-symbol-face);
    font-style: italic;
    font-size: 16px;
  }
  .held .s-ctl,
  .held .s-none {
    stroke: var(--p-accent);
  }
  .after {
    fill: var(--p-ink);
  }
  .before {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 1px;
  }
  .with {
    fill: none;
    stroke: var(--p-ink-2);
    stroke-width: 1px;
    stroke-dasharray: 5 3;
  }
  .parts {
    display: grid;
    grid-template-columns: minmax(0, 1fr) minmax(0, 1fr);
    gap: 32px;
    margin-top: 24px;
  }
  .parts h3 {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-2);
    font-weight: 400;
    color: var(--p-ink-2);
    margin: 0 0 6px;
  }
  td.num,
  th.num {
    text-align: right;
    white-space: nowrap;
    padding-left: 14px;
  }
  tr.weak td,
  tr.weak th {
    font-weight: 700;
  }
  td.bar {
    width: 45%;
    padding-left: 14px;
  }
  .none {
    color: var(--p-ink-2);
  }
  .modes {
    display: flex;
    gap: 16px;
    margin: 0 0 16px;
    padding: 0;
    border: 0;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  .modes label {
    display: inline-flex;
    gap: 6px;
    align-items: center;
    min-height: 24px;
  }
  .modes label:has(:checked) {
    font-weight: 700;
  }
  @container plumb (max-width: 900px) {
    .parts {
      grid-template-columns: minmax(0, 1fr);
    }
  }
  @media print {
    .parts {
      grid-template-columns: minmax(0, 1fr) minmax(0, 1fr);
    }
    table,
    svg {
      break-inside: avoid;
    }
  }
`;
