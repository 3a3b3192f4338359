import { type CSSResultGroup, css, html, nothing, type TemplateResult } from 'lit';
import { CampaignError } from '../../lib/campaign/fault.js';
import { hasFragment, readFragment } from '../../lib/campaign/fragment.js';
import { PlumbElement } from '../plumb-element.js';

/** What is shown where the address does not say. */
const USUAL = ['section', 'links'];
/** Elements that show a campaign, as an address names them. */
export const SHOWABLE = [
  'section',
  'links',
  'budget',
  'averaging',
  'tide',
  'map',
  'break-even',
  'network',
  'report',
] as const;

/** What a page shows when it is opened with a campaign behind the # of its address: the elements that the address names, and
 *  nothing else of the page. In a frame it tells the page round it how high it is, a number and no more.
 *
 *  `<plumb-embed>…what the page is without a campaign in its address…</plumb-embed>`
 *
 * @slot What the page is without a campaign in its address.
 * @csspart base The sheet. */
export class PlumbEmbed extends PlumbElement {
  static override styles: CSSResultGroup = [
    PlumbElement.styles,
    css`
      .one + .one {
        margin-top: var(--p-space-6);
      }
    `,
  ];

  readonly #observer = new ResizeObserver(() => this.#tellHeight());
  #told = 0;

  override connectedCallback(): void {
    super.connectedCallback();
    window.addEventListener('hashchange', this.#followAddress);
    this.#observer.observe(this);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    window.removeEventListener('hashchange', this.#followAddress);
    this.#observer.disconnect();
  }

  readonly #followAddress = (): void => this.requestUpdate();

  /** To whatever page it stands in: the receiver knows the frame, and a height is no secret. */
  #tellHeight(): void {
    if (window.parent === window || !hasFragment(location.hash)) return;
    const { marginTop, marginBottom } = getComputedStyle(document.body);
    const margins = Number.parseFloat(marginTop) + Number.parseFloat(marginBottom);
    const height = Math.ceil(document.body.getBoundingClientRect().height + margins);
    if (height === this.#told || !(height > 0)) return;
    this.#told = height;
    window.parent.postMessage(height, '*');
  }

  /** Names that the address asks for; those that this page doesn't know apart. */
  #asked(): { readonly known: readonly string[]; readonly unknown: readonly string[] } {
    let show: readonly string[] = [];
    try {
      show = readFragment(location.hash)?.show ?? [];
    } catch (error) {
      // the campaign below says in place what is wrong with the address
      if (!(error instanceof CampaignError)) throw error;
    }
    const asked = show.length === 0 ? USUAL : show;
    const isKnown = (name: string) =>
      (SHOWABLE as readonly string[]).includes(name) && customElements.get(`plumb-${name}`) !== undefined;
    return { known: asked.filter(isKnown), unknown: asked.filter((name) => !isKnown(name)) };
  }

  protected override content(): TemplateResult {
    if (!hasFragment(location.hash)) return html`<slot></slot>`;
    const { known, unknown } = this.#asked();
    const elements = known.map((name) => {
      const element = document.createElement(`plumb-${name}`);
      element.className = 'one';
      return element;
    });
    return html`${
      unknown.length === 0
        ? nothing
        : html`<div class="flt">
              <p class="hd">Not shown: ${unknown.join(', ')}</p>
              <p>The address may ask for ${SHOWABLE.join(', ')}: <code>show=section,links</code>.</p>
            </div>`
    }
      <plumb-campaign fragment>${elements}</plumb-campaign>`;
  }
}
