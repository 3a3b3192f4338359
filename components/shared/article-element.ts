import { html, nothing, type PropertyValues, type TemplateResult } from 'lit';
import type { Fault } from '../../lib/campaign/fault.js';
import { PlumbElement } from '../plumb-element.js';
import { type AttributeFault, faultBlock, faultList, tagAsRead } from './attribute-faults.js';
import { copyLine } from './copy-line.js';
import { plainText, type RichText, richText } from './rich-text.js';

export type Reading<Answer> =
  | { readonly ok: true; readonly answer: Answer }
  | { readonly ok: false; readonly faults: readonly Fault[] };

/** Detail of `plumb-change`: a reader has typed a value. `answer` null: it cannot be read. */
export interface PlumbChange {
  readonly name: string;
  readonly text: string;
  readonly answer: unknown;
}

declare global {
  interface HTMLElementEventMap {
    'plumb-change': CustomEvent<PlumbChange>;
  }
}

/** How long a half-typed value may stand before it counts as unreadable. */
const SETTLE_MS = 800;

const propertyOf = (attribute: string): string =>
  attribute.replace(/-(\w)/g, (_, letter: string) => letter.toUpperCase());

/** `1,5` may mean two numbers: both are said. */
const commaMeanings = (text: string): string => {
  const number = /\d+,\d+/.exec(text)?.[0];
  return number ? `; it could mean ${number.replace(',', '.')} or ${number.replace(',', '')}` : '';
};

const attributeFault = ({ code, path, found, expected, column }: Fault): AttributeFault => {
  const [wanted = expected, write = null] = expected.split(/: write /);
  const meanings = code === 'decimal-comma' ? commaMeanings(found) : '';
  const why = `${code.replaceAll('-', ' ')}${meanings === '' ? `; expected ${wanted}` : meanings}`;
  return {
    name: path,
    text: found === 'nothing' ? null : found,
    position: column === null ? null : column - 1,
    why,
    wanted,
    write,
  };
};
export interface FieldOptions {
  /** what is used, or wanted, where nothing is given */
  readonly placeholder?: string;
  /** words to choose from, instead of free text */
  readonly choices?: readonly string[];
  /** the choice of none of them */
  readonly unset?: string;
  /** label where no `<label>` stands */
  readonly spoken?: string;
}

/** An element that works from its attributes alone and whose values a reader can type over.
 *
 *  Stated values come from attributes (properties of the same name, camel case); what is typed stands over them, marked
 *  *edited*, until it is undone or the page changes the attribute. A value that cannot be read leaves the last good answer
 *  standing as stale; attributes at fault are shown as read, all at once, and nothing in place of a number. */
export abstract class ArticleElement<Answer> extends PlumbElement {
  protected override readonly inArticle = true;
  /** attribute names in the order of the form */
  protected abstract readonly names: readonly string[];
  /** values that show what the element does, for one who meets it empty */
  protected abstract readonly example: Readonly<Record<string, string>>;
  protected abstract readonly wanted: string;

  readonly #edits = new Map<string, string>();
  #reading: Reading<Answer> | null = null;
  #lastGood: Answer | null = null;
  #settled = true;
  #faultsAreLate = false;
  #timer: ReturnType<typeof setTimeout> | undefined;
  #copied: string | null = null;

  /** The answer now shown as valid; null while there is none. */
  get answer(): Answer | null {
    return this.#reading?.ok ? this.#reading.answer : null;
  }

  protected abstract read(texts: Readonly<Record<string, string | null>>): Reading<Answer>;
  protected abstract sentence(answer: Answer): RichText;
  protected abstract figures(answer: Answer | null): TemplateResult;
  protected abstract underFigures(answer: Answer): TemplateResult;
  /** The line to cite, without its end: who computed it and when. */
  protected abstract citation(answer: Answer): RichText;

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    clearTimeout(this.#timer);
  }

  protected stated(name: string): string | null {
    const text = (this as unknown as Record<string, unknown>)[propertyOf(name)];
    return typeof text === 'string' ? text : null;
  }

  /** The text in force: as typed, else as stated; null where there is none. */
  protected text(name: string): string | null {
    const text = this.#edits.get(name) ?? this.stated(name);
    return text === null || text.trim() === '' ? null : text;
  }

