import { CampaignError, type Fault, type Warning } from '../../campaign/fault.js';
import { DecimalScanner, latin1 } from '../file-bytes/decimal-scanner.js';
import { coefficientCount, coefficientIndex, type GravityModel, MAX_SYNTHESIS_DEGREE } from './gravity-model.js';
import { type IcgemHeader, readIcgemHeader } from './icgem-header.js';
import { normalizeCoefficients } from './normalization.js';

export interface IcgemOptions {
  /** degree up to which coefficients are kept and must be complete; default all of the file's */
  readonly maxDegree?: number;
  /** size of the file, for the progress and for its end to be known */
  readonly totalBytes?: number;
  /** called after each piece with the share read, 0…1, or the bytes so far where the size is not known */
  readonly onProgress?: (progress: { readonly bytes: number; readonly share: number | null }) => void;
}

/** No head comes near this; without a limit a file of another kind would be gathered whole in search of its end. */
const MAX_HEADER_BYTES = 2 ** 20;
const MAX_LINE_BYTES = 4096;
/** Why a time-variable term cannot be left out: the static part alone belongs to no date. */
const TIME_VARIABLE: Readonly<Record<string, string>> = {
  gfct: 'a coefficient at a reference epoch (gfct)',
  trnd: 'a linear trend (trnd)',
  dot: 'a linear trend (dot)',
  acos: 'a periodic cosine term (acos)',
  asin: 'a periodic sine term (asin)',
};

/** Reads an ICGEM gravity-field file (`.gfc`, icgem1.0 and 2.0) piece by piece: {@link push} each piece, then {@link end}.
 *  Barthelmes & Förste, The ICGEM-format. Memory: the coefficients (24 bytes each with their sigmas) and one line. */
export class IcgemReader {
  readonly #options: IcgemOptions;
  readonly #scanner = new DecimalScanner();
  #header: IcgemHeader | null = null;
  #headerLines: string[] = [];
  #headerBytes = 0;
  #limit = 0;
  #cosine = new Float64Array(0);
  #sine = new Float64Array(0);
  #cosineSigma = new Float32Array(0);
  #sineSigma = new Float32Array(0);
  #present = new Uint8Array(0);
  #rows = 0;
  #extraColumns = 0;
  #line = 0;
  #bytes = 0;
  #pending = new Uint8Array(0);
  #endedInLineFeed = true;
  #afterCarriageReturn = false;
  #atLastLine = false;

  constructor(options: IcgemOptions = {}) {
    const { maxDegree } = options;
    if (maxDegree !== undefined && !(Number.isInteger(maxDegree) && maxDegree >= 2))
      throw new CampaignError([
        this.#fault('maxDegree', String(maxDegree), `a whole number from 2 to ${MAX_SYNTHESIS_DEGREE}`, null),
      ]);
    this.#options = options;
  }

