/** Seeded noise for tests: a 32-bit generator (mulberry32, T. Ettinger 2017, public domain) and normal deviates by Box–Muller. */
export function normalDeviates(seed: number): () => number {
  let state = seed >>> 0;
  const uniform = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  let spare: number | null = null;
  return () => {
    if (spare !== null) {
      const s = spare;
      spare = null;
      return s;
    }
    const r = Math.sqrt(-2 * Math.log(1 - uniform()));
    const phi = 2 * Math.PI * uniform();
    spare = r * Math.sin(phi);
    return r * Math.cos(phi);
  };
}

/** White frequency noise with Allan deviation `level` at one sampling interval. */
export function whiteFm(n: number, level: number, seed: number): Float64Array {
  const next = normalDeviates(seed);
  return Float64Array.from({ length: n }, () => level * next());
}

/** Random-walk frequency noise: running sum of white steps. */
export function randomWalkFm(n: number, step: number, seed: number): Float64Array {
  const y = whiteFm(n, step, seed);
  for (let i = 1; i < n; i++) y[i]! += y[i - 1]!;
  return y;
}

/** White phase noise: differences of white phase. */
export function whitePm(n: number, level: number, seed: number): Float64Array {
  const x = whiteFm(n + 1, level, seed);
  return Float64Array.from({ length: n }, (_, i) => x[i + 1]! - x[i]!);
}

/** Fast Fourier transform in place, length a power of two. */
function fft(re: Float64Array, im: Float64Array, sign: 1 | -1): void {
  const n = re.length;
  for (let i = 1, j = 0; i < n; i++) {
    let bit = n >> 1;
    for (; j & bit; bit >>= 1) j ^= bit;
    j ^= bit;
    if (i < j) {
      [re[i], re[j]] = [re[j]!, re[i]!];
      [im[i], im[j]] = [im[j]!, im[i]!];
    }
  }
  for (let size = 2; size <= n; size *= 2) {
    const angle = (sign * 2 * Math.PI) / size;
    for (let k = 0; k < size / 2; k++) {
      const c = Math.cos(angle * k);
      const s = Math.sin(angle * k);
      for (let i = k; i < n; i += size) {
        const j = i + size / 2;
        const tr = c * re[j]! - s * im[j]!;
        const ti = c * im[j]! + s * re[j]!;
        re[j] = re[i]! - tr;
        im[j] = im[i]! - ti;
        re[i]! += tr;
        im[i]! += ti;
      }
    }
  }
}

interface Spectrum {
  readonly re: Float64Array;
  readonly im: Float64Array;
}
const filters = new Map<string, Spectrum>();

/** Transform of the impulse response of (1 − B)^{α/2}, `length` values padded to `size`. */
function filterOf(alpha: number, length: number, size: number): Spectrum {
  const key = `${alpha} ${length}`;
  let found = filters.get(key);
  if (!found) {
    const re = new Float64Array(size);
    const im = new Float64Array(size);
    re[0] = 1;
    for (let k = 1; k < length; k++) re[k] = (re[k - 1]! * (k - 1 - alpha / 2)) / k;
    fft(re, im, 1);
    found = { re, im };
    filters.set(key, found);
  }
  return found;
}

/** Power-law frequency noise S_y ~ f^α by fractional differencing of white noise, (1 − B)^{α/2} (Kasdin & Walter 1992, Proc. IEEE
 *  Freq. Control Symp., 274), convolved by FFT; the first half of a record of twice the length is thrown away, so that it does
 *  not start from rest. `level` is the standard deviation of the driving white noise. */
export function powerLawFm(n: number, alpha: number, level: number, seed: number): Float64Array {
  const length = 2 * n;
  let size = 1;
  while (size < 2 * length) size *= 2;
  const h = filterOf(alpha, length, size);
  const w = new Float64Array(size);
  w.set(whiteFm(length, level, seed));
  const wi = new Float64Array(size);
  fft(w, wi, 1);
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    re[i] = (h.re[i]! * w[i]! - h.im[i]! * wi[i]!) / size;
    im[i] = (h.re[i]! * wi[i]! + h.im[i]! * w[i]!) / size;
  }
  fft(re, im, -1);
  return re.slice(n, length);
}
