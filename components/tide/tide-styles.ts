import { css } from 'lit';

export const tideStyles = css`
  .s-grid {
    fill: none;
    stroke: var(--p-hair);
    stroke-width: 0.75px;
  }
  .s-tide {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 0.75px;
    stroke-linejoin: round;
  }
  .s-tide.spoken {
    stroke-width: 1.75px;
  }
  .s-tide.held {
    stroke: var(--p-accent);
    stroke-width: 1.75px;
  }
  .s-dot.held,
  text.held {
    fill: var(--p-accent);
  }
  .s-cursor {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 0.75px;
    stroke-dasharray: 2 3;
  }
  .fig {
    touch-action: pan-y;
  }
  .reading {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    line-height: 1.4;
    min-height: 1.4em;
    margin-top: 8px;
  }
  table {
    margin-top: var(--p-space-4);
  }
  .n {
    min-width: 4em;
  }
  td,
  thead th + th {
    padding-left: 14px;
    text-align: right;
  }
  td,
  tbody th {
    vertical-align: baseline;
    padding-top: 6px;
    padding-bottom: 6px;
  }
  thead th {
    max-width: 10em;
  }
  tbody .vd,
  thead th.vd {
    text-align: left;
  }
  tbody .vd {
    font-family: var(--p-font-text);
    font-size: var(--p-size-4);
  }
  .name {
    font: inherit;
    font-weight: 700;
    color: var(--p-ink);
    background: none;
    border: 0;
    padding: 2px 0;
    min-width: 24px;
    min-height: 24px;
    text-align: left;
    cursor: pointer;
  }
  .name.in-hand {
    color: var(--p-accent);
  }
  .warnings {
    list-style: none;
    margin: 12px 0 0;
    padding: 0;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    line-height: 1.45;
    max-width: 62em;
  }
  @container plumb (max-width: 655px) {
    table,
    tbody,
    tr,
    td,
    tbody th {
      display: block;
      padding-left: 0;
    }
    thead {
      position: absolute;
      width: 1px;
      height: 1px;
      overflow: hidden;
      clip-path: inset(50%);
    }
    tr {
      padding: 8px 0;
    }
    td {
      display: grid;
      grid-template-columns: 148px minmax(0, 1fr);
      align-items: baseline;
      padding: 2px 0;
    }
    td::before {
      content: attr(data-k);
      color: var(--p-ink-2);
      font-size: var(--p-size-2);
      font-family: var(--p-font-figure);
      text-align: left;
    }
    tbody .vd {
      text-align: right;
    }
  }
  @media print {
    .reading {
      display: none;
    }
    .s-tide.held {
      stroke: var(--p-ink);
    }
  }
`;
