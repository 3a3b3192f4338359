import { type CSSResultGroup, html, nothing, type TemplateResult } from 'lit';
import { evaluationOf } from '../../lib/answers/evaluate.js';
import type { Evaluation } from '../../lib/answers/evaluation.js';
import { planOf } from '../../lib/answers/plan.js';
import { formatConcise, formatLength } from '../../lib/quantity/index.js';
import { LENGTH_NOTE, SIGN_NOTE, tideNote } from '../../lib/report/conventions.js';
import { residualStrip, residualStripStyles, stripReach } from '../charts/residual-strip.js';
import { PlumbElement } from '../plumb-element.js';
import { CampaignElement } from '../shared/campaign-element.js';
import { alignedNumber, pointColumn, quantityText } from '../shared/number.js';
import { richText, sentenceCase } from '../shared/rich-text.js';
import { oncePerCampaign, solvedOf } from '../state/answers.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { type ColumnKey, type LinkRow, linkRows, NONE } from './link-rows.js';
import { linksStyles } from './links-styles.js';
import { COVERAGE, predictionSentence, reason, verdictSentence } from './links-words.js';

const evaluationFor = oncePerCampaign((campaign) => evaluationOf(solvedOf(campaign)));
const planFor = oncePerCampaign((campaign) => planOf(solvedOf(campaign)));

interface Column {
  readonly key: ColumnKey;
  readonly head: TemplateResult | string;
  readonly unit: string;
  /** head in the narrow form */
  readonly narrow: string;
}

const y = html`<i class="s">y</i>`;
const PREDICTED: readonly Column[] = [
  { key: 'length', head: 'length', unit: 'm', narrow: 'length / m' },
  { key: 'potential', head: html`Δ<i class="s">W</i>`, unit: 'm²/s²', narrow: 'ΔW / m²/s²' },
  { key: 'offset', head: y, unit: '1e-18', narrow: 'y / 1e-18' },
  { key: 'normalHeight', head: 'normal height', unit: 'm', narrow: 'normal height / m' },
];
const MEASURED: readonly Column[] = [{ key: 'measured', head: y, unit: '1e-18', narrow: 'measured y / 1e-18' }];
const DIFFERENCE: readonly Column[] = [
  { key: 'difference', head: y, unit: '1e-18', narrow: 'difference / 1e-18' },
  { key: 'differenceLength', head: 'length', unit: 'mm', narrow: 'difference / mm' },
];

/** The links of a campaign: what gravity alone makes between each pair of clocks, in length, potential and frequency; beside it
 *  what was measured, how far apart the two are, and the verdict.
 *
 *  Inside a `<plumb-campaign>`.
 *
 * @slot Fallback: what the page shows without script.
 * @fires plumb-select A reader has taken a link in hand; detail: `link`, its id or null.
 * @csspart base The sheet.
 * @csspart provenance The line that says who computed it and when.
 * @cssproperty [--plumb-paper] Ground; likewise `--plumb-ink` and the other colours. */
export class PlumbLinks extends CampaignElement {
  static override styles: CSSResultGroup = [PlumbElement.styles, residualStripStyles, linksStyles];

