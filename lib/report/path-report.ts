import type { LinkPath, PathAnswer } from '../answers/path.js';
import { formatDuration } from '../quantity/index.js';
import { decimalCell } from './numbers.js';
import { none, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

/** What `path` found, as tables: signals, and clocks that are carried. */
export function pathReport(
  answer: PathAnswer,
  options: { readonly title: string; readonly provenance: string },
): Report {
  const moved = answer.links.filter((link) => link.movedClock !== null);
  return {
    title: answer.title ?? options.title,
    sentences: answer.links.map(sentence),
    tables: [signalsTable(answer.links), ...(moved.length > 0 ? [movedTable(moved)] : [])],
    conventions: [
      'Sign: a positive Sagnac delay makes a signal from the first clock (from) to the second (to) arrive later; it is positive eastwards. A clock that gains shows more time than one that stayed.',
      'These are times, constant as long as the way is: none of them is part of y.',
    ],
    cautions: answer.warnings,
    provenance: options.provenance,
  };
}

const NS = 1e9;
const PS = 1e12;
const nanoseconds = (s: number): string => `${s < 0 ? '\u2212' : '+'}${Math.abs(s * NS).toFixed(3)} ns`;

function sentence(link: LinkPath): string {
  const signal = `Link ${link.id}: a signal is delayed by rotation by ${nanoseconds(link.sagnac.oneWay)} one way, and as much stays in a two-way time comparison`;
  const moved = link.movedClock;
  return moved === null
    ? `${signal}.`
    : `${signal}; a clock carried along it for ${formatDuration(moved.duration)} gains ${nanoseconds(moved.total)} on one that stays.`;
}

const signalsTable = (links: readonly LinkPath[]): Table => ({
  id: 'signals',
  title: 'Signals',
  columns: [
    textColumn('link'),
    textColumn('way'),
    numberColumn('way points'),
    numberColumn('length', 'km'),
    numberColumn('Sagnac one-way', 'ns'),
    numberColumn('Sagnac two-way', 'ns'),
    numberColumn('gravitational delay one-way', 'ps'),
    numberColumn('gravitational delay two-way', 'ps'),
  ],
  rows: links.map((link) => [
    textCell(link.id),
    textCell(link.way),
    decimalCell(link.via, 0),
    decimalCell(link.length / 1000, 3),
    decimalCell(link.sagnac.oneWay * NS, 4, 'signed'),
    decimalCell(link.sagnac.twoWay * NS, 4, 'signed'),
    link.gravitationalDelay === null ? none : decimalCell(link.gravitationalDelay.oneWay * PS, 2),
    link.gravitationalDelay === null ? none : decimalCell(link.gravitationalDelay.twoWay * PS, 2),
  ]),
  notes: [
    'two-way: what stays in half the difference of the signals both ways over one path. The Sagnac delay stays whole, for it has opposite signs; the gravitational delay is the same both ways and cancels.',
    'A fibre’s refractive index has no part in the Sagnac delay.',
  ],
});

const movedTable = (links: readonly LinkPath[]): Table => ({
  id: 'moved-clocks',
  title: 'Carried clocks: time gained on a clock that stays at the first site',
  columns: [
    textColumn('link'),
    numberColumn('duration', 'h'),
    numberColumn('by height', 'ns'),
    numberColumn('by velocity', 'ns'),
    numberColumn('by rotation', 'ns'),
    numberColumn('total', 'ns'),
  ],
  rows: links.flatMap(({ id, movedClock: m }) =>
    m === null
      ? []
      : [
          [
            textCell(id),
            decimalCell(m.duration / 3600, 3),
            ...[m.potential, m.velocity, m.rotation, m.total].map((s) => decimalCell(s * NS, 4, 'signed')),
          ],
        ],
  ),
  notes: [
    'by height: ∫ΔW/c² dt with the normal field at the heights above sea level; by velocity: −∫v²/2c² dt over the ground; by rotation: the Sagnac term, which a round trip without area does not have.',
  ],
});
