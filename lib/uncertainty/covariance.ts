import type { Gradient } from './gradient.js';
import type { ErrorSource, Input, Place } from './inputs.js';
import { correlationBetweenPlaces } from './place-correlation.js';

/** One source's places, their slots in the flat sums, and the correlation between them. */
interface SourceField {
  readonly source: ErrorSource;
  readonly places: Place[];
  readonly placeIndex: Map<string, number>;
  /** first slot of the field */
  start: number;
  /** dense correlation between places, made on first use and only where it differs from pair to pair */
  rho: Float64Array | null;
}

/** Covariance Σ of the inputs. Two inputs are correlated only if they name the same source: cov = ρ·u₁·u₂ with ρ = 1 at one
 *  place; between places 1 for a plain source, its `correlation`, or exp(−d/L) with d the geodesic distance on GRS80.
 *  Σ is never formed: for y = Σ c·x a variance needs the independent parts, and per source the sums S = Σ c·u at each place,
 *  since Sᵀ·R·S is what the source adds (GUM 5.2.2, F.1.2.3). */
export class InputCovariance {
  readonly inputs: readonly Input[];
  readonly sources: readonly ErrorSource[];
  readonly #fields: SourceField[] = [];
  /** per input, variance of its independent parts */
  readonly #own: Float64Array;
  /** shared parts of all inputs, flat: those of input i are partStart[i] … partStart[i+1]−1 */
  readonly #partStart: Int32Array;
  readonly #partField: Int32Array;
  readonly #partSlot: Int32Array;
  readonly #partU: Float64Array;
  readonly #slots: number;

