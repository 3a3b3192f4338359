import type { Outliers } from './outliers.js';
import { median } from './time-order.js';

export interface UnitSlip {
  /** first and last sample */
  readonly first: number;
  readonly last: number;
  /** how many times larger than the rest: a power of 1000, or of ten for percent-like slips in 1e-15, 1e-16 */
  readonly factor: number;
  /** told from the values themselves, or, where they average to nothing, from their scatter */
  readonly evidence: 'value' | 'scatter';
}

/** Factors by which units slip: prefixes, 1e-15 for 1e-18, ppm. */
const POWERS = [3, -3, 6, -6, 9, -9, 12, -12, 15, -15, 18, -18] as const;

const MAD_TO_SIGMA = 1.482602218505602;
const BLOCKS = 200;
const SMALLEST_BLOCK = 16;

/** Stretches of a record in another unit than the rest: values (or, about zero, scatter) a power of a thousand away. */
export function findUnitSlips(y: Float64Array, outliers: Outliers): UnitSlip[] {
  return merged(y.length < 2 * SMALLEST_BLOCK ? single(y, outliers) : [...byBlocks(y, outliers)]);
}

/** Stretches of one factor that overlap or touch become one. */
function merged(slips: readonly UnitSlip[]): UnitSlip[] {
  const sorted = [...slips].sort((a, b) => a.first - b.first);
  const joint: UnitSlip[] = [];
  for (const slip of sorted) {
    const last = joint.at(-1);
    if (last && last.factor === slip.factor && slip.first <= last.last + 1) {
      joint[joint.length - 1] = { ...last, last: Math.max(last.last, slip.last) };
    } else joint.push(slip);
  }
  return joint;
}

/** Short records: outliers that fit when divided by a factor. */
function single(y: Float64Array, outliers: Outliers): UnitSlip[] {
  const middle = median(y);
  return joined(outliers.samples.map((i) => ({ i, power: valuePower(y[i]!, middle, outliers.scale, outliers.limit) })));
}

/** The power of ten p for which value/10^p is an ordinary value; 0 for none. */
function valuePower(value: number, middle: number, scale: number, limit: number): number {
  // About zero every small value is ordinary: the rest must lie so far from it that zero itself would be an outlier.
  if (Math.abs(middle) < 2 * limit * scale) return 0;
  for (const p of POWERS) if (Math.abs(value / 10 ** p - middle) <= limit * scale) return p;
  return 0;
}

function joined(found: readonly { i: number; power: number }[]): UnitSlip[] {
  const slips: UnitSlip[] = [];
  for (const { i, power } of found) {
    if (power === 0) continue;
    const factor = Number(`1e${power}`);
    const last = slips.at(-1);
    if (last && last.last === i - 1 && last.factor === factor) slips[slips.length - 1] = { ...last, last: i };
    else slips.push({ first: i, last: i, factor, evidence: 'value' });
  }
  return slips;
}

interface Block {
  readonly from: number;
  readonly to: number;
  readonly middle: number;
  readonly sigma: number;
}

/** Level and scatter of each of a few hundred blocks against their medians over the record. */
function* byBlocks(y: Float64Array, outliers: Outliers): Generator<UnitSlip> {
  const size = Math.max(SMALLEST_BLOCK, Math.ceil(y.length / BLOCKS));
  const blocks: Block[] = [];
  for (let from = 0; from + size <= y.length || from === 0; from += size) {
    // The last block takes the rest, so that no sample is left out.
    const to = from + 2 * size > y.length ? y.length : from + size;
    const step = Math.max(1, Math.floor((to - from) / 500));
    const values = Float64Array.from({ length: Math.ceil((to - from) / step) }, (_, k) => y[from + k * step]!);
    const middle = median(values);
    blocks.push({ from, to, middle, sigma: MAD_TO_SIGMA * median(values.map((v) => Math.abs(v - middle))) });
    if (to === y.length) break;
  }
  const level = median(Float64Array.from(blocks, (b) => b.middle));
  const sigma = median(Float64Array.from(blocks, (b) => b.sigma));
  const wander = MAD_TO_SIGMA * median(Float64Array.from(blocks, (b) => Math.abs(b.middle - level)));
  const away = Math.abs(level) > 3 * Math.max(sigma / Math.sqrt(size), wander);
  let open: UnitSlip | null = null;
  for (const b of blocks) {
    const power = slippedPower(b, level, sigma, away);
    const factor = Number(`1e${power}`);
    if (open !== null && (power === 0 || open.factor !== factor)) {
      yield edges(y, open, level, sigma);
      open = null;
    }
    if (power === 0) continue;
    const first: number = open?.first ?? b.from;
    open = { first, last: b.to - 1, factor, evidence: away ? 'value' : 'scatter' };
  }
  if (open !== null) yield edges(y, open, level, sigma);
  yield* joined(
    outliers.samples.map((i) => ({ i, power: valuePower(y[i]!, level, Math.max(sigma, wander), outliers.limit) })),
  );
}

/** Level (where there is one) and scatter must have slipped alike: within a factor of two, the scatter of a few samples of four. */
function slippedPower(b: Block, level: number, sigma: number, away: boolean): number {
  if (sigma === 0 || b.sigma === 0) return 0;
  const near = (ratio: number, p: number, within: number): boolean =>
    ratio > 0 && Math.abs(Math.log10(ratio) - p) < within;
  return (
    POWERS.find((p) =>
      away ? near(b.sigma / sigma, p, 0.6) && near(b.middle / level, p, 0.3) : near(b.sigma / sigma, p, 0.3),
    ) ?? 0
  );
}

/** Grows or shrinks a slipped stretch to the sample: by size, since it stands a thousandfold away from the rest. */
function edges(y: Float64Array, slip: UnitSlip, level: number, sigma: number): UnitSlip {
  const ordinary = Math.max(Math.abs(level), 3 * sigma);
  const limit = ordinary * Math.sqrt(slip.factor);
  const isSlipped = (i: number): boolean => (slip.factor > 1 ? Math.abs(y[i]!) > limit : Math.abs(y[i]!) < limit);
  let { first, last } = slip;
  while (first > 0 && isSlipped(first - 1)) first--;
  while (last + 1 < y.length && isSlipped(last + 1)) last++;
  while (first < last && !isSlipped(first)) first++;
  while (last > first && !isSlipped(last)) last--;
  return { ...slip, first, last };
}
