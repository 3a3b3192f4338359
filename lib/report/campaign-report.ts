import type { Evaluation, LinkEvaluation } from '../answers/evaluation.js';
import type { Plan } from '../answers/plan.js';
import type { LinkPrediction, Prediction } from '../answers/prediction.js';
import type { SolvedCampaign } from '../answers/solve-campaign.js';
import type { TideAnswer } from '../answers/tide.js';
import type { Campaign } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import { formatLength } from '../quantity/index.js';
import { CARE_NOTES } from './care.js';
import { evaluationReport } from './evaluation-report.js';
import { inputText } from './input-words.js';
import { inputsTable, remarksTable, sourcesTable } from './inputs-table.js';
import { planReport } from './plan-report.js';
import { predictionReport } from './prediction-report.js';
import type { Report, Table } from './table.js';
import { tideReport } from './tide-report.js';

/** What a whole report is made of; null what the campaign does not ask for. */
export interface CampaignAnswers {
  readonly solved: SolvedCampaign;
  readonly prediction: Prediction;
  /** null without measurements */
  readonly evaluation: Evaluation | null;
  readonly plan: Plan;
  /** null without a window */
  readonly tide: TideAnswer | null;
}

/** A part of the report with a number of its own. */
export interface Chapter {
  readonly id: 'uncertainty' | 'comparison' | 'averaging' | 'tide' | 'potentials' | 'inputs';
  readonly title: string;
  readonly sentences: readonly string[];
  readonly tables: readonly Table[];
}

/** The whole campaign as a report: its first page, and the chapters that follow. As a {@link Report} it is one list of tables. */
export interface CampaignReport extends Report {
  readonly question: string;
  /** per link, the inputs with the largest shares in words: `W₀ of north 48 %` */
  readonly limits: readonly { readonly link: string; readonly shares: readonly string[] }[];
  /** what must be borne in mind */
  readonly care: readonly string[];
  readonly chapters: readonly Chapter[];
}

/** Shares named on the first page, and the least that is worth a name. */
const SHARES = { most: 3, least: 0.05 };
/** More links than this are not told one by one. */
const MOST_SENTENCES = 5;

/** @param options.provenance version and date */
export function campaignReport(
  { solved, prediction, evaluation, plan, tide }: CampaignAnswers,
  options: { readonly title: string; readonly provenance: string },
): CampaignReport {
  const { campaign } = solved.model;
  const common = { ...options, full: false, links: [] };
  const predicted = predictionReport(prediction, campaign, common);
  const compared = evaluation && evaluationReport(evaluation, campaign, options);
  const planned = planReport(plan, campaign, common);
  const tides = tide && tideReport(tide, common);
  const of = (report: Report, ...ids: readonly string[]) => report.tables.filter(({ id }) => ids.includes(id));
  const named = shortly(campaign);
  const chapters: Chapter[] = [
    {
      id: 'uncertainty' as const,
      title: 'What each input contributes',
      sentences: predicted.sentences,
      tables: of(predicted, 'budget', 'correlations'),
    },
    ...(compared
      ? [
          {
            id: 'comparison' as const,
            title: 'Measured and predicted',
            sentences: compared.sentences,
            tables: compared.tables.filter(({ id }) => id !== 'checks'),
          },
        ]
      : []),
    {
      id: 'averaging' as const,
      title: 'Averaging',
      sentences: planned.sentences,
      tables: of(planned, 'links', 'shares', 'bridged'),
    },
    ...(tides ? [{ id: 'tide' as const, title: 'Tide', sentences: tides.sentences, tables: of(tides, 'links') }] : []),
    {
      id: 'potentials' as const,
      title: 'Sites and clocks',
      sentences: [],
      tables: of(predicted, 'sites', 'determinations', 'checks', 'clocks'),
    },
    {
      id: 'inputs' as const,
      title: 'Inputs, sources, references',
      sentences: [],
      tables: [inputsTable(solved.model), sourcesTable(campaign), remarksTable(campaign)],
    },
  ]
    .map((chapter) => ({
      ...chapter,
      tables: chapter.tables.filter(({ rows }) => rows.length > 0).map(withoutOptions),
    }))
    .filter(({ tables, sentences }) => tables.length > 0 || sentences.length > 0);
  return {
    title: campaign.title ?? options.title,
    question: questionOf(campaign),
    sentences: answerSentences(prediction, evaluation),
    tables: [...of(predicted, 'links'), ...chapters.flatMap(({ tables }) => tables)],
    conventions: [...new Set([...predicted.conventions, ...(compared?.conventions ?? []), ...CARE_NOTES])],
    cautions: distinct([predicted, compared, planned, tides].flatMap((report) => report?.cautions ?? [])),
    provenance: options.provenance,
    limits: prediction.links.flatMap((link) =>
      link.y && link.budget.length > 0 ? [{ link: link.id, shares: largestShares(named, link) }] : [],
    ),
    care: CARE_NOTES,
    chapters,
  };
}

