import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import type { TrialDifferences } from '../model/model-function.js';
import { trialDifferences } from '../model/trial-differences.js';
import {
  BLOCK,
  type TrialCorrelation,
  type TrialInput,
  type TrialModel,
  weightedSum,
} from '../uncertainty/monte-carlo/index.js';
import type { SolvedCampaign } from './solve-campaign.js';

/** Inputs, correlations and model of the offsets y of links, for a Monte Carlo run. */
export interface LinkTrials {
  readonly inputs: readonly TrialInput[];
  readonly correlations: readonly TrialCorrelation[];
  readonly model: TrialModel;
}

/** One function of the model with the arrays of deviations that it reads. */
interface Term {
  readonly inputs: readonly number[];
  readonly differences: TrialDifferences;
}

/** The measurement model of the offsets of some links: every determination, levelling and tie evaluated as it is, not linearised;
 *  the weights of the least-squares combination are those of the solution, numbers and not inputs (a combination with fixed weights
 *  is the estimator that was used).
 * @param links indices of links that have a prediction */
export function linkTrials(solved: SolvedCampaign, links: readonly number[]): LinkTrials {
  const { model, potentials } = solved;
  const { campaign } = model;
  const used = new Map<number, number>();
  const inputs: TrialInput[] = [];
  const registered: number[] = [];
  const place = (index: number): number => {
    let at = used.get(index);
    if (at === undefined) {
      at = inputs.length;
      used.set(index, at);
      const { path, distribution, u, dof } = model.inputs[index]!;
      inputs.push({ name: path, distribution, u, dof });
      registered.push(index);
    }
    return at;
  };
  const estimatesOf = (indices: readonly number[]) => indices.map((i) => model.inputs[i]!.value);

  // W of a site is a fixed combination of the determinations in the fit
  const columnOf = siteColumns(solved);
  const sites = new Set<number>();
  const clocks = new Set<number>();
  for (const l of links) {
    for (const id of [campaign.links[l]!.from, campaign.links[l]!.to]) {
      const clock = model.clockIndex.get(id)!;
      clocks.add(clock);
      sites.add(model.siteIndex.get(campaign.clocks[clock]!.site)!);
    }
  }
  const siteList = [...sites];
  const clockList = [...clocks];
  const gains = siteList.map((s) => {
    const column = columnOf[s]!;
    return column < 0 ? new Float64Array(potentials.fitted.length) : potentials.solution.gain[column]!;
  });
  const needed = potentials.fitted.map((_, i) => gains.some((g) => g[i] !== 0));
  const determinations: (Term | null)[] = potentials.fitted.map(({ f }, i) =>
    needed[i] ? { inputs: f.inputs.map(place), differences: trialDifferences(f, estimatesOf(f.inputs)) } : null,
  );
  const ties: (Term | null)[] = clockList.map((c) => {
    const f = model.tieFunctions[c];
    return f ? { inputs: f.inputs.map(place), differences: trialDifferences(f, estimatesOf(f.inputs)) } : null;
  });
  const variables = clockList.map((c) => {
    const index = model.variableInputs[c];
    return index === null || index === undefined ? null : place(index);
  });

  const block = () => new Float64Array(BLOCK);
  const determinationTrials = potentials.fitted.map((_, i) => (needed[i] ? block() : new Float64Array(0)));
  const siteTrials = siteList.map(block);
  const clockTrials = clockList.map(block);
  const tieTrial = block();
  const siteOfClock = clockList.map((c) => siteList.indexOf(model.siteIndex.get(campaign.clocks[c]!.site)!));
  const ends = links.map((l) => {
    const { from, to } = campaign.links[l]!;
    const at = (id: string) => clockList.indexOf(model.clockIndex.get(id)!);
    return { from: at(from), to: at(to) };
  });

  const evaluateTerm = (term: Term, deviations: readonly Float64Array[], count: number, out: Float64Array): void =>
    term.differences(
      term.inputs.map((i) => deviations[i]!),
      count,
      out,
    );
  return {
    inputs,
    correlations: correlationsOf(solved, registered),
    model: {
      outputs: links.map((l) => campaign.links[l]!.id),
      evaluate(deviations, count, out) {
        determinations.forEach((term, i) => {
          if (term) evaluateTerm(term, deviations, count, determinationTrials[i]!);
        });
        gains.forEach((gain, s) => {
          weightedSum(gain, determinationTrials, count, siteTrials[s]!);
        });
        clockList.forEach((_, c) => {
          const parts: Float64Array[] = [siteTrials[siteOfClock[c]!]!];
          const tie = ties[c];
          if (tie) {
            evaluateTerm(tie, deviations, count, tieTrial);
            parts.push(tieTrial);
          }
          const variable = variables[c];
          if (variable !== null && variable !== undefined) parts.push(deviations[variable]!);
          weightedSum(
            parts.map(() => 1),
            parts,
            count,
            clockTrials[c]!,
          );
        });
        ends.forEach(({ from, to }, l) => {
          const [a, b, y] = [clockTrials[from]!, clockTrials[to]!, out[l]!];
          for (let t = 0; t < count; t++) y[t] = (a[t]! - b[t]!) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
        });
      },
    },
  };
}

/** Column of each site in the solution, −1 for one that is held. */
function siteColumns({ model, potentials: { groups } }: SolvedCampaign): number[] {
  const held = new Set(groups.sites.flatMap((sites, g) => (groups.hasLevel[g] ? [] : [sites[0]!])));
  let next = 0;
  return model.campaign.sites.map((_, s) => (held.has(s) ? -1 : next++));
}

/** Correlations of whole errors, cov/(u₁·u₂), of every pair that has one. */
function correlationsOf({ model: { covariance } }: SolvedCampaign, registered: readonly number[]): TrialCorrelation[] {
  const found: TrialCorrelation[] = [];
  registered.forEach((i, first) => {
    for (let second = first + 1; second < registered.length; second++) {
      const j = registered[second]!;
      const cov = covariance.between(i, j);
      if (cov !== 0) found.push({ first, second, rho: cov / (covariance.inputs[i]!.u * covariance.inputs[j]!.u) });
    }
  });
  return found;
}