  protected override willUpdate(changed: PropertyValues): void {
    for (const name of this.names) if (changed.has(propertyOf(name))) this.#edits.delete(name);
    const texts = Object.fromEntries(this.names.map((name) => [name, this.text(name)]));
    const empty = Object.values(texts).every((text) => text === null);
    const wasFailed = this.#reading?.ok === false;
    this.#reading = empty ? null : this.read(texts);
    if (this.#reading === null) this.#lastGood = null;
    else if (this.#reading.ok) this.#lastGood = this.#reading.answer;
    else if (!wasFailed) this.#faultsAreLate = this.hasUpdated;
  }

  // --- what a reader does

  #type(name: string, text: string, settled: boolean): void {
    const before = this.text(name);
    if (text === (this.stated(name) ?? '')) this.#edits.delete(name);
    else this.#edits.set(name, text);
    this.#copied = null;
    this.#settled = settled;
    clearTimeout(this.#timer);
    if (!settled) this.#timer = setTimeout(() => this.#settle(), SETTLE_MS);
    this.requestUpdate();
    if (this.text(name) !== before)
      void this.updateComplete.then(() => {
        const detail: PlumbChange = { name, text, answer: this.answer };
        this.dispatchEvent(new CustomEvent('plumb-change', { detail, bubbles: true, composed: true }));
      });
  }

  #settle(): void {
    this.#settled = true;
    this.requestUpdate();
  }

  /** Makes the field of a value visible, where the form can be folded away. */
  protected reveal(): void {}

  async #focus(name: string): Promise<void> {
    this.reveal();
    await this.updateComplete;
    this.renderRoot.querySelector<HTMLElement>(`#f-${name}`)?.focus();
  }

