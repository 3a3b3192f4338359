import { CampaignError, faultAt } from '../campaign/fault.js';
import type { InputCovariance } from './covariance.js';
import { cholesky, type Matrix } from './matrix.js';

/** Σ must have no eigenvalue below −1e-10 of its largest: else no errors can be so correlated (JCGM 102, 3.21).
 *  A plain source, a correlation in 0…1 and an exponential of distance always pass; a negative correlation ρ between n places
 *  has the eigenvalue 1 + (n − 1)·ρ and passes alone only above zero.
 * @throws {CampaignError} `correlation-impossible`, naming the source */
export function checkPositiveSemidefinite(
  covariance: InputCovariance,
  sources: readonly { readonly id: string; readonly correlation?: number }[],
): void {
  const suspects = sources.flatMap((s, index) => {
    const rho = s.correlation ?? 1;
    const n = rho < 0 ? (covariance.sourceField(s.id)?.places.length ?? 0) : 0;
    return n > 1 && 1 + (n - 1) * rho < -1e-10 ? [{ ...s, rho, n, index }] : [];
  });
  if (suspects.length === 0) return;
  const ids = new Set(suspects.map((s) => s.id));
  const involved = covariance.inputs.flatMap((x, i) => (x.parts.some((p) => ids.has(p.source ?? '')) ? [i] : []));
  // in units of each input's u, so that metres and m²/s² weigh alike
  const r: Matrix = involved.map((i) =>
    Float64Array.from(involved, (j) => covariance.between(i, j) / (covariance.inputs[i]!.u * covariance.inputs[j]!.u)),
  );
  const shift = 1e-10 * largestEigenvalue(r);
  r.forEach((row, i) => {
    row[i]! += shift;
  });
  // other, independent parts of the same inputs can make up for what the source alone lacks
  if (cholesky(r)) return;
  throw new CampaignError(
    suspects.map((s) =>
      faultAt(
        'correlation-impossible',
        `sources.${s.id}.correlation`,
        `${s.rho} between ${s.n} places`,
        `at least ${(-1 / (s.n - 1)).toPrecision(4)}: ${s.n} errors cannot all be more negatively correlated than −1/(n − 1)`,
      ),
    ),
  );
}

/** Largest eigenvalue of a symmetric positive-diagonal matrix by the power method; a few per cent are enough here. */
function largestEigenvalue(m: Matrix): number {
  let v = Float64Array.from(m, (_, i) => 1 + (i % 7) / 7);
  let value = 0;
  for (let step = 0; step < 50; step++) {
    const next = Float64Array.from(m, (row) => row.reduce((s, x, j) => s + x * v[j]!, 0));
    value = Math.hypot(...next);
    if (value === 0) return 0;
    v = next.map((x) => x / value);
  }
  return value;
}
