import type { Evaluation, LinkEvaluation } from '../../lib/answers/evaluation.js';
import type { LinkPrediction, Prediction } from '../../lib/answers/prediction.js';
import type { Campaign, Link } from '../../lib/campaign/campaign.js';
import { formatConcise, formatLength } from '../../lib/quantity/index.js';
import { inputName } from '../shared/input-name.js';
import { num, type RichText, sentenceCase, sym, word } from '../shared/rich-text.js';

/** Coverage factor of the U on the strips: that of the verdict, |difference| ≤ 2u (VIM 2.47). */
export const COVERAGE = 2;

const listed = (parts: readonly RichText[]): RichText =>
  parts.flatMap(
    (part, i): RichText => (i === 0 ? part : i === parts.length - 1 ? [' and ', ...part] : [', ', ...part]),
  );

const ids = (links: readonly { readonly id: string }[]): RichText =>
  links.length > 4
    ? [`${links.length} links`]
    : listed([...new Set(links.map(({ id }) => id))].map((id) => [word(id)]));

/** Whether more than one is meant: of two measurements of one link only one is named. */
const several = (links: readonly { readonly id: string }[]): boolean => new Set(links.map(({ id }) => id)).size > 1;

export function linkDescription(link: LinkPrediction, stated: Link | undefined): string {
  const kind = stated?.kind ? `, ${stated.kind}` : '';
  const length = stated?.lengthM ? `, ${formatLength(stated.lengthM)}` : '';
  return `${link.from} to ${link.to}${kind}${length}`;
}

const percent = (share: number): string => `${Math.round(100 * share)}\u00a0%`;

/** The least certain link and what limits it; links without a common level are named. */
export function predictionSentence(campaign: Campaign, prediction: Prediction): RichText {
  const known = prediction.links.filter(({ y }) => y !== null && y.u > 0);
  const unknown = prediction.links.filter(({ y }) => y === null);
  const missing: RichText =
    unknown.length > 0
      ? [' ', ...ids(unknown), `: none, for ${unknown.length === 1 ? 'its' : 'their'} ends have no common level.`]
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
  const which: RichText =
    known.length === 1 ? ['Link ', word(worst.id)] : ['The least certain link, ', word(worst.id), ','];
  return [...which, ' is predicted to ', num(formatLength(worst.dH!.u, 2)), '.', ...limit, ...missing];
}

/** What the comparison found, verdict by verdict. */
export function verdictSentence({ links }: Evaluation, unmeasured: number): RichText {
  const of = (verdict: LinkEvaluation['verdict']) => links.filter((link) => link.verdict === verdict);
  const [agree, differ, inconclusive] = [of('agree'), of('differ'), of('inconclusive')];
  const parts: RichText[] = [];
  if (differ.length > 0)
    parts.push([...ids(differ), several(differ) ? ' differ from their prediction.' : ' differs from its prediction.']);
  if (agree.length > 0)
    parts.push([...ids(agree), several(agree) ? ' agree with their prediction.' : ' agrees with its prediction.']);
  if (inconclusive.length > 0) parts.push([...ids(inconclusive), ' could not have told.']);
  if (parts.length === 0) parts.push(['Nothing can be said of the measurements.']);
  if (unmeasured > 0) parts.push([`${unmeasured === 1 ? 'One link is' : `${unmeasured} links are`} not measured.`]);
  return parts.flatMap((part, i): RichText => {
    const [first, ...rest] = i === 0 ? part : [' ', ...part];
    return typeof first === 'string' && i === 0 ? [sentenceCase(first), ...rest] : [first!, ...rest];
  });
}

/** The same in a few words, for a narrow column. */
export function shortReason(link: LinkEvaluation): RichText {
  const { residualLength, smallestDetectableM, verdict } = link;
  if (!residualLength || smallestDetectableM === null) return ['No common level.'];
  const U = COVERAGE * residualLength.u;
  if (verdict === 'inconclusive') return [num(formatLength(smallestDetectableM, 2)), ' or more would have shown.'];
  if (verdict === 'differ' && U > 0)
    return [
      num(formatConcise(Math.abs(residualLength.value) / U, null, { significant: 2 })),
      ' times ',
      sym('U'),
      ' = ',
      num(formatLength(U, 2)),
      '.',
    ];
  return ['Within ', sym('U'), ' = ', num(formatLength(U, 2)), '.'];
}

/** One line of reason under the verdict. */
export function reason(link: LinkEvaluation, effectM: number | null): RichText {
  const { residualLength, smallestDetectableM } = link;
  if (!residualLength || smallestDetectableM === null) return ['Its ends have no common level to predict from.'];
  const U = COVERAGE * residualLength.u;
  const within: RichText = ['Within ', sym('U'), ' = ', num(formatLength(U, 2)), '.'];
  if (link.verdict === 'agree')
    return [...within, ' A discrepancy of ', num(formatLength(smallestDetectableM, 2)), ' would have shown.'];
  if (link.verdict === 'inconclusive')
    return [
      'Only ',
      num(formatLength(smallestDetectableM, 2)),
      ' or more would have shown; the effect asked about is ',
      num(formatLength(effectM ?? 0, 2)),
      '.',
    ];
  if (link.verdict === null)
    return link.z === null
      ? ['Both sides are exact.']
      : [...within, ' The file states no effect, so agreement would say nothing.'];
  const times: RichText =
    U > 0
      ? [num(formatConcise(Math.abs(residualLength.value) / U, null, { significant: 2 })), ' times ', sym('U'), '.']
      : [];
  const fitting = link.suspects.filter(({ fits }) => fits);
  const [first] = fitting;
  if (!first) return [...times, ' No single mistake that was tried fits in size and sign.'];
  const explains = `${formatConcise(first.explains.value, first.explains.u || null, { scale: -18, sign: 'always', significant: 3 })}e-18`;
  return [
    ...times,
    fitting.length === 1
      ? ' One mistake fits in size and sign: '
      : ` ${fitting.length} mistakes fit in size and sign, best: `,
    `${first.path}: ${first.mistake} (`,
    num(explains),
    ').',
  ];
}
