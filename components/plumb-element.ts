import { type CSSResultGroup, html, LitElement, type TemplateResult } from 'lit';
import { figureStyles } from './theme/figure-styles.js';
import { sharedStyles } from './theme/shared-styles.js';
import { ThemeController } from './theme/theme-controller.js';
import { tokens } from './theme/tokens.js';

/** Ground of every element: the sheet with its palette, in step with the page round it. */
export abstract class PlumbElement extends LitElement {
  static override styles: CSSResultGroup = [tokens, sharedStyles, figureStyles];

  readonly #theme = new ThemeController(this);
  /** True for the elements that live in an article: they take its typeface. */
  protected readonly inArticle: boolean = false;

  /** What stands on the sheet. */
  protected abstract content(): TemplateResult;

  protected override render(): TemplateResult {
    const { theme, ownGround } = this.#theme;
    return html`<div
      class="plumb ${theme} ${ownGround ? 'own' : ''} ${this.inArticle ? 'article' : ''}"
      part="base"
    >
      ${this.content()}
    </div>`;
  }
}
