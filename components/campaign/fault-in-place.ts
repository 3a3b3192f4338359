import { html, nothing, type TemplateResult } from 'lit';
import type { Fault } from '../../lib/campaign/fault.js';

/** Characters of the file shown before and after the one at fault. */
const BEFORE = 32;
const AFTER = 36;

/** The piece of the line with the text at fault underlined. */
function excerpt(line: string, column: number, found: string): TemplateResult {
  const at = Math.min(column - 1, line.length);
  const from = Math.max(0, at - BEFORE);
  // what was found stands there word for word, or only its first character is known to be at fault
  const length = line.startsWith(found, at) ? Math.min(found.length, AFTER) : 1;
  const bad = line.slice(at, at + length);
  const after = line.slice(at + length, at + AFTER);
  return html`<code
    >${from > 0 ? '…' : nothing}${line.slice(from, at).trimStart()}<span class="bad">${bad === '' ? '\u00a0' : bad}</span
    >${after}${at + AFTER < line.length ? '…' : nothing}</code
  >`;
}

/** One fault of a campaign file: where, what was read, why not, what to write. @param lines of the file, if it was read */
export function faultInPlace(
  { code, path, line, column, found, expected }: Fault,
  lines: readonly string[] | null,
): TemplateResult {
  const [wanted = expected, write = null] = expected.split(/: write /);
  const text = line === null ? undefined : lines?.[line - 1];
  return html`<dl>
    <dt>${line === null ? 'at' : `line ${line}`}</dt>
    <dd>
      <b>${path === '' ? 'the file' : path}</b>${column === null ? nothing : html`<span class="dim">, column ${column}</span>`}
      ${text === undefined || column === null ? nothing : html`<br />${excerpt(text, column, found)}`}
    </dd>
    <dt>read</dt>
    <dd>${found}</dd>
    <dt>why</dt>
    <dd>${code.replaceAll('-', ' ')}; expected ${wanted}</dd>
    ${
      write === null
        ? nothing
        : html`<dt>write</dt>
            <dd><code>${write}</code></dd>`
    }
  </dl>`;
}
