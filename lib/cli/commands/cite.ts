import { evaluationOf } from '../../answers/evaluate.js';
import { predictionOf } from '../../answers/predict.js';
import { solveCampaign } from '../../answers/solve-campaign.js';
import { readCampaign } from '../../campaign/read.js';
import { clockCitations, linkCitations, measurementCitations } from '../../report/citation.js';
import { referencePotentialNote, SIGN_NOTE, tideNote } from '../../report/conventions.js';
import { decimalCell, estimateCell, OFFSET } from '../../report/numbers.js';
import { estimateColumn, none, numberColumn, type Table, textCell, textColumn } from '../../report/table.js';
import { readCallCampaign } from '../campaign-of-call.js';
import type { Command } from '../command.js';
import { readFileText } from '../read-file.js';

export const cite: Command = {
  name: 'cite',
  summary: 'one citable sentence per link and per clock; redshifts against the values used before',
  synopsis: 'FILE [--before OLD] [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'Sentences with value, u, k, W₀, tide system, frame and epoch, method, version and date, for reports and papers: the offset of each link, the redshift of each clock against Terrestrial Time (shift and correction by name), and each measurement.',
    'With --before, a table of each clock’s redshift beside the value used before, from an older campaign file, and the age of that value from the file’s "date".',
  ],
  options: { before: { value: 'OLD', help: 'an older campaign file: the values used before' } },
  examples: ['plumbtick cite campaign.json', 'plumbtick cite campaign.json --before campaign-2024.json'],
  async run(call) {
    const { campaign, title, refuseAt, withWarnings } = readCallCampaign(call);
    const solved = refuseAt(() => solveCampaign(campaign));
    const prediction = withWarnings(predictionOf(solved));
    const evaluation = refuseAt(() => evaluationOf(solved));
    const sentences = [
      ...linkCitations(prediction, campaign, call.provenance),
      ...clockCitations(prediction, campaign, call.provenance),
      ...measurementCitations(evaluation, call.provenance),
    ];
    const old = call.option('before');
    const before = old === null ? null : readCampaign(await readFileText(old)).campaign;
    const used = before ? new Map(predictionOf(solveCampaign(before)).clocks.map((c) => [c.id, c.redshift])) : null;
    const ageDays = before?.date === undefined ? null : ageInDays(before.date);
    const redshifts = prediction.clocks.map((c) => {
      const was = used?.get(c.id) ?? null;
      return {
        id: c.id,
        redshift: c.redshift,
        ...(used ? { before: was, change: c.redshift && was ? c.redshift.value - was.value : null, ageDays } : {}),
      };
    });
    return {
      kind: 'answer',
      status: 0,
      json: { sentences, redshifts, warnings: prediction.warnings },
      report: () => ({
        title,
        sentences: sentences.map((s) => s.sentence),
        tables: used ? [redshiftTable(redshifts, before?.date ?? null)] : [],
        conventions: [tideNote(campaign.tide), SIGN_NOTE, referencePotentialNote(campaign)],
        cautions: prediction.warnings,
        provenance: call.provenance,
      }),
    };
  },
};

/** Days since an ISO date; null where the text is none: then the age is said as the text itself. */
function ageInDays(date: string): number | null {
  const ms = /^\d{4}-\d{2}-\d{2}/.test(date) ? Date.parse(date.slice(0, 10)) : Number.NaN;
  return Number.isNaN(ms) ? null : Math.floor((Date.now() - ms) / 86_400_000);
}

type Redshift = {
  readonly id: string;
  readonly redshift: { value: number; u: number } | null;
  readonly before?: { value: number; u: number } | null;
  readonly change?: number | null;
  readonly ageDays?: number | null;
};

function redshiftTable(rows: readonly Redshift[], date: string | null): Table {
  return {
    id: 'redshifts',
    title: 'Redshift of each clock: now, and as used before',
    columns: [
      textColumn('clock'),
      estimateColumn('redshift now', OFFSET.unit),
      estimateColumn('used before', OFFSET.unit),
      numberColumn('change', OFFSET.unit),
      numberColumn('age', 'd'),
    ],
    rows: rows.map((r) => [
      textCell(r.id),
      estimateCell(r.redshift, OFFSET, 'signed'),
      r.before ? estimateCell(r.before, OFFSET, 'signed') : none,
      r.change == null ? none : decimalCell(r.change * 1e18, 2, 'signed'),
      r.ageDays == null ? none : decimalCell(r.ageDays, 0),
    ]),
    notes: [
      date === null
        ? 'The older file states no "date", so the age of its values is unknown.'
        : `The older file is dated ${date}.`,
    ],
  };
}
