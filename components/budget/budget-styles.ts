import { css } from 'lit';

export const budgetStyles = css`
  h2 {
    font-size: var(--p-size-6);
    font-weight: 400;
    line-height: 1.2;
    margin: 0 0 6px;
    text-wrap: balance;
  }
  h2 .field {
    display: inline;
    width: auto;
    font-size: inherit;
    font-weight: 700;
    color: var(--p-accent);
    min-height: 32px;
  }
  h3 {
    font-size: 17px;
    line-height: 1.3;
    font-weight: 700;
    margin: 0 0 6px;
  }
  .only-print {
    display: none;
  }
  .only-narrow {
    display: none;
  }
  .num {
    text-align: right;
    white-space: nowrap;
  }

  /* Three scales beside what is tried */
  .bhead {
    display: grid;
    grid-template-columns: max-content minmax(0, 460px);
    justify-content: space-between;
    gap: 32px;
    align-items: start;
    margin-bottom: var(--p-space-5);
  }
  .tri {
    width: auto;
  }
  .tri thead,
  .tri tbody tr {
    border-color: var(--p-hair);
  }
  .tri thead {
    border-bottom: var(--p-w-hair) solid var(--p-line);
  }
  .tri tbody tr,
  .tri tbody tr:last-child {
    border-bottom: var(--p-w-hair) solid var(--p-hair);
  }
  .tri th,
  .tri td {
    padding: 3px 0;
  }
  .tri tbody th {
    color: var(--p-ink-2);
    padding-right: 8px;
  }
  .tri td,
  .tri thead th {
    padding-left: 18px;
    text-align: right;
    white-space: nowrap;
  }
  .trinote {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-2);
    line-height: 1.4;
    color: var(--p-ink-2);
    margin: 6px 0 0;
  }
  .whatif {
    border-left: var(--p-w-bar) solid var(--p-accent);
    padding: 0 0 0 14px;
    font-size: 16px;
    line-height: 1.45;
  }
  .whatif p + p,
  .whatif ul + p {
    margin-top: 6px;
  }
  .whatif ul {
    list-style: none;
    margin: 0;
    padding: 0;
  }
  .whatif .word {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    margin-left: 6px;
  }
  .whatif.idle {
    border-left-color: var(--p-hair);
    color: var(--p-ink-2);
    font-size: var(--p-size-4);
  }
  .buttons {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 8px 12px;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-2);
  }
  .was {
    margin-right: 4px;
    white-space: nowrap;
  }
  .now {
    color: var(--p-accent);
    font-weight: 700;
    white-space: nowrap;
    transition: color var(--p-quick);
  }

  /* The budget */
  .budget {
    table-layout: fixed;
  }
  .budget thead .c-u {
    width: 150px;
  }
  .budget thead .c-c {
    width: 104px;
  }
  .budget thead .c-uy {
    width: 96px;
  }
  .budget thead .c-bar {
    width: 29%;
  }
  .budget thead .c-sh {
    width: 84px;
  }
  .budget thead .c-ctl {
    width: 118px;
  }
  .budget thead th,
  .budget td {
    text-align: right;
    padding-left: 14px;
    vertical-align: middle;
  }
  .budget thead th {
    vertical-align: bottom;
  }
  .budget thead th:first-child {
    text-align: left;
    padding-left: 0;
  }
  .budget thead .c-bar {
    text-align: left;
  }
  .budget td {
    padding-top: 4px;
    padding-bottom: 4px;
    white-space: nowrap;
  }
  .budget tbody th {
    padding: 5px 0;
    vertical-align: middle;
  }
  .budget td.c-bar {
    padding-top: 0;
    padding-bottom: 0;
  }
  .budget td.c-u {
    white-space: normal;
  }
  .budget td.c-u .field {
    width: auto;
    max-width: 9.5em;
    text-align: right;
    border-bottom-color: transparent;
  }
  .budget tr:hover td.c-u .field,
  .budget td.c-u .field:focus,
  .budget td.c-u .field.ed {
    border-bottom-color: var(--p-line);
  }
  .budget .field.ed {
    color: var(--p-accent);
    font-weight: 700;
  }
  .budget .field[aria-invalid='true'] {
    border-bottom-color: var(--p-fault);
    text-decoration: underline wavy var(--p-fault) 1.25px;
    text-underline-offset: 4px;
  }
  .budget .sub {
    color: var(--p-ink-2);
    font-size: var(--p-size-2);
  }
  .budget .word {
    font-size: var(--p-size-2);
    white-space: nowrap;
    margin-left: 4px;
  }
  .budget tr.grp .nm {
    font-weight: 700;
  }
  .budget tbody tr:hover {
    background: var(--p-wash);
  }
  .budget tr.kid {
    border-top: 0;
  }
  .budget tr.kid th {
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
  .budget tr.cancel th {
    white-space: normal;
  }
  .budget tr.cancel td.c-bar {
    padding-top: 4px;
    padding-bottom: 6px;
  }
  .budget tr.cancel .field {
    display: inline-block;
    width: 4.8em;
    text-align: right;
  }
  .budget tr.cancel label {
    color: var(--p-ink-2);
    font-size: var(--p-size-2);
    margin-right: 4px;
  }
  .budget tr.neg .c-sh {
    color: var(--p-caution);
    font-weight: 700;
  }
  .budget tr.ed th {
    position: relative;
  }
  .budget tr.ed .nm::before {
    content: '';
    position: absolute;
    left: -14px;
    top: 0;
    bottom: 0;
    border-left: var(--p-w-bar) solid var(--p-accent);
  }
  .budget tr.rest td,
  .budget tr.rest th {
    padding-top: 2px;
    padding-bottom: 2px;
  }
  .budget tr.why {
    border-top: 0;
  }
  .budget tr.why td {
    text-align: left;
    white-space: normal;
    padding: 0 0 10px;
  }
  .budget tr.why .flt {
    margin: 0 0 0 18px;
  }
  .axl {
    overflow: visible;
  }
  .s-grid {
    stroke: var(--p-hair);
    stroke-width: 0.75px;
  }
  .s-wi {
    stroke: var(--p-accent);
    stroke-width: 2px;
  }
  .s-end,
  .s-ind {
    stroke: var(--p-ink);
    stroke-width: 1.25px;
    fill: none;
  }
  .s-ind {
    stroke-width: 1px;
    stroke-dasharray: 1.5 3;
  }
  .signed .s-band {
    stroke: none;
  }

  /* Factors: real radio inputs, the chosen one bold with a heavy underline */
  .fac {
    display: inline-flex;
    margin: 0;
    padding: 0;
    border: 0.75px solid var(--p-line);
    min-width: 0;
  }
  .fac label {
    position: relative;
    cursor: pointer;
  }
  .fac label + label {
    border-left: 0.75px solid var(--p-line);
  }
  .fac input {
    position: absolute;
    inset: 0;
    width: 100%;
    height: 100%;
    opacity: 0;
    margin: 0;
    cursor: pointer;
  }
  .fac span {
    display: block;
    min-width: 30px;
    min-height: 24px;
    text-align: center;
    padding: 3px 6px;
    line-height: 1.3;
    color: var(--p-ink-2);
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  .fac input:checked + span {
    color: var(--p-ink);
    font-weight: 700;
    box-shadow: inset 0 -3px 0 var(--p-ink);
  }
  tr.ed .fac input:checked + span {
    color: var(--p-accent);
    box-shadow: inset 0 -3px 0 var(--p-accent);
  }
  .fac input:focus-visible + span {
    outline: 2px solid var(--p-accent);
    outline-offset: 2px;
  }

  .comparison {
    margin-top: var(--p-space-6);
  }
  .comparison > p {
    max-width: 42em;
    margin: 0 0 var(--p-space-3);
    text-wrap: pretty;
  }

  /* Trials */
  .two {
    display: grid;
    grid-template-columns: 520px minmax(0, 1fr);
    gap: 48px;
    margin-top: var(--p-space-6);
    align-items: start;
  }
  .two p {
    margin: 0 0 12px;
    max-width: 42em;
    text-wrap: pretty;
  }
  .s-hist {
    fill: var(--p-band);
    stroke: var(--p-line);
    stroke-width: 0.75px;
  }
  .s-curve {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 2px;
  }
  .s-mc {
    stroke: var(--p-line);
    stroke-width: 5px;
  }
  .working p {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    margin: 6px 0 8px;
  }
  .two .key-row {
    margin-top: 12px;
  }

  /* Questions */
  .three {
    display: grid;
    grid-template-columns: repeat(3, minmax(0, 1fr));
    gap: 32px 40px;
    margin-top: var(--p-space-6);
    align-items: start;
  }
  .three p {
    text-wrap: pretty;
  }
  .three .word {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  .small td,
  .small th {
    padding: 3px 0;
    vertical-align: top;
  }
  .small td,
  .small th + th {
    padding-left: 10px;
  }
  .small tr.same {
    border-top: 0;
  }
  .small small {
    display: block;
    font-size: var(--p-size-1);
  }
  .small {
    margin-top: 6px;
  }

  /* Export */
  .disclose {
    margin-top: var(--p-space-5);
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  .export pre {
    max-height: 280px;
    overflow: auto;
    border: 0.75px solid var(--p-line);
    padding: 8px 12px;
    margin: 10px 0;
    white-space: pre;
    overflow-wrap: normal;
  }
  .fac.wide {
    flex-wrap: wrap;
  }
  .fac.wide span {
    padding: 4px 10px 6px;
  }

  @media screen {
    .closed {
      display: none;
    }
  }

  @container plumb (max-width: 1119px) {
    .bhead {
      grid-template-columns: max-content minmax(0, 1fr);
    }
    .two {
      grid-template-columns: 328px minmax(0, 1fr);
      gap: 28px;
    }
    .three {
      grid-template-columns: repeat(2, minmax(0, 1fr));
    }
    .budget td,
    .budget thead th {
      padding-left: 10px;
    }
  }
  @container plumb (max-width: 900px) {
    .bhead {
      grid-template-columns: minmax(0, 1fr);
      gap: 20px;
    }
    .budget thead .c-u {
      width: 128px;
    }
    .budget thead .c-uy {
      width: 86px;
    }
    .budget thead .c-bar {
      width: 22%;
    }
    .budget thead .c-sh {
      width: 70px;
    }
  }
  @media screen {
    @container plumb (max-width: 900px) {
      .budget .c-c {
        display: none;
      }
    }
  }
  @media screen {
    @container plumb (max-width: 655px) {
      h2 {
        font-size: 22px;
      }
      .two,
      .three {
        grid-template-columns: minmax(0, 1fr);
      }
      .tri {
        width: 100%;
        font-size: var(--p-size-1);
      }
      .tri td,
      .tri thead th {
        padding-left: 4px;
        font-size: inherit;
      }
      .tri tbody th {
        padding-right: 2px;
      }
      .budget,
      .budget tbody,
      .budget tr,
      .budget td,
      .budget tbody th {
        display: block;
        width: auto;
      }
      .budget thead {
        position: absolute;
        width: 1px;
        height: 1px;
        overflow: hidden;
        clip-path: inset(50%);
      }
      .budget tbody tr {
        display: grid;
        grid-template-columns: minmax(0, 1fr) 118px;
        gap: 2px 12px;
        padding: 8px 0;
        position: relative;
      }
      .budget tbody tr:first-child {
        border-top: var(--p-w-axis) solid var(--p-ink);
      }
      .budget td,
      .budget tbody th {
        padding: 0;
        white-space: normal;
      }
      .budget td.c-bar {
        grid-column: 1;
        grid-row: 2;
        width: auto;
      }
      .budget td.c-u {
        grid-column: 2;
        grid-row: 1;
        min-width: 0;
      }
      .budget td.c-u .field {
        width: 100%;
        max-width: none;
      }
      .budget td.c-sh {
        grid-column: 2;
        grid-row: 2;
        align-self: center;
        font-weight: 700;
      }
      .budget td.c-sh:not(:empty)::after {
        content: ' %';
      }
      .budget td.c-uy,
      .budget tr.rest td:not(.c-bar),
      .budget tr.cancel td.c-sh,
      .budget tr.cancel td.c-u {
        display: none;
      }
      .budget tr.cancel th {
        grid-column: 1 / -1;
      }
      .budget td.c-ctl {
        grid-column: 1 / -1;
        display: none;
        text-align: left;
      }
      .budget tr.held td.c-ctl,
      .budget tr.cancel td.c-ctl {
        display: block;
      }
      .budget tr.held td.c-ctl::before {
        content: 'what if × ';
        color: var(--p-ink-2);
        font-size: var(--p-size-2);
        margin-right: 8px;
      }
      .budget tr.cancel td.c-bar {
        grid-row: auto;
      }
      .budget tr.cancel td.c-ctl {
        grid-column: 2;
        text-align: right;
      }
      .only-narrow {
        display: inline;
      }
      .fac span {
        min-width: 44px;
        padding: 9px 8px 10px;
      }
      .budget tr.kid th::after {
        top: 14px;
      }
      .budget tr.kid.last th::before {
        bottom: auto;
        height: 14px;
      }
      .budget tr.ed .nm::before {
        left: -10px;
      }
      .export pre {
        white-space: pre-wrap;
        overflow-wrap: anywhere;
      }
      .small {
        font-size: var(--p-size-2);
      }
    }
  }
  @media print {
    .only-print {
      display: inline;
    }
    .was.print-plain {
      text-decoration: none;
      color: inherit;
      margin: 0;
    }
    .budget tr.ed .nm::before {
      border: 0;
    }
    .budget {
      font-size: 12px;
    }
    .budget td,
    .budget thead th {
      padding-left: 10px;
    }
    .budget thead .c-u {
      width: 84px;
    }
    .budget thead .c-c,
    .budget thead .c-uy {
      width: 72px;
    }
    .budget thead .c-bar {
      width: 24%;
    }
    .budget thead .c-sh {
      width: 64px;
    }
    .bhead {
      grid-template-columns: minmax(0, 1fr);
      margin-bottom: 14px;
      break-inside: avoid;
    }
    .two {
      grid-template-columns: 328px minmax(0, 1fr);
      gap: 24px;
      margin-top: 22px;
      break-inside: avoid;
    }
    .three {
      grid-template-columns: minmax(0, 1fr) minmax(0, 1fr);
      gap: 18px 28px;
      margin-top: 22px;
    }
    .three > div {
      break-inside: avoid;
    }
    h2,
    h3,
    .say {
      break-after: avoid;
    }
    h3 {
      font-size: 14px;
    }
    .small {
      font-size: 11px;
    }
    thead {
      display: table-header-group;
    }
  }
`;
