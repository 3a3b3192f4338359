import { css } from 'lit';

/** The palette and the measures of every element, resolved once on the root of its shadow tree (`.plumb`).
 *
 *  `--plumb-…` are the public names: set on the page, an ancestor or the element they win over the values here. Inside,
 *  only the resolved `--p-…` are used, so that a lone element in a foreign page needs nothing from it.
 *  Contrast of text on paper and on band is at least 4.5, of marks 3.0, in all four palettes.
 *
 *  `.dark` is set by the theme controller; print and forced colours override both. */
export const tokens = css`
  .plumb {
    --p-paper: var(--plumb-paper, #fafaf7);
    --p-wash: var(--plumb-wash, #eff1ed);
    --p-ink: var(--plumb-ink, #16212a);
    --p-ink-2: var(--plumb-ink-2, #46535c);
    --p-ink-3: var(--plumb-ink-3, #566269);
    --p-line: var(--plumb-line, #69767d);
    --p-level: var(--plumb-level, #5e7a8a);
    --p-hair: var(--plumb-hair, #cfd4d2);
    --p-band: var(--plumb-band, #d5dee2);
    --p-accent: var(--plumb-accent, #0a5a7f);
    --p-accent-band: var(--plumb-accent-band, #c3dbe6);
    --p-caution: var(--plumb-caution, #7a5500);
    --p-fault: var(--plumb-fault, #ae2b16);

    --p-symbol-face:
      'Palatino Linotype', Palatino, P052, 'URW Palladio L', 'TeX Gyre Pagella', 'Book Antiqua', 'Noto Serif', serif;
    --p-font-text: var(--plumb-font-text, var(--p-symbol-face));
    --p-font-figure: var(
      --plumb-font-figure,
      'Helvetica Neue',
      Helvetica,
      Arial,
      'Nimbus Sans',
      'Liberation Sans',
      Roboto,
      sans-serif
    );
    --p-font-code: var(
      --plumb-font-code,
      ui-monospace,
      'Cascadia Mono',
      Menlo,
      Consolas,
      'Liberation Mono',
      monospace
    );

    --p-size-1: var(--plumb-size-1, 11px);
    --p-size-2: var(--plumb-size-2, 12px);
    --p-size-3: var(--plumb-size-3, 13px);
    --p-size-4: var(--plumb-size-4, 15px);
    --p-size-5: var(--plumb-size-5, 19px);
    --p-size-6: var(--plumb-size-6, 25px);
    --p-size-7: var(--plumb-size-7, 38px);

    --p-space-1: var(--plumb-space-1, 4px);
    --p-space-2: var(--plumb-space-2, 8px);
    --p-space-3: var(--plumb-space-3, 12px);
    --p-space-4: var(--plumb-space-4, 16px);
    --p-space-5: var(--plumb-space-5, 24px);
    --p-space-6: var(--plumb-space-6, 32px);
    --p-space-7: var(--plumb-space-7, 48px);
    --p-space-8: var(--plumb-space-8, 80px);

    --p-w-hair: var(--plumb-w-hair, 0.5px);
    --p-w-level: var(--plumb-w-level, 0.75px);
    --p-w-axis: var(--plumb-w-axis, 1px);
    --p-w-tie: var(--plumb-w-tie, 1.5px);
    --p-w-link: var(--plumb-w-link, 2px);
    --p-w-heavy: var(--plumb-w-heavy, 3px);
    --p-w-bar: var(--plumb-w-bar, 4px);
    --p-quick: var(--plumb-quick, 120ms);

    color-scheme: light;
    color: var(--p-ink);
    font-family: var(--p-font-text);
    font-size: var(--p-size-4);
    line-height: 1.5;
    font-variant-numeric: lining-nums tabular-nums;
    text-rendering: optimizeLegibility;
    /* what a page hands down to all it holds, and what would bend tables and lettering */
    direction: ltr;
    text-align: left;
    text-indent: 0;
    text-transform: none;
    text-shadow: none;
    letter-spacing: normal;
    word-spacing: normal;
    white-space: normal;
    word-break: normal;
    overflow-wrap: normal;
    hyphens: manual;
    font-style: normal;
    font-weight: 400;
    font-stretch: normal;
    border-spacing: 0;
    container: plumb / inline-size;
  }

  .plumb.own {
    background: var(--p-paper);
  }

  .plumb.dark {
    --p-paper: var(--plumb-paper, #10181d);
    --p-wash: var(--plumb-wash, #19232a);
    --p-ink: var(--plumb-ink, #e7e9e4);
    --p-ink-2: var(--plumb-ink-2, #b6bfc2);
    --p-ink-3: var(--plumb-ink-3, #98a5ab);
    --p-line: var(--plumb-line, #7f8e96);
    --p-level: var(--plumb-level, #7490a0);
    --p-hair: var(--plumb-hair, #2f3c44);
    --p-band: var(--plumb-band, #263944);
    --p-accent: var(--plumb-accent, #7cc6e6);
    --p-accent-band: var(--plumb-accent-band, #1b4456);
    --p-caution: var(--plumb-caution, #e3b65c);
    --p-fault: var(--plumb-fault, #ff9078);
    color-scheme: dark;
  }

  /* In an article: the page's own typeface. An undefined custom property makes font-family fall back to inheritance. */
  .plumb.article {
    --p-font-text: var(--plumb-font-text);
    --p-font-figure: var(--plumb-font-figure);
  }

  @media (prefers-reduced-motion: reduce) {
    .plumb {
      --p-quick: 0ms;
    }
  }

  @media (forced-colors: active) {
    .plumb,
    .plumb.dark {
      --p-paper: Canvas;
      --p-wash: Canvas;
      --p-ink: CanvasText;
      --p-ink-2: CanvasText;
      --p-ink-3: CanvasText;
      --p-line: CanvasText;
      --p-level: CanvasText;
      --p-hair: GrayText;
      --p-band: transparent;
      --p-accent: Highlight;
      --p-accent-band: transparent;
      --p-caution: CanvasText;
      --p-fault: CanvasText;
    }
    .plumb svg {
      forced-color-adjust: none;
    }
  }

  @media print {
    .plumb,
    .plumb.own,
    .plumb.dark {
      --p-paper: #ffffff;
      --p-wash: #ffffff;
      --p-ink: #000000;
      --p-ink-2: #333333;
      --p-ink-3: #4d4d4d;
      --p-line: #6e6e6e;
      --p-level: #6e6e6e;
      --p-hair: #bfbfbf;
      --p-band: #dcdcdc;
      --p-accent: #084b6b;
      --p-accent-band: #c9d6dd;
      --p-caution: #664700;
      --p-fault: #96200d;
      --p-size-4: 13px;
      --p-size-5: 15.5px;
      --p-size-6: 20px;
      --p-size-7: 30px;
      color-scheme: light;
      background: none;
      print-color-adjust: exact;
      -webkit-print-color-adjust: exact;
    }
  }
`;
