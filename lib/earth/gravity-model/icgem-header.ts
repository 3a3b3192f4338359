import { CampaignError, type Fault, type Warning } from '../../campaign/fault.js';
import { closest } from '../../quantity/near-match.js';
import type { TideSystem } from '../tide-system.js';
import type { CoefficientErrors } from './gravity-model.js';

/** What the head of an ICGEM file says. */
export interface IcgemHeader {
  readonly format: 'icgem1.0' | 'icgem2.0';
  readonly name: string;
  readonly gmM3s2: number;
  readonly radiusM: number;
  readonly maxDegree: number;
  readonly tide: TideSystem | 'unknown';
  readonly errors: CoefficientErrors;
  /** columns of standard deviations that follow C and S; the first two are used (calibrated before formal) */
  readonly sigmaColumns: 0 | 2 | 4;
  readonly normalized: boolean;
  readonly warnings: readonly Warning[];
}

const TIDES: Readonly<Record<string, TideSystem | 'unknown'>> = {
  tide_free: 'free',
  'tide-free': 'free',
  non_tidal: 'free',
  zero_tide: 'zero',
  'zero-tide': 'zero',
  mean_tide: 'mean',
  'mean-tide': 'mean',
  unknown: 'unknown',
};

const ERRORS: Readonly<Record<string, readonly [CoefficientErrors, 0 | 2 | 4]>> = {
  no: ['no', 0],
  calibrated: ['calibrated', 2],
  formal: ['formal', 2],
  unknown: ['unknown', 2],
  calibrated_and_formal: ['calibrated', 4],
};

const KEYS = [
  'product_type',
  'modelname',
  'earth_gravity_constant',
  'gravity_constant',
  'radius',
  'max_degree',
  'errors',
  'norm',
  'tide_system',
  'format',
] as const;
type Key = (typeof KEYS)[number];

/** Nothing larger is published; a larger claim is a slip or an attack. */
const MAX_DEGREE_CLAIM = 20_000;

interface Entry {
  readonly value: string;
  readonly line: number;
}

/** Lines of the head (up to, not including, `end_of_head`). Text before `begin_of_head`, where there is one, is the authors' own.
 *  Barthelmes & Förste, The ICGEM-format (GFZ Potsdam; versions of 2011 and 2023).
 * @throws {CampaignError} with every fault of the head */
export function readIcgemHeader(lines: readonly string[]): IcgemHeader {
  const begin = lines.findIndex((l) => /^\s*begin_of_head\b/.test(l));
  const entries = new Map<Key, Entry>();
  for (let i = begin + 1; i < lines.length; i++) {
    const match = /^\s*(\S+)\s+(.*?)\s*$/.exec(lines[i]!);
    const key = KEYS.find((k) => k === match?.[1]?.toLowerCase());
    // free text may begin with a keyword where there is no begin_of_head: the last one counts, as the head proper follows it
    if (key && match) entries.set(key, { value: match[2]!, line: i + 1 });
  }
  return new HeaderReader(entries).read();
}

class HeaderReader {
  readonly #entries: ReadonlyMap<Key, Entry>;
  readonly #faults: Fault[] = [];
  readonly #warnings: Warning[] = [];
  constructor(entries: ReadonlyMap<Key, Entry>) {
    this.#entries = entries;
  }

  read(): IcgemHeader {
    const product = this.#entries.get('product_type');
    if (product && product.value.toLowerCase() !== 'gravity_field')
      this.#fault('product_type', product, 'gravity_field: coefficients of the gravitational potential');
    const gmKey = this.#entries.has('earth_gravity_constant') ? 'earth_gravity_constant' : 'gravity_constant';
    const gmM3s2 = this.#number(gmKey, 'GM in m³/s², such as 3.986004415e14', 3.98e14, 3.99e14);
    const radiusM = this.#number('radius', 'reference radius in m, such as 6378136.3', 6.3e6, 6.4e6);
    const maxDegree = this.#number('max_degree', `a whole number from 0 to ${MAX_DEGREE_CLAIM}`, 0, MAX_DEGREE_CLAIM);
    if (!Number.isInteger(maxDegree) && !Number.isNaN(maxDegree))
      this.#fault('max_degree', this.#entries.get('max_degree')!, 'a whole number');
    const [errors, sigmaColumns] = this.#word('errors', ERRORS) ?? this.#noErrors();
    const tide = this.#word('tide_system', TIDES) ?? 'unknown';
    const norm = this.#word('norm', { fully_normalized: true, unnormalized: false }) ?? true;
    const format = this.#word('format', { 'icgem1.0': 'icgem1.0', 'icgem2.0': 'icgem2.0' } as const) ?? 'icgem1.0';
    if (this.#faults.length > 0) throw new CampaignError(this.#faults);
    if (tide === 'unknown')
      this.#warnings.push({
        code: 'tide-system-unknown',
        path: 'tide_system',
        message:
          'the file does not say in which permanent-tide system its coefficients are: tide-free and zero-tide W differ by k₂·W_T, up to 0.6 m²/s² (6.5e-18) at a pole.',
      });
    return {
      format,
      name: this.#entries.get('modelname')?.value ?? '',
      gmM3s2,
      radiusM,
      maxDegree,
      tide,
      errors,
      sigmaColumns,
      normalized: norm,
      warnings: this.#warnings,
    };
  }

  #noErrors(): readonly [CoefficientErrors, 0] {
    this.#warnings.push({
      code: 'errors-not-stated',
      path: 'errors',
      message:
        'the head has no `errors`: read as without standard deviations, so W has no commission uncertainty from the file.',
    });
    return ['no', 0];
  }

  #word<T>(key: Key, words: Readonly<Record<string, T>>): T | null {
    const entry = this.#entries.get(key);
    if (!entry) return null;
    const word = entry.value.split(/\s/)[0]!.toLowerCase();
    if (Object.hasOwn(words, word)) return words[word]!;
    const near = closest(word, Object.keys(words));
    this.#fault(key, entry, `${Object.keys(words).join(', ')}${near ? `; ${near} is near` : ''}`);
    return null;
  }

  #number(key: Key, expected: string, least: number, most: number): number {
    const entry = this.#entries.get(key);
    if (!entry) {
      this.#faults.push({
        code: 'header-key-missing',
        path: key,
        line: null,
        column: null,
        found: 'nothing',
        expected,
      });
      return Number.NaN;
    }
    const word = entry.value.split(/\s/)[0]!;
    const value = /^[+-]?(\d+\.?\d*|\.\d+)([eEdD][+-]?\d+)?$/.test(word)
      ? Number(word.replace(/[dD]/, 'e'))
      : Number.NaN;
    if (value >= least && value <= most) return value;
    this.#fault(key, entry, expected);
    return Number.NaN;
  }

  #fault(path: Key, entry: Entry, expected: string): void {
    this.#faults.push({ code: 'header-value', path, line: entry.line, column: null, found: entry.value, expected });
  }
}
