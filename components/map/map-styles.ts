import { css } from 'lit';

export const mapStyles = css`
  .sheet {
    display: grid;
    gap: var(--p-space-4) var(--p-space-6);
    grid-template-columns: minmax(0, 1fr);
  }
  .sheet.wide {
    grid-template-columns: 680px minmax(0, 1fr);
  }
  .fig {
    outline-offset: 4px;
  }
  svg.clip {
    overflow: hidden;
  }
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
  svg .b {
    font-weight: 700;
  }
  .s-coast {
    fill: none;
    stroke: var(--p-line);
    stroke-width: 0.75px;
  }
  .s-grid {
    fill: none;
    stroke: var(--p-hair);
    stroke-width: var(--p-w-hair);
  }
  .s-frame {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: var(--p-w-axis);
  }
  .s-ground-of-map {
    fill: transparent;
    pointer-events: all;
    cursor: grab;
    touch-action: pan-y;
  }
  .s-reach {
    fill: none;
    stroke: var(--p-ink-2);
    stroke-width: 1px;
    stroke-dasharray: 4 3;
  }
  .hit {
    fill: none;
  }
  .hit.flat {
    fill: transparent;
    stroke: none;
  }
  .ring-focus {
    fill: none;
    stroke: none;
  }
  .mark:focus-visible .ring-focus {
    stroke: var(--p-accent-band);
    stroke-width: 9px;
  }
  .movable {
    cursor: move;
    touch-action: none;
  }
  .bar {
    display: flex;
    flex-wrap: wrap;
    gap: 8px;
    align-items: center;
    margin-top: 8px;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  .bar label {
    margin-left: auto;
    display: flex;
    gap: 8px;
    align-items: baseline;
    color: var(--p-ink-2);
  }
  .bar .field {
    width: auto;
    max-width: 16em;
  }
  .reading {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    line-height: 1.4;
    min-height: 1.4em;
    margin-top: var(--p-space-2);
  }
  .pairs td,
  .pairs thead th + th {
    padding-left: 14px;
    text-align: right;
    white-space: nowrap;
  }
  .pairs thead th + th {
    white-space: normal;
  }
  .pairs td,
  .pairs tbody th {
    padding-top: 6px;
    padding-bottom: 6px;
  }
  .pairs small {
    margin-left: 6px;
    color: var(--p-ink-2);
    font-size: var(--p-size-2);
    font-weight: 400;
  }
  .pairs .held th {
    color: var(--p-accent);
  }
  .pairs tbody th {
    font-weight: 700;
  }
  @container plumb (max-width: 655px) {
    .pairs td,
    .pairs thead th + th {
      padding-left: 8px;
    }
    .pairs {
      font-size: 12px;
    }
  }
  @media print {
    .bar,
    .reading {
      display: none;
    }
  }
`;
