import type { Distribution, UncertaintyPart } from '../campaign/campaign.js';
import type { GeodeticPosition } from '../earth/geodesic-distance.js';

/** Where an input lies, as far as correlation is concerned. Two inputs of one place that name the same source have ρ = 1. */
export interface Place {
  /** identity, such as `sites.cellar` or `datums.national-a` */
  readonly key: string;
  /** null where the place has no position: a datum, a transition, a link */
  readonly position: GeodeticPosition | null;
}

/** A named input quantity X_i of the measurement model (GUM 4.1). One entry however often it is used. */
export interface Input {
  /** identity: the path of the value in the campaign */
  readonly path: string;
  /** best estimate x_i as stated, SI, before any tide or frame conversion */
  readonly value: number;
  /** standard uncertainty u(x_i), SI; u² = Σ parts² */
  readonly u: number;
  readonly parts: readonly UncertaintyPart[];
  readonly place: Place;
  readonly distribution: Distribution;
  /** null: infinitely many */
  readonly dof: number | null;
}

/** A shared error source: what makes inputs correlated. `correlation` between different places, or a correlation length. */
export interface ErrorSource {
  readonly id: string;
  readonly correlation: number | null;
  readonly correlationLengthM: number | null;
  /** correlation between two different places, where it is known from elsewhere; in place of the other two */
  readonly between?: (a: Place, b: Place) => number;
}

/** Collects inputs so that each path becomes one input, whoever asks for it. */
export class InputRegister {
  readonly #index = new Map<string, number>();
  readonly #inputs: Input[] = [];

  get inputs(): readonly Input[] {
    return this.#inputs;
  }

  /** Index of the input of that path; made by `make` if it isn't there yet. */
  indexOf(path: string, make: () => Omit<Input, 'path'>): number {
    const known = this.#index.get(path);
    if (known !== undefined) return known;
    const index = this.#inputs.length;
    this.#inputs.push({ path, ...make() });
    this.#index.set(path, index);
    return index;
  }
}
