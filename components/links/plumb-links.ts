import { type CSSResultGroup, html, type TemplateResult } from 'lit';
import type { Estimate, LinkPrediction } from '../../lib/answers/prediction.js';
import type { Campaign, Link, Measurement } from '../../lib/campaign/campaign.js';
import { formatConcise, formatLength, formatScaled } from '../../lib/quantity/index.js';
import { LENGTH_NOTE, SIGN_NOTE, tideNote } from '../../lib/report/conventions.js';
import { PlumbElement } from '../plumb-element.js';
import { inputName } from '../shared/input-name.js';
import { alignedNumber, pointColumn } from '../shared/number.js';
import { num, type RichText, richText, sentenceCase } from '../shared/rich-text.js';
import { type AnsweredCampaign, CampaignConsumer } from '../state/campaign-context.js';
import { linksStyles } from './links-styles.js';

const NONE = 'none';

interface Column {
  readonly head: TemplateResult | string;
  readonly unit: string;
  /** head in the narrow form */
  readonly key: string;
  /** lines of one link: one, or one per measurement */
  readonly texts: (link: LinkPrediction) => readonly string[];
}

const text = (estimate: Estimate | null, show: (estimate: Estimate) => string): readonly string[] => [
  estimate ? show(estimate) : NONE,
];
const plain = ({ value, u }: Estimate): string => formatConcise(value, u);
const signed = ({ value, u }: Estimate): string => formatConcise(value, u, { sign: 'always' });
const offset = ({ value, u }: Estimate): string => formatScaled(value, u, -18);

const COLUMNS: readonly Column[] = [
  { head: 'length', unit: 'm', key: 'length / m', texts: ({ dH }) => text(dH, plain) },
  {
    head: html`Δ<i class="s">W</i>`,
    unit: 'm²/s²',
    key: 'ΔW / m²/s²',
    texts: ({ dW }) => text(dW, plain),
  },
  { head: html`<i class="s">y</i>`, unit: '1e-18', key: 'y / 1e-18', texts: ({ y }) => text(y, offset) },
  {
    head: 'normal height',
    unit: 'm',
    key: 'normal height / m',
    texts: ({ dHNormal }) => text(dHNormal, signed),
  },
];

const measuredColumn = (measurements: readonly Measurement[]): Column => ({
  head: html`measured <i class="s">y</i>`,
  unit: '1e-18',
  key: 'measured y / 1e-18',
  texts: ({ id }) => {
    const own = measurements.filter(({ link }) => link === id);
    return own.length === 0 ? [NONE] : own.map(({ y }) => offset(y));
  },
});

/** The links of a campaign: what gravity alone makes between each pair of clocks, in length, potential and frequency.
 *
 *  Inside a `<plumb-campaign>`.
 *
 * @slot Fallback: what the page shows without script.
 * @csspart base The sheet.
 * @cssproperty [--plumb-paper] Ground; likewise `--plumb-ink` and the other colours. */
export class PlumbLinks extends PlumbElement {
  static override styles: CSSResultGroup = [PlumbElement.styles, linksStyles];

  readonly #campaign = new CampaignConsumer(this);

  #row(
    link: LinkPrediction,
    campaign: Campaign,
    columns: readonly Column[],
    widths: readonly string[],
  ): TemplateResult {
    const stated = campaign.links.find(({ id }) => id === link.id);
    return html`<tr role="row">
      <th scope="row" role="rowheader"><b>${link.id}</b><small>${description(link, stated)}</small></th>
      ${columns.map(
        ({ texts, key }, i) => html`<td role="cell" data-k=${key}>
          ${texts(link).map((line) => (line === NONE ? html`<span class="none">${NONE}</span>` : alignedNumber(line, widths[i]!)))}
        </td>`,
      )}
    </tr>`;
  }

  #table({ campaign, prediction }: AnsweredCampaign): TemplateResult {
    const columns = campaign.measurements.length > 0 ? [...COLUMNS, measuredColumn(campaign.measurements)] : COLUMNS;
    const widths = columns.map(({ texts }) => pointColumn(prediction.links.flatMap(texts)));
    return html`<table class="links" role="table">
      <caption class="only-spoken">Links</caption>
      <thead role="rowgroup">
        <tr role="row">
          <th scope="col" role="columnheader">link</th>
          ${columns.map(
            ({ head, unit }) =>
              html`<th scope="col" role="columnheader" class="num">${head} <span class="nb">/ ${unit}</span></th>`,
          )}
        </tr>
      </thead>
      <tbody role="rowgroup">
        ${prediction.links.map((link) => this.#row(link, campaign, columns, widths))}
      </tbody>
    </table>`;
  }

  #answered(answered: AnsweredCampaign): TemplateResult {
    const { campaign, prediction } = answered;
    if (prediction.links.length === 0)
      return html`<p class="say">The campaign has no links between clocks.</p>
        <p class="note">A link names two clocks: <code>"links": [{"id": "ab", "from": "clock-a", "to": "clock-b"}]</code>.</p>`;
    return html`<p class="say">${richText(sentence(answered))}</p>
      ${this.#table(answered)}
      <p class="note">${SIGN_NOTE} ${tideNote(campaign.tide)} ${sentenceCase(LENGTH_NOTE)}</p>`;
  }

  protected override content(): TemplateResult {
    const { state } = this.#campaign;
    if (state === null)
      return html`<slot></slot>
        <p class="note no-print">
          No campaign is loaded. Put the element inside
          <code>&lt;plumb-campaign src="campaign.json"&gt;</code>.
        </p>`;
    if (state.status === 'ready') return this.#answered(state);
    if (state.status === 'failed') {
      if (!state.lastGood)
        return html`<div class="flt"><p class="hd">Not computed: the campaign cannot be read</p></div>`;
      return html`<div class="stale">
        <p class="tagc">before the last change of the campaign, which cannot be read</p>
        ${this.#answered(state.lastGood)}
      </div>`;
    }
    return html`<slot></slot>`;
  }
}

function description(link: LinkPrediction, stated: Link | undefined): string {
  const kind = stated?.kind ? `, ${stated.kind}` : '';
  const length = stated?.lengthM ? `, ${formatLength(stated.lengthM)}` : '';
  return `${link.from} to ${link.to}${kind}${length}`;
}

const percent = (share: number): string => `${Math.round(100 * share)}\u00a0%`;

/** The least certain link and what limits it; links without a common level are named. */
function sentence({ campaign, prediction }: AnsweredCampaign): RichText {
  const known = prediction.links.filter(({ y }) => y !== null && y.u > 0);
  const unknown = prediction.links.filter(({ y }) => y === null);
  const missing: RichText =
    unknown.length > 0
      ? [
          ` ${unknown.map(({ id }) => id).join(', ')}: none, for ${unknown.length === 1 ? 'its ends have' : 'their ends have'} no common level.`,
        ]
      : [];
  const worst = known.reduce<LinkPrediction | null>(
    (one, other) => (one && one.y!.u >= other.y!.u ? one : other),
    null,
  );
  if (!worst) return ['No link carries an uncertainty.', ...missing];
  const [first] = worst.budget;
  const limit: RichText = first
    ? [
        ' What limits it most is ',
        ...inputName(campaign, first.input),
        `, with ${percent(first.share)} of the variance.`,
      ]
    : [];
  const which = known.length === 1 ? `Link ${worst.id}` : `The least certain link, ${worst.id},`;
  return [`${which} is predicted to `, num(formatLength(worst.dH!.u, 2)), '.', ...limit, ...missing];
}
