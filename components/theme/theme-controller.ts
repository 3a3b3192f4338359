import type { ReactiveController, ReactiveControllerHost } from 'lit';

export type Theme = 'light' | 'dark';

/** Palette, and whether the element has to paint its own paper because the page's ground would not carry it. */
export interface Surroundings {
  readonly theme: Theme;
  readonly ownGround: boolean;
}

type Host = ReactiveControllerHost & HTMLElement;

const mounted = new Set<ThemeController>();
const prefersDark = matchMedia('(prefers-color-scheme: dark)');
const refresh = () => {
  for (const controller of mounted) controller.update();
};
const observer = new MutationObserver(refresh);

const startWatching = () => {
  prefersDark.addEventListener('change', refresh);
  // A wiki switches its night mode by a class or a style on <html> or <body>; our own pages by data-theme anywhere.
  observer.observe(document, { attributes: true, subtree: true, attributeFilter: ['data-theme'] });
  for (const root of [document.documentElement, document.body])
    observer.observe(root, { attributes: true, attributeFilter: ['data-theme', 'class', 'style'] });
};

const stopWatching = () => {
  prefersDark.removeEventListener('change', refresh);
  observer.disconnect();
};

/** The parent across shadow roots. */
const parentOf = (node: Element): Element | null => {
  if (node.assignedSlot) return node.assignedSlot;
  if (node.parentElement) return node.parentElement;
  const root = node.getRootNode();
  return root instanceof ShadowRoot ? root.host : null;
};

/** Perceived lightness 0…1 of `rgb(…)`; null where nothing opaque is painted. */
const lightness = (color: string): number | null => {
  const parts = color.match(/[\d.]+/g)?.map(Number);
  if (!color.startsWith('rgb') || !parts || parts.length < 3) return null;
  const [red = 0, green = 0, blue = 0, alpha = 1] = parts;
  return alpha < 0.5 ? null : (0.2126 * red + 0.7152 * green + 0.0722 * blue) / 255;
};

/** Grounds on which the palettes keep their contrast: nearly white, nearly black. */
const LIGHT_ENOUGH = 0.93;
const DARK_ENOUGH = 0.13;

const statedTheme = (element: Element): Theme | null => {
  for (let node: Element | null = element; node; node = parentOf(node)) {
    const stated = node.getAttribute('data-theme');
    if (stated === 'light' || stated === 'dark') return stated;
  }
  return null;
};

const pageGround = (element: Element): number | null => {
  for (let node = parentOf(element); node; node = parentOf(node)) {
    const { backgroundColor, backgroundImage } = getComputedStyle(node);
    const ground = lightness(backgroundColor);
    if (ground !== null) return ground;
    if (backgroundImage !== 'none') return null;
  }
  return null;
};

/** Which palette fits the place where the element stands: the nearest `data-theme`; else the page's own evidence, the ground
 *  it paints or its `color-scheme`; else what the reader's system prefers. */
const surroundingsOf = (element: Element): Surroundings => {
  const ground = pageGround(element);
  const scheme = getComputedStyle(element).colorScheme;
  const theme =
    statedTheme(element) ??
    (ground !== null ? (ground < 0.5 ? 'dark' : 'light') : null) ??
    (scheme === 'light' || scheme === 'dark' ? scheme : null) ??
    (prefersDark.matches ? 'dark' : 'light');
  const carried = ground !== null && (theme === 'light' ? ground >= LIGHT_ENOUGH : ground <= DARK_ENOUGH);
  return { theme, ownGround: !carried };
};

/** Keeps the palette of an element in step with the page round it. */
export class ThemeController implements ReactiveController {
  theme: Theme = 'light';
  ownGround = true;
  readonly #host: Host;

  constructor(host: Host) {
    this.#host = host;
    host.addController(this);
  }

  hostConnected(): void {
    if (mounted.size === 0) startWatching();
    mounted.add(this);
    this.update();
  }

  hostDisconnected(): void {
    mounted.delete(this);
    if (mounted.size === 0) stopWatching();
  }

  update(): void {
    const { theme, ownGround } = surroundingsOf(this.#host);
    if (theme === this.theme && ownGround === this.ownGround) return;
    this.theme = theme;
    this.ownGround = ownGround;
    this.#host.requestUpdate();
  }
}