  #set(name: string, text: string): void {
    this.#type(name, text, true);
    void this.#focus(name);
  }

  #showExample(): void {
    for (const [name, text] of Object.entries(this.example)) this.#edits.set(name, text);
    this.requestUpdate();
    void this.#focus(this.names[0]!);
  }

  async #copy(text: string): Promise<void> {
    const line = this.renderRoot.querySelector('.cite p');
    if (!line) return;
    const done = await copyLine(text, line);
    this.#copied = done === 'copied' ? 'copied' : 'marked; copy it with Ctrl+C';
    this.requestUpdate();
  }

  // --- what is shown

  #faultOf(name: string): AttributeFault | null {
    if (this.#reading === null || this.#reading.ok) return null;
    const fault = this.#reading.faults.find(({ path }) => path === name);
    return fault ? attributeFault(fault) : null;
  }

  /** What stands under a field: that it is edited, or why it cannot be read. */
  #underField(name: string): TemplateResult | typeof nothing {
    const edited = this.#edits.has(name);
    const fault = this.#settled ? this.#faultOf(name) : null;
    const stated = this.stated(name);
    if (!edited && (!fault || stated !== null)) return nothing;
    const undo = edited
      ? html`<p class="sub">
          <span class="edw">edited</span>${stated === null ? nothing : html`, was <span class="was">${stated}</span>`}
          <button type="button" class="word" @click=${() => this.#set(name, stated ?? '')}>Undo</button>
        </p>`
      : nothing;
    return html`<div id="n-${name}" class="under">
      ${
        fault && edited
          ? html`<div class="flt" role="alert">
              ${faultList(fault, false)}
              ${
                fault.write === null
                  ? nothing
                  : html`<button type="button" class="btn" @click=${() => this.#set(name, fault.write ?? '')}>
                      Write ${fault.write}
                    </button>`
              }
            </div>`
          : nothing
      }
      ${undo}
      ${fault && !edited ? html`<p class="sub dim">still wanted: ${fault.wanted}</p>` : nothing}
    </div>`;
  }

  /** The field of one value and what is to be said about it. @param choices words to choose from; null: free text */
  protected field(name: string, options: FieldOptions = {}): TemplateResult {
    const { placeholder = '', choices = null, unset = 'none', spoken } = options;
    const text = this.#edits.get(name) ?? this.stated(name) ?? '';
    const invalid = this.#settled && this.#faultOf(name) !== null ? 'true' : 'false';
    const under = this.#underField(name);
    const describedBy = under === nothing ? nothing : `n-${name}`;
    const field = choices
      ? html`<select
          class="field ${this.#edits.has(name) ? 'ed' : ''}"
          id="f-${name}"
          aria-label=${spoken ?? nothing}
          aria-invalid=${invalid}
          aria-describedby=${describedBy}
          @change=${(event: Event) => this.#type(name, (event.target as HTMLSelectElement).value, true)}
        >
          ${[...(text === '' || choices.includes(text) ? [] : [text]), ...choices].map(
            (choice) => html`<option value=${choice} ?selected=${choice === text}>${choice}</option>`,
          )}
          <option value="" ?selected=${text === ''}>${unset}</option>
        </select>`
      : html`<input
          class="field ${this.#edits.has(name) ? 'ed' : ''}"
          id="f-${name}"
          type="text"
          autocomplete="off"
          autocapitalize="off"
          spellcheck="false"
          placeholder=${placeholder}
          aria-label=${spoken ?? nothing}
          aria-invalid=${invalid}
          aria-describedby=${describedBy}
          .value=${text}
          @input=${(event: Event) => this.#type(name, (event.target as HTMLInputElement).value, false)}
          @change=${(event: Event) => this.#type(name, (event.target as HTMLInputElement).value, true)}
        />`;
    return html`${field}${under}`;
  }

  /** A row of the form: label and field. */
  protected fieldRow(name: string, label: TemplateResult | string, options: FieldOptions = {}): TemplateResult {
    return html`<tr class="in ${this.#edits.has(name) ? 'ed' : ''} ${this.text(name) === null ? 'no-print' : ''}">
      <th scope="row"><label for="f-${name}">${label}</label></th>
      <td colspan="2">${this.field(name, options)}</td>
    </tr>`;
  }

  /** The numbers shown are those before an edit that cannot be read. */
  protected get isStale(): boolean {
    return this.#reading !== null && !this.#reading.ok && this.#settled;
  }

  protected isEdited(name: string): boolean {
    return this.#edits.has(name);
  }

  protected cite(answer: Answer, computed: string): TemplateResult {
    const parts: RichText = [...this.citation(answer), `; ${computed}.`];
    return html`<div class="cite">
      <p>${richText(parts)}</p>
      <div class="no-print">
        <button type="button" class="btn" @click=${() => this.#copy(plainText(parts))}>Copy this line</button>
        <p class="dim" role="status">${this.#copied ?? ''}</p>
      </div>
    </div>`;
  }

  #answered(answer: Answer): TemplateResult {
    return html`<p class="s1">${richText(this.sentence(answer))}</p>
      ${this.figures(answer)} ${this.underFigures(answer)}`;
  }

  #stale(answer: Answer, faults: readonly Fault[]): TemplateResult {
    return html`<div class="stale">
        <p class="s1">${richText(this.sentence(answer))}</p>
        <p class="tagc">before the last edit, which cannot be read</p>
        <p>
          <button type="button" class="btn" @click=${() => void this.#focus(faults[0]!.path)}>Go to the field</button>
        </p>
      </div>
      ${this.figures(answer)}`;
  }

  #failed(faults: readonly Fault[]): TemplateResult {
    const stated = faults.filter(({ path }) => !this.#edits.has(path)).map(attributeFault);
    const given = this.names.flatMap((name) => {
      const text = this.stated(name);
      return text === null ? [] : [[name, text] as const];
    });
    // typed into an element that was empty: its fields say themselves what they still want
    if (given.length === 0) return html`<p class="s1">${this.wanted}</p>${this.figures(null)}`;
    return html`${tagAsRead(this.localName, given, stated)}
      ${stated.length > 0 ? faultBlock(stated, this.#faultsAreLate) : nothing} ${this.figures(null)}`;
  }

  protected override content(): TemplateResult {
    const reading = this.#reading;
    if (reading === null)
      return html`<div class="pf">
        <slot></slot>
        <p class="s1 no-print">${this.wanted}</p>
        <p class="no-print">
          <button type="button" class="btn" @click=${() => this.#showExample()}>Fill in an example</button>
        </p>
        ${this.figures(null)}
      </div>`;
    if (reading.ok) return html`<div class="pf">${this.#answered(reading.answer)}</div>`;
    const editsAlone =
      this.#edits.size > 0 && reading.faults.every(({ path, code }) => this.#edits.has(path) || code === 'missing');
    if (this.#lastGood !== null && editsAlone)
      return html`<div class="pf">
        ${this.#settled ? this.#stale(this.#lastGood, reading.faults) : this.#answered(this.#lastGood)}
      </div>`;
    return html`<div class="pf">${this.#failed(reading.faults)}</div>`;
  }
}
