import { css, unsafeCSS } from 'lit';

// Widths of the part right of the decimal point, in tenths of an em: classes, because a strict Content-Security-Policy
// refuses style attributes.
const pointWidths = Array.from({ length: 90 }, (_, i) => `.e${i}{--r:${(i / 10).toFixed(1)}em}`).join('');

/** Words, numbers, symbols, states and controls that all elements share. */
export const sharedStyles = css`
  :host {
    display: block;
  }
  :host([hidden]) {
    display: none;
  }
  *,
  *::before,
  *::after {
    box-sizing: border-box;
  }

  /* Numbers and symbols */
  .q,
  .nb {
    white-space: nowrap;
  }
  .g {
    margin-right: 0.16em;
  }
  i.s {
    font-family: var(--p-symbol-face);
    font-style: italic;
  }
  sub {
    font-size: 0.75em;
    line-height: 0;
  }
  .n {
    display: inline-grid;
    grid-template-columns: 1fr var(--r, 4.4em);
    width: 100%;
    white-space: nowrap;
  }
  .n .i {
    text-align: right;
  }
  .n .r {
    text-align: left;
  }
  ${unsafeCSS(pointWidths)}

  /* Words */
  p {
    margin: 0;
  }
  .dim {
    color: var(--p-ink-2);
  }
  .note {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-2);
    line-height: 1.5;
    color: var(--p-ink-2);
    margin: var(--p-space-3) 0 0;
    max-width: 62em;
    text-wrap: pretty;
  }
  .say {
    font-size: var(--p-size-5);
    line-height: 1.42;
    margin: 0 0 var(--p-space-5);
    max-width: 42em;
    text-wrap: pretty;
  }
  .by {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-1);
    line-height: 1.5;
    color: var(--p-ink-3);
    margin: 6px 0 0;
  }
  .key-row {
    display: flex;
    flex-wrap: wrap;
    gap: var(--plumb-key-gap, 10px 28px);
    margin: var(--plumb-key-margin, 20px 0 0);
    padding: 0;
    list-style: none;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-2);
    line-height: 1.3;
    color: var(--p-ink-2);
  }
  .key-row li {
    display: flex;
    align-items: center;
    gap: 9px;
  }
  .key-row svg {
    flex: none;
  }
  .in-hand {
    color: var(--p-accent);
    font-weight: 700;
  }
  .caution {
    color: var(--p-caution);
    font-family: var(--p-symbol-face);
    font-style: italic;
    font-size: 1.1em;
  }
  .v-agree {
    font-weight: 700;
  }
  .v-differ {
    font-weight: 700;
    color: var(--p-fault);
  }
  .v-inconclusive {
    font-style: italic;
    color: var(--p-caution);
  }
  code,
  pre {
    font-family: var(--p-font-code);
    font-size: 12.5px;
    line-height: 1.7;
    font-variant-ligatures: none;
  }
  pre {
    margin: 0;
    white-space: pre-wrap;
    overflow-wrap: anywhere;
  }
  code {
    overflow-wrap: anywhere;
  }
  .bad {
    text-decoration: underline wavy var(--p-fault) 1.25px;
    text-underline-offset: 4px;
  }
  .only-spoken {
    position: absolute;
    width: 1px;
    height: 1px;
    overflow: hidden;
    clip-path: inset(50%);
    white-space: nowrap;
  }

  /* Tables */
  table {
    border-collapse: collapse;
    width: 100%;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    line-height: 1.4;
    color: inherit;
  }
  th {
    font-weight: 400;
    text-align: left;
  }
  thead {
    border-bottom: var(--p-w-axis) solid var(--p-ink);
  }
  thead th {
    font-size: var(--p-size-2);
    color: var(--p-ink-2);
    vertical-align: bottom;
    padding: 0 0 6px;
  }
  tbody tr {
    border-top: var(--p-w-hair) solid var(--p-line);
  }
  tbody tr:first-child {
    border-top: 0;
  }
  tbody tr:last-child {
    border-bottom: var(--p-w-axis) solid var(--p-ink);
  }
  td,
  tbody th {
    padding: 9px 0;
    vertical-align: top;
  }

  /* Controls */
  :focus-visible {
    outline: 2px solid var(--p-accent);
    outline-offset: 2px;
  }
  .btn {
    font-family: inherit;
    font-size: var(--p-size-3);
    line-height: 1.2;
    color: var(--p-ink);
    background: var(--p-paper);
    border: 1px solid var(--p-ink);
    border-radius: 0;
    padding: 6px 12px 7px;
    min-height: 30px;
    cursor: pointer;
    white-space: nowrap;
  }
  .btn:hover {
    background: var(--p-ink);
    color: var(--p-paper);
  }
  .word {
    font: inherit;
    color: var(--p-accent);
    background: none;
    border: 0;
    padding: 3px 0;
    margin: -3px 0;
    min-height: 24px;
    min-width: 24px;
    text-decoration: underline;
    text-decoration-thickness: 0.5px;
    text-underline-offset: 3px;
    cursor: pointer;
  }
  .field {
    font-family: inherit;
    font-size: inherit;
    line-height: 1.4;
    font-variant-numeric: inherit;
    color: var(--p-ink);
    background: none;
    border: 0;
    border-bottom: 1px solid var(--p-ink);
    border-radius: 0;
    padding: 2px 0;
    margin: 0;
    min-height: 24px;
    width: 100%;
  }
  .field::placeholder {
    color: var(--p-ink-3);
    opacity: 1;
    font-style: italic;
  }
  .field[aria-invalid='true'] {
    border-bottom-color: var(--p-fault);
  }
  select.field {
    appearance: auto;
  }
  select.field option {
    color: var(--p-ink);
    background: var(--p-paper);
  }

  /* States: failed, stale, edited */
  .flt {
    border-left: var(--p-w-bar) solid var(--p-fault);
    padding: 1px 0 1px 14px;
    margin: var(--p-space-3) 0 0;
  }
  .flt .hd {
    font-weight: 700;
    color: var(--p-fault);
    margin: 0 0 4px;
  }
  .flt dl {
    display: grid;
    grid-template-columns: 72px minmax(0, 1fr);
    gap: 2px 14px;
    margin: 0 0 10px;
    font-size: 14px;
    line-height: 1.5;
  }
  .flt dl:last-child {
    margin-bottom: 0;
  }
  .flt dt {
    color: var(--p-ink-2);
  }
  .flt dd {
    margin: 0;
    overflow-wrap: anywhere;
  }
  .stale {
    border-left: 4px double var(--p-caution);
    padding-left: 10px;
  }
  .tagc {
    color: var(--p-caution);
    font-family: var(--p-symbol-face);
    font-style: italic;
    font-size: 15px;
  }
  .edw {
    color: var(--p-accent);
    font-family: var(--p-symbol-face);
    font-style: italic;
  }
  .was {
    text-decoration: line-through;
    text-decoration-thickness: 1px;
    color: var(--p-ink-2);
  }

  @container plumb (max-width: 655px) {
    .say {
      font-size: 17px;
      margin-bottom: var(--p-space-4);
    }
    .flt dl {
      grid-template-columns: 64px minmax(0, 1fr);
    }
  }
  @media screen and (max-width: 720px) {
    .btn {
      min-width: 44px;
      min-height: 38px;
      padding: 10px 14px 11px;
    }
    .field {
      min-height: 38px;
    }
    .word {
      min-width: 44px;
      min-height: 38px;
      padding: 9px 0;
      margin: -9px 0;
    }
  }
  @media (pointer: coarse) {
    /* smaller type makes a phone zoom in on the field */
    .field {
      font-size: 16px;
    }
  }
  @media print {
    .say {
      font-size: 14.5px;
      margin-bottom: 8px;
    }
    .btn,
    .word,
    .no-print {
      display: none !important;
    }
    tr,
    svg,
    .flt {
      break-inside: avoid;
    }
    .field {
      border-bottom: 0;
      appearance: none;
    }
  }
`;
