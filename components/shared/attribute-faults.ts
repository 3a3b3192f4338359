import { html, nothing, type TemplateResult } from 'lit';

/** An attribute or a field that cannot be read. */
export interface AttributeFault {
  /** attribute name */
  readonly name: string;
  /** the text as given; null where nothing was given and something must be */
  readonly text: string | null;
  /** index of the character at fault in `text`; null: the whole text */
  readonly position: number | null;
  readonly why: string;
  /** what would be right, in words */
  readonly wanted: string;
  /** the text that would be right; null if it cannot be told */
  readonly write: string | null;
}

/** The text with a wavy underline at the character at fault. */
export function markedText({ text, position }: AttributeFault): TemplateResult {
  const given = text ?? '';
  if (given === '') return html`<span class="bad">nothing</span>`;
  if (position === null) return html`<span class="bad">${given}</span>`;
  // a place behind the last character: something is missing there
  if (position >= given.length) return html`${given}<span class="bad">&nbsp;</span>`;
  const end = position + ((given.codePointAt(position) ?? 0) > 0xffff ? 2 : 1);
  return html`${given.slice(0, position)}<span class="bad">${given.slice(position, end)}</span>${given.slice(end)}`;
}

/** The tag as it stands in the page, its faults underlined. */
export function tagAsRead(
  tag: string,
  attributes: readonly (readonly [name: string, text: string])[],
  faults: readonly AttributeFault[],
): TemplateResult {
  const faultOf = (name: string) => faults.find((fault) => fault.name === name);
  return html`<pre>&lt;${tag}${attributes.map(([name, text], i) => {
    const fault = faultOf(name);
    return html`${i === 0 ? ' ' : '\n  '}${name}="${fault ? markedText({ ...fault, text }) : text}"`;
  })}&gt;</pre>`;
}

/** Read, why, write: one list per fault. @param asAttribute how to write it in the page, else as typed into a field */
export const faultList = (fault: AttributeFault, asAttribute: boolean): TemplateResult => html`<dl>
  <dt>${asAttribute ? fault.name : 'read'}</dt>
  <dd><b>${asAttribute ? (fault.text ?? 'nothing') : markedText(fault)}</b></dd>
  <dt>why</dt>
  <dd>${fault.why}</dd>
  ${
    fault.write === null
      ? nothing
      : html`<dt>write</dt>
          <dd><code>${asAttribute ? `${fault.name}="${fault.write}"` : fault.write}</code></dd>`
  }
</dl>`;

/** All faults at once. `late`: they appeared after the page was loaded, so they are announced. */
export const faultBlock = (faults: readonly AttributeFault[], late: boolean): TemplateResult => html`<div
  class="flt"
  role=${late ? 'alert' : nothing}
>
  <p class="hd">
    Not computed: ${faults.length === 1 ? '1 attribute' : `${faults.length} attributes`} cannot be read
  </p>
  ${faults.map((fault) => faultList(fault, true))}
</div>`;