function questionOf({ measurements, effectM, targetM }: Campaign): string {
  const effect = effectM ?? (targetM === null ? null : 10 * targetM);
  const measured = measurements.some(({ check }) => !check);
  if (!measured)
    return targetM === null
      ? 'Which offset does gravity make between the clocks, and how surely is it known?'
      : `Which offset does gravity make between the clocks, and is it known to ${formatLength(targetM, 2)}?`;
  return effect === null
    ? 'Do the clocks agree with the heights?'
    : `Do the clocks agree with the heights, and would a discrepancy of ${formatLength(effect, 2)} have shown?`;
}

/** The finding, link by link where they are few. */
function answerSentences({ links }: Prediction, evaluation: Evaluation | null): string[] {
  const compared = evaluation?.links ?? [];
  if (compared.length > MOST_SENTENCES) {
    const count = (verdict: LinkEvaluation['verdict']) => compared.filter((link) => link.verdict === verdict).length;
    return [
      `Of ${compared.length} measurements ${count('agree')} agree, ${count('differ')} differ, ${count('inconclusive')} could not have told.`,
    ];
  }
  if (compared.length > 0) {
    const several = (id: string) => compared.filter((link) => link.id === id).length > 1;
    return compared.map((link) =>
      comparedSentence(several(link.id) ? `${link.id} (${link.measurement})` : link.id, link, evaluation!.effectM),
    );
  }
  const known = links.filter(({ dH }) => dH !== null);
  if (known.length > MOST_SENTENCES || known.length === 0) {
    const worst = known.reduce<LinkPrediction | null>(
      (one, other) => (one && one.dH!.u >= other.dH!.u ? one : other),
      null,
    );
    return worst
      ? [`All ${known.length} links are predicted to ${formatLength(worst.dH!.u, 2)} or better.`]
      : ['No link has a common level to predict from.'];
  }
  return [
    `${listed(known.map(({ id, dH }) => `${id} is predicted to ${dH!.u > 0 ? formatLength(dH!.u, 2) : 'the last digit, every input being exact'}`))}.`,
  ];
}

function comparedSentence(
  id: string,
  { verdict, smallestDetectableM, residualLength, suspects }: LinkEvaluation,
  effectM: number | null,
): string {
  if (!residualLength || smallestDetectableM === null) return `${id} is not computed: its ends have no common level.`;
  const shows = formatLength(smallestDetectableM, 2);
  if (verdict === 'agree') return `${id} agrees with its prediction; a discrepancy of ${shows} would have shown.`;
  if (verdict === 'inconclusive')
    return `${id} is inconclusive: only ${shows} or more would have shown, ${formatLength(effectM ?? 0, 2)} is asked about.`;
  if (verdict === null)
    return `${id} lies within twice its uncertainty; without an effect asked about that says no more.`;
  const fits = suspects.filter((suspect) => suspect.fits).length;
  const mistakes =
    fits === 0
      ? 'no single mistake that was tried would explain it'
      : fits === 1
        ? 'one mistake would explain it'
        : `${fits} mistakes would each explain it`;
  return `${id} differs from its prediction by ${formatLength(Math.abs(residualLength.value), 2)}; ${mistakes}.`;
}

/** Options of the command line say nothing on paper. */
const withoutOptions = (table: Table): Table => ({
  ...table,
  notes: table.notes.filter((note) => !/(^|\s)--\w/.test(note)),
});

/** Names up to their first comma: the first page has no room for more. */
const shortly = (campaign: Campaign): Campaign => ({
  ...campaign,
  sites: campaign.sites.map((site) =>
    site.name === undefined ? site : { ...site, name: site.name.split(',')[0]!.trim() },
  ),
});

const largestShares = (campaign: Campaign, { budget }: LinkPrediction): string[] =>
  budget
    .slice(0, SHARES.most)
    .filter(({ share }, i) => i === 0 || Math.abs(share) >= SHARES.least)
    .map(({ input, share }) =>
      `${inputText(campaign, input)} ${Math.round(100 * share)}\u00a0%`.replace('-', '\u2212'),
    );

const listed = (parts: readonly string[]): string =>
  parts.length < 2 ? (parts[0] ?? '') : `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}`;

const distinct = (warnings: readonly Warning[]): readonly Warning[] => {
  const seen = new Set<string>();
  return warnings.filter(({ code, path, message }) => {
    const key = `${code} ${path} ${message}`;
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
};
