import { type CSSResultGroup, html, nothing, type TemplateResult } from 'lit';
import type { Prediction } from '../../lib/answers/prediction.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { W0_IHRS } from '../../lib/constants/defining-constants.js';
import { version } from '../../lib/constants/version.js';
import { formatConcise, formatInstant, formatLength } from '../../lib/quantity/index.js';
import type { CampaignReport, Chapter } from '../../lib/report/campaign-report.js';
import { type LinkRow, linkRows, NONE } from '../links/link-rows.js';
import { shortReason } from '../links/links-words.js';
import { PlumbElement } from '../plumb-element.js';
import { CampaignElement } from '../shared/campaign-element.js';
import { alignedNumber, pointColumn, quantityText } from '../shared/number.js';
import { computedBy } from '../shared/provenance.js';
import { reportTable } from '../shared/report-table.js';
import { richText } from '../shared/rich-text.js';
import { warningList } from '../shared/warnings.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { answersFor, reportOf } from './report-of.js';
import { reportStyles } from './report-styles.js';

/** The whole campaign as a page to print. The first sheet holds question, answer, section, links, what limits and what to bear in
 *  mind; the inputs follow on the last. Nothing is in hand on paper, so nothing is in accent.
 *
 *  Inside a `<plumb-campaign>`. For page numbers and margins the page round it sets `@page`.
 *
 * @slot Fallback: what the page shows without script.
 * @csspart base The sheet.
 * @csspart paper Each sheet of paper.
 * @csspart provenance The line that says who computed it and when. */
export class PlumbReport extends CampaignElement {
  static override styles: CSSResultGroup = [PlumbElement.styles, reportStyles];

  /** It stands on the paper itself. */
  protected override get signed(): boolean {
    return false;
  }

