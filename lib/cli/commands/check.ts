import { predict } from '../../answers/predict.js';
import type { Campaign } from '../../campaign/campaign.js';
import { CampaignError, type Fault, faultAt, type Warning } from '../../campaign/fault.js';
import { withPlaces } from '../../campaign/locate.js';
import { cautionsAsText } from '../../report/as-text.js';
import { decimalCell, none, type Report, textCell, textColumn } from '../../report/index.js';
import { readCallCampaign } from '../campaign-of-call.js';
import type { Answer, Call, Command } from '../command.js';
import { faultsAsText } from '../faults.js';

export const check: Command = {
  name: 'check',
  summary: 'whether a campaign file can be used, every fault with its line',
  synopsis: 'FILE [--strict] [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'Reads the file, builds the model from it, and says every fault at once: what was found, where, and what would be right. Cautions are printed too: defaults that were taken and what they may cost.',
    'With --json the object has "faults" (empty when good) and "warnings".',
  ],
  options: {
    strict: { help: 'refuse heights and potentials without a permanent-tide label instead of assuming one' },
  },
  examples: ['plumbtick check campaign.json', 'plumbtick check campaign.json --strict --json'],
  run(call) {
    const { campaign, faults, warnings } = examine(call);
    const status = faults.length > 0 ? 1 : 0;
    return {
      kind: 'answer',
      status,
      json: { faults, warnings },
      report: () => checkReport(call, campaign, faults, warnings),
      text: () => checkText(call, campaign, faults, warnings),
    } satisfies Answer;
  },
};

interface Examined {
  /** null where it could not be read */
  readonly campaign: Campaign | null;
  readonly faults: readonly Fault[];
  readonly warnings: readonly Warning[];
}

function examine(call: Call): Examined {
  let campaign: Campaign | null = null;
  try {
    const read = readCallCampaign(call);
    campaign = read.campaign;
    // what only shows when everything is put together: impossible correlations, contradicting exact values
    const { warnings: all } = read.withWarnings(read.refuseAt(() => predict(read.campaign)));
    if (!call.has('strict')) return { campaign, faults: [], warnings: all };
    const unlabelled = all.filter(({ code }) => code === 'tide-label-missing');
    return {
      campaign,
      faults: withPlaces(call.file?.text ?? '', unlabelled.map(tideFault)),
      warnings: all.filter((warning) => !unlabelled.includes(warning)),
    };
  } catch (error) {
    if (!(error instanceof CampaignError)) throw error;
    return { campaign, faults: error.faults, warnings: [] };
  }
}

const tideFault = ({ code, path, message }: Warning): Fault =>
  faultAt(
    code,
    path,
    `no permanent-tide label (${message.replace(/^no permanent-tide label; /, '')})`,
    '"tide": "mean", "zero" or "free"',
  );

const counted = (count: number, one: string) => `${count} ${count === 1 ? one : `${one}s`}`;

function summary(campaign: Campaign, warnings: readonly Warning[]): string {
  const parts = [
    counted(campaign.sites.length, 'site'),
    counted(campaign.clocks.length, 'clock'),
    counted(campaign.links.length, 'link'),
    counted(campaign.measurements.length, 'measurement'),
  ];
  return `Can be used: ${parts.join(', ')}; ${warnings.length === 0 ? 'no cautions' : counted(warnings.length, 'caution')}.`;
}

function checkText(
  call: Call,
  campaign: Campaign | null,
  faults: readonly Fault[],
  warnings: readonly Warning[],
): string {
  const head =
    faults.length > 0 || campaign === null
      ? faultsAsText(call.file?.name ?? '', faults)
      : `${summary(campaign, warnings)}\n`;
  return warnings.length === 0 ? head : `${head}${cautionsAsText(warnings)}\n`;
}

function checkReport(
  call: Call,
  campaign: Campaign | null,
  faults: readonly Fault[],
  warnings: readonly Warning[],
): Report {
  const place = (value: number | null) => (value === null ? none : decimalCell(value, 0));
  return {
    title: `Check of ${call.file?.name ?? ''}`,
    sentences: [
      faults.length > 0 || campaign === null
        ? `Refused: ${counted(faults.length, 'fault')}.`
        : summary(campaign, warnings),
    ],
    tables: [
      {
        id: 'faults',
        title: 'Faults',
        columns: [
          { head: 'line', unit: null, kind: 'number' },
          { head: 'column', unit: null, kind: 'number' },
          ...['path', 'code', 'found', 'expected'].map(textColumn),
        ],
        rows: faults.map(({ line, column, path, code, found, expected }) => [
          place(line),
          place(column),
          ...[path, code, found, expected].map(textCell),
        ]),
        notes: [],
      },
    ],
    conventions: [],
    cautions: warnings,
    provenance: call.provenance,
  };
}
