import type { Evaluation, LinkEvaluation } from '../../lib/answers/evaluation.js';
import type { Estimate, LinkPrediction, Prediction } from '../../lib/answers/prediction.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatConcise } from '../../lib/quantity/index.js';
import { estimateText, METRES, OFFSET, POTENTIAL, type Scale, type SignStyle } from '../../lib/report/numbers.js';
import type { StripValue } from '../charts/residual-strip.js';
import { COVERAGE, linkDescription } from './links-words.js';

export const NONE = 'none';

/** One row: a link with one of its measurements, or with none. */
export interface LinkRow {
  readonly id: string;
  readonly description: string;
  /** said below: which measurement it is, the normal height, the second line of `predicted` */
  readonly remarks: readonly string[];
  /** one line per entry */
  readonly texts: Readonly<Record<ColumnKey, readonly string[]>>;
  readonly evaluation: LinkEvaluation | null;
  /** null where there is nothing to compare */
  readonly strip: StripValue | null;
}

export type ColumnKey =
  | 'length'
  | 'potential'
  | 'offset'
  | 'normalHeight'
  | 'measured'
  | 'difference'
  | 'differenceLength';

const shown = (estimate: Estimate | null, scale: Scale, sign: SignStyle = 'unsigned'): readonly string[] => [
  estimate ? estimateText(estimate, scale, sign) : NONE,
];

/** Length equivalents of differences are millimetres. */
const millimetres = (estimate: Estimate | null): readonly string[] => [
  estimate ? formatConcise(estimate.value, estimate.u, { scale: -3, sign: 'always' }) : NONE,
];

export function linkRows(
  campaign: Campaign,
  prediction: Prediction,
  evaluation: Evaluation | null,
): readonly LinkRow[] {
  const stated = new Map(campaign.links.map((link) => [link.id, link]));
  const transitions = new Map(campaign.clocks.map(({ id, transition }) => [id, transition]));
  const row = (link: LinkPrediction, compared: LinkEvaluation | null, severalHere: boolean): LinkRow => {
    const ratio = compared?.ratioOffset ?? null;
    const remarks = [
      ...(severalHere ? [`measurement ${compared!.measurement}`] : []),
      ...(ratio === null
        ? []
        : [`second line: offset of ${transitions.get(link.to)} over ${transitions.get(link.from)}`]),
    ];
    return {
      id: link.id,
      description: linkDescription(link, stated.get(link.id)),
      remarks,
      texts: {
        length: shown(link.dH, METRES),
        potential: shown(link.dW, POTENTIAL),
        offset: [...shown(link.y, OFFSET), ...(ratio ? shown(ratio, OFFSET, 'signed') : [])],
        normalHeight: shown(link.dHNormal, METRES, 'signed'),
        measured: shown(compared?.measured ?? null, OFFSET),
        difference: shown(compared?.residual ?? null, OFFSET, 'signed'),
        differenceLength: millimetres(compared?.residualLength ?? null),
      },
      evaluation: compared,
      strip: compared?.residual ? stripOf(compared, compared.residual) : null,
    };
  };
  return prediction.links.flatMap((link) => {
    const own = evaluation?.links.filter(({ id }) => id === link.id) ?? [];
    return own.length === 0 ? [row(link, null, false)] : own.map((compared) => row(link, compared, own.length > 1));
  });
}

const stripOf = ({ verdict, effectOffset }: LinkEvaluation, residual: Estimate): StripValue => ({
  value: residual.value,
  expanded: COVERAGE * residual.u,
  effect: effectOffset,
  kind: verdict ?? 'open',
});