  constructor(inputs: readonly Input[], sources: readonly ErrorSource[]) {
    this.inputs = inputs;
    this.sources = sources;
    this.#own = new Float64Array(inputs.length);
    const fieldOf = new Map<string, number>();
    for (const source of sources) {
      fieldOf.set(source.id, this.#fields.length);
      this.#fields.push({ source, places: [], placeIndex: new Map(), start: 0, rho: null });
    }
    const parts: { readonly field: number; readonly place: number; readonly u: number }[] = [];
    this.#partStart = new Int32Array(inputs.length + 1);
    inputs.forEach((input, i) => {
      for (const part of input.parts) {
        if (part.source === null) {
          this.#own[i]! += part.u * part.u;
          continue;
        }
        const field = fieldOf.get(part.source);
        if (field === undefined)
          throw new Error(`internal: input ${input.path} names the unlisted source ${part.source}`);
        parts.push({ field, place: placeOf(this.#fields[field]!, input.place), u: part.u });
      }
      this.#partStart[i + 1] = parts.length;
    });
    let slots = 0;
    for (const field of this.#fields) {
      field.start = slots;
      slots += field.places.length;
    }
    this.#slots = slots;
    this.#partField = Int32Array.from(parts, (p) => p.field);
    this.#partSlot = Int32Array.from(parts, (p) => this.#fields[p.field]!.start + p.place);
    this.#partU = Float64Array.from(parts, (p) => p.u);
  }

  /** Correlation of a source between two of its places. */
  #rho(field: SourceField, p: number, q: number): number {
    if (p === q) return 1;
    const rho = denseCorrelation(field);
    return rho === null ? (field.source.correlation ?? 1) : rho[p * field.places.length + q]!;
  }

  /** S per slot, and the slots that it touches per field. */
  #load(gradient: Gradient): Load {
    const sums = new Float64Array(this.#slots);
    const touched: number[][] = [];
    const seen = new Uint8Array(this.#slots);
    const { indices, values } = gradient;
    for (let k = 0; k < indices.length; k++) {
      const i = indices[k]!;
      const c = values[k]!;
      for (let p = this.#partStart[i]!; p < this.#partStart[i + 1]!; p++) {
        const slot = this.#partSlot[p]!;
        sums[slot]! += c * this.#partU[p]!;
        if (seen[slot]) continue;
        seen[slot] = 1;
        const field = this.#partField[p]!;
        const list = touched[field];
        if (list) list.push(slot);
        else touched[field] = [slot];
      }
    }
    return { sums, touched };
  }

  /** R·S of one source: what each of its places feels of the loading. */
  #image(field: SourceField, { sums }: Load, touched: readonly number[]): Float64Array {
    const n = field.places.length;
    const image = new Float64Array(n);
    const { start, source } = field;
    const dense = denseCorrelation(field);
    if (dense === null) {
      const rho = source.correlation ?? 1;
      let total = 0;
      for (const slot of touched) total += sums[slot]!;
      image.fill(rho * total);
      for (const slot of touched) image[slot - start]! += (1 - rho) * sums[slot]!;
      return image;
    }
    for (const slot of touched) {
      const s = sums[slot]!;
      const row = (slot - start) * n;
      for (let q = 0; q < n; q++) image[q]! += dense[row + q]! * s;
    }
    return image;
  }

  /** Sᵀ·R·S of one source. */
  #quadratic(field: SourceField, { sums }: Load, touched: readonly number[]): number {
    const { start, source } = field;
    let squares = 0;
    for (const slot of touched) squares += sums[slot]! * sums[slot]!;
    const dense = denseCorrelation(field);
    if (dense === null) {
      const rho = source.correlation ?? 1;
      let total = 0;
      for (const slot of touched) total += sums[slot]!;
      return rho * total * total + (1 - rho) * squares;
    }
    const n = field.places.length;
    let mixed = 0;
    for (let a = 1; a < touched.length; a++) {
      const row = (touched[a]! - start) * n - start;
      let inner = 0;
      for (let b = 0; b < a; b++) inner += dense[row + touched[b]!]! * sums[touched[b]!]!;
      mixed += sums[touched[a]!]! * inner;
    }
    return squares + 2 * mixed;
  }

  /** Variance u²(y) = c·Σ·cᵀ. */
  variance(gradient: Gradient): number {
    const load = this.#load(gradient);
    let sum = 0;
    for (let k = 0; k < gradient.indices.length; k++) {
      const c = gradient.values[k]!;
      sum += c * c * this.#own[gradient.indices[k]!]!;
    }
    load.touched.forEach((touched, field) => {
      sum += this.#quadratic(this.#fields[field]!, load, touched);
    });
    // a difference that cancels exactly may come out at −1e-16 of its terms
    return Math.max(0, sum);
  }

  /** (Σ·cᵀ)_i for every input i: the covariance of y with each input. */
  withInputs(gradient: Gradient): Float64Array {
    const load = this.#load(gradient);
    const out = new Float64Array(this.inputs.length);
    for (let k = 0; k < gradient.indices.length; k++) {
      const i = gradient.indices[k]!;
      out[i] = gradient.values[k]! * this.#own[i]!;
    }
    const images = this.#images(load);
    for (let i = 0; i < out.length; i++)
      for (let p = this.#partStart[i]!; p < this.#partStart[i + 1]!; p++)
        out[i]! += this.#partU[p]! * images[this.#partSlot[p]!]!;
    return out;
  }

  /** Images of all touched sources, by slot; 0 where nothing is felt. */
  #images(load: Load): Float64Array {
    const images = new Float64Array(this.#slots);
    load.touched.forEach((touched, index) => {
      const field = this.#fields[index]!;
      images.set(this.#image(field, load, touched), field.start);
    });
    return images;
  }

  /** Covariance matrix of several quantities, as rows. */
  matrix(gradients: readonly Gradient[]): Float64Array[] {
    const loads = gradients.map((g) => this.#load(g));
    const rows = gradients.map(() => new Float64Array(gradients.length));
    const own = new Float64Array(this.inputs.length);
    gradients.forEach((a, i) => {
      for (let k = 0; k < a.indices.length; k++) own[a.indices[k]!] = a.values[k]! * this.#own[a.indices[k]!]!;
      const images = this.#images(loads[i]!);
      for (let j = i; j < loads.length; j++) {
        let sum = 0;
        const { indices, values } = gradients[j]!;
        for (let k = 0; k < indices.length; k++) sum += own[indices[k]!]! * values[k]!;
        const { sums, touched } = loads[j]!;
        touched.forEach((slots) => {
          for (const slot of slots) sum += images[slot]! * sums[slot]!;
        });
        rows[i]![j] = sum;
        rows[j]![i] = sum;
      }
      for (const x of a.indices) own[x] = 0;
    });
    return rows;
  }

  /** Places and correlations of one source, for checks and for drawing its reach; null for an unknown id. */
  sourceField(id: string): { readonly places: readonly Place[]; rho(p: number, q: number): number } | null {
    const field = this.#fields.find((f) => f.source.id === id);
    return field ? { places: field.places, rho: (p, q) => this.#rho(field, p, q) } : null;
  }

  /** Covariance of two inputs. */
  between(i: number, j: number): number {
    let sum = i === j ? this.#own[i]! : 0;
    for (let p = this.#partStart[i]!; p < this.#partStart[i + 1]!; p++)
      for (let q = this.#partStart[j]!; q < this.#partStart[j + 1]!; q++) {
        if (this.#partField[p] !== this.#partField[q]) continue;
        const field = this.#fields[this.#partField[p]!]!;
        const rho = this.#rho(field, this.#partSlot[p]! - field.start, this.#partSlot[q]! - field.start);
        sum += this.#partU[p]! * this.#partU[q]! * rho;
      }
    return sum;
  }
}

interface Load {
  readonly sums: Float64Array;
  /** per field index (sparse), its touched slots */
  readonly touched: readonly (readonly number[])[];
}

/** Correlation between all places of a source, in rows; null where it is one number for every pair. */
function denseCorrelation(field: SourceField): Float64Array | null {
  const { correlationLengthM, between } = field.source;
  if (between) {
    const n = field.places.length;
    field.rho ??= Float64Array.from({ length: n * n }, (_, i) => {
      const [p, q] = [Math.floor(i / n), i % n];
      return p === q ? 1 : between(field.places[p]!, field.places[q]!);
    });
  } else if (correlationLengthM !== null) field.rho ??= correlationBetweenPlaces(field.places, correlationLengthM);
  return field.rho;
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
