import { type CSSResultGroup, html, type TemplateResult } from 'lit';
import { type AveragingFigure, type AveragingLink, averagingFigureOf } from '../../lib/answers/averaging-figure.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatDays, formatLength } from '../../lib/quantity/index.js';
import { dayText, detectionSentence, linkSentence, partText, wallText } from '../../lib/report/plan-words.js';
import { PlumbElement } from '../plumb-element.js';
import { CampaignElement } from '../shared/campaign-element.js';
import { quantityText } from '../shared/number.js';
import { WidthController } from '../shared/width-controller.js';
import { oncePerCampaign, solvedOf } from '../state/answers.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { averagingFigure } from './averaging-figure.js';
import { averagingStyles } from './averaging-styles.js';

const figureOf = oncePerCampaign((campaign) => averagingFigureOf(solvedOf(campaign)));

/** Beside the drawing stands the table from here on, px; below it the drawing takes the whole width. */
const BESIDE_PX = 1120;
const DRAWING_PX = 720;

/** How long the clocks must run: the uncertainty of each link's height difference against days, the target with the day it is
 *  met, the floor that no averaging passes, and what limits.
 *
 *  Inside a `<plumb-campaign>`.
 *
 * @slot Fallback: what the page shows without script.
 * @fires plumb-select - A reader takes a link in hand; `detail.link` is its id.
 * @csspart base The sheet.
 * @csspart provenance The line that says who computed it and when. */
export class PlumbAveraging extends CampaignElement {
  static override styles: CSSResultGroup = [PlumbElement.styles, averagingStyles];

  readonly #width = new WidthController(this);

  protected override answered(answered: AnsweredCampaign): TemplateResult {
    const { campaign } = answered;
    const figure = figureOf(campaign);
    if (figure.links.length === 0)
      return html`<p class="say">The campaign has no links between clocks.</p>
        <p class="note">A link names two clocks: <code>"links": [{"id": "ab", "from": "clock-a", "to": "clock-b"}]</code>.</p>`;
    const held = this.linkInHand(answered);
    const main = figure.links.find(({ plan }) => plan.id === held) ?? firstToShow(figure);
    const { width } = this.#width;
    return html`<p class="say">${linkSentence(main.plan, figure.plan, campaign)} ${detectionSentence(main.plan, figure.plan)}</p>
      <div class="plate">
        ${
          main.points.length === 0
            ? html`<p>There is nothing to draw: the clocks of link ${main.plan.id} and the link have no common time.</p>`
            : averagingFigure({
                figure,
                campaign,
                main,
                inHand: held === main.plan.id,
                width: width >= BESIDE_PX ? DRAWING_PX : Math.min(width, DRAWING_PX),
              })
        }
        <div>${this.#table(figure, campaign, main, held)} ${notes(main, campaign)}</div>
      </div>`;
  }

  #table(figure: AveragingFigure, campaign: Campaign, main: AveragingLink, held: string | null): TemplateResult {
    const { plan } = figure;
    const window = campaign.window ? formatDays((campaign.window.endMs - campaign.window.startMs) / 1000) : null;
    const target = plan.target === null ? 'target' : `${formatLength(plan.target)} after`;
    const at = window === null ? 'at window' : `at ${window}`;
    const length = (lengthM: number | null | undefined) =>
      lengthM == null ? html`<span class="none">none</span>` : quantityText(formatLength(lengthM, 2));
    return html`<table role="table">
      <caption class="only-spoken">
        Links: how long, what limits, what could be seen
      </caption>
      <thead role="rowgroup">
        <tr role="row">
          <th scope="col" role="columnheader">link</th>
          <th scope="col" role="columnheader" class="num">${target}</th>
          <th scope="col" role="columnheader" class="num">${at}</th>
          <th scope="col" role="columnheader" class="num">floor</th>
          <th scope="col" role="columnheader" class="num">detectable</th>
          <th scope="col" role="columnheader" class="words">what limits ${at}</th>
        </tr>
      </thead>
      <tbody role="rowgroup">
        ${figure.links.map(({ plan: link }) => {
          return html`<tr role="row" class=${link.id === held ? 'held' : ''}>
            <th scope="row" role="rowheader">
              <button
                type="button"
                class="pick"
                aria-pressed=${link.id === main.plan.id ? 'true' : 'false'}
                @click=${() => this.take(link.id === held ? null : link.id)}
              >
                ${link.id}
              </button>
            </th>
            <td role="cell" class="num" data-k=${target}>
              ${plan.target === null ? html`<span class="none">none</span>` : html`<span>${wallText(link.timeToTarget)}${link.targetMet ? html`<small>${dayText(link.targetMet.at)}</small>` : ''}</span>`}
            </td>
            <td role="cell" class="num" data-k=${at}>${length(link.window?.uH)}</td>
            <td role="cell" class="num" data-k="floor">${length(link.floor)}</td>
            <td role="cell" class="num" data-k="detectable">${length(link.smallestDetectable)}</td>
            <td role="cell" class="words" data-k="what limits ${at}">
              ${link.window?.limit ? partText(link.window.limit, campaign) : html`<span class="none">none</span>`}
            </td>
          </tr>`;
        })}
      </tbody>
    </table>`;
  }
}

/** The first link that reaches the target, else the one with the lowest floor. */
function firstToShow({ links }: AveragingFigure): AveragingLink {
  const meets = links.find(({ plan }) => plan.timeToTarget !== null);
  const running = links.filter(({ points }) => points.length > 0);
  return meets ?? running.reduce((a, b) => (b.plan.floor < a.plan.floor ? b : a), running[0] ?? links[0]!);
}

function notes(main: AveragingLink, campaign: Campaign): TemplateResult {
  const { plan } = main;
  const limits = main.limits();
  const stretches = limits.map(({ toS, part }, i) =>
    i === limits.length - 1 ? partText(part, campaign) : `${partText(part, campaign)} up to ${wallText(toS)}`,
  );
  const data = plan.window
    ? ` ${formatDays(plan.window.T)} hold ${formatDays(plan.window.data, 2)} of common data.`
    : '';
  const bridged = plan.bridged?.window
    ? html` Gaps of ${plan.bridged.clocks.join(', ')} bridged (open dots): ${formatLength(plan.bridged.window.uH, 2)} instead of
      ${plan.window ? formatLength(plan.window.uH, 2) : 'none'} over the window.`
    : '';
  return html`<p class="note">
    Days are days on the wall. Clocks and link of ${plan.id} run together for ${(100 * plan.uptime).toFixed(0)}&nbsp;% of the time.${data}
    ${limits.length > 0 ? html`What limits ${plan.id}: ${stretches.join(', then ')}.` : ''}
    What limits is the largest of the variances; geodesy is no part of the curves, only of what is detectable against the
    prediction.${bridged}
  </p>`;
}