  #name(row: LinkRow, inHand: string | null): TemplateResult {
    const held = row.id === inHand;
    return html`<th scope="row" role="rowheader">
      <button
        type="button"
        class="name ${held ? 'in-hand' : ''}"
        aria-pressed=${held ? 'true' : 'false'}
        @click=${() => this.take(held ? null : row.id)}
      >
        ${row.id}
      </button>
      <small>${row.description}</small>
      ${row.remarks.map((remark) => html`<small>${remark}</small>`)}
    </th>`;
  }

  #verdict({ evaluation, id }: LinkRow, effectM: number | null, { campaign }: AnsweredCampaign): TemplateResult {
    if (evaluation)
      return html`<span class="v v-${evaluation.verdict ?? 'none'}">${evaluation.verdict ?? (evaluation.residual ? 'no verdict' : 'not computed')}</span>
        <small>${richText(reason(evaluation, effectM))}</small>`;
    const planned = campaign.window
      ? (planFor(campaign).links.find((link) => link.id === id)?.smallestDetectable ?? null)
      : null;
    return html`<span class="v">not measured</span>
      ${planned === null ? nothing : html`<small>Planned: ${quantityText(formatLength(planned, 2))} or more would show.</small>`}`;
  }

  #cells(
    row: LinkRow,
    columns: readonly Column[],
    widths: ReadonlyMap<ColumnKey, string>,
    group: string,
  ): TemplateResult[] {
    return columns.map(
      ({ key, narrow }) => html`<td role="cell" data-k=${narrow} class=${group}>
        ${row.texts[key].map((line, i) =>
          line === NONE
            ? html`<span class="none">${NONE}</span>`
            : html`<span class=${i > 0 ? 'second' : 'first'}>${alignedNumber(line, widths.get(key)!)}</span>`,
        )}
      </td>`,
    );
  }

  #heads(columns: readonly Column[], group: string): TemplateResult[] {
    return columns.map(
      ({ head, unit }) =>
        html`<th scope="col" role="columnheader" class="num ${group}">${head} <span class="nb">/ ${unit}</span></th>`,
    );
  }

  #table(answered: AnsweredCampaign, rows: readonly LinkRow[], evaluation: Evaluation | null): TemplateResult {
    const inHand = this.linkInHand(answered);
    // what was measured takes the place of the normal height, which then stands below
    const predicted = evaluation ? PREDICTED.slice(0, 3) : PREDICTED;
    const columns = evaluation ? [...predicted, ...MEASURED, ...DIFFERENCE] : predicted;
    const widths = new Map(columns.map(({ key }) => [key, pointColumn(rows.flatMap(({ texts }) => texts[key]))]));
    const strips = rows.flatMap(({ strip }) => (strip ? [strip] : []));
    const reach = stripReach(strips);
    const end = formatConcise(reach * 1e18, null, { significant: 2 });
    return html`<table class="links ${evaluation ? 'compared' : ''}" role="table">
      <caption class="only-spoken">${evaluation ? 'Links, measured beside predicted' : 'Links'}</caption>
      <thead role="rowgroup">
        ${
          evaluation
            ? html`<tr role="row" class="grp">
                <td role="cell"></td>
                <th scope="colgroup" role="columnheader" colspan="3" class="g1"><span>predicted</span></th>
                <th scope="colgroup" role="columnheader" class="g2"><span>measured</span></th>
                <th scope="colgroup" role="columnheader" colspan="2" class="g3"><span>measured minus predicted</span></th>
                <td role="cell" colspan="2" class="stc"></td>
              </tr>`
            : nothing
        }
        <tr role="row">
          <th scope="col" role="columnheader">link</th>
          ${this.#heads(predicted, 'g1')}
          ${
            evaluation
              ? html`${this.#heads(MEASURED, 'g2')} ${this.#heads(DIFFERENCE, 'g3')}
                  <th scope="col" role="columnheader" class="stc">
                    <span class="axis"><span>−${end}</span><span>0</span><span>+${end}e-18</span></span>
                  </th>
                  <th scope="col" role="columnheader" class="vd">verdict</th>`
              : nothing
          }
        </tr>
      </thead>
      <tbody role="rowgroup">
        ${rows.map(
          (row) => html`<tr role="row" class=${row.id === inHand ? 'held' : ''}>
            ${this.#name(row, inHand)} ${this.#cells(row, predicted, widths, 'g1')}
            ${
              evaluation
                ? html`${this.#cells(row, MEASURED, widths, 'g2')} ${this.#cells(row, DIFFERENCE, widths, 'g3')}
                    <td role="cell" class="stc">${row.strip ? residualStrip(row.strip, reach) : nothing}</td>
                    <td role="cell" class="vd">${this.#verdict(row, evaluation.effectM, answered)}</td>`
                : nothing
            }
          </tr>`,
        )}
      </tbody>
    </table>`;
  }

  #key(rows: readonly LinkRow[], { effectM }: Evaluation): TemplateResult {
    const has = (kind: string) => rows.some(({ strip }) => strip?.kind === kind);
    return html`<ul class="key-row">
      <li>
        <svg width="44" height="16" aria-hidden="true">
          <rect x="2" y="3" width="40" height="10" class="s-strip" /><path d="M2 1v14M42 1v14" class="s-end" /><circle cx="22" cy="8" r="4" class="s-dot" />
        </svg>
        <span>difference with <i class="s">U</i>, <i class="s">k</i> = ${COVERAGE}, 95 %</span>
      </li>
      ${
        effectM === null
          ? nothing
          : html`<li>
              <svg width="24" height="16" aria-hidden="true"><path d="M3 0v16M21 0v16" class="s-effect" /></svg>
              ± effect asked about, ${formatLength(effectM, 2)}
            </li>`
      }
      ${
        has('inconclusive')
          ? html`<li>
              <svg width="52" height="16" aria-hidden="true">
                <rect x="0" y="3" width="52" height="10" class="s-strip" /><path d="M0 3H52M0 13H52" class="s-unsure" /><circle cx="26" cy="8" r="4" class="s-open" />
              </svg>
              could not have told
            </li>`
          : nothing
      }
      ${
        has('differ')
          ? html`<li>
              <svg width="40" height="16" aria-hidden="true">
                <path d="M10 8H40" class="s-off" /><path d="M0 8l11 -5v10z" class="s-wrong" />
              </svg>
              off the strip: differ
            </li>`
          : nothing
      }
    </ul>`;
  }

  /** How far apart the ends are in normal heights, and what the clocks alone say. */
  #heights(rows: readonly LinkRow[], evaluation: Evaluation): TemplateResult {
    const texts = rows.map((row) => ({
      row,
      predicted: row.texts.normalHeight[0]!,
      found: row.evaluation?.inferred.dHNormal
        ? formatConcise(row.evaluation.inferred.dHNormal.value, row.evaluation.inferred.dHNormal.u, { sign: 'always' })
        : NONE,
    }));
    const widths = [pointColumn(texts.map(({ predicted }) => predicted)), pointColumn(texts.map(({ found }) => found))];
    const cell = (text: string, column: string) =>
      html`<td>${text === NONE ? html`<span class="none">${NONE}</span>` : alignedNumber(text, column)}</td>`;
    return html`<table class="heights">
      <caption>Normal height of the second end over the first, in m</caption>
      <thead>
        <tr><th scope="col">link</th><th scope="col" class="num">predicted</th><th scope="col" class="num">by the clocks</th></tr>
      </thead>
      <tbody>
        ${texts.map(
          ({ row, predicted, found }) => html`<tr>
            <th scope="row">
              <b>${row.id}</b>${evaluation.links.filter(({ id }) => id === row.id).length > 1 ? html` ${row.evaluation?.measurement}` : nothing}
            </th>
            ${cell(predicted, widths[0]!)} ${cell(found, widths[1]!)}
          </tr>`,
        )}
      </tbody>
    </table>`;
  }

  protected override answered(answered: AnsweredCampaign): TemplateResult {
    const { campaign, prediction } = answered;
    if (prediction.links.length === 0)
      return html`<p class="say">The campaign has no links between clocks.</p>
        <p class="note">A link names two clocks: <code>"links": [{"id": "ab", "from": "clock-a", "to": "clock-b"}]</code>.</p>`;
    const evaluation = campaign.measurements.some(({ check }) => !check) ? evaluationFor(campaign) : null;
    const rows = linkRows(campaign, prediction, evaluation);
    const unmeasured = rows.filter((row) => row.evaluation === null).length;
    const checks = evaluation?.checks.filter(({ path }) => path.startsWith('measurements.')) ?? [];
    return html`<p class="say">
        ${richText(evaluation ? verdictSentence(evaluation, unmeasured) : predictionSentence(campaign, prediction))}
      </p>
      ${this.#table(answered, rows, evaluation)} ${evaluation ? this.#key(rows, evaluation) : nothing}
      ${evaluation ? this.#heights(rows, evaluation) : nothing}
      ${
        checks.length === 0
          ? nothing
          : html`<p class="note">
              Compared but in no verdict: ${checks.map(
                ({ path, residual, z }, i) =>
                  html`${i > 0 ? '; ' : nothing}${path}, difference
                  ${quantityText(`${formatConcise(residual.value, residual.u, { scale: -18, sign: 'always' })}e-18`)}${z === null ? nothing : html`, <i class="s">z</i> = ${formatConcise(z, null, { significant: 2, sign: 'always' })}`}`,
              )}.
            </p>`
      }
      <p class="note">
        ${SIGN_NOTE} ${tideNote(campaign.tide)} ${sentenceCase(LENGTH_NOTE)}
        ${
          evaluation
            ? 'Measured: every correction applied except gravity’s; its u holds the systematics of clocks and link. Where a link joins unlike transitions their offset is added to the prediction before the difference is taken.'
            : nothing
        }
      </p>`;
  }
}
