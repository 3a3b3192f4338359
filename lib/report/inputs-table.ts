import type { Campaign } from '../campaign/campaign.js';
import type { Model } from '../model/model.js';
import { inputUnit } from './input-unit.js';
import { inputText, sourceText } from './input-words.js';
import { sizeCell, statedCell } from './numbers.js';
import { estimateColumn, none, numberColumn, type Table, textCell, textColumn } from './table.js';

/** Every input that enters, in the order of the file: value and u as stated, in SI, and the sources that its error comes from. */
export function inputsTable({ campaign, inputs }: Model): Table {
  return {
    id: 'inputs',
    title: 'All inputs as given',
    columns: [
      textColumn('input'),
      textColumn('path'),
      estimateColumn('stated', null),
      textColumn('unit'),
      numberColumn('u'),
      textColumn('error from'),
      textColumn('distribution'),
    ],
    rows: inputs.map(({ path, value, u, parts, distribution, dof }) => [
      textCell(inputText(campaign, path)),
      textCell(path),
      statedCell({ value, u }),
      textCell(inputUnit(path)),
      u > 0 ? sizeCell(u) : none,
      textCell(sourcesText(campaign, parts)),
      textCell(u > 0 ? `${distribution}${dof === null ? '' : `, ${dof} degrees of freedom`}` : 'exact'),
    ]),
    notes: [
      'Before any conversion of tide, frame or unit. Inputs that name one source are correlated; own: independent of all others. Systematics of clocks and links have the value 0.',
    ],
  };
}

const sourcesText = (campaign: Campaign, parts: Model['inputs'][number]['parts']): string =>
  parts.length === 0
    ? 'none'
    : [...new Set(parts.map(({ source }) => (source === null ? 'own' : sourceText(campaign, source))))].join(', ');

/** The shared error sources, and how they go together between sites. */
export function sourcesTable({ sources }: Campaign): Table {
  return {
    id: 'sources',
    title: 'Shared error sources',
    columns: [textColumn('source'), textColumn('name'), textColumn('correlation between sites')],
    rows: sources.map(({ id, name, correlation, correlationLengthM }) => [
      textCell(id),
      name === undefined ? none : textCell(name),
      textCell(
        correlationLengthM !== undefined
          ? `exp(−d/L), L = ${correlationLengthM / 1000} km`
          : correlation !== undefined
            ? `ρ = ${String(correlation).replace('-', '\u2212')}`
            : 'ρ = 1',
      ),
    ]),
    notes: [],
  };
}

/** Notes, references and dates that stand anywhere in the file, with their place. */
export function remarksTable(campaign: Campaign): Table {
  const rows: Table['rows'][number][] = [];
  const walk = (value: unknown, path: string): void => {
    if (Array.isArray(value))
      value.forEach((one, i) => {
        walk(one, `${path}${path === '' ? '' : '.'}${(one as { id?: unknown })?.id ?? i}`);
      });
    else if (value !== null && typeof value === 'object') {
      const { note, reference, date } = value as { note?: string; reference?: string; date?: string };
      const said = [note, reference, date].filter((text) => typeof text === 'string');
      if (said.length > 0) rows.push([textCell(path === '' ? 'campaign' : path), textCell(said.join('; '))]);
      for (const [key, inner] of Object.entries(value)) walk(inner, path === '' ? key : `${path}.${key}`);
    }
  };
  walk(campaign, '');
  return {
    id: 'remarks',
    title: 'Notes and references',
    columns: [textColumn('at'), textColumn('text')],
    rows,
    notes: [],
  };
}
