import {
  boolean,
  number,
  object,
  oneOf,
  optional,
  type Range,
  reference,
  required,
  scalar,
  text,
} from './descriptor.js';

/** Limits that no value of a real campaign comes near; what lies beyond is a slip of unit or key. */
export const GRAVITY: Range = { min: 9, max: 10.5, because: 'gravity near the Earth’s surface, in m/s²' };
export const POTENTIAL: Range = {
  min: 6.2e7,
  max: 6.3e7,
  because: 'a gravity potential near the Earth’s surface, in m²/s²',
};
export const GRADIENT: Range = { min: -1e-4, max: 1e-4, because: 'a gravity gradient, in s⁻²' };
export const SMALL_FRACTION: Range = { min: -1e-6, max: 1e-6, because: 'a fraction, not a multiple of 1e-18' };
export const SMALL_DEVIATION: Range = {
  min: 0,
  max: 1e-6,
  uncertainty: true,
  because: 'a fraction, not a multiple of 1e-18',
};

export const name = optional(text(), 'Name', 'What people call it; shown beside the id.');

export const candidate = {
  candidate: optional(boolean(), 'Candidate', 'Not there yet: design ranks what it would bring. Default: false.'),
  cost: optional(
    scalar('fraction', { min: 0 }),
    'Cost',
    'Cost of the candidate, in any unit that is the same through the file.',
  ),
} as const;

export const use = optional(oneOf('check'), 'Use', '"check": compared with the result, not fitted.');

export const datumReference = optional(
  reference('datums', ['ihrs', 'u0-grs80', 'tt']),
  'Datum',
  'Datum of the height or geopotential number: one from datums, or ihrs (62 636 853.4 m²/s², the default), u0-grs80 ' +
    '(62 636 860.850, for ζ or N from a model without the zero-degree term), tt (L_G·c²).',
);

/** One piece of a systematic uncertainty. */
export const systematicPiece = object('systematic', 'One piece of a systematic relative frequency uncertainty.', {
  u: required(scalar('fraction', SMALL_DEVIATION), 'u', 'Standard uncertainty, relative frequency.'),
  source: optional(
    reference('sources'),
    'Source',
    'Shared error source: the same source elsewhere is the same error. Without it the piece is independent.',
  ),
  dof: optional(number({ above: 0 }), 'Degrees of freedom', 'Degrees of freedom of u. Default: infinitely many.'),
  name,
});
