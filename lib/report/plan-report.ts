import type { BridgedPoint, LinkPlan, Plan, PlanPoint } from '../answers/plan.js';
import type { Campaign } from '../campaign/campaign.js';
import { decimalCell, OFFSET, sizeCell } from './numbers.js';
import { dayText, detectionSentence, linkSentence, partText, wallText } from './plan-words.js';
import { type Cell, none, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

export interface PlanReportOptions {
  readonly title: string;
  readonly provenance: string;
  /** for a program to read: every curve */
  readonly full: boolean;
  /** links whose curves are wanted */
  readonly links: readonly string[];
}

/** More links than this are not told one by one. */
const MAX_SENTENCES = 4;
/** More curves than this are printed only where asked for. */
const MAX_CURVES = 2;

/** What `plan` found: when, what limits, what could be seen, and the curves. */
export function planReport(plan: Plan, campaign: Campaign, options: PlanReportOptions): Report {
  return {
    title: campaign.title ?? options.title,
    sentences: sentences(plan, campaign),
    tables: [
      linksTable(plan, campaign),
      sharesTable(plan),
      bridgedTable(plan, campaign),
      curveTable(plan, campaign, options),
    ].filter((table) => table.rows.length > 0),
    conventions: [
      'Times are on the wall, from the start of the window; the common up-time of clocks and link is their share of it.',
      'u(length) = u(y)·c²/ḡ. Geodesy is no part of it; smallest detectable and effect are against the prediction, with geodesy.',
      `Test size ${plan.test.size}, power ${plan.test.power}.`,
    ],
    cautions: plan.warnings,
    provenance: options.provenance,
  };
}

function sentences(plan: Plan, campaign: Campaign): string[] {
  if (plan.links.length === 0) return ['The campaign has no links between clocks.'];
  if (plan.links.length > MAX_SENTENCES) {
    const met = plan.links.filter(({ timeToTarget }) => timeToTarget !== null).length;
    return plan.target === null ? [] : [`${met} of ${plan.links.length} links reach the target.`];
  }
  return plan.links.map((link) =>
    [linkSentence(link, plan, campaign), detectionSentence(link, plan)].filter(Boolean).join(' '),
  );
}

const millimetres = (lengthM: number | null): Cell => (lengthM === null ? none : sizeCell(1000 * lengthM, 3));

function linksTable(plan: Plan, campaign: Campaign): Table {
  return {
    id: 'links',
    title: 'Links: how long, what limits, what could be seen',
    columns: [
      textColumn('link'),
      numberColumn('uptime'),
      textColumn('target after'),
      textColumn('on'),
      numberColumn('u at window', 'mm'),
      numberColumn('floor', 'mm'),
      textColumn('what limits the window'),
      numberColumn('u of geodesy', 'mm'),
      numberColumn('detectable', 'mm'),
      textColumn('effect after'),
    ],
    rows: plan.links.map((link) => {
      const { window, targetMet, timeToTarget, timeToEffect } = link;
      return [
        textCell(link.id),
        decimalCell(link.uptime, 3),
        plan.target === null ? none : textCell(wallText(timeToTarget)),
        targetMet ? textCell(dayText(targetMet.at)) : none,
        millimetres(window?.uH ?? null),
        millimetres(link.floor),
        window?.limit ? textCell(partText(window.limit, campaign)) : none,
        millimetres(link.uGeodesy),
        millimetres(link.smallestDetectable),
        plan.effect === null || link.uGeodesy === null ? none : textCell(wallText(timeToEffect)),
      ];
    }),
    notes: [
      'floor: what no averaging passes. detectable: smallest discrepancy against the prediction that the window shows. never: not at any time.',
    ],
  };
}

function sharesTable(plan: Plan): Table {
  const heads = ['from', 'to', 'link'];
  return {
    id: 'shares',
    title: 'Shares of u² over the window',
    columns: [
      textColumn('link'),
      ...heads.map((head) => numberColumn(`statistics ${head}`, '%')),
      ...heads.map((head) => numberColumn(`systematic ${head}`, '%')),
      numberColumn('ratio', '%'),
    ],
    rows: plan.links.flatMap(({ id, window }) => {
      if (!window?.shares) return [];
      const s = window.shares;
      return [
        [
          textCell(id),
          ...[
            s.statisticsFrom,
            s.statisticsTo,
            s.statisticsLink,
            s.systematicFrom,
            s.systematicTo,
            s.systematicLink,
            s.ratio,
          ].map((share) => decimalCell(100 * share, 1)),
        ],
      ];
    }),
    notes: [
      'from, to: the two clocks; ratio: the offsets of unlike transitions. Covariances included: a source that both clocks share cancels, and a share can be negative.',
    ],
  };
}

function bridgedTable(plan: Plan, campaign: Campaign): Table {
  return {
    id: 'bridged',
    title: 'With gaps bridged by flywheels',
    columns: [
      textColumn('link'),
      textColumn('flywheel at'),
      textColumn('target after'),
      numberColumn('u at window', 'mm'),
      numberColumn('without', 'mm'),
      numberColumn('u of dead time', OFFSET.unit),
      textColumn('what limits the window'),
    ],
    rows: plan.links.flatMap(({ id, bridged, window }) =>
      bridged
        ? [
            [
              textCell(id),
              textCell(bridged.clocks.join(', ')),
              plan.target === null ? none : textCell(wallText(bridged.timeToTarget)),
              millimetres(bridged.window?.uH ?? null),
              millimetres(window?.uH ?? null),
              bridged.window ? sizeCell(1e18 * bridged.window.uDeadTime) : none,
              bridged.window?.limit ? textCell(partText(bridged.window.limit, campaign)) : none,
            ],
          ]
        : [],
    ),
    notes: [
      'A clock with a flywheel counts while the flywheel runs; the flywheel adds the noise of its mean over the gaps (Yu, Weiss & Parker 2007; Leute et al. 2016).',
    ],
  };
}

function curveTable(plan: Plan, campaign: Campaign, { full, links }: PlanReportOptions): Table {
  const wanted = links.length > 0 ? plan.links.filter(({ id }) => links.includes(id)) : plan.links;
  const shown = full || links.length > 0 || wanted.length <= MAX_CURVES ? wanted : [];
  const row = (id: string, p: PlanPoint | BridgedPoint, how: string): readonly Cell[] => [
    textCell(id),
    textCell(how),
    sizeCell(p.T / 86_400, 3),
    sizeCell(1e18 * p.uStat, 3),
    sizeCell(1e18 * p.uY, 3),
    millimetres(p.uH),
    p.limit ? textCell(partText(p.limit, campaign)) : none,
  ];
  const rowsOf = ({ id, curve, bridged }: LinkPlan) => [
    ...curve.map((p) => row(id, p, 'common time')),
    ...(bridged?.curve ?? []).map((p) => row(id, p, 'bridged')),
  ];
  return {
    id: 'curve',
    title: 'Uncertainty against time',
    columns: [
      textColumn('link'),
      textColumn('over'),
      numberColumn('T', 'd'),
      numberColumn('u(y) statistics', OFFSET.unit),
      numberColumn('u(y)', OFFSET.unit),
      numberColumn('u(length)', 'mm'),
      textColumn('what limits'),
    ],
    rows: shown.flatMap(rowsOf),
    notes: [],
  };
}
