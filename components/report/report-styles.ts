import { css } from 'lit';

/** The sheet of paper: the print palette and the print sizes whatever the screen, handed down to the drawings on it. */
export const reportStyles = css`
  .paper {
    --plumb-paper: #ffffff;
    --plumb-wash: #ffffff;
    --plumb-ink: #000000;
    --plumb-ink-2: #333333;
    --plumb-ink-3: #4d4d4d;
    --plumb-line: #6e6e6e;
    --plumb-level: #6e6e6e;
    --plumb-hair: #bfbfbf;
    --plumb-band: #dcdcdc;
    --plumb-accent: #000000;
    --plumb-accent-band: #dcdcdc;
    --plumb-caution: #664700;
    --plumb-fault: #96200d;
    --plumb-size-2: 10.5px;
    --plumb-key-gap: 4px 20px;
    --plumb-key-margin: 6px 0 0;
    --p-paper: #ffffff;
    --p-ink: #000000;
    --p-ink-2: #333333;
    --p-ink-3: #4d4d4d;
    --p-line: #6e6e6e;
    --p-hair: #bfbfbf;
    --p-caution: #664700;
    --p-fault: #96200d;
    --p-accent: #000000;
    color-scheme: light;
    width: 794px;
    padding: 46px 61px 57px;
    border: 1px solid #6e6e6e;
    background: #ffffff;
    color: #000000;
    font-family: var(--p-font-text);
    font-size: 13px;
    line-height: 1.45;
  }
  .paper + .paper {
    margin-top: var(--p-space-5);
  }
  .lay {
    display: grid;
    grid-template-columns: 794px minmax(0, 1fr);
    gap: var(--p-space-6);
    align-items: start;
  }
  .head {
    border-top: var(--p-w-heavy) solid #000000;
    padding-top: 10px;
  }
  h1 {
    font-size: 25px;
    line-height: 1.15;
    font-weight: 400;
    margin: 0 0 6px;
    text-wrap: balance;
  }
  .question {
    font-style: italic;
    color: var(--p-ink-2);
    margin: 0 0 4px;
    font-size: 14px;
  }
  .answer {
    font-size: 14.5px;
    line-height: 1.4;
    margin: 0 0 8px;
    text-wrap: pretty;
  }
  .block {
    margin: 0 0 8px;
    display: flex;
    justify-content: space-between;
    border-top: 1px solid #000000;
    border-bottom: 1px solid #000000;
    font-family: var(--p-font-figure);
    font-size: 10px;
    line-height: 1.4;
    white-space: nowrap;
  }
  .block div {
    padding: 5px 6px 6px;
    border-left: var(--p-w-hair) solid var(--p-line);
  }
  .block div:first-child {
    border-left: 0;
    padding-left: 0;
  }
  .block div:last-child {
    padding-right: 0;
  }
  .block dt {
    font-size: 9.5px;
    color: var(--p-ink-3);
  }
  .block dd {
    margin: 0;
  }
  h2 {
    font-size: 17px;
    line-height: 1.25;
    font-weight: 400;
    margin: 12px 0 4px;
    break-after: avoid;
  }
  .rule {
    border-top: 1px solid #000000;
    padding-top: 8px;
  }
  .two {
    display: grid;
    grid-template-columns: minmax(0, 1fr) minmax(0, 0.88fr);
    gap: 24px;
    align-items: start;
  }
  .two h2 {
    margin-top: 8px;
  }
  .links,
  .limits,
  .rt {
    font-size: 10.5px;
    line-height: 1.35;
  }
  .limits td,
  .limits tbody th,
  .links td,
  .links tbody th,
  .rt td,
  .rt tbody th {
    padding: 3px 0;
  }
  .links td,
  .links thead th + th,
  .limits td,
  .rt td,
  .rt thead th + th {
    padding-left: 10px;
  }
  .links thead th,
  .rt thead th {
    font-size: 10px;
    padding-bottom: 4px;
  }
  .num {
    text-align: right;
  }
  .rt {
    margin-top: 12px;
  }
  .rt caption {
    text-align: left;
    font-weight: 700;
    font-size: 11.5px;
    padding-bottom: 6px;
    break-after: avoid;
  }
  .rt tbody tr {
    border-top-color: var(--p-hair);
  }
  .rn,
  .fn {
    font-family: var(--p-font-figure);
    font-size: 10px;
    line-height: 1.45;
    color: var(--p-ink-2);
    margin: 5px 0 0;
  }
  .links small {
    display: block;
    font-size: 10px;
    color: var(--p-ink-2);
  }
  .links b {
    font-size: 12px;
  }
  .links tbody th {
    min-width: 136px;
  }
  .v {
    display: block;
    font-family: var(--p-font-text);
    font-size: 13px;
    line-height: 1.2;
  }
  .v.v-differ {
    font-weight: 700;
  }
  .vd {
    width: 138px;
  }
  .none {
    display: block;
    text-align: right;
    color: var(--p-ink-2);
  }
  .care {
    margin: 0;
    padding: 0;
    list-style: none;
    font-size: 11px;
    line-height: 1.35;
  }
  .care li + li {
    margin-top: 3px;
  }
  .foot {
    break-before: avoid;
    margin-top: 8px;
    display: flex;
    justify-content: space-between;
    font-family: var(--p-font-figure);
    font-size: 9.5px;
    color: var(--p-ink-2);
  }
  .say2 {
    margin: 0 0 4px;
    font-size: 12.5px;
  }
  .warnings {
    list-style: none;
    margin: 8px 0 0;
    padding: 0;
    font-family: var(--p-font-figure);
    font-size: 10.5px;
    line-height: 1.45;
  }
  .contents {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  .contents p {
    margin-bottom: var(--p-space-2);
  }
  .in-short {
    display: none;
  }
  .contents .it {
    font-family: var(--p-symbol-face);
    font-style: italic;
    font-size: var(--p-size-4);
  }
  .contents ol {
    margin: 0 0 var(--p-space-4);
    padding-left: 1.6em;
  }
  .contents li {
    margin: 3px 0;
  }

  @container plumb (max-width: 1059px) {
    .lay {
      grid-template-columns: 794px;
    }
    .contents {
      order: -1;
    }
  }
  @media screen {
    @container plumb (max-width: 793px) {
      .paper {
        display: none;
      }
      .lay,
      .in-short {
        display: block;
      }
    }
  }
  @media print {
    .lay {
      display: block;
    }
    .contents {
      display: none;
    }
    .paper,
    .paper + .paper {
      width: auto;
      max-width: none;
      padding: 0;
      border: 0;
      margin: 0;
    }
    .paper + .paper {
      break-before: page;
    }
    .rt.short,
    .two,
    .head,
    .block,
    .chapter-head,
    plumb-section,
    plumb-map,
    plumb-tide {
      break-inside: avoid;
    }
    thead {
      display: table-header-group;
    }
  }
`;
