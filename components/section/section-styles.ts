import { css } from 'lit';

export const sectionStyles = css`
  svg .sn {
    font-family: var(--p-symbol-face);
    font-style: italic;
    font-size: 16px;
  }
  svg .l {
    font-size: 12px;
  }
  svg .l-2 {
    fill: var(--p-ink-2);
  }
  svg .l2i {
    font-family: var(--p-symbol-face);
    font-style: italic;
    font-size: 12.5px;
    fill: var(--p-ink-2);
  }
  svg .b {
    font-weight: 700;
  }
  svg .sy {
    font-size: 1.1em;
  }
  svg .su {
    font-size: 0.75em;
  }
  .s-tick {
    fill: none;
    stroke: var(--p-line);
    stroke-width: 0.75px;
  }
  .s-paper {
    fill: var(--p-paper);
  }
  .s-tie {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: var(--p-w-tie);
  }
  .s-loupe {
    fill: var(--p-paper);
    stroke: var(--p-ink);
    stroke-width: 1px;
  }
  .s-glass {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 1px;
  }
  .s-leader {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 0.6px;
  }
  .hit.flat {
    stroke: none;
  }
  .fig {
    display: flex;
    align-items: flex-start;
  }
  .fig > svg {
    flex: none;
  }
  .scroll {
    flex: 1;
    min-width: 0;
  }
  .scroll.wide {
    overflow-x: auto;
  }
  .reading {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    line-height: 1.4;
    min-height: 2.8em;
    margin-top: var(--p-space-3);
    display: flex;
    flex-wrap: wrap;
    gap: 0 18px;
    align-items: baseline;
    align-content: flex-start;
  }
  .reading dt {
    color: var(--p-ink-2);
    display: inline;
  }
  .detail {
    display: grid;
    grid-template-columns: auto minmax(0, 1fr);
    gap: var(--p-space-6);
    align-items: center;
    margin-top: var(--p-space-4);
  }
  .detail.narrow {
    grid-template-columns: minmax(0, 1fr);
    justify-items: center;
    gap: var(--p-space-4);
  }
  .detail > div {
    width: 100%;
  }
  h3 {
    font-size: 17px;
    line-height: 1.3;
    font-weight: 700;
    margin: 0 0 6px;
  }
  h3 span {
    font-weight: 400;
    color: var(--p-ink-2);
  }
  .tri {
    width: 100%;
    max-width: 30em;
  }
  .tri td,
  .tri tbody th {
    padding: 4px 0;
  }
  .tri td,
  .tri thead th + th {
    padding-left: 10px;
  }
  .tri thead th {
    padding-bottom: 4px;
  }
  .tri thead th + th {
    text-align: right;
  }
  .tri thead {
    border-bottom: var(--p-w-hair) solid var(--p-line);
  }
  .tri tbody tr,
  .tri tbody tr:last-child {
    border-bottom: var(--p-w-hair) solid var(--p-hair);
    border-top: 0;
  }
  .tri tbody th {
    color: var(--p-ink-2);
  }
  .tri .sum th,
  .tri .sum td {
    color: var(--p-ink);
    font-weight: 700;
  }
  .lists {
    margin-top: var(--p-space-4);
  }
  .lists h3 {
    margin-top: var(--p-space-4);
  }
  .disclose {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    margin-top: var(--p-space-3);
  }
  .all {
    margin-top: var(--p-space-3);
  }
  .all th + td,
  .all thead th + th,
  .all td + td {
    padding-left: 14px;
  }
  .all td,
  .all tbody th {
    padding-top: 5px;
    padding-bottom: 5px;
  }
  .all thead th + th {
    text-align: right;
  }
  .all .grp th {
    padding-top: 12px;
    color: var(--p-ink-2);
    font-size: var(--p-size-2);
  }
  @container plumb (max-width: 655px) {
    .tri {
      font-size: 12.5px;
      max-width: none;
    }
    .tri td,
    .tri thead th + th {
      padding-left: 6px;
    }
    .all {
      font-size: 12px;
    }
    .all td + td,
    .all th + td,
    .all thead th + th {
      padding-left: 6px;
    }
  }
  @media print {
    .reading {
      display: none;
    }
    .detail,
    .lists section {
      break-inside: avoid;
    }
  }
`;
