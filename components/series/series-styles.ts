import { css } from 'lit';

export const seriesStyles = css`
  .s-grid {
    fill: none;
    stroke: var(--p-hair);
    stroke-width: 0.75px;
  }
  .s-solid {
    fill: var(--p-ink);
  }
  .s-range,
  .s-mean,
  .s-u {
    fill: none;
    stroke: var(--p-ink);
  }
  .s-range {
    stroke-width: 1px;
  }
  .s-mean {
    stroke-width: 2px;
  }
  .s-u {
    stroke-width: 0.75px;
  }
  .s-invalid {
    fill: var(--p-paper);
    stroke: var(--p-ink-2);
    stroke-width: 1px;
  }
  .s-open {
    fill: var(--p-paper);
    stroke: var(--p-ink);
    stroke-width: 1.5px;
  }
  .under {
    display: grid;
    grid-template-columns: repeat(2, minmax(0, 1fr));
    gap: 28px;
    margin: 20px 0;
  }
  .note + table {
    margin-top: 20px;
  }
  th.num,
  td.num {
    text-align: right;
    white-space: nowrap;
    padding-left: 12px;
  }
  summary {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-2);
    padding: 10px 0;
    cursor: pointer;
  }
  @container plumb (max-width: 899px) {
    .under {
      grid-template-columns: minmax(0, 1fr);
    }
  }
  @container plumb (max-width: 479px) {
    .wide {
      display: none;
    }
  }
`;
