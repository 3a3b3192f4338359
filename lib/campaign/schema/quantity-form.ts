import { MEASURED_KEYS } from '../../quantity/index.js';
import {
  type Keys,
  list,
  number,
  object,
  oneOf,
  optional,
  type QuantityDescriptor,
  quantity,
  reference,
  remarks,
  required,
  type ScalarDescriptor,
  scalar,
  text,
} from './descriptor.js';
import { EPOCH, FRAME } from './epoch-and-frame.js';

const source = optional(
  reference('sources'),
  'Source',
  'Shared error source: the same source elsewhere is the same error. Without it the error is independent of all others.',
);

const tideKey = optional(
  oneOf('mean', 'zero', 'free'),
  'Tide system',
  'Permanent-tide system of the value. Without it a default is taken, with a warning.',
);

const epochKeys = {
  epoch: optional(EPOCH, 'Epoch', 'Epoch of the height, decimal years.'),
  rate: optional(
    quantity('speed', { min: -3e-8, max: 3e-8, because: 'a vertical rate of the ground, less than a metre a year' }),
    'Rate',
    'Vertical rate, m/s, positive upwards: "1.2(3) mm/a". It brings the height to the epoch of the datum, or of the campaign.',
  ),
} as const;

const frameKeys = {
  frame: optional(
    FRAME,
    'Frame',
    'Terrestrial reference frame: ITRF2020 … ITRF2000, ETRF2000, ETRF2014, IGS20 and the like.',
  ),
  ...epochKeys,
} as const;

const degreesList = list(number({ min: -540, max: 540 }), { min: 2, max: 4 });

const gridNodes = object('nodes', 'Nodes of a grid round the site, so that the file is not needed.', {
  lat: required(degreesList, 'Latitudes', 'Latitudes of the nodes, degrees, from the south, evenly spaced.'),
  lon: required(degreesList, 'Longitudes', 'Longitudes of the nodes, degrees, from the west, evenly spaced.'),
  values: required(
    list(list(number(), { min: 2, max: 4 }), { min: 2, max: 4 }),
    'Values',
    'Values at the nodes, m: a list per latitude.',
  ),
});

const gridKeys = {
  grid: optional(
    text(),
    'Grid',
    'Geoid or quasigeoid grid (ISG, GTX or GeoTIFF) off which the value is read, in place of value; a file beside the campaign.',
  ),
  method: optional(
    oneOf('bilinear', 'bicubic'),
    'Interpolation',
    'bilinear, or bicubic: cubic convolution with a = −1/2. Default: bilinear.',
  ),
  nodes: optional(gridNodes, 'Nodes', 'The nodes of the grid round the site, kept so that the file is not needed.'),
} as const;

/** Keys of the object form of a measured number; `value`, `u` and `unit` are read together, by lib/quantity. */
export function quantityKeys(descriptor: QuantityDescriptor): Keys {
  const known = made.get(descriptor);
  if (known) return known;
  const keys = makeQuantityKeys(descriptor);
  made.set(descriptor, keys);
  return keys;
}

const made = new WeakMap<QuantityDescriptor, Keys>();

function makeQuantityKeys(descriptor: QuantityDescriptor): Keys {
  const { kind } = descriptor;
  if (descriptor.sizesError) return { ...scalarKeys(scalar(kind)), source };
  const uncertainty = scalar(kind, { min: 0, uncertainty: true, bare: true });
  return {
    value: (descriptor.grid ? optional : required)(
      scalar(kind, { bare: true }),
      'Value',
      'A number in the field’s default unit, or a text such as "143.216(8) m".',
    ),
    ...(descriptor.grid ? gridKeys : {}),
    u: optional(uncertainty, 'u', 'Standard uncertainty, where the value’s text does not carry it.'),
    unit: optional(text(), 'Unit', 'Unit of value and u where they have none of their own.'),
    source,
    parts: optional(
      list(
        object('part', 'One piece of a standard uncertainty.', {
          u: required(uncertainty, 'u', 'Standard uncertainty of the piece.'),
          source,
        }),
        { min: 1 },
      ),
      'Parts',
      'Pieces of the uncertainty, in place of source; they add as squares.',
    ),
    distribution: optional(
      oneOf('normal', 'uniform', 'triangular', 't'),
      'Distribution',
      'uniform: half-width √3·u; triangular: half-width √6·u; t: needs dof, u is its scale. Default: normal.',
    ),
    dof: optional(number({ above: 0 }), 'Degrees of freedom', 'Degrees of freedom of u. Default: infinitely many.'),
    ...(descriptor.tide ? { tide: tideKey } : {}),
    ...(descriptor.frame ? frameKeys : descriptor.epoch ? epochKeys : {}),
    ...remarks,
  };
}

/** Keys of the object form of a number without uncertainty. */
export const scalarKeys = ({ kind }: ScalarDescriptor): Keys => ({
  value: required(
    scalar(kind, { bare: true }),
    'Value',
    'A number in the field’s default unit, or a text with its unit.',
  ),
  unit: optional(text(), 'Unit', 'Unit of the value where it has none of its own.'),
  ...remarks,
});

/** Keys that lib/quantity reads together; the rest are read here one by one. */
export const READ_TOGETHER: ReadonlySet<string> = new Set(MEASURED_KEYS);
