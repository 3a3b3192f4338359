import { css } from 'lit';

export const deskStyles = css`
  .top {
    display: flex;
    flex-wrap: wrap;
    align-items: baseline;
    gap: 8px 16px;
    border-top: var(--p-w-heavy) solid var(--p-ink);
    padding-top: 12px;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  .top h1 {
    font-family: var(--p-font-text);
    font-size: var(--p-size-6);
    line-height: 1.2;
    font-weight: 400;
    margin: 0;
    flex: 1 1 14em;
  }
  .kept {
    flex-basis: 100%;
    color: var(--p-ink-2);
    font-size: var(--p-size-2);
  }
  .kept.caution-line {
    color: var(--p-caution);
  }
  .columns {
    display: grid;
    grid-template-columns: 104px minmax(0, 1fr) 392px;
    gap: 32px;
    margin-top: 20px;
  }
  .register {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-2);
    position: sticky;
    top: 8px;
    align-self: start;
  }
  .register h2 {
    font-size: var(--p-size-1);
    font-weight: 400;
    color: var(--p-ink-3);
    margin: 12px 0 4px;
  }
  .register ul {
    list-style: none;
    margin: 0;
    padding: 0;
  }
  .register a {
    color: var(--p-accent);
    text-underline-offset: 3px;
  }
  .desk > plumb-section,
  .desk > plumb-links,
  .desk > plumb-budget,
  .desk > plumb-network {
    margin-top: var(--p-space-8);
    border-top: var(--p-w-axis) solid var(--p-ink);
    padding-top: 12px;
  }
  .answer .say {
    margin: 12px 0;
  }
  .register li {
    display: flex;
    justify-content: space-between;
    padding: 3px 0;
  }
  .answer {
    position: sticky;
    top: 8px;
    align-self: start;
    max-height: 96vh;
    overflow: auto;
  }
  .table-title {
    display: flex;
    align-items: baseline;
    gap: 12px;
    border-bottom: var(--p-w-axis) solid var(--p-ink);
    margin-top: 24px;
    font-family: var(--p-font-figure);
  }
  .table-title h2 {
    font-family: var(--p-font-text);
    font-size: var(--p-size-5);
    font-weight: 400;
    margin: 0;
    flex: 1;
  }
  .row {
    border-bottom: var(--p-w-hair) solid var(--p-line);
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  .row.open {
    border-top: var(--p-w-axis) solid var(--p-ink);
    border-bottom: var(--p-w-axis) solid var(--p-ink);
    padding-bottom: 12px;
  }
  .row-head {
    display: grid;
    grid-template-columns: 9em minmax(0, 1fr) 150px;
    gap: 12px;
    width: 100%;
    padding: 7px 0;
    border: 0;
    background: none;
    color: inherit;
    font: inherit;
    text-align: left;
    min-height: 31px;
    cursor: pointer;
  }
  .row-head:hover {
    background: var(--p-wash);
  }
  .row-head .sum {
    color: var(--p-ink-2);
    overflow: hidden;
    text-overflow: ellipsis;
    white-space: nowrap;
  }
  .row.wrong {
    border-left: var(--p-w-bar) solid var(--p-fault);
    padding-left: 8px;
  }
  .form {
    display: grid;
    gap: 4px;
  }
  .field {
    display: grid;
    grid-template-columns: 11em minmax(8em, 1fr) 150px 4.5em;
    gap: 4px 12px;
    align-items: center;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  .field.wrong {
    border-left: var(--p-w-bar) solid var(--p-fault);
    padding-left: 8px;
  }
  .field .label {
    color: var(--p-ink-2);
  }
  .field .pieces,
  .field .fault-note,
  .field .piece {
    grid-column: 2 / -1;
  }
  .fault-note {
    color: var(--p-fault);
    font-size: var(--p-size-2);
    font-family: var(--p-font-figure);
    margin: 2px 0;
  }
  .fault-note b {
    color: var(--p-ink);
  }
  input[type='text'],
  select,
  textarea {
    font: inherit;
    color: var(--p-ink);
    background: transparent;
    border: 0;
    border-bottom: 1px solid var(--p-line);
    border-radius: 0;
    padding: 3px 2px;
    min-height: 26px;
    width: 100%;
  }
  select {
    background: var(--p-paper);
  }
  textarea {
    font-family: var(--p-font-code);
    font-size: 12.5px;
    line-height: 1.5;
    min-height: 24em;
    border: 1px solid var(--p-line);
    white-space: pre;
  }
  .weight {
    display: grid;
    grid-template-columns: 1fr 4em;
    gap: 6px;
    align-items: center;
  }
  .share {
    text-align: right;
    font-size: var(--p-size-2);
  }
  .group {
    border: 0;
    border-left: var(--p-w-hair) solid var(--p-line);
    margin: 6px 0 6px 0;
    padding: 2px 0 2px 14px;
    min-width: 0;
  }
  .group legend {
    padding: 0;
    color: var(--p-ink-2);
    font-size: var(--p-size-2);
  }
  .items {
    margin: 0;
    padding: 0;
    list-style: none;
    display: grid;
    gap: 10px;
  }
  .item-tools {
    display: inline-flex;
    gap: 12px;
  }
  .add {
    display: inline-flex;
    gap: 8px;
    align-items: center;
    color: var(--p-ink-2);
    font-size: var(--p-size-2);
    width: fit-content;
  }
  summary {
    cursor: pointer;
    font-size: var(--p-size-2);
    color: var(--p-ink-2);
    min-height: 24px;
  }
  .changes {
    margin: 0;
    padding: 0;
    list-style: none;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-2);
  }
  .changes li {
    display: flex;
    gap: 10px;
    justify-content: space-between;
    border-top: var(--p-w-hair) solid var(--p-line);
    padding: 5px 0;
  }
  .answer h2 {
    font-family: var(--p-font-text);
    font-size: var(--p-size-5);
    font-weight: 400;
    margin: 20px 0 6px;
  }
  .answer h2:first-child {
    margin-top: 0;
  }
  .finder {
    position: relative;
    flex: 0 1 16em;
  }
  .finder ul {
    position: absolute;
    z-index: 2;
    left: 0;
    right: 0;
    min-width: 26em;
    background: var(--p-paper);
    border: 1px solid var(--p-ink);
    list-style: none;
    margin: 0;
    padding: 0;
  }
  .finder li button {
    display: grid;
    grid-template-columns: minmax(0, 1fr) auto;
    gap: 12px;
    width: 100%;
    border: 0;
    background: none;
    color: inherit;
    font: inherit;
    text-align: left;
    padding: 6px 8px;
    cursor: pointer;
  }
  .finder li button:hover,
  .finder li button:focus-visible {
    background: var(--p-wash);
  }
  .dropping {
    outline: 2px solid var(--p-accent);
    outline-offset: 4px;
  }
  @container plumb (max-width: 1239px) {
    .columns {
      grid-template-columns: minmax(0, 1fr);
    }
    .register,
    .answer {
      position: static;
      max-height: none;
    }
    .register ul {
      display: flex;
      flex-wrap: wrap;
      gap: 4px 16px;
    }
    .register li {
      gap: 6px;
    }
    .answer {
      order: -1;
    }
  }
  @container plumb (max-width: 655px) {
    .field {
      grid-template-columns: minmax(0, 1fr) auto;
    }
    .field .label,
    .field .pieces,
    .field .fault-note {
      grid-column: 1 / -1;
    }
    .field .weight {
      grid-column: 1 / -1;
    }
    .row-head {
      grid-template-columns: minmax(0, 1fr);
      gap: 2px;
    }
    .finder ul {
      min-width: 0;
    }
  }
  @media print {
    .register,
    .changes,
    .top button,
    .finder {
      display: none;
    }
  }
`;
