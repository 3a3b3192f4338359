import type { Evaluation, LinkEvaluation } from '../answers/evaluation.js';
import { suspectsSentence } from '../answers/suspects/suspects.js';
import type { Campaign } from '../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { formatLength } from '../quantity/index.js';
import { checksTable } from './checks-table.js';
import { LENGTH_NOTE, referencePotentialNote, SIGN_NOTE, tideNote } from './conventions.js';
import { decimalCell, estimateCell, METRES, OFFSET, POTENTIAL, sizeText } from './numbers.js';
import {
  estimateColumn,
  none,
  notComputed,
  numberColumn,
  type Report,
  type Table,
  textCell,
  textColumn,
} from './table.js';

const ROUND_GRAVITY = 9.81;
/** A fraction of frequency as a length, for a sentence. */
const lengthOf = (y: number) => formatLength((Math.abs(y) * SPEED_OF_LIGHT_SQUARED_M2_PER_S2) / ROUND_GRAVITY, 2);

/** Suspects shown per link where none or many fit. */
const MAX_SUSPECTS = 8;

/** What `evaluate` found: verdicts, measured beside predicted, what the clocks say of the heights, suspects. */
export function evaluationReport(
  evaluation: Evaluation,
  campaign: Campaign,
  options: { readonly title: string; readonly provenance: string },
): Report {
  const tables = [
    comparisonTable(evaluation),
    inferredTable(evaluation),
    suspectsTable(evaluation),
    checksTable(evaluation.checks),
  ].filter((t) => t.rows.length > 0);
  return {
    title: campaign.title ?? options.title,
    sentences: [
      ...evaluation.links.map((l) => verdictSentence(l, evaluation, campaign)),
      ...togetherSentence(evaluation),
    ],
    tables,
    conventions: [
      tideNote(campaign.tide),
      SIGN_NOTE,
      'measured: with every correction applied except gravity’s; u with the systematics of clocks and link.',
      'agree: |z| ≤ 2 (metrological compatibility, VIM 2.47). inconclusive: a discrepancy of the size asked about would not have shown (test size 0.05, power 0.8). E_n and the Birge ratio are extras; no uncertainty is scaled by them.',
      referencePotentialNote(campaign),
    ],
    cautions: evaluation.warnings,
    provenance: options.provenance,
  };
}

/** Verdict and its reason, in one or two sentences. */
export function verdictSentence(link: LinkEvaluation, _: Evaluation, campaign: Campaign): string {
  const name = `Link ${link.id}${link.measurement === link.id ? '' : ` (measurement ${link.measurement})`}`;
  if (!link.residual || link.z === null)
    return `${name}: not computed, its sites have no common level to predict from.`;
  const u = lengthOf(link.residual.u);
  const z = sizeText(Math.abs(link.z));
  if (link.verdict === 'differ')
    return `${name}: differ. Measured and predicted are ${lengthOf(link.residual.value)} apart, ${z} times u = ${u}. ${suspectsSentence(link.suspects)}`;
  const shows = formatLength(link.smallestDetectableM ?? 0, 2);
  if (link.verdict === 'inconclusive') {
    const effect = campaign.effectM ?? 10 * (campaign.targetM ?? 0);
    return `${name}: inconclusive. Only ${shows} or more would have shown; the effect asked about is ${formatLength(effect, 2)}.`;
  }
  if (link.verdict === 'agree')
    return `${name}: agree. The difference is ${lengthOf(link.residual.value)}, ${z} times u = ${u}. A discrepancy of ${shows} would have shown.`;
  return `${name}: the difference is ${lengthOf(link.residual.value)}, ${z} times u = ${u}; without an effect asked about that says no more.`;
}

function togetherSentence({ chi2, dof, p, birge }: Evaluation): string[] {
  if (chi2 === null || dof < 2) return [];
  return [
    `Together: χ² = ${sizeText(chi2, 3)} for ${dof} measurements, p = ${sizeText(p ?? 1)}; Birge ratio ${sizeText(birge ?? 0, 3)}.`,
  ];
}

function comparisonTable({ links }: Evaluation): Table {
  return {
    id: 'links',
    title: 'Links: measured beside predicted',
    columns: [
      textColumn('link'),
      textColumn('measurement'),
      estimateColumn('measured', OFFSET.unit),
      estimateColumn('predicted', OFFSET.unit),
      estimateColumn('difference', OFFSET.unit),
      numberColumn('z'),
      numberColumn('p'),
      numberColumn('E_n'),
      textColumn('verdict'),
    ],
    rows: links.map((l) => [
      textCell(l.id),
      textCell(String(l.measurement)),
      estimateCell(l.measured, OFFSET, 'signed'),
      estimateCell(l.predicted, OFFSET, 'signed'),
      estimateCell(l.residual, OFFSET, 'signed'),
      l.z === null ? notComputed : decimalCell(l.z, 2, 'signed'),
      l.p === null ? notComputed : decimalCell(l.p, 3),
      // E_n = d/(2u): both expanded with k = 2 (ISO 13528:2022, 9.7)
      l.z === null ? notComputed : decimalCell(Math.abs(l.z) / 2, 2),
      l.verdict === null ? none : textCell(l.verdict),
    ]),
    notes: ['predicted: gravity’s y plus what unlike transitions add. difference = measured − predicted.'],
  };
}

function inferredTable({ links }: Evaluation): Table {
  return {
    id: 'inferred',
    title: 'What the clocks alone say of the heights',
    columns: [
      textColumn('link'),
      textColumn('measurement'),
      estimateColumn('length', METRES.unit),
      estimateColumn('ΔW', POTENTIAL.unit),
      estimateColumn('normal height', METRES.unit),
    ],
    rows: links.map((l) => [
      textCell(l.id),
      textCell(String(l.measurement)),
      estimateCell(l.inferred.dH, METRES, 'signed'),
      estimateCell(l.inferred.dW, POTENTIAL, 'signed'),
      estimateCell(l.inferred.dHNormal, METRES, 'signed'),
    ]),
    notes: [LENGTH_NOTE, 'Not an official height: heights for legal or cadastral use are for licensed surveyors.'],
  };
}

function suspectsTable({ links }: Evaluation): Table {
  return {
    id: 'suspects',
    title: 'Suspects: single mistakes held against the difference, best first',
    columns: [
      textColumn('link'),
      textColumn('what'),
      textColumn('mistake'),
      numberColumn('explains', OFFSET.unit),
      numberColumn('z left'),
      textColumn('fits'),
      textColumn('look at'),
    ],
    rows: links.flatMap((l) =>
      l.suspects
        .slice(0, MAX_SUSPECTS)
        .map((s) => [
          textCell(l.id),
          textCell(s.path),
          textCell(s.mistake),
          decimalCell(s.explains.value * 1e18, 1, 'signed'),
          decimalCell(s.z, 1, 'signed'),
          textCell(s.fits ? 'fits' : 'does not fit'),
          textCell(s.lookAt),
        ]),
    ),
    notes: [
      'Each mistake is taken out of this campaign and the whole model run again. fits: what is left is within 2u. Those that would change the difference by less than a tenth of its u are left out.',
    ],
  };
}
