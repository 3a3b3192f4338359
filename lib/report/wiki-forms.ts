import { reportAsHtml } from './as-html.js';
import { reportAsLatex } from './as-latex.js';
import { reportAsMarkdown } from './as-markdown.js';
import { reportAsMediaWiki } from './as-mediawiki.js';
import type { Report } from './table.js';

/** A way to put a campaign into a wiki. */
export type WikiForm = 'script' | 'iframe' | 'markdown' | 'mediawiki' | 'html' | 'latex';

/** What the text of a form is made from. */
export interface WikiSource {
  /** text of the campaign file */
  readonly campaign: string;
  readonly report: Report;
  /** names of the elements to show, without `plumb-` */
  readonly show: readonly string[];
  /** id of the link in hand; null: none */
  readonly link: string | null;
  /** address of the script on the server of the wiki */
  readonly script: string;
  /** address of the single page, campaign and all */
  readonly address: string;
}

/** Text to paste, for one of the forms. */
export function wikiText(form: WikiForm, source: WikiSource): string {
  switch (form) {
    case 'script':
      return scriptText(source);
    case 'iframe':
      return iframeText(source);
    case 'markdown':
      return reportAsMarkdown(source.report);
    case 'mediawiki':
      return reportAsMediaWiki(source.report);
    case 'html':
      return reportAsHtml(source.report);
    case 'latex':
      return reportAsLatex(source.report);
  }
}

const attribute = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('"', '&quot;').replaceAll('<', '&lt;');

/** One script per page, and the campaign inside its element: this works where a policy forbids every request, and from disk. */
function scriptText({ campaign, show, link, script, report }: WikiSource): string {
  // inside a script element only its end would end it
  const json = campaign.trim().replaceAll('<', '\\u003c');
  const inHand = link === null ? '' : ` link="${attribute(link)}"`;
  return [
    `<script src="${attribute(script)}" defer></script>`,
    `<plumb-campaign${inHand}>`,
    '<script type="application/json">',
    json,
    '</script>',
    `<p>${attribute(report.sentences.join(' '))}</p>`,
    ...show.map((name) => `<plumb-${name}></plumb-${name}>`),
    '</plumb-campaign>',
    '',
  ].join('\n');
}

/** A frame without rights of its own: no cookies, no storage, no way out. The second element lets it grow to its height. */
function iframeText({ address, report }: WikiSource): string {
  return [
    `<iframe id="plumb" title="${attribute(report.title)}" src="${attribute(address)}"`,
    '  sandbox="allow-scripts" width="100%" height="900" loading="lazy" frameborder="0"></iframe>',
    '<!-- where the wiki allows a script, the frame grows to its height: -->',
    '<script>addEventListener("message", (e) => {',
    '  const frame = document.getElementById("plumb");',
    '  if (e.source === frame.contentWindow && typeof e.data === "number") frame.height = e.data;',
    '});</script>',
    '',
  ].join('\n');
}
