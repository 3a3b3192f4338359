import { chordDistanceM, geodesicDistanceM } from '../earth/geodesic-distance.js';
import type { Gradient } from './gradient.js';
import type { ErrorSource, Input, Place } from './inputs.js';

/** Below this correlation an exponential is left out: 1e-20 of a variance is far under the rounding of its sum. */
const NEGLIGIBLE_EXPONENT = 46;

/** One source's places and the correlation between them. */
interface SourceField {
  readonly source: ErrorSource;
  readonly places: Place[];
  readonly placeIndex: Map<string, number>;
  /** dense correlation between places, only for a correlation length */
  rho: Float64Array | null;
}

interface Part {
  readonly field: number;
  readonly place: number;
  readonly u: number;
}

/** A gradient as the covariance sees it: independent parts, and per source the sum of c_i·u_i at each place. */
interface Loading {
  readonly gradient: Gradient;
  readonly fields: readonly { readonly field: number; readonly sums: ReadonlyMap<number, number> }[];
}

/** Covariance Σ of the inputs. Two inputs are correlated only if they name the same source: cov = ρ·u₁·u₂ with ρ = 1 at one
 *  place; between places 1 for a plain source, its `correlation`, or exp(−d/L) with d the geodesic distance on GRS80.
 *  Σ is never formed: a variance needs only the sums per source and place (GUM 5.2.2, F.1.2.3). */
export class InputCovariance {
  readonly inputs: readonly Input[];
  readonly #fields: SourceField[] = [];
  /** per input: variance of its independent parts, and its parts that name a source */
  readonly #own: Float64Array;
  readonly #parts: readonly (readonly Part[])[];

  constructor(inputs: readonly Input[], sources: readonly ErrorSource[]) {
    this.inputs = inputs;
    this.#own = new Float64Array(inputs.length);
    const fieldOf = new Map<string, number>();
    for (const source of sources) {
      fieldOf.set(source.id, this.#fields.length);
      this.#fields.push({ source, places: [], placeIndex: new Map(), rho: null });
    }
    this.#parts = inputs.map((input, i) => {
      const shared: Part[] = [];
      for (const part of input.parts) {
        if (part.source === null) {
          this.#own[i]! += part.u * part.u;
          continue;
        }
        const field = fieldOf.get(part.source);
        if (field === undefined)
          throw new Error(`internal: input ${input.path} names the unlisted source ${part.source}`);
        shared.push({ field, place: placeOf(this.#fields[field]!, input.place), u: part.u });
      }
      return shared;
    });
  }

  /** Correlation of a source between two of its places. */
  #rho(field: SourceField, p: number, q: number): number {
    if (p === q) return 1;
    const { correlation, correlationLengthM } = field.source;
    if (correlationLengthM === null) return correlation ?? 1;
    field.rho ??= correlationMatrix(field.places, correlationLengthM);
    return field.rho[p * field.places.length + q]!;
  }

  #load(gradient: Gradient): Loading {
    const sums = new Map<number, Map<number, number>>();
    for (let k = 0; k < gradient.indices.length; k++) {
      const c = gradient.values[k]!;
      for (const { field, place, u } of this.#parts[gradient.indices[k]!]!) {
        const at = sums.get(field) ?? new Map<number, number>();
        sums.set(field, at);
        at.set(place, (at.get(place) ?? 0) + c * u);
      }
    }
    return { gradient, fields: [...sums].map(([field, s]) => ({ field, sums: s })) };
  }

