import { html, type TemplateResult } from 'lit';
import { type BudgetExport, budgetCsv, budgetReport } from '../../lib/report/budget-export.js';
import { budgetSvg } from '../../lib/report/budget-export-svg.js';
import { markup } from '../../lib/report/markup.js';

/** Forms in which a budget leaves the page. */
export const EXPORT_FORMS = ['Markdown', 'MediaWiki', 'LaTeX', 'HTML', 'CSV', 'SVG'] as const;
export type ExportForm = (typeof EXPORT_FORMS)[number];

const FILES: Readonly<Record<ExportForm, { readonly ending: string; readonly type: string }>> = {
  Markdown: { ending: 'md', type: 'text/markdown' },
  MediaWiki: { ending: 'wiki.txt', type: 'text/plain' },
  LaTeX: { ending: 'tex', type: 'application/x-tex' },
  HTML: { ending: 'html', type: 'text/html' },
  CSV: { ending: 'csv', type: 'text/csv' },
  SVG: { ending: 'svg', type: 'image/svg+xml' },
};

export function exportText(form: ExportForm, budget: BudgetExport): string {
  switch (form) {
    case 'CSV':
      return budgetCsv(budget);
    case 'SVG':
      return budgetSvg(budget);
    case 'Markdown':
      return markup.markdown.report(budgetReport(budget));
    case 'MediaWiki':
      return markup.mediawiki.report(budgetReport(budget));
    case 'LaTeX':
      return markup.latex.report(budgetReport(budget));
    case 'HTML':
      return markup.html.report(budgetReport(budget));
  }
}

/** Hands the text to the reader as a file. */
export function save(form: ExportForm, text: string, link: string): void {
  const { ending, type } = FILES[form];
  const address = URL.createObjectURL(new Blob([text], { type: `${type};charset=utf-8` }));
  const anchor = document.createElement('a');
  anchor.href = address;
  anchor.download = `budget-${link.replace(/[^\w-]+/g, '_')}.${ending}`;
  anchor.click();
  setTimeout(() => URL.revokeObjectURL(address), 1000);
}

interface ExportContext {
  readonly form: ExportForm;
  readonly text: string;
  /** what became of the last copy; '' before */
  readonly status: string;
  choose(form: ExportForm): void;
  copy(): void;
  save(): void;
}

/** The budget as text to take away: a form, the text itself, copy and save. */
export function exportView({ form, text, status, choose, copy, save: keep }: ExportContext): TemplateResult {
  return html`<div class="export no-print">
    <fieldset class="fac wide">
      <legend class="only-spoken">form</legend>
      ${EXPORT_FORMS.map(
        (one) => html`<label
          ><input type="radio" name="form" .checked=${one === form} @change=${() => choose(one)} /><span>${one}</span></label
        >`,
      )}
    </fieldset>
    <pre tabindex="0" aria-label=${`Budget as ${form}`}>${text}</pre>
    <p class="buttons">
      <button type="button" class="btn" @click=${copy}>Copy</button>
      <button type="button" class="btn" @click=${keep}>Save</button>
      <span class="dim" role="status">${status}</span>
    </p>
  </div>`;
}