  #block(campaign: Campaign, { combination }: Prediction): TemplateResult {
    const { window, targetM, effectM } = campaign;
    const day = (ms: number) => formatInstant(ms).slice(0, 10);
    const lengths = [targetM, effectM ?? (targetM === null ? null : 10 * targetM)];
    const entries: readonly (readonly [TemplateResult | string, TemplateResult | string])[] = [
      ['window', window ? `${day(window.startMs)} to ${day(window.endMs)}` : 'none'],
      ['permanent tide', campaign.tide],
      [html`<i class="s">W</i><sub>0</sub>, IHRS`, quantityText(`${formatConcise(W0_IHRS.value, null)} m²/s²`)],
      ['target, effect', lengths.map((m) => (m === null ? 'none' : formatLength(m, 2))).join(', ')],
      [
        'combination',
        combination
          ? html`<i class="s">χ</i>² ${combination.chi2.toPrecision(2)}, ${combination.dof} dof`
          : 'nothing redundant',
      ],
      ['version', version],
    ];
    return html`<dl class="block">${entries.map(([name, value]) => html`<div><dt>${name}</dt><dd>${value}</dd></div>`)}</dl>`;
  }

  #links({ campaign, prediction }: AnsweredCampaign): TemplateResult {
    const { evaluation, plan } = answersFor(campaign);
    const rows = linkRows(campaign, prediction, evaluation);
    const keys = evaluation
      ? (['length', 'potential', 'offset', 'measured', 'differenceLength'] as const)
      : (['length', 'potential', 'offset', 'normalHeight'] as const);
    const heads = {
      length: html`length <span class="nb">/ m</span>`,
      potential: html`Δ<i class="s">W</i> <span class="nb">/ m²/s²</span>`,
      offset: html`<i class="s">y</i> <span class="nb">/ 1e-18</span>`,
      measured: html`measured <span class="nb">/ 1e-18</span>`,
      differenceLength: html`difference <span class="nb">/ mm</span>`,
      normalHeight: html`normal height <span class="nb">/ m</span>`,
    };
    const widths = keys.map((key) => pointColumn(rows.flatMap(({ texts }) => texts[key])));
    const verdict = ({ evaluation: one, id }: LinkRow) => {
      if (one)
        return html`<span class="v v-${one.verdict ?? 'none'}">${one.verdict ?? (one.residual ? 'no verdict' : 'not computed')}</span>
          <small>${richText(shortReason(one))}</small>`;
      const planned = campaign.window ? plan.links.find((link) => link.id === id)?.smallestDetectable : null;
      return html`<span class="v">not measured</span>${planned == null ? nothing : html`<small>Planned: ${formatLength(planned, 2)} would show.</small>`}`;
    };
    return html`<table class="links">
      <caption class="only-spoken">Links</caption>
      <thead>
        <tr>
          <th scope="col">link</th>
          ${keys.map((key) => html`<th scope="col" class="num">${heads[key]}</th>`)}
          ${evaluation ? html`<th scope="col" class="vd">verdict</th>` : nothing}
        </tr>
      </thead>
      <tbody>
        ${rows.map(
          (row) => html`<tr>
            <th scope="row"><b>${row.id}</b><small>${row.description}</small></th>
            ${keys.map(
              (key, i) => html`<td>
                ${row.texts[key].map((text) => (text === NONE ? html`<span class="none">${NONE}</span>` : alignedNumber(text, widths[i]!)))}
              </td>`,
            )}
            ${evaluation ? html`<td class="vd">${verdict(row)}</td>` : nothing}
          </tr>`,
        )}
      </tbody>
    </table>`;
  }

  #foot(title: string): TemplateResult {
    return html`<p class="foot" part="provenance"><span>${title}</span><span>${computedBy()}</span></p>`;
  }

  #first(answered: AnsweredCampaign, report: CampaignReport): TemplateResult {
    const { campaign, prediction } = answered;
    return html`<div class="paper" part="paper" data-theme="light">
      <div class="head">
        <h1>${report.title}</h1>
        <p class="question">${report.question}</p>
        <p class="answer">${report.sentences.join(' ')}</p>
      </div>
      ${this.#block(campaign, prediction)}
      <h2>1 Section</h2>
      <plumb-section bare link=""></plumb-section>
      <h2 class="rule">2 Links</h2>
      ${this.#links(answered)}
      <p class="fn">
        Length is the length equivalent of Δ<i class="s">W</i>, not a height difference. A second line is what unlike transitions add
        before the difference is taken.
      </p>
      <div class="two">
        <div>
          <h2 class="rule">3 What limits</h2>
          <table class="limits">
            <caption class="only-spoken">Largest shares of the variance of each link</caption>
            <tbody>
              ${report.limits.map(({ link, shares }) => html`<tr><th scope="row"><b>${link}</b></th><td>${shares.join('; ')}</td></tr>`)}
            </tbody>
          </table>
        </div>
        <div>
          <h2 class="rule">4 Read with care</h2>
          <ul class="care">${report.care.map((note) => html`<li>${note}</li>`)}</ul>
        </div>
      </div>
      ${this.#foot(report.title)}
    </div>`;
  }

  #drawing({ id }: Chapter, campaign: Campaign): TemplateResult | typeof nothing {
    if (id === 'tide') return html`<plumb-tide bare link=""></plumb-tide>`;
    if (id === 'potentials' && campaign.sites.length > 1) return html`<plumb-map bare link=""></plumb-map>`;
    return nothing;
  }

  protected override answered(answered: AnsweredCampaign): TemplateResult {
    const { campaign, warnings } = answered;
    const report = reportOf(answered, computedBy());
    const chapters = report.chapters.map((chapter, i) => ({ chapter, number: i + 5 }));
    // the inputs have a sheet of their own
    const sheets = [
      chapters.filter(({ chapter }) => chapter.id !== 'inputs'),
      chapters.filter(({ chapter }) => chapter.id === 'inputs'),
    ];
    return html`<div class="lay">
      <div>
        ${this.#first(answered, report)}
        ${sheets
          .filter((sheet) => sheet.length > 0)
          .map(
            (sheet, s) => html`<div class="paper" part="paper" data-theme="light">
              ${sheet.map(
                ({ chapter, number }) => html`<section>
                  <div class="chapter-head">
                    <h2 class="rule">${number} ${chapter.title}</h2>
                    ${chapter.sentences.map((sentence) => html`<p class="say2">${sentence}</p>`)}
                  </div>
                  ${this.#drawing(chapter, campaign)} ${chapter.tables.map(reportTable)}
                </section>`,
              )}
              ${
                s === 1
                  ? html`<h2 class="rule">${chapters.length + 5} Conventions</h2>
                      ${report.conventions.filter((note) => !report.care.includes(note)).map((note) => html`<p class="rn">${note}</p>`)}
                      ${warningList(warnings.map((warning) => ({ ...warning, message: warning.path === '' ? warning.message : `${warning.path}: ${warning.message}` })))}`
                  : nothing
              }
              ${this.#foot(report.title)}
            </div>`,
          )}
      </div>
      <nav class="contents no-print" aria-label="Contents of the report">
        <div class="in-short">
          <h2>${report.title}</h2>
          <p class="say">${report.sentences.join(' ')}</p>
        </div>
        <p class="it">What is printed</p>
        <ol>
          ${['Section', 'Links', 'What limits', 'Read with care', ...chapters.map(({ chapter }) => chapter.title), 'Conventions'].map((title) => html`<li>${title}</li>`)}
        </ol>
        <p><button type="button" class="btn" @click=${() => window.print()}>Print</button></p>
        <p class="dim">A4 at its own size, in the colours of print. What is printed is what the file states.</p>
      </nav>
    </div>`;
  }
}
