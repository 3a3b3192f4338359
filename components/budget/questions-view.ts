import { html, nothing, type TemplateResult } from 'lit';
import type { Improvement, LinkQuestions } from '../../lib/answers/questions.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatConcise, formatLength } from '../../lib/quantity/index.js';
import { sourceText } from '../../lib/report/input-words.js';
import { TIDE_QUANTITY_WORDS } from '../../lib/report/questions-report.js';
import { inputName } from '../shared/input-name.js';
import { quantityText } from '../shared/number.js';
import { type RichText, richText } from '../shared/rich-text.js';
import { gravityWords, helpWords, in1e18, negativeWords, tideWords } from './budget-words.js';

interface QuestionsContext {
  readonly campaign: Campaign;
  readonly open: ReadonlySet<string>;
  toggle(key: string): void;
}

/** Questions answered from the same derivatives: each an answer in words, its numbers behind it. */
export function questionsView(context: QuestionsContext, questions: LinkQuestions | null): TemplateResult {
  if (!questions) return html`<section class="three" aria-label="Questions"></section>`;
  const { campaign } = context;
  const negative = negativeWords(campaign, questions);
  return html`<section class="three" aria-label="Questions">
    ${question(context, 'help', 'What single value would help most', helpWords(campaign, questions), helpTable(campaign, questions))}
    ${question(
      context,
      'gravity',
      'Is a gravity visit needed',
      gravityWords(campaign, questions),
      gravityTable(campaign, questions),
    )}
    ${
      questions.tideLabels.length > 0
        ? question(
            context,
            'tide',
            'If a tide label is wrong',
            tideWords(campaign, questions),
            tideTable(campaign, questions),
          )
        : nothing
    }
    ${
      negative
        ? html`<div>
            <h3>What takes away from another</h3>
            <p>${richText(negative)}</p>
          </div>`
        : nothing
    }
  </section>`;
}

function question(
  { open, toggle }: QuestionsContext,
  key: string,
  title: string,
  answer: RichText,
  table: TemplateResult,
): TemplateResult {
  const isOpen = open.has(key);
  return html`<div>
    <h3>${title}</h3>
    <p>${richText(answer)}</p>
    <p class="no-print">
      <button
        type="button"
        class="word"
        aria-expanded=${isOpen ? 'true' : 'false'}
        aria-controls=${`q-${key}`}
        @click=${() => toggle(key)}
      >
        ${isOpen ? 'hide' : 'show'} numbers
      </button>
    </p>
    <div id=${`q-${key}`} class=${isOpen ? '' : 'closed'}>${table}</div>
  </div>`;
}

const num = (text: string): TemplateResult => html`<td class="num">${quantityText(text)}</td>`;

function helpTable(campaign: Campaign, { inputs, sources }: LinkQuestions): TemplateResult {
  const row = (one: Improvement) =>
    html`<tr>
      <th scope="row">
        ${
          one.input === null
            ? html`<b>${sourceText(campaign, one.source!)}</b>`
            : richText(inputName(campaign, one.input))
        }
      </th>
      ${num(formatLength(one.halvedM, 2))} ${num(formatLength(one.exactM, 2))}
    </tr>`;
  return html`<table class="small">
    <caption class="only-spoken">u of the link with one thing known better</caption>
    <thead>
      <tr>
        <th scope="col">known better</th>
        <th scope="col" class="num">half its <i class="s">u</i></th>
        <th scope="col" class="num">exact</th>
      </tr>
    </thead>
    <tbody>
      ${sources.map(row)} ${inputs.map(row)}
    </tbody>
  </table>`;
}

function gravityTable(campaign: Campaign, { gravity }: LinkQuestions): TemplateResult {
  return html`<table class="small">
    <caption class="only-spoken">Gravity at the two ends</caption>
    <thead>
      <tr>
        <th scope="col">site</th>
        <th scope="col" class="num">tie / m</th>
        <th scope="col" class="num">by <i class="s">g</i> / 1e-18</th>
        <th scope="col" class="num">by <i class="s">Γ</i> / 1e-18</th>
        <th scope="col" class="num">exact</th>
      </tr>
    </thead>
    <tbody>
      ${gravity.map(
        (visit) => html`<tr>
          <th scope="row">
            ${campaign.sites.find(({ id }) => id === visit.site)?.name ?? visit.site}
            <small class="dim"
              ><i class="s">g</i> ${visit.gStated ? 'stated' : 'default'}, <i class="s">Γ</i>
              ${visit.gradientStated ? 'stated' : 'default'}</small
            >
          </th>
          ${num(formatConcise(Number(visit.tieM.toFixed(3)), null, { sign: 'always' }))}
          ${num(in1e18(visit.uyG))} ${num(in1e18(visit.uyGradient))} ${num(formatLength(visit.exactM, 2))}
        </tr>`,
      )}
    </tbody>
  </table>`;
}

function tideTable(campaign: Campaign, { tideLabels, commonLabels }: LinkQuestions): TemplateResult {
  const mm = (lengthM: number) => `${lengthM > 0 ? '+' : ''}${(1000 * lengthM).toFixed(1)}`.replace('-', '\u2212');
  const offset = (y: number) => `${y > 0 ? '+' : ''}${(1e18 * y).toFixed(2)}`.replace('-', '\u2212');
  return html`<table class="small">
    <caption class="only-spoken">What a wrong permanent-tide label would change</caption>
    <thead>
      <tr>
        <th scope="col">value</th>
        <th scope="col">if it were</th>
        <th scope="col" class="num">mm</th>
        <th scope="col" class="num">1e-18</th>
      </tr>
    </thead>
    <tbody>
      ${tideLabels.flatMap(({ path, stated, used, errors }) =>
        errors.map(
          ({ system, lengthM, y }, i) => html`<tr class=${i > 0 ? 'same' : ''}>
            <th scope="row">
              ${
                i > 0
                  ? html`<span class="only-spoken">${richText(inputName(campaign, path))}</span>`
                  : html`${richText(inputName(campaign, path))}
                      <small class="dim">${stated === null ? `no label, taken as ${used}` : used}</small>`
              }
            </th>
            <td>${system}</td>
            ${num(mm(lengthM))} ${num(offset(y))}
          </tr>`,
        ),
      )}
      ${commonLabels.map(
        ({ quantity, used, errors: [worst] }) => html`<tr>
          <th scope="row">all ${TIDE_QUANTITY_WORDS[quantity]} <small class="dim">${used}</small></th>
          <td>${worst!.system}</td>
          ${num(mm(worst!.lengthM))} ${num(offset(worst!.y))}
        </tr>`,
      )}
    </tbody>
  </table>`;
}
