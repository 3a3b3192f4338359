import type { LinkTide, TideAnswer } from '../answers/tide.js';
import { formatDuration } from '../quantity/index.js';
import { decimalCell, OFFSET, sizeText } from './numbers.js';
import { none, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

export interface TideReportOptions {
  /** heading where the campaign has no title */
  readonly title: string;
  /** version and date of the computation */
  readonly provenance: string;
  /** the whole series; else it is only spoken of */
  readonly full: boolean;
}

const offsetCell = (y: number) => decimalCell(y * 1e18, 3, 'signed');
const sizeOfOffset = (y: number) => `${sizeText(Math.abs(y) * 1e18)}e-18`;

/** What `tide` found: one line per link, and the series. */
export function tideReport(answer: TideAnswer, options: TideReportOptions): Report {
  const tables = [linksTable(answer), ...(options.full ? [seriesTable(answer)] : [])];
  return {
    title: answer.title ?? options.title,
    sentences: answer.links.map(verdict),
    tables,
    conventions: [
      'Sign: add y to the offset of the static (mean-tide) potential to get what the clocks feel at an instant; to correct a measured offset, subtract it. y > 0 when the second clock of a link (to) runs fast.',
      'Model: solid-Earth tide of Moon (degrees 2, 3) and Sun (degree 2) at a site fixed to the crust, without its permanent part. It is good to about 1e-18; omitted bounds what it leaves out.',
    ],
    cautions: answer.warnings,
    provenance: options.provenance,
  };
}

/** The finding for one link in a sentence. */
function verdict(link: LinkTide): string {
  const swing = `Link ${link.id}: the tide moves y between ${offsetText(link.min)} and ${offsetText(link.max)}`;
  if (link.left === null) return `${swing}; clocks and link never run together in the window.`;
  const where = link.left.over === 'window' ? 'the whole window' : 'the stated availability';
  const left = `averaging over ${where} (${formatDuration(link.left.seconds)}) leaves ${offsetText(link.left.mean)}`;
  if (link.needsCorrecting === null || link.target === null)
    return `${swing}; ${left}. No target is stated to judge it by.`;
  return `${swing}; ${left}, and the target is ${sizeOfOffset(link.target)}: the average ${link.needsCorrecting ? 'needs correcting' : 'does not need correcting'}.`;
}

const offsetText = (y: number) => (y === 0 ? '0' : `${y < 0 ? '\u2212' : '+'}${sizeOfOffset(y)}`);

const linksTable = ({ links }: TideAnswer): Table => ({
  id: 'links',
  title: 'Links: what the tide adds to y',
  columns: [
    textColumn('link'),
    ...['min', 'max', 'mean', 'rms', 'left by averaging', 'omitted'].map((head) => numberColumn(head, OFFSET.unit)),
    numberColumn('averaged', 'h'),
    textColumn('average needs correcting'),
  ],
  rows: links.map((link) => [
    textCell(link.id),
    offsetCell(link.min),
    offsetCell(link.max),
    offsetCell(link.mean),
    decimalCell(link.rms * 1e18, 3),
    link.left === null ? none : offsetCell(link.left.mean),
    decimalCell(link.omitted * 1e18, 3),
    link.left === null ? none : decimalCell(link.left.seconds / 3600, 2),
    textCell(link.needsCorrecting === null ? 'not judged' : link.needsCorrecting ? 'yes' : 'no'),
  ]),
  notes: [
    'rms is about zero. mean is that of the samples; left by averaging is the integral over the window, or over the time in which both clocks and the link are stated to run. It needs correcting where it exceeds a third of the target.',
    'The series: --json, or --csv --table series.',
  ],
});

const seriesTable = ({ series }: TideAnswer): Table => ({
  id: 'series',
  title: 'Series: what to add to y',
  columns: [textColumn('time'), ...series.links.map(({ id }) => numberColumn(id, OFFSET.unit))],
  rows: series.times.map((time, t) => [textCell(time), ...series.links.map(({ y }) => offsetCell(y[t]!))]),
  notes: [],
});
