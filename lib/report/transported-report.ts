import type { TransportedClocks, TransportedLink, TransportedResult } from '../answers/transported-clock.js';
import type { Campaign } from '../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { formatLength, formatScaled } from '../quantity/index.js';
import { LENGTH_NOTE, SIGN_NOTE, tideNote } from './conventions.js';
import { decimalCell, estimateCell, METRES, OFFSET, POTENTIAL, type Scale, sizeCell } from './numbers.js';
import { type Cell, estimateColumn, none, numberColumn, type Report, textCell, textColumn } from './table.js';

/** What the clocks that travel say of potential differences. */
export function transportedReport(
  answer: TransportedClocks,
  campaign: Campaign,
  options: { readonly title: string; readonly provenance: string },
): Report {
  return {
    title: campaign.title ?? options.title,
    sentences: answer.links.length === 0 ? [NOTHING] : answer.links.flatMap(sentences),
    tables: [
      {
        id: 'side-by-side',
        title: 'Side by side: what the two clocks differ by, gravity taken off',
        columns: [
          textColumn('link'),
          textColumn('when'),
          estimateColumn('y', OFFSET.unit),
          estimateColumn('ΔW', POTENTIAL.unit),
          estimateColumn('difference', OFFSET.unit),
        ],
        rows: answer.links.flatMap((l) =>
          l.sideBySide.map((s) => [
            textCell(l.id),
            textCell(s.when),
            s.y ? estimateCell(s.y, OFFSET, 'signed') : none,
            estimateCell(s.dW, POTENTIAL, 'signed'),
            estimateOrU(s.difference, OFFSET),
          ]),
        ),
        notes: ['u of the difference with everything that is uncertain there; what both clocks share is in it.'],
      },
      {
        id: 'before-after',
        title: 'Before against after, before anything is averaged',
        columns: [
          textColumn('link'),
          textColumn('comparisons'),
          estimateColumn('before − after', OFFSET.unit),
          numberColumn('normalised'),
        ],
        rows: answer.links.flatMap((l) =>
          l.beforeAfter.map((b) => [
            textCell(l.id),
            textCell(`${b.before} and ${b.after}`),
            estimateCell(b.difference, OFFSET, 'signed'),
            b.z === null ? none : decimalCell(b.z, 2, 'signed'),
          ]),
        ),
        notes: ['normalised: the difference over its u.'],
      },
      {
        id: 'results',
        title: 'Potential differences by the clock that travels',
        columns: [
          textColumn('link'),
          textColumn('measurement'),
          estimateColumn('length', METRES.unit),
          estimateColumn('ΔW', POTENTIAL.unit),
          estimateColumn('predicted ΔW', POTENTIAL.unit),
          estimateColumn('difference', POTENTIAL.unit),
          numberColumn('z'),
        ],
        rows: answer.links.flatMap((l) =>
          l.results.map((r) => [
            textCell(l.id),
            textCell(r.measurement === null ? 'planned' : String(r.measurement)),
            estimateOrU(r.dH, METRES),
            estimateOrU(r.dW, POTENTIAL),
            r.predicted ? estimateCell(r.predicted, POTENTIAL, 'signed') : none,
            r.residual ? estimateCell(r.residual, POTENTIAL, 'signed') : none,
            r.z === null ? none : decimalCell(r.z, 2, 'signed'),
          ]),
        ),
        notes: [
          'ΔW = c²·(R_remote/R_local − 1) + ΔW_local with R = ν(to)/ν(from): the ratio of unlike clocks cancels.',
        ],
      },
      {
        id: 'components',
        title: 'Systematics: what cancels',
        columns: [
          textColumn('link'),
          textColumn('of'),
          textColumn('component'),
          textColumn('source'),
          numberColumn('remote', OFFSET.unit),
          numberColumn('side by side', OFFSET.unit),
          numberColumn('left', OFFSET.unit),
        ],
        rows: answer.links.flatMap((l) =>
          (l.results[0]?.components ?? []).map((c) => [
            textCell(l.id),
            textCell(c.of),
            textCell(c.name),
            c.source === null ? none : textCell(c.source),
            ...[c.uRemote, c.uSideBySide, c.uLeft].map((u) => sizeCell(1e18 * u)),
          ]),
        ),
        notes: [
          'A piece of the travelling clock cancels by its source; one without a source is a new error in each place.',
        ],
      },
    ].filter(({ rows }) => rows.length > 0),
    conventions: [tideNote(campaign.tide), SIGN_NOTE, LENGTH_NOTE],
    cautions: answer.warnings,
    provenance: options.provenance,
  };
}

const NOTHING =
  'No link has a clock that travels: "transported": {"clock": "…", "sideBySide": [{"when": "before", "y": "…", "dH": "…"}]}.';

/** An estimate, or u alone in words where there is no value yet. */
const estimateOrU = ({ value, u }: { readonly value: number | null; readonly u: number }, scale: Scale): Cell =>
  value === null
    ? textCell(`u = ${formatScaled(u, null, scale.power, { significant: 2 })}`)
    : estimateCell({ value, u }, scale, 'signed');

const lengthOf = (y: number) => formatLength((Math.abs(y) * SPEED_OF_LIGHT_SQUARED_M2_PER_S2) / 9.81, 2);

function sentences(link: TransportedLink): string[] {
  const [pair] = link.beforeAfter;
  const agreement =
    pair && pair.z !== null
      ? ` Before and after differ by ${lengthOf(pair.difference.value)}, ${Math.abs(pair.z).toFixed(1)} times the u of that.`
      : '';
  return link.results.map((r) => `${resultSentence(link.id, link.clock, r)}${agreement}`);
}

function resultSentence(id: string, clock: string, { measurement, dH, residual, z }: TransportedResult): string {
  if (dH.value === null)
    return `Link ${id}, clock ${clock} travelling: ${formatLength(dH.u, 2)} ${measurement === null ? 'planned over the window' : 'once the comparisons side by side are there'}.`;
  const against = residual && z !== null ? `, ${Math.abs(z).toFixed(1)} times u from the prediction` : '';
  return `Link ${id}, clock ${clock} travelling: length equivalent known to ${formatLength(dH.u, 2)}${against}.`;
}
