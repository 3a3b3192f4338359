import { css } from 'lit';
import { plotStyles } from '../charts/plot-frame.js';

export const averagingStyles = css`
  ${plotStyles}
  .plate {
    display: grid;
    grid-template-columns: 720px minmax(0, 1fr);
    gap: 28px;
    align-items: start;
  }
  th.num,
  td.num {
    text-align: right;
    white-space: nowrap;
    padding-left: 14px;
  }
  td.words,
  th.words {
    padding-left: 16px;
  }
  .pick {
    font: inherit;
    font-weight: 700;
    color: inherit;
    background: none;
    border: 0;
    padding: 2px 0;
    margin: -2px 0;
    min-height: 24px;
    min-width: 24px;
    text-align: left;
    cursor: pointer;
    text-decoration: underline;
    text-decoration-thickness: 0.5px;
    text-underline-offset: 3px;
  }
  tr.held .pick {
    color: var(--p-accent);
    text-decoration-thickness: 2px;
  }
  tbody tr:hover {
    background: var(--p-wash);
  }
  small {
    display: block;
    font-size: var(--p-size-1);
    color: var(--p-ink-2);
  }
  .none {
    color: var(--p-ink-2);
  }
  td.best {
    font-weight: 700;
  }
  @container plumb (max-width: 1119px) {
    .plate {
      grid-template-columns: minmax(0, 1fr);
    }
  }
  @container plumb (max-width: 655px) {
    table,
    tbody,
    tr,
    td,
    tbody th {
      display: block;
      width: auto;
    }
    thead {
      position: absolute;
      width: 1px;
      height: 1px;
      overflow: hidden;
      clip-path: inset(50%);
    }
    tbody tr:first-child {
      border-top: var(--p-w-axis) solid var(--p-ink);
    }
    tr {
      padding: 8px 0 10px;
    }
    td,
    tbody th {
      padding: 2px 0;
    }
    td,
    td.num,
    td.words {
      display: grid;
      grid-template-columns: 148px minmax(0, 1fr);
      text-align: left;
      padding-left: 0;
      white-space: normal;
    }
    td::before {
      content: attr(data-k);
      color: var(--p-ink-2);
      font-size: var(--p-size-2);
    }
  }
  @media screen and (max-width: 720px) {
    .pick {
      min-height: 38px;
      min-width: 44px;
      padding: 9px 0;
      margin: -9px 0;
    }
  }
  @media print {
    .plate {
      grid-template-columns: minmax(0, 1fr);
    }
    .pick {
      text-decoration: none;
    }
  }
`;
