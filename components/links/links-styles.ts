import { css } from 'lit';

export const linksStyles = css`
  .say {
    font-size: var(--p-size-5);
    line-height: 1.42;
    margin: 0 0 var(--p-space-5);
    max-width: 42em;
    text-wrap: pretty;
  }
  .flt {
    font-family: var(--p-font-figure);
  }
  .links th b {
    font-size: var(--p-size-4);
  }
  .links th small {
    display: block;
    font-size: var(--p-size-2);
    color: var(--p-ink-2);
  }
  .links td,
  .links thead th + th {
    padding-left: 14px;
  }
  .links thead .num {
    text-align: right;
  }
  .links .none {
    display: block;
    text-align: right;
    color: var(--p-ink-2);
  }
  .links tbody tr:hover {
    background: var(--p-wash);
  }
  @container plumb (max-width: 655px) {
    .links,
    .links tbody,
    .links tr,
    .links td,
    .links tbody th {
      display: block;
      width: auto;
    }
    .links thead {
      position: absolute;
      width: 1px;
      height: 1px;
      overflow: hidden;
      clip-path: inset(50%);
    }
    .links tr {
      padding: 10px 0 12px;
    }
    .links tbody tr:first-child {
      border-top: var(--p-w-axis) solid var(--p-ink);
    }
    .links td,
    .links tbody th {
      padding: 2px 0;
    }
    .links td {
      display: grid;
      grid-template-columns: 148px minmax(0, 1fr);
      align-items: baseline;
    }
    .links td::before {
      content: attr(data-k);
      color: var(--p-ink-2);
      font-size: var(--p-size-2);
    }
    .links td > * + * {
      grid-column: 2;
    }
  }
  @media print {
    .say {
      font-size: 14.5px;
      margin-bottom: 8px;
    }
  }
`;
