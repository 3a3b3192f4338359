import { analyseSeries } from '../../answers/series.js';
import { recommendedFrequency } from '../../clocks/recommended-frequencies.js';
import {
  type ColumnWord,
  FrequencySeriesParser,
  type Nominal,
  nominal,
  ratioNominal,
  readColumnWords,
  type SeriesOptions,
} from '../../clocks/series/index.js';
import { readExact } from '../../quantity/index.js';
import { seriesReport } from '../../report/series-report.js';
import { type Call, type Command, UsageError } from '../command.js';
import { readFileInPieces } from '../file-pieces.js';

export const series: Command = {
  name: 'series',
  summary: 'frequency data: gaps and oddities, stability, the mean and its uncertainty',
  synopsis: 'FILE [--tau 1s] [--columns "mjd y"] [--at "1,10,100"] [--json | --csv | --markdown]',
  takesFile: 'data',
  description: [
    'Reads lines of start (MJD or ISO 8601, UTC) and y, with stop, u and validity where there are such columns, from CSV or from columns parted by blanks; any length, in pieces. What looks wrong (order, duplicates, overlaps, gaps, leaps of a day, outliers, steps, slips of unit) is named by line; nothing is changed, interpolated or left out except duplicate, overlapping and invalid rows, which are counted.',
    'Then the Allan, modified Allan, time, Hadamard and total deviations with 68.3 % intervals, the noise by name, and the mean with the uncertainty that this noise leaves it. Deviations use only terms without a gap inside.',
    'The columns are guessed; where that is not certain, --columns has to confirm. A frequency or a ratio, however many digits it has, becomes a fraction by its nominal: the recommended one that it lies next to, or the one stated.',
  ],
  options: {
    tau: { value: 'DURATION', help: 'time between samples; needed where the file has no dates' },
    columns: { value: 'WORDS', help: 'one word per column: mjd iso stop y u valid ratio hz, - for one not to be read' },
    at: { value: 'FACTORS', help: 'averaging factors in samples, such as 1,10,100; octaves if not given' },
    transition: { value: 'NAME', help: 'clock of a hz column, or the two of a ratio, such as 171Yb/87Sr' },
    nominal: { value: 'NUMBER', help: 'what a hz or ratio column reads at y = 0, every digit: 429228004229872.99' },
    carrier: {
      value: 'HZ',
      help: 'optical frequency behind a beat note in the hz column; negative if the beat falls as the clock rises',
    },
  },
  examples: [
    'plumbtick series run-7.csv',
    'plumbtick series run-7.txt --columns "mjd y u valid" --at 1,10,100,1000 --json',
    'plumbtick series ratio.txt --columns "mjd ratio" --transition 171Yb/87Sr',
    'plumbtick series beat.txt --columns "mjd hz" --nominal 35e6 --carrier 429228004229872.99',
  ],
  async run(call) {
    const options = readOptions(call);
    const factors = readFactors(call.option('at'));
    const parser = new FrequencySeriesParser(options);
    const progress = new Progress();
    await readFileInPieces(call.fileName!, (piece, size) => {
      parser.push(piece);
      progress.show(parser.progress, size);
    });
    progress.end();
    const read = parser.finish();
    const answer = analyseSeries(read, factors === null ? {} : { factors });
    return {
      kind: 'answer',
      status: 0,
      json: answer,
      report: (detail) => seriesReport(answer, { provenance: call.provenance, full: detail === 'full' }),
    };
  },
};

const wrong = (option: string, found: string, expected: string): never => {
  throw new UsageError(`series: --${option} ${found}: expected ${expected}`);
};

function readOptions(call: Call): SeriesOptions {
  const tau = call.option('tau');
  const columns = call.option('columns');
  const from = readNominal(call);
  return {
    ...(tau === null ? {} : { tauS: readTau(tau) }),
    ...(columns === null ? {} : { columns: readColumns(columns) }),
    ...(from === null ? {} : { nominal: from }),
  };
}

function readTau(text: string): number {
  const read = readExact(text, 'duration');
  if (!read.ok) return wrong('tau', text, read.problems[0]?.expected ?? 'a duration');
  return read.value > 0 ? read.value : wrong('tau', text, 'more than 0, such as 1s');
}

function readColumns(text: string): readonly ColumnWord[] {
  const read = readColumnWords(text);
  return 'words' in read ? read.words : wrong('columns', JSON.stringify(text), read.faults[0]!.expected);
}

function readFactors(text: string | null): readonly number[] | null {
  if (text === null) return null;
  const factors = text.split(/[\s,]+/).filter((part) => part !== '');
  if (factors.length === 0 || factors.some((part) => !/^[1-9]\d{0,8}$/.test(part))) {
    return wrong('at', JSON.stringify(text), 'whole numbers of samples from 1 on, such as 1,10,100');
  }
  return [...new Set(factors.map(Number))].sort((a, b) => a - b);
}

function readNominal(call: Call): Nominal | null {
  const [transition, stated, carrier] = ['transition', 'nominal', 'carrier'].map((name) => call.option(name));
  if (transition != null && (stated != null || carrier != null)) {
    return wrong('transition', transition, 'either a transition or --nominal and --carrier');
  }
  if (transition != null) {
    const [b, a, ...more] = transition.split('/').map((name) => name.trim());
    if (more.length > 0) return wrong('transition', transition, 'one transition, or two with a solidus between');
    return a === undefined ? ofOne(b!) : ratioNominal(frequencyText(b!), frequencyText(a));
  }
  if (stated == null) {
    return carrier == null ? null : wrong('carrier', carrier, '--nominal beside it: the beat at y = 0');
  }
  try {
    return nominal(stated, carrier ?? stated);
  } catch (error) {
    if (error instanceof RangeError) throw new UsageError(`series: --nominal, --carrier: ${error.message}`);
    throw error;
  }
}

function frequencyText(transition: string): string {
  return (
    recommendedFrequency(transition)?.text ??
    wrong('transition', transition, 'a transition with a recommended frequency, such as 87Sr')
  );
}

const ofOne = (transition: string): Nominal => nominal(frequencyText(transition), frequencyText(transition));

/** How far the reading has come, on one line of a terminal; nothing where standard error is none. */
class Progress {
  #next = Date.now() + 500;
  #shown = false;

  show({ bytes, rows }: { readonly bytes: number; readonly rows: number }, size: number | null): void {
    if (!process.stderr.isTTY || Date.now() < this.#next) return;
    this.#next = Date.now() + 200;
    this.#shown = true;
    const share = size === null || size === 0 ? '' : `${Math.floor((100 * bytes) / size)} %, `;
    process.stderr.write(`\r${share}${(rows / 1e6).toFixed(1)} million rows `);
  }

  end(): void {
    if (this.#shown) process.stderr.write('\r\u001b[K');
  }
}
