import { coefficientIndex, type GravityModel } from './gravity-model.js';

/** Coefficients of a model in the conventional (unnormalised) form made fully normalised: C̄ = C/√((2 − δ₀ₘ)(2n + 1)(n − m)!/(n + m)!)
 *  (Heiskanen & Moritz 1967, section 1-14). Such files end near degree 80, where the numbers fall below 1e-300. */
export function normalizeCoefficients(model: GravityModel): GravityModel {
  const cosine = model.cosine.slice();
  const sine = model.sine.slice();
  const cosineSigma = model.cosineSigma?.slice() ?? null;
  const sineSigma = model.sineSigma?.slice() ?? null;
  for (let n = 0; n <= model.maxDegree; n++) {
    let factor = Math.sqrt(1 / (2 * n + 1));
    for (let m = 0; m <= n; m++) {
      // √((n + m)!/(n − m)!) step by step; the 2 comes in at m = 1
      if (m > 0) factor *= Math.sqrt((n + m) * (n - m + 1)) * (m === 1 ? Math.SQRT1_2 : 1);
      const k = coefficientIndex(n, m);
      cosine[k]! *= factor;
      sine[k]! *= factor;
      if (cosineSigma && sineSigma) {
        cosineSigma[k]! *= factor;
        sineSigma[k]! *= factor;
      }
    }
  }
  return { ...model, cosine, sine, cosineSigma, sineSigma };
}
