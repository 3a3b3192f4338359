import { css } from 'lit';

export const campaignStyles = css`
  .flt {
    font-family: var(--p-font-figure);
    margin-bottom: var(--p-space-5);
  }
  .flt dl {
    font-size: var(--p-size-3);
  }
  .foot {
    margin-top: var(--p-space-5);
  }
  .warnings {
    list-style: none;
    margin: 0;
    padding: 0;
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    line-height: 1.45;
    max-width: 62em;
  }
  .warnings li {
    overflow-wrap: anywhere;
  }
  .warnings li + li {
    margin-top: 6px;
  }
  .more {
    font-family: var(--p-font-figure);
    font-size: var(--p-size-3);
    margin-top: 6px;
  }
  .own {
    padding: 0;
  }
`;
