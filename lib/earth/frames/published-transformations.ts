import type { FourteenParameters } from './fourteen-parameters.js';
import type { FrameName } from './frame-name.js';

/** One published set of parameters with the sense in which it was published. */
export interface PublishedTransformation {
  readonly from: FrameName;
  readonly to: FrameName;
  readonly parameters: FourteenParameters;
  readonly source: string;
}

type Triple = readonly [number, number, number];
const NONE: Triple = [0, 0, 0];

/** From one ITRF to an older one: the rotations and their rates are zero by definition of the newer frames' orientation. */
const itrf = (
  from: FrameName,
  to: FrameName,
  epochYear: number,
  [t1, t2, t3, scalePpb]: readonly [number, number, number, number],
  [r1, r2, r3, scaleRatePpbPerYear]: readonly [number, number, number, number],
  source: string,
): PublishedTransformation => ({
  from,
  to,
  parameters: {
    epochYear,
    translationMm: [t1, t2, t3],
    translationRateMmPerYear: [r1, r2, r3],
    scalePpb,
    scaleRatePpbPerYear,
    rotationMas: NONE,
    rotationRateMasPerYear: NONE,
  },
  source,
});

const ITRF2020 = 'ITRF2020: Altamimi et al. (2023), J. Geodesy 97:47; itrf.ign.fr, Tran_ITRF2020';
const ITRF2014 = 'ITRF2014: Altamimi et al. (2016), JGR Solid Earth 121:6109, table 4';
const ITRF2008 = 'ITRF2008: Altamimi et al. (2011), J. Geodesy 85:457, table 8; IERS Conventions 2010, table 4.1';
const ITRF2005 = 'ITRF2005: Altamimi et al. (2007), JGR 112:B09401';
const EUREF = 'EUREF Technical Note 1: Relationship and transformation between the ITRS and the ETRS (Altamimi 2018)';

const ETRF2000_RATE: Triple = [0.081, 0.49, -0.792];

/** Every pair that was published, as it was published. The tables agree with each other: every loop over three frames closes to
 *  nanometres. Only the ETRF frames reach ITRF2020 and each other through ITRF2014. */
export const PUBLISHED_TRANSFORMATIONS: readonly PublishedTransformation[] = [
  itrf('ITRF2020', 'ITRF2014', 2015, [-1.4, -0.9, 1.4, -0.42], [0, -0.1, 0.2, 0], ITRF2020),
  itrf('ITRF2020', 'ITRF2008', 2015, [0.2, 1.0, 3.3, -0.29], [0, -0.1, 0.1, 0.03], ITRF2020),
  itrf('ITRF2020', 'ITRF2005', 2015, [2.7, 0.1, -1.4, 0.65], [0.3, -0.1, 0.1, 0.03], ITRF2020),
  itrf('ITRF2020', 'ITRF2000', 2015, [-0.2, 0.8, -34.2, 2.25], [0.1, 0, -1.7, 0.11], ITRF2020),
  itrf('ITRF2014', 'ITRF2008', 2010, [1.6, 1.9, 2.4, -0.02], [0, 0, -0.1, 0.03], ITRF2014),
  itrf('ITRF2014', 'ITRF2005', 2010, [2.6, 1.0, -2.3, 0.92], [0.3, 0, -0.1, 0.03], ITRF2014),
  itrf('ITRF2014', 'ITRF2000', 2010, [0.7, 1.2, -26.1, 2.12], [0.1, 0.1, -1.9, 0.11], ITRF2014),
  itrf('ITRF2008', 'ITRF2005', 2000, [-2.0, -0.9, -4.7, 0.94], [0.3, 0, 0, 0], ITRF2008),
  itrf('ITRF2008', 'ITRF2000', 2000, [-1.9, -1.7, -10.5, 1.34], [0.1, 0.1, -1.8, 0.08], ITRF2008),
  itrf('ITRF2005', 'ITRF2000', 2000, [0.1, -0.8, -5.8, 0.4], [-0.2, 0.1, -1.8, 0.08], ITRF2005),
  {
    from: 'ITRF2000',
    to: 'ETRF2000',
    parameters: {
      epochYear: 1989,
      translationMm: [54, 51, -48],
      translationRateMmPerYear: NONE,
      scalePpb: 0,
      scaleRatePpbPerYear: 0,
      rotationMas: NONE,
      rotationRateMasPerYear: ETRF2000_RATE,
    },
    source: EUREF,
  },
  {
    from: 'ITRF2005',
    to: 'ETRF2000',
    parameters: {
      epochYear: 2000,
      translationMm: [54.1, 50.2, -53.8],
      translationRateMmPerYear: [-0.2, 0.1, -1.8],
      scalePpb: 0.4,
      scaleRatePpbPerYear: 0.08,
      rotationMas: [0.891, 5.39, -8.712],
      rotationRateMasPerYear: ETRF2000_RATE,
    },
    source: EUREF,
  },
  {
    from: 'ITRF2008',
    to: 'ETRF2000',
    parameters: {
      epochYear: 2000,
      translationMm: [52.1, 49.3, -58.5],
      translationRateMmPerYear: [0.1, 0.1, -1.8],
      scalePpb: 1.34,
      scaleRatePpbPerYear: 0.08,
      rotationMas: [0.891, 5.39, -8.712],
      rotationRateMasPerYear: ETRF2000_RATE,
    },
    source: EUREF,
  },
  {
    from: 'ITRF2014',
    to: 'ETRF2000',
    parameters: {
      epochYear: 2010,
      translationMm: [54.7, 52.2, -74.1],
      translationRateMmPerYear: [0.1, 0.1, -1.9],
      scalePpb: 2.12,
      scaleRatePpbPerYear: 0.11,
      rotationMas: [1.701, 10.29, -16.632],
      rotationRateMasPerYear: ETRF2000_RATE,
    },
    source: EUREF,
  },
  {
    from: 'ITRF2014',
    to: 'ETRF2014',
    parameters: {
      epochYear: 1989,
      translationMm: NONE,
      translationRateMmPerYear: NONE,
      scalePpb: 0,
      scaleRatePpbPerYear: 0,
      rotationMas: NONE,
      rotationRateMasPerYear: [0.085, 0.531, -0.77],
    },
    source: EUREF,
  },
];
