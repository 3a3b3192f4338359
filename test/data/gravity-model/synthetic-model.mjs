// Synthetic gravity models: the size of the Earth's field by Kaula's rule (1e-5/n², uniform), C20 and C40 of about the Earth's own,
// degree 1 zero. Made from a seed by whole-number arithmetic, so the same on every machine; too large to keep in the repository.

export const GM_M3S2 = 3.986004415e14;
export const RADIUS_M = 6378136.3;

/** xorshift32 (Marsaglia 2003): whole numbers 1 … 2³² − 1. */
function generator(seed) {
  let x = seed >>> 0 || 1;
  return () => {
    x ^= x << 13;
    x >>>= 0;
    x ^= x >>> 17;
    x ^= x << 5;
    x >>>= 0;
    return x;
  };
}

/** Coefficients by degree, index n(n + 1)/2 + m, and their standard deviations. */
export function syntheticModel(maxDegree, seed = 20270503) {
  const next = generator(seed);
  const count = ((maxDegree + 1) * (maxDegree + 2)) / 2;
  const cosine = new Float64Array(count);
  const sine = new Float64Array(count);
  const sigma = new Float32Array(count);
  cosine[0] = 1;
  for (let n = 2; n <= maxDegree; n++) {
    const size = 1.7e-5 / (n * n);
    for (let m = 0; m <= n; m++) {
      const k = (n * (n + 1)) / 2 + m;
      cosine[k] = size * (next() / 2147483648 - 1);
      sine[k] = m === 0 ? 0 : size * (next() / 2147483648 - 1);
      sigma[k] = Math.fround(1e-12 * (1 + (next() % 1000) / 250));
    }
  }
  if (maxDegree >= 2) cosine[3] = -4.841694575e-4;
  if (maxDegree >= 4) cosine[10] = 5.39965e-7;
  return { maxDegree, gmM3s2: GM_M3S2, radiusM: RADIUS_M, cosine, sine, sigma };
}

/** As an ICGEM file, 17 digits: read back, every coefficient is the same number. Yields text in pieces. */
export function* gfcPieces(model, { sigmas = false, tide = 'tide_free' } = {}) {
  yield [
    'Synthetic coefficients, no model of the Earth.',
    '',
    'begin_of_head ==================================================',
    'product_type              gravity_field',
    'modelname                 SYNTHETIC',
    `earth_gravity_constant    ${model.gmM3s2}`,
    `radius                    ${model.radiusM}`,
    `max_degree                ${model.maxDegree}`,
    `errors                    ${sigmas ? 'formal' : 'no'}`,
    'norm                      fully_normalized',
    `tide_system               ${tide}`,
    '',
    'key    n    m    C    S',
    'end_of_head ====================================================',
    '',
  ].join('\n');
  for (let n = 0; n <= model.maxDegree; n++) {
    let text = '';
    for (let m = 0; m <= n; m++) {
      const k = (n * (n + 1)) / 2 + m;
      text += `gfc ${String(n).padStart(4)} ${String(m).padStart(4)} ${model.cosine[k].toExponential(16)} ${model.sine[k].toExponential(16)}`;
      text += sigmas ? ` ${model.sigma[k].toExponential(4)} ${(m === 0 ? 0 : model.sigma[k]).toExponential(4)}\n` : '\n';
    }
    yield text;
  }
}

/** As the two files of GeographicLib's gravity-model format: properties, and coefficients by order in little-endian doubles.
 *  The degree-0 coefficient stands as 0 there and is 1 in the sum. */
export function egmFiles(model, name, { angularVelocity, a, f, gm }) {
  const { maxDegree: N } = model;
  const id = 'PLUMBSYN';
  const properties = [
    'EGMF-1',
    `Name ${name}`,
    'Description synthetic',
    'ReleaseDate 2027-01-01',
    'ConversionDate 2027-01-01',
    'DataVersion 1',
    `ModelRadius ${model.radiusM}`,
    `ModelMass ${model.gmM3s2}`,
    `AngularVelocity ${angularVelocity}`,
    `ReferenceRadius ${a}`,
    `ReferenceMass ${gm}`,
    `Flattening ${f}`,
    'HeightOffset 0',
    'CorrectionMultiplier 1',
    'Normalization full',
    `ID ${id}`,
    '',
  ].join('\n');
  const cosines = ((N + 1) * (N + 2)) / 2;
  const sines = cosines - (N + 1);
  const buffer = new ArrayBuffer(8 + 8 + 8 * (cosines + sines) + 8 + 8);
  const view = new DataView(buffer);
  for (let i = 0; i < 8; i++) view.setUint8(i, id.charCodeAt(i));
  view.setInt32(8, N, true);
  view.setInt32(12, N, true);
  let at = 16;
  for (const [values, from] of [
    [model.cosine, 0],
    [model.sine, 1],
  ])
    for (let m = from; m <= N; m++)
      for (let n = m; n <= N; n++, at += 8) view.setFloat64(at, n === 0 ? 0 : values[(n * (n + 1)) / 2 + m], true);
  // no height correction: one coefficient of degree 0, which is 0
  view.setInt32(at, 0, true);
  view.setInt32(at + 4, 0, true);
  view.setFloat64(at + 8, 0, true);
  return { properties, coefficients: new Uint8Array(buffer) };
}
