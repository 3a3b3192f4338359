import { css } from 'lit';
import { averagingStyles } from '../averaging/averaging-styles.js';

export const breakEvenStyles = css`
  ${averagingStyles}
  .s-level-line,
  .s-gnss-line {
    fill: none;
    stroke: var(--p-ink);
    stroke-width: 1.5px;
    stroke-dasharray: 6 4;
  }
  .s-gnss-line {
    stroke-width: 1px;
    stroke-dasharray: 9 4 2 4;
  }
  td.smallest {
    font-weight: 700;
  }
  form {
    display: flex;
    flex-wrap: wrap;
    gap: 8px 20px;
    align-items: end;
    margin: 16px 0 0;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
  }
  form label {
    display: block;
    font-size: var(--p-size-2);
    color: var(--p-ink-2);
  }
  form .field {
    width: 118px;
  }
`;
