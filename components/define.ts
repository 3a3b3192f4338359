/** Registers an element once: a wiki may include the script twice, and the first one stays. */
export function define(name: string, element: CustomElementConstructor): void {
  if (!customElements.get(name)) customElements.define(name, element);
}
