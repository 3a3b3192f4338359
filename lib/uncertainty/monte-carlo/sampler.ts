import { CampaignError, faultAt } from '../../campaign/fault.js';
import { DomainError } from '../distributions/domain-error.js';
import { zeros } from '../matrix.js';
import { Xoshiro128 } from '../random.js';
import { CopulaCorrelations } from './copula-correlation.js';
import { type Deviates, deviatesOf } from './deviates.js';
import { fillNormalScores } from './normal-scores.js';
import { pivotedCholesky } from './pivoted-cholesky.js';
import { type Shape, shapeOf, type TrialCorrelation, type TrialInput } from './trial-input.js';
import { weightedSum } from './weighted-sum.js';

/** Trials drawn at a time: the arrays of some sixty inputs stay in a processor's cache. */
export const BLOCK = 1000;

interface Independent {
  readonly input: number;
  readonly stream: Xoshiro128;
  readonly deviates: Deviates;
}

interface CorrelatedGroup {
  readonly inputs: readonly number[];
  readonly streams: readonly Xoshiro128[];
  /** per input of the group, its row of the factor: scores = rows·independent scores */
  readonly rows: readonly Float64Array[];
  readonly deviates: readonly Deviates[];
}

/** Draws joint deviations of the inputs from their estimates: independent inputs one by one; correlated ones through a Gaussian
 *  copula (JCGM 101:2008, 6.4.8 for the normal case) whose correlations are solved so that the inputs' product-moment
 *  correlations are the stated ones. An input's distribution is that of its whole error, the correlation of two inputs that of their
 *  whole errors, cov/(u₁·u₂): where an error has several parts, its parts have no distributions of their own.
 *
 *  Every input has a stream of its own, so results depend neither on the order of the inputs nor on the length of the blocks. */
export class Sampler {
  /** per input, deviations of the current block; valid to the count last drawn */
  readonly deviations: readonly Float64Array[];
  readonly #independent: Independent[] = [];
  readonly #groups: CorrelatedGroup[] = [];
  readonly #scores: Float64Array[];

  /** @throws {CampaignError} a correlation that the distributions cannot have, alone or together
   *  @throws {DomainError} an input, index or seed outside its domain */
  constructor(inputs: readonly TrialInput[], correlations: readonly TrialCorrelation[], seed: number) {
    const shapes = inputs.map(shapeOf);
    this.deviations = inputs.map(() => new Float64Array(BLOCK));
    const byName = inputs.map((_, i) => i).sort((a, b) => compare(inputs[a]!.name, inputs[b]!.name));
    const streams = streamsInOrder(byName, seed);
    let largestRank = 0;
    for (const members of connected(inputs, byName, correlations)) {
      if (members.length === 1) {
        const i = members[0]!;
        if (inputs[i]!.u === 0) continue; // exact: its deviations stay 0
        const deviates = deviatesOf(shapes[i]!, inputs[i]!.u);
        this.#independent.push({ input: i, stream: streams[i]!, deviates });
        continue;
      }
      const { rows, rank } = scoreFactor(members, inputs, shapes, correlations);
      largestRank = Math.max(largestRank, rank);
      this.#groups.push({
        inputs: members,
        streams: members.slice(0, rank).map((i) => streams[i]!),
        rows,
        deviates: members.map((i) => deviatesOf(shapes[i]!, inputs[i]!.u)),
      });
    }
    this.#scores = Array.from({ length: largestRank }, () => new Float64Array(BLOCK));
  }

  /** Draws the next `count` ≤ BLOCK trials into `deviations`. */
  draw(count: number): void {
    for (const { input, stream, deviates } of this.#independent) {
      deviates.fill(stream, this.deviations[input]!, count);
    }
    for (const { inputs, streams, rows, deviates } of this.#groups) {
      streams.forEach((stream, k) => {
        fillNormalScores(stream, this.#scores[k]!, count);
      });
      inputs.forEach((input, i) => {
        const out = this.deviations[input]!;
        weightedSum(rows[i]!, this.#scores, count, out);
        deviates[i]!.fromScores(out, count);
      });
    }
  }
}

/** Code-unit order, the same in every locale. */
const compare = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);

function streamsInOrder(byName: readonly number[], seed: number): Xoshiro128[] {
  const streams: Xoshiro128[] = [];
  const next = Xoshiro128.fromSeed(seed);
  for (const i of byName) {
    streams[i] = next.clone();
    next.jump();
  }
  return streams;
}

/** Groups of inputs tied by non-zero correlations, each in the order of names. */
function connected(
  inputs: readonly TrialInput[],
  byName: readonly number[],
  correlations: readonly TrialCorrelation[],
): number[][] {
  const parent = inputs.map((_, i) => i);
  const root = (i: number): number => {
    let r = i;
    while (parent[r] !== r) r = parent[r]!;
    parent[i] = r;
    return r;
  };
  for (const { first, second, rho } of correlations) {
    if (!(first in inputs && second in inputs) || first === second) {
      throw new DomainError('correlation', `${first}, ${second}`, `two different indices below ${inputs.length}`);
    }
    if (!(Math.abs(rho) <= 1 + 1e-12)) {
      throw new DomainError(
        `correlation of ${inputs[first]!.name} and ${inputs[second]!.name}`,
        rho,
        'a number from −1 to 1',
      );
    }
    if (rho !== 0 && inputs[first]!.u > 0 && inputs[second]!.u > 0) parent[root(first)] = root(second);
  }
  const groups = new Map<number, number[]>();
  for (const i of byName) {
    const r = root(i);
    const group = groups.get(r);
    if (group) group.push(i);
    else groups.set(r, [i]);
  }
  return [...groups.values()];
}

/** Factor of the copula's correlation matrix of one group. */
function scoreFactor(
  members: readonly number[],
  inputs: readonly TrialInput[],
  shapes: readonly Shape[],
  correlations: readonly TrialCorrelation[],
): { rows: Float64Array[]; rank: number } {
  const place = new Map(members.map((input, k) => [input, k]));
  const matrix = zeros(members.length, members.length);
  for (let k = 0; k < members.length; k++) matrix[k]![k] = 1;
  const solver = new CopulaCorrelations();
  for (const { first, second, rho } of correlations) {
    const a = place.get(first);
    const b = place.get(second);
    if (a === undefined || b === undefined || rho === 0) continue;
    const r =
      shapes[first]!.kind === 'normal' && shapes[second]!.kind === 'normal'
        ? rho
        : solver.scoreCorrelation(
            { name: inputs[first]!.name, shape: shapes[first]! },
            { name: inputs[second]!.name, shape: shapes[second]! },
            rho,
          );
    matrix[a]![b] = r;
    matrix[b]![a] = r;
  }
  const factor = pivotedCholesky(matrix);
  if ('indefiniteAt' in factor) {
    const at = factor.indefiniteAt;
    const others = members.filter((_, k) => k !== at && matrix[at]![k] !== 0).map((i) => inputs[i]!.name);
    throw new CampaignError([
      faultAt(
        'correlations-impossible-together',
        inputs[members[at]!]!.name,
        `correlations with ${others.join(', ')} that no joint distribution of these shapes has in a Gaussian copula`,
        'lower correlations in absolute value, or the normal distribution for these inputs',
      ),
    ]);
  }
  return { rows: factor.rows, rank: factor.rank };
}