  /** R·s of one source: what each place feels of the loading. */
  #image(field: SourceField, sums: ReadonlyMap<number, number>): Float64Array {
    const n = field.places.length;
    const image = new Float64Array(n);
    if (field.source.correlationLengthM === null) {
      const rho = field.source.correlation ?? 1;
      let total = 0;
      for (const s of sums.values()) total += s;
      image.fill(rho * total);
      for (const [p, s] of sums) image[p]! += (1 - rho) * s;
      return image;
    }
    for (const [p, s] of sums) for (let q = 0; q < n; q++) image[q]! += this.#rho(field, p, q) * s;
    return image;
  }

  /** Variance u²(y) = c·Σ·cᵀ. */
  variance(gradient: Gradient): number {
    const load = this.#load(gradient);
    let sum = 0;
    for (let k = 0; k < gradient.indices.length; k++) {
      const c = gradient.values[k]!;
      sum += c * c * this.#own[gradient.indices[k]!]!;
    }
    for (const { field, sums } of load.fields) {
      const image = this.#image(this.#fields[field]!, sums);
      for (const [p, s] of sums) sum += s * image[p]!;
    }
    // a difference that cancels exactly may come out at −1e-16 of its terms
    return Math.max(0, sum);
  }

  /** (Σ·cᵀ)_i for every input i: the covariance of y with each input. */
  withInputs(gradient: Gradient): Float64Array {
    const { fields } = this.#load(gradient);
    const out = new Float64Array(this.inputs.length);
    for (let k = 0; k < gradient.indices.length; k++) {
      const i = gradient.indices[k]!;
      out[i] = gradient.values[k]! * this.#own[i]!;
    }
    const images = new Map(fields.map(({ field, sums }) => [field, this.#image(this.#fields[field]!, sums)]));
    this.#parts.forEach((parts, i) => {
      for (const { field, place, u } of parts) {
        const image = images.get(field);
        if (image) out[i]! += u * image[place]!;
      }
    });
    return out;
  }

  /** Covariance matrix of several quantities, rows of {@link Float64Array}. */
  matrix(gradients: readonly Gradient[]): Float64Array[] {
    const loads = gradients.map((g) => this.#load(g));
    const rows = gradients.map(() => new Float64Array(gradients.length));
    const own = new Float64Array(this.inputs.length);
    loads.forEach((a, i) => {
      for (let k = 0; k < a.gradient.indices.length; k++) {
        const x = a.gradient.indices[k]!;
        own[x] = a.gradient.values[k]! * this.#own[x]!;
      }
      const images = new Map(a.fields.map(({ field, sums }) => [field, this.#image(this.#fields[field]!, sums)]));
      for (let j = i; j < loads.length; j++) {
        const b = loads[j]!;
        let sum = 0;
        const { indices, values } = b.gradient;
        for (let k = 0; k < indices.length; k++) sum += own[indices[k]!]! * values[k]!;
        for (const { field, sums } of b.fields) {
          const image = images.get(field);
          if (image) for (const [p, s] of sums) sum += image[p]! * s;
        }
        rows[i]![j] = sum;
        rows[j]![i] = sum;
      }
      for (const x of a.gradient.indices) own[x] = 0;
    });
    return rows;
  }

  /** Inputs and correlations of one source, for checks and for drawing its reach. */
  sourceField(id: string): { readonly places: readonly Place[]; rho(p: number, q: number): number } | null {
    const field = this.#fields.find((f) => f.source.id === id);
    return field ? { places: field.places, rho: (p, q) => this.#rho(field, p, q) } : null;
  }

  /** Covariance of two inputs. */
  between(i: number, j: number): number {
    let sum = i === j ? this.#own[i]! : 0;
    for (const a of this.#parts[i]!)
      for (const b of this.#parts[j]!)
        if (a.field === b.field) sum += a.u * b.u * this.#rho(this.#fields[a.field]!, a.place, b.place);
    return sum;
  }
}

function placeOf(field: SourceField, place: Place): number {
  let index = field.placeIndex.get(place.key);
  if (index === undefined) {
    index = field.places.length;
    field.placeIndex.set(place.key, index);
    field.places.push(place);
  }
  return index;
}

function correlationMatrix(places: readonly Place[], lengthM: number): Float64Array {
  const n = places.length;
  const rho = new Float64Array(n * n);
  for (let p = 0; p < n; p++) {
    rho[p * n + p] = 1;
    for (let q = p + 1; q < n; q++) {
      const a = places[p]!.position;
      const b = places[q]!.position;
      if (!a || !b) throw new Error(`internal: ${places[a ? q : p]!.key} has no position for a correlation length`);
      const near = chordDistanceM(a, b) < NEGLIGIBLE_EXPONENT * lengthM;
      rho[p * n + q] = near ? Math.exp(-geodesicDistanceM(a, b) / lengthM) : 0;
      rho[q * n + p] = rho[p * n + q]!;
    }
  }
  return rho;
}
