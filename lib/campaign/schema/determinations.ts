import { NORMAL_HEIGHT_FIELDS, readNormalHeightField } from '../../earth/normal-height-field.js';
import { candidate, datumReference, GRADIENT, GRAVITY, POTENTIAL, use } from './common.js';
import {
  number,
  object,
  oneOf,
  optional,
  quantity,
  reference,
  required,
  scalar,
  shorthand,
  text,
  variant,
} from './descriptor.js';

const common = { use, ...candidate } as const;

const NORMAL_FIELD = text(
  NORMAL_HEIGHT_FIELDS.map((field) => field.id),
  (name) =>
    readNormalHeightField(name) === null
      ? `one of ${NORMAL_HEIGHT_FIELDS.map((field) => field.id).join(', ')}; potsdam: the gravity in it was in the Potsdam system`
      : null,
);

const h = optional(
  quantity('length', { tide: true, frame: true }),
  'Ellipsoidal height h',
  'Height of the marker above the GRS80 ellipsoid, m. Default: the site’s h.',
);
const g = optional(
  quantity('acceleration', GRAVITY),
  'Surface gravity g',
  'Gravity at the marker, m/s². Default: the site’s g.',
);
const physicalHeight = (what: string) =>
  required(
    quantity('length', { tide: true, epoch: true }),
    `${what} H`,
    `${what} of the marker, m, positive above the datum.`,
  );

const gravityModel = shorthand(
  object('gravity model', 'A gravity model and how much of it is used.', {
    file: required(text(), 'File', 'ICGEM file (.gfc), beside the campaign.'),
    maxDegree: optional(
      number({ min: 2, max: 2700, integer: true }),
      'Degree',
      'Degree to which the series is summed. Default: all of the model.',
    ),
    tide: optional(
      oneOf('mean', 'zero', 'free'),
      'Tide system',
      'Permanent-tide system of the coefficients, where the file does not say it.',
    ),
  }),
  'file',
);

/** How the potential of a site is known; what each kind says about W stands in its help. */
export const determination = variant('determination', 'Kind', 'How the gravity potential W of the site is known.', {
  potential: object('potential', 'W as it is.', {
    ...common,
    W: required(quantity('potential', { tide: true, ...POTENTIAL }), 'Potential W', 'Gravity potential, m²/s².'),
  }),
  'geopotential-number': object('geopotential-number', 'W = W0 − C.', {
    ...common,
    C: required(
      quantity('potential', { tide: true }),
      'Geopotential number C',
      'C = W0 − W, m²/s², positive above the datum.',
    ),
    datum: datumReference,
  }),
  'normal-height': object('normal-height', 'W = W0 − (U₀ − U(φ, H)) with the GRS80 normal field.', {
    ...common,
    H: physicalHeight('Normal height'),
    datum: datumReference,
    field: optional(NORMAL_FIELD, 'Normal field', 'Normal field the height was made with. Default: GRS80.'),
  }),
  'normal-orthometric-height': object('normal-orthometric-height', 'W from a height without measured gravity in it.', {
    ...common,
    H: physicalHeight('Normal-orthometric height'),
    datum: datumReference,
  }),
  'orthometric-height': object('orthometric-height', 'Helmert height: W = W0 − (g + 4.24e-7 s⁻²·H)·H.', {
    ...common,
    H: physicalHeight('Orthometric height'),
    g,
    datum: datumReference,
  }),
  'dynamic-height': object('dynamic-height', 'W = W0 − gammaRef·H.', {
    ...common,
    H: physicalHeight('Dynamic height'),
    gammaRef: optional(
      quantity('acceleration', GRAVITY),
      'Reference gravity',
      'Constant the geopotential number was divided by, m/s². Default: normal gravity of the ellipsoid at 45°.',
    ),
    datum: datumReference,
  }),
  'gnss-quasigeoid': object('gnss-quasigeoid', 'As normal-height, with H = h − ζ.', {
    ...common,
    h,
    zeta: required(
      quantity('length', { tide: true, frame: true, grid: true }),
      'Height anomaly ζ',
      'Height of the quasigeoid above the GRS80 ellipsoid, m.',
    ),
    datum: datumReference,
  }),
  'gnss-geoid': object('gnss-geoid', 'W = W0 − (g + k·H)·H with H = h − N and k the mean gravity factor.', {
    ...common,
    h,
    N: required(
      quantity('length', { tide: true, frame: true, grid: true }),
      'Geoid height N',
      'Height of the geoid above the GRS80 ellipsoid, m.',
    ),
    g,
    meanGravityFactor: optional(
      quantity('gradient', GRADIENT),
      'Mean gravity factor k',
      'Increase of gravity along the plumb line to its mean value, s⁻². Default: 4.24e-7 s⁻² with u = 10 %.',
    ),
    datum: datumReference,
  }),
  'gravity-model': object(
    'gravity-model',
    'W = V of the model’s spherical harmonics + centrifugal potential, at latitude, longitude and h.',
    {
      ...common,
      h,
      model: required(
        gravityModel,
        'Model',
        'Gravity model in ICGEM format (.gfc), a file beside the campaign: its name, or {"file", "maxDegree", "tide"}.',
      ),
      commission: optional(
        scalar('length', { min: 0, uncertainty: true }),
        'Commission',
        'Standard uncertainty from the coefficients, as a geoid height, m. Default: from their standard deviations in the file, with the covariance between sites.',
      ),
      omission: optional(
        scalar('length', { min: 0, uncertainty: true }),
        'Omission',
        'Standard uncertainty from what lies beyond the last degree N, as a geoid height, m. Default: Kaula’s rule, 64 m/N; alike over 20 000 km/N.',
      ),
    },
  ),
  'levelled-from': object(
    'levelled-from',
    'W = W(site) − g·dH.',
    {
      ...common,
      site: required(reference('sites'), 'From site', 'Site at which the levelling starts.'),
      dH: required(
        quantity('length', { tide: true }),
        'Height difference dH',
        'Levelled height of this site over the other, m; positive when this one is higher.',
      ),
      g: optional(
        quantity('acceleration', GRAVITY),
        'Mean gravity g',
        'Mean gravity along the line, m/s². Default: the mean of the two sites’ g.',
      ),
      length: optional(scalar('length', { above: 0 }), 'Length of the line', 'Levelled distance, m.'),
      b: optional(
        quantity('root-length', { min: 0, sizesError: true }),
        'Random error b',
        'Standard uncertainty of the line per root of its length, mm/√km: with k it makes u(dH) = b·√length ⊕ k·length.',
      ),
      k: optional(
        quantity('length-ratio', { min: 0, sizesError: true }),
        'Systematic error k',
        'Standard uncertainty of the line in proportion to its length, mm/km. Its source makes it common to lines.',
      ),
    },
    {
      needs: [
        ['b', 'length'],
        ['k', 'length'],
      ],
    },
  ),
});
