import { css } from 'lit';

/** Lines and marks of the drawings: a level is horizontal, uncertainty a band with two edges, ground hatched on one side. */
export const figureStyles = css`
  svg {
    display: block;
    overflow: visible;
  }
  svg text {
    font-family: var(--p-font-figure);
    font-size: 11.5px;
    fill: var(--p-ink);
  }
  svg .sy {
    font-family: var(--p-symbol-face);
    font-style: italic;
  }
  svg .l2 {
    font-size: var(--p-size-1);
    fill: var(--p-ink-2);
  }
  svg .lb {
    font-size: 12px;
    font-weight: 700;
  }
  .halo {
    paint-order: stroke;
    stroke: var(--p-paper);
    stroke-width: 5px;
    stroke-linejoin: round;
  }
  .s-level,
  .s-zero,
  .s-edge,
  .s-ground,
  .s-hatch,
  .s-dim,
  .s-axis {
    fill: none;
    stroke: var(--p-ink);
  }
  .s-level {
    stroke: var(--p-level);
    stroke-width: var(--p-w-level);
  }
  .s-zero {
    stroke: var(--p-level);
    stroke-width: 1.75px;
  }
  .s-band {
    fill: var(--p-band);
  }
  .s-edge {
    stroke: var(--p-line);
    stroke-width: var(--p-w-hair);
  }
  .s-ground {
    stroke-width: var(--p-w-tie);
  }
  .s-hatch {
    stroke-width: var(--p-w-hair);
  }
  .s-dim {
    stroke-width: 0.75px;
  }
  .s-arrow,
  .s-bolt,
  .s-dot,
  .s-bar {
    fill: var(--p-ink);
  }
  .s-ring {
    fill: var(--p-paper);
    stroke: var(--p-ink);
    stroke-width: 1.5px;
  }
  .s-axis {
    stroke-width: var(--p-w-axis);
  }
  .s-grp {
    fill: var(--p-paper);
    stroke: var(--p-ink);
    stroke-width: 1.25px;
  }
  .s-neg {
    fill: var(--p-paper);
    stroke: var(--p-caution);
    stroke-width: 2px;
  }
`;