  /** @throws {CampaignError} as soon as something is wrong: the rest of the file need not be read */
  push(piece: Uint8Array): void {
    let start = 0;
    if (this.#pending.length > 0) {
      const stop = nextLineEnd(piece, 0);
      const joined = new Uint8Array(this.#pending.length + stop);
      joined.set(this.#pending);
      joined.set(piece.subarray(0, stop), this.#pending.length);
      this.#pending = joined;
      if (stop === piece.length) this.#checkLineLength(joined.length);
      else {
        this.#pending = new Uint8Array(0);
        this.#takeLine(joined, 0, joined.length, piece[stop]!);
        start = stop + 1;
      }
    }
    if (this.#pending.length === 0) {
      for (;;) {
        const stop = nextLineEnd(piece, start);
        if (stop === piece.length) break;
        this.#takeLine(piece, start, stop, piece[stop]!);
        start = stop + 1;
      }
      this.#checkLineLength(piece.length - start);
      this.#pending = piece.slice(start);
    }
    if (piece.length > 0) this.#endedInLineFeed = piece[piece.length - 1] === 0x0a || piece[piece.length - 1] === 0x0d;
    this.#bytes += piece.length;
    const { totalBytes, onProgress } = this.#options;
    onProgress?.({ bytes: this.#bytes, share: totalBytes ? Math.min(1, this.#bytes / totalBytes) : null });
  }

  /** @throws {CampaignError} if the head or any coefficient is missing */
  end(): GravityModel {
    this.#atLastLine = true;
    if (this.#pending.length > 0) this.#takeLine(this.#pending, 0, this.#pending.length, 0x0a);
    this.#pending = new Uint8Array(0);
    const header = this.#header;
    if (!header)
      throw new CampaignError([
        this.#fault(
          'not-icgem',
          'no line `end_of_head`',
          'an ICGEM gravity-field file (.gfc), whose head ends with end_of_head',
          null,
        ),
      ]);
    this.#checkZeroDegree();
    this.#checkComplete(header);
    const count = coefficientCount(this.#limit);
    const withSigmas = header.sigmaColumns > 0;
    const warnings = [...header.warnings, ...this.#warnings(header)];
    const model = {
      name: header.name,
      format: header.format,
      maxDegree: this.#limit,
      maxDegreeOfFile: header.maxDegree,
      gmM3s2: header.gmM3s2,
      radiusM: header.radiusM,
      tide: header.tide,
      errors: header.errors,
      cosine: this.#cosine.slice(0, count),
      sine: this.#sine.slice(0, count),
      cosineSigma: withSigmas ? this.#cosineSigma.slice(0, count) : null,
      sineSigma: withSigmas ? this.#sineSigma.slice(0, count) : null,
      warnings,
    };
    return header.normalized ? model : normalizeCoefficients(model);
  }

  #takeLine(bytes: Uint8Array, start: number, stop: number, ending: number): void {
    // the line feed of a carriage return and line feed ends no line of its own
    if (this.#afterCarriageReturn && ending === 0x0a && start === stop) {
      this.#afterCarriageReturn = false;
      return;
    }
    this.#afterCarriageReturn = ending === 0x0d;
    this.#line++;
    if (this.#header) this.#takeRow(bytes, start, stop);
    else this.#takeHeaderLine(bytes, start, stop);
  }

  #takeHeaderLine(bytes: Uint8Array, start: number, stop: number): void {
    this.#headerBytes += stop - start + 1;
    if (this.#headerBytes > MAX_HEADER_BYTES)
      throw new CampaignError([
        this.#fault(
          'not-icgem',
          `no line \`end_of_head\` in the first ${MAX_HEADER_BYTES} bytes`,
          'an ICGEM gravity-field file (.gfc)',
        ),
      ]);
    const text = latin1(bytes, start, stop);
    if (!/^\s*end_of_head\b/.test(text)) {
      this.#headerLines.push(text);
      return;
    }
    // geoid grids begin alike
    if (this.#headerLines.some((line) => /^\s*(isg format|nrows)\s*[=:]/i.test(line)))
      throw new CampaignError([
        this.#fault(
          'not-icgem',
          'the head of a geoid grid in ISG format',
          'an ICGEM gravity-field file (.gfc); a grid is named by "zeta" or "N"',
        ),
      ]);
    this.#header = readIcgemHeader(this.#headerLines);
    this.#headerLines = [];
    this.#limit = this.#options.maxDegree ?? this.#header.maxDegree;
    if (this.#limit > this.#header.maxDegree)
      throw new CampaignError([
        this.#fault(
          'maxDegree',
          String(this.#limit),
          `at most ${this.#header.maxDegree}, the degree of this model`,
          null,
        ),
      ]);
    if (this.#limit > MAX_SYNTHESIS_DEGREE)
      throw new CampaignError([
        this.#fault(
          'max_degree',
          String(this.#limit),
          `maxDegree of at most ${MAX_SYNTHESIS_DEGREE}, to which the synthesis is stable`,
          null,
        ),
      ]);
  }

  #takeRow(bytes: Uint8Array, start: number, stop: number): void {
    const scanner = this.#scanner;
    scanner.reset(bytes, start, stop);
    if (!scanner.skipBlanks()) return;
    const at = scanner.position;
    const isGfc =
      bytes[at] === 0x67 && bytes[at + 1] === 0x66 && bytes[at + 2] === 0x63 && at + 3 < stop && bytes[at + 3]! <= 0x20;
    if (isGfc) scanner.position = at + 3;
    else {
      const key = scanner.word().toLowerCase();
      if (key.startsWith('#')) return;
      if (key !== 'gfc') this.#refuseKey(key);
    }
    const n = scanner.wholeNumber();
    const m = n < 0 ? -1 : scanner.wholeNumber();
    if (m < 0 || m > n)
      this.#refuseRow(
        `${n < 0 ? 'no degree' : m < 0 ? 'no order' : `degree ${n}, order ${m}`}`,
        'gfc, degree n, order m ≤ n, C, S',
      );
    if (n > this.#header!.maxDegree)
      this.#refuseRow(`degree ${n}`, `degrees up to ${this.#header!.maxDegree}, the max_degree of the head`);
    const c = scanner.number();
    const s = scanner.number();
    if (Number.isNaN(c) || Number.isNaN(s))
      this.#refuseRow(
        scanner.skipBlanks() ? scanner.word() : 'the end of the line',
        `C and S of degree ${n}, order ${m} as numbers`,
      );
    let cosineSigma = 0;
    let sineSigma = 0;
    if (this.#header!.sigmaColumns > 0) {
      cosineSigma = scanner.number();
      sineSigma = scanner.number();
      if (this.#header!.sigmaColumns === 4) {
        scanner.number();
        if (Number.isNaN(scanner.number())) sineSigma = Number.NaN;
      }
      if (!(cosineSigma >= 0 && sineSigma >= 0))
        this.#refuseRow(
          scanner.skipBlanks() ? scanner.word() : `${latin1(bytes, start, stop).trim().split(/\s+/).length} columns`,
          `${this.#header!.sigmaColumns} standard deviations ≥ 0 after C and S, as \`errors\` says`,
        );
    }
    if (scanner.skipBlanks()) this.#extraColumns++;
    if (n > this.#limit) return;
    const k = coefficientIndex(n, m);
    if (k >= this.#present.length) this.#grow(k);
    if (this.#present[k]) this.#refuseRow(`degree ${n}, order ${m} again`, 'each coefficient once');
    this.#present[k] = 1;
    this.#rows++;
    this.#cosine[k] = c;
    this.#sine[k] = s;
    if (this.#header!.sigmaColumns > 0) {
      this.#cosineSigma[k] = cosineSigma;
      this.#sineSigma[k] = sineSigma;
    }
  }

  /** Room is made as rows come, so that a head which claims a high degree costs nothing by itself. */
  #grow(index: number): void {
    const size = Math.min(coefficientCount(this.#limit), Math.max(1024, 2 * this.#present.length, index + 1));
    const copy = <T extends Float64Array | Float32Array | Uint8Array>(into: T, from: T): T => {
      into.set(from);
      return into;
    };
    this.#cosine = copy(new Float64Array(size), this.#cosine);
    this.#sine = copy(new Float64Array(size), this.#sine);
    this.#present = copy(new Uint8Array(size), this.#present);
    if (this.#header!.sigmaColumns > 0) {
      this.#cosineSigma = copy(new Float32Array(size), this.#cosineSigma);
      this.#sineSigma = copy(new Float32Array(size), this.#sineSigma);
    }
  }

  /** Degree 0 carries the whole mass: a difference of two models, which has 0 there, would give a potential of nearly nothing. */
  #checkZeroDegree(): void {
    if (this.#present[0] && !(Math.abs(this.#cosine[0]! - 1) < 1e-6))
      throw new CampaignError([
        this.#fault(
          'not-a-whole-field',
          `C of degree 0 is ${this.#cosine[0]}`,
          '1: a whole gravity field, not a difference of two',
          null,
        ),
      ]);
    if (this.#present[0]) return;
    if (this.#present.length === 0) this.#grow(0);
    this.#cosine[0] = 1;
  }

  #checkComplete(header: IcgemHeader): void {
    const hasRow = (k: number) => k < this.#present.length && this.#present[k] === 1;
    for (let n = 2; n <= this.#limit; n++)
      for (let m = 0; m <= n; m++)
        if (!hasRow(coefficientIndex(n, m)))
          throw new CampaignError([
            this.#fault(
              'coefficients-missing',
              `${this.#rows} coefficients; degree ${n}, order ${m} is the first that is missing${this.#endedInLineFeed ? '' : '; the last line is cut off'}`,
              `every coefficient from degree 2 to ${this.#limit}${n > 2 ? `; or maxDegree ${n - 1} or less, to which the file is complete` : ''}`,
              null,
            ),
          ]);
    if (this.#limit < 2)
      throw new CampaignError([
        this.#fault('max_degree', String(header.maxDegree), 'a model of degree 2 or more', null),
      ]);
  }

  #warnings(header: IcgemHeader): Warning[] {
    const warnings: Warning[] = [];
    if (!this.#present[0])
      warnings.push({
        code: 'zero-degree-missing',
        path: 'gfc 0 0',
        message: 'the file has no coefficient of degree 0: C₀₀ = 1 is taken, all of the mass GM.',
      });
    const offset = this.#originOffsetM(header);
    if (offset > 0)
      warnings.push({
        code: 'first-degree',
        path: 'gfc 1',
        message: `degree 1 is not zero: the origin of the model lies ${offset.toPrecision(2)} m off the centre of mass.`,
      });
    if (this.#extraColumns > 0)
      warnings.push({
        code: 'extra-columns',
        path: 'errors',
        message: `${this.#extraColumns} rows have more columns than \`errors\` announces; the further ones are not used.`,
      });
    if (!this.#endedInLineFeed)
      warnings.push({
        code: 'no-last-line-end',
        path: '',
        message: 'the last row has no line end: every coefficient is there, but the last number may have been cut.',
      });
    return warnings;
  }

  #originOffsetM(header: IcgemHeader): number {
    const at = (values: Float64Array, n: number, m: number) => values[coefficientIndex(n, m)] ?? 0;
    return (
      Math.sqrt(3) * header.radiusM * Math.hypot(at(this.#cosine, 1, 0), at(this.#cosine, 1, 1), at(this.#sine, 1, 1))
    );
  }

  #refuseKey(key: string): never {
    const kind = TIME_VARIABLE[key];
    if (kind)
      throw new CampaignError([
        this.#fault(
          'time-variable-model',
          `${kind} of degree ${this.#scanner.word()}, order ${this.#scanner.word()}`,
          'a static model, gfc rows only: this version does not evaluate a model at a date',
        ),
      ]);
    throw new CampaignError([this.#fault('row', key.slice(0, 40), 'a row that begins with gfc')]);
  }

  #refuseRow(found: string, expected: string): never {
    const cut = this.#atLastLine ? ' in the last line, which has no end: the file is cut off' : '';
    throw new CampaignError([this.#fault('row', `${found.slice(0, 80)}${cut}`, expected)]);
  }

  #checkLineLength(length: number): void {
    if (length > MAX_LINE_BYTES && this.#header)
      throw new CampaignError([
        this.#fault('row', `a line of more than ${MAX_LINE_BYTES} bytes`, 'one coefficient per line'),
      ]);
    if (length > MAX_HEADER_BYTES)
      throw new CampaignError([
        this.#fault('not-icgem', `no line end in ${length} bytes`, 'an ICGEM gravity-field file (.gfc), which is text'),
      ]);
  }

  #fault(code: string, found: string, expected: string, line: number | null = this.#line): Fault {
    return { code, path: '', line, column: null, found, expected };
  }
}

function nextLineEnd(bytes: Uint8Array, from: number): number {
  for (let i = from; i < bytes.length; i++) if (bytes[i] === 0x0a || bytes[i] === 0x0d) return i;
  return bytes.length;
}

/** A file that is in memory. @throws {CampaignError} see {@link IcgemReader} */
export function parseIcgem(bytes: Uint8Array, options: IcgemOptions = {}): GravityModel {
  const reader = new IcgemReader({ totalBytes: bytes.length, ...options });
  // in pieces, so that progress can be told
  for (let at = 0; at < bytes.length; at += 2 ** 20) reader.push(bytes.subarray(at, at + 2 ** 20));
  return reader.end();
}

/** A file that comes in pieces, such as a stream. @throws {CampaignError} see {@link IcgemReader} */
export async function readIcgem(
  pieces: AsyncIterable<Uint8Array> | Iterable<Uint8Array>,
  options: IcgemOptions = {},
): Promise<GravityModel> {
  const reader = new IcgemReader(options);
  for await (const piece of pieces) reader.push(piece);
  return reader.end();
}
