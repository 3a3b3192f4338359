import { css } from 'lit';

/** Look of the elements in an article: sentence, two levels beside the values, the lines under them. */
export const articleStyles = css`
  .pf {
    border-top: 2px solid var(--p-ink);
    border-bottom: 1px solid var(--p-ink);
    padding: 10px 0 12px;
    margin: 16px 0 18px;
  }
  .own .pf {
    padding-left: 12px;
    padding-right: 12px;
  }
  .s1 {
    font-size: 18px;
    line-height: 1.35;
    margin: 0 0 10px;
    text-wrap: pretty;
  }
  .body {
    display: grid;
    grid-template-columns: 168px minmax(0, 1fr);
    gap: 20px;
    align-items: start;
  }
  .body.bare {
    margin-top: 12px;
    grid-template-columns: minmax(0, 1fr);
  }
  .pf td,
  .pf tbody th {
    padding: 4px 0;
  }
  .pf td {
    padding-left: 10px;
    white-space: nowrap;
  }
  .pf .u {
    color: var(--p-ink-2);
    padding-left: 6px;
    width: 4.2em;
  }
  .values tbody tr {
    border-color: var(--p-hair);
  }
  .values tbody tr:last-child {
    border-bottom: var(--p-w-hair) solid var(--p-line);
  }
  .values tbody + tbody tr:first-child {
    border-top: var(--p-w-axis) solid var(--p-ink);
  }
  .values tr.sum {
    border-top: 1px solid var(--p-ink);
  }
  .values tr.res th,
  .values tr.res td:not(.u) {
    font-weight: 700;
  }
  tr.in td {
    white-space: normal;
    padding-top: 2px;
    padding-bottom: 2px;
    width: 62%;
  }
  .values tbody tr.in {
    border-top: 0;
    border-bottom: 0;
  }
  tr.in th,
  tr.in td {
    vertical-align: baseline;
  }
  tr.in .field {
    text-align: right;
    text-align-last: right;
    border-bottom-color: var(--p-line);
  }
  tr.in:hover .field {
    border-bottom-color: var(--p-ink);
  }
  tr.ed th {
    position: relative;
  }
  tr.ed th::before {
    content: '';
    position: absolute;
    left: -10px;
    top: 0;
    bottom: 0;
    border-left: var(--p-w-bar) solid var(--p-accent);
  }
  .was-good th {
    position: relative;
  }
  .values .was-good th::after,
  .budget .was-good tr:not(.kid) th::after {
    content: '';
    position: absolute;
    left: -10px;
    top: 0;
    bottom: 0;
    border-left: 4px double var(--p-caution);
  }
  .budget small {
    display: block;
    font-size: var(--p-size-1);
  }
  .field.ed {
    font-weight: 700;
    color: var(--p-accent);
  }
  .under .sub {
    text-align: right;
    margin: 2px 0 4px;
    font-size: var(--p-size-2);
  }
  .under .flt {
    margin: 6px 0 8px;
  }
  .under .flt dl {
    grid-template-columns: 44px minmax(0, 1fr);
    font-size: var(--p-size-3);
    margin-bottom: 6px;
  }
  .ans {
    margin: 12px 0 0;
    display: grid;
    grid-template-columns: auto minmax(0, 1fr);
    gap: 3px 14px;
    font-size: 14px;
  }
  .ans dt {
    color: var(--p-ink-2);
  }
  .ans dd {
    margin: 0;
  }
  .cite {
    display: flex;
    gap: 16px;
    align-items: flex-start;
    margin: 12px 0 0;
    padding-top: 10px;
    border-top: var(--p-w-hair) solid var(--p-line);
    font-size: 13px;
    line-height: 1.45;
  }
  .cite > p {
    flex: 1;
  }
  .cite [role='status'] {
    font-size: var(--p-size-2);
    max-width: 11em;
  }
  .warnings {
    list-style: none;
    margin: 12px 0 0;
    padding: 0;
    font-size: 13px;
    line-height: 1.45;
  }
  .warnings li + li {
    margin-top: 6px;
  }
  .pf .note {
    font-family: inherit;
  }
  .sites {
    margin-top: 12px;
  }
  .sites thead th + th {
    text-align: right;
    padding-left: 14px;
  }
  .sites td + td {
    padding-left: 14px;
  }
  .sites tr.in td {
    width: 37%;
  }
  .sites tr.in td[colspan] {
    width: 74%;
  }
  .budget {
    margin-top: 16px;
  }
  .pf .budget td,
  .pf .budget tbody th {
    padding: 3px 0;
  }
  .pf .budget td {
    padding-left: 14px;
    text-align: right;
  }
  .budget thead th {
    padding-bottom: 4px;
  }
  .budget thead th + th {
    text-align: right;
    padding-left: 14px;
  }
  .pf .budget .bw {
    width: 130px;
    text-align: left;
    vertical-align: middle;
  }
  .budget tbody tr {
    border-color: var(--p-hair);
  }
  .budget tr.kid {
    border-top: 0;
  }
  .pf .budget tr.kid th {
    padding-left: 18px;
    position: relative;
  }
  .budget tr.kid th::before {
    content: '';
    position: absolute;
    left: 5px;
    top: 0;
    bottom: 0;
    border-left: 1px solid var(--p-ink);
  }
  .budget tr.kid.last th::before {
    bottom: 50%;
  }
  .budget tr.kid th::after {
    content: '';
    position: absolute;
    left: 5px;
    top: 50%;
    width: 8px;
    border-top: 1px solid var(--p-ink);
  }
  .budget tr.neg .share {
    color: var(--p-caution);
    font-weight: 700;
  }
  .disclose {
    margin-top: 10px;
    font-size: 13px;
  }
  @media screen {
    .closed {
      display: none;
    }
  }
  @container plumb (max-width: 479px) {
    .budget .own-u {
      display: none;
    }
    .pf .budget td,
    .budget thead th + th,
    .sites td + td,
    .sites thead th + th {
      padding-left: 8px;
    }
    .pf .budget .bw {
      width: 92px;
    }
    .body {
      grid-template-columns: minmax(0, 1fr);
    }
    .cite {
      flex-direction: column;
      gap: 10px;
    }
    tr.in td {
      width: 66%;
    }
  }
  @media print {
    .pf {
      break-inside: avoid;
    }
    .field.ed,
    tr.ed th::before {
      color: inherit;
      border: 0;
    }
    .under .flt {
      display: none;
    }
  }
`;
