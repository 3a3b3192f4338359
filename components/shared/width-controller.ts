import type { ReactiveController, ReactiveControllerHost } from 'lit';

/** Figures are drawn for the width they stand in, never scaled. Steps that small are not worth drawing anew for. */
const STEP_PX = 8;
/** A4 inside its margins, 178 mm at 96 px per inch: no element can measure the paper before it is printed on. */
const PAPER_PX = 672;
/** Where the element isn't laid out yet. */
const UNKNOWN_PX = 960;

const printing = matchMedia('print');

/** Width of an element in px, in steps, drawn anew when it changes and for paper when it is printed. */
export class WidthController implements ReactiveController {
  /** px; on paper that of a sheet of A4 */
  width = UNKNOWN_PX;
  readonly #host: ReactiveControllerHost & HTMLElement;
  // in the next frame: drawing anew changes the height, which must not be told while widths are still being told
  readonly #observer = new ResizeObserver(() => requestAnimationFrame(this.#measure));

  constructor(host: ReactiveControllerHost & HTMLElement) {
    this.#host = host;
    host.addController(this);
  }

  readonly #measure = (): void => {
    const measured = this.#host.getBoundingClientRect().width;
    // not laid out (display: none): what was measured last still holds
    if (measured === 0) return;
    const fitted = printing.matches ? Math.min(PAPER_PX, measured) : measured;
    const width = Math.floor(fitted / STEP_PX) * STEP_PX;
    if (width === this.width) return;
    this.width = width;
    this.#host.requestUpdate();
  };

  hostConnected(): void {
    this.#observer.observe(this.#host);
    printing.addEventListener('change', this.#measure);
    this.#measure();
  }

  hostDisconnected(): void {
    this.#observer.disconnect();
    printing.removeEventListener('change', this.#measure);
  }
}
