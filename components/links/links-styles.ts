import { css } from 'lit';

export const linksStyles = css`
  .flt {
    font-family: var(--p-font-figure);
  }
  .name {
    font: inherit;
    font-size: var(--p-size-4);
    font-weight: 700;
    line-height: 1.3;
    color: var(--p-ink);
    background: none;
    border: 0;
    padding: 2px 0;
    margin: -2px 0;
    min-width: 24px;
    min-height: 24px;
    text-align: left;
    cursor: pointer;
  }
  .name:hover {
    text-decoration: underline;
    text-decoration-thickness: 0.5px;
    text-underline-offset: 3px;
  }
  .name.in-hand {
    color: var(--p-accent);
  }
  .links small {
    display: block;
    font-size: var(--p-size-2);
    color: var(--p-ink-2);
    text-wrap: pretty;
  }
  .links td,
  .links thead th + th {
    padding-left: 14px;
  }
  .links thead .num,
  .heights thead .num {
    text-align: right;
  }
  .links .none,
  .heights .none {
    display: block;
    text-align: right;
    color: var(--p-ink-2);
  }
  .links .second .n {
    color: var(--p-ink-2);
  }
  .links tbody tr:hover {
    background: var(--p-wash);
  }
  .grp th {
    color: var(--p-ink);
    padding-bottom: 4px;
    text-align: right;
  }
  .grp th + th {
    padding-left: 14px;
  }
  .grp th span {
    display: block;
    border-bottom: var(--p-w-hair) solid var(--p-line);
    padding-bottom: 3px;
  }
  .links td.stc,
  .links th.stc {
    padding-left: 22px;
    width: 212px;
  }
  .links td.stc {
    padding-top: 4px;
  }
  .axis {
    display: grid;
    grid-template-columns: 1fr auto 1fr;
    font-size: var(--p-size-1);
  }
  .axis span:last-child {
    text-align: right;
  }
  .links .vd {
    width: 250px;
    padding-left: 18px;
  }
  .v {
    display: block;
    font-family: var(--p-font-text);
    font-size: 17px;
    line-height: 1.25;
    font-weight: 400;
  }
  .v.v-differ {
    font-weight: 700;
  }
  .heights {
    width: auto;
    min-width: 24em;
    margin-top: var(--p-space-5);
  }
  .heights caption {
    text-align: left;
    font-size: var(--p-size-2);
    color: var(--p-ink-2);
    padding-bottom: 6px;
  }
  .heights td,
  .heights tbody th {
    padding: 4px 0;
  }
  .heights td,
  .heights th + th {
    padding-left: 24px;
  }

  @container plumb (min-width: 656px) and (max-width: 1119px) {
    .compared,
    .compared thead,
    .compared tbody {
      display: block;
    }
    .compared {
      font-size: 12px;
    }
    .compared tr {
      display: grid;
      grid-template-columns: minmax(0, 1.6fr) repeat(3, minmax(0, 1fr)) minmax(0, 1fr) minmax(0, 0.9fr) minmax(0, 0.9fr);
      align-items: start;
    }
    .compared thead tr {
      align-items: end;
    }
    .compared td,
    .compared thead th + th {
      padding: 0 0 0 6px;
    }
    .compared thead tr > th,
    .compared thead tr > th + th {
      padding-bottom: 6px;
    }
    .compared tbody tr {
      padding: 9px 0;
    }
    .compared tbody th {
      padding: 0 8px 0 0;
      grid-row: 1 / 3;
    }
    .compared .grp .g1 {
      grid-column: 2 / 5;
    }
    .compared .grp .g3 {
      grid-column: 6 / 8;
    }
    .compared thead .stc,
    .compared thead .vd {
      display: none;
    }
    .compared tbody td.stc {
      grid-column: 2 / 5;
      width: auto;
      padding: 2px 0 0 10px;
    }
    .compared tbody td.vd {
      grid-column: 5 / 8;
      width: auto;
      padding: 4px 0 0 18px;
    }
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
    .links td[data-k] {
      display: grid;
      grid-template-columns: 148px minmax(0, 1fr);
      align-items: baseline;
    }
    .links td[data-k]::before {
      content: attr(data-k);
      color: var(--p-ink-2);
      font-size: var(--p-size-2);
    }
    .links td > * + * {
      grid-column: 2;
    }
    .links td.stc,
    .links .vd {
      width: auto;
      padding: 2px 0;
    }
    .heights {
      width: 100%;
      min-width: 0;
    }
    .heights td,
    .heights th + th {
      padding-left: 12px;
    }
  }
  @media screen and (max-width: 720px) {
    .name {
      min-height: 38px;
      min-width: 44px;
      margin: -7px 0;
      padding: 7px 0;
    }
  }
  @media print {
    .compared {
      font-size: 11.5px;
    }
    .name {
      margin: 0;
      min-height: 0;
    }
    .name.in-hand {
      color: inherit;
    }
  }
`;
