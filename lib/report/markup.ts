import { reportAsHtml, tableAsHtml } from './as-html.js';
import { reportAsLatex, tableAsLatex } from './as-latex.js';
import { reportAsMarkdown, tableAsMarkdown } from './as-markdown.js';
import { reportAsMediaWiki, tableAsMediaWiki } from './as-mediawiki.js';
import type { Report, Table } from './table.js';

/** Forms in which a page, a wiki or a paper takes a report: text with markup, for people to read. */
export const markupForms = ['markdown', 'mediawiki', 'latex', 'html'] as const;
export type MarkupForm = (typeof markupForms)[number];

export const markup: Readonly<
  Record<MarkupForm, { readonly table: (table: Table) => string; readonly report: (report: Report) => string }>
> = {
  markdown: { table: tableAsMarkdown, report: reportAsMarkdown },
  mediawiki: { table: tableAsMediaWiki, report: reportAsMediaWiki },
  latex: { table: tableAsLatex, report: reportAsLatex },
  html: { table: tableAsHtml, report: reportAsHtml },
};
