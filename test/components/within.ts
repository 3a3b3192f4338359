import { fixture, nextFrame } from '@open-wc/testing';
import type { TemplateResult } from 'lit';
import type { PlumbElement } from '../../components/plumb-element.js';

/** The root of an element's shadow tree. */
export const sheet = (element: PlumbElement): HTMLElement => element.shadowRoot!.querySelector<HTMLElement>('.plumb')!;

/** Its words as a reader sees them, white space as one space. */
export const words = (element: PlumbElement, selector = '.plumb'): string =>
  [...element.shadowRoot!.querySelectorAll(selector)]
    .map((node) => node.textContent ?? '')
    .join(' ')
    .replace(/\s+/g, ' ')
    .trim();

export const field = (element: PlumbElement, name: string): HTMLInputElement =>
  element.shadowRoot!.querySelector<HTMLInputElement>(`#f-${name}`)!;

export const button = (element: PlumbElement, name: string): HTMLButtonElement => {
  const found = [...element.shadowRoot!.querySelectorAll('button')].find((one) =>
    one.textContent?.trim().startsWith(name),
  );
  if (!found) throw new Error(`no button ${name}`);
  return found;
};

/** Types over a field and leaves it. */
export async function type(element: PlumbElement, name: string, text: string): Promise<void> {
  const one = field(element, name);
  one.value = text;
  one.dispatchEvent(new Event('input', { bubbles: true }));
  one.dispatchEvent(new Event('change', { bubbles: true }));
  await element.updateComplete;
}

/** An element in a box of a width, in px. */
export async function boxed<T extends Element>(template: TemplateResult, widthPx: number): Promise<T> {
  const box = document.createElement('div');
  box.style.width = `${widthPx}px`;
  box.style.background = '#ffffff';
  const element = await fixture<T>(template, { parentNode: box });
  await nextFrame();
  return element;
}

/** Anything in the shadow tree that sticks out of the element to the right. */
export const overflowing = (element: PlumbElement): readonly string[] => {
  const right = element.getBoundingClientRect().right + 1;
  return [...element.shadowRoot!.querySelectorAll('*')]
    .filter((node) => node.getBoundingClientRect().right > right && !node.closest('.only-spoken, thead'))
    .map((node) => `${node.localName}.${node.getAttribute('class') ?? ''}`);
};
