import { RECOMMENDED_FREQUENCIES } from '../../clocks/recommended-frequencies.js';
import { candidate, name, SMALL_DEVIATION, systematicPiece } from './common.js';
import {
  id,
  instant,
  list,
  number,
  object,
  optional,
  pieces,
  quantity,
  reference,
  required,
  scalar,
  text,
} from './descriptor.js';

/** Link kinds for which typical published figures are offered. */
export const LINK_KINDS = ['fibre', 'free-space', 'satellite', 'transported', 'local'] as const;

export const interval = object(
  'interval',
  'A stretch of time, UTC.',
  {
    start: required(instant(), 'Start', 'Beginning, ISO 8601 in UTC or MJD.'),
    end: required(instant(), 'End', 'End, ISO 8601 in UTC or MJD; after the start.'),
  },
  { ordered: [['start', 'end']] },
);

const white = optional(
  scalar('fraction', SMALL_DEVIATION),
  'White frequency noise',
  'Allan deviation at 1 s, falling as τ^(−1/2). Default: 0.',
);
const flicker = optional(
  scalar('fraction', SMALL_DEVIATION),
  'Flicker floor',
  'Allan deviation of the flicker frequency noise, the same at every τ. Default: 0.',
);

const clockStability = object(
  'clock stability',
  'Allan deviations of a clock.',
  { white, flicker },
  {
    refused: {
      phase: {
        code: 'phase-on-clock',
        expected: 'white and flicker: phase noise is a term of links, state it in the stability of the link',
      },
    },
  },
);
const linkStability = object('link stability', 'Allan deviations that a link adds.', {
  white,
  flicker,
  phase: optional(
    scalar('fraction', SMALL_DEVIATION),
    'White phase noise',
    'Allan deviation at 1 s, falling as 1/τ. Default: 0.',
  ),
});

const systematic = optional(
  pieces(scalar('fraction', SMALL_DEVIATION), systematicPiece),
  'Systematic uncertainty',
  'Relative frequency uncertainty that averaging does not reduce: one number, or pieces that add as squares. Default: 0.',
);
const uptime = optional(
  scalar('fraction', { min: 0, max: 1 }),
  'Uptime',
  'Share of the time in which it delivers, 0 to 1. Default: 1.',
);
const available = optional(
  list(interval, { min: 1 }),
  'Available',
  'Measured intervals of good data, in place of uptime.',
);

export const clock = object(
  'clock',
  'A clock, standing at a site.',
  {
    id: required(id('clocks'), 'Id', 'Name by which links refer to the clock.'),
    name,
    site: required(reference('sites'), 'Site', 'Site whose marker the tie starts from.'),
    transition: required(
      reference(
        'transitions',
        RECOMMENDED_FREQUENCIES.map((f) => f.transition),
      ),
      'Transition',
      'Clock transition: one with a recommended frequency, or one from transitions with a frequency of its own.',
    ),
    tie: optional(
      list(
        object('tie step', 'One step of the way from the marker to the atoms.', {
          name: optional(text(), 'Step', 'From where to where.'),
          dH: required(
            quantity('length', { tide: true }),
            'Height difference dH',
            'Step upwards, m; negative goes down.',
          ),
        }),
      ),
      'Tie',
      'Steps from the site’s marker to the atoms. Default: none, the atoms are at the marker.',
    ),
    systematic,
    stability: optional(clockStability, 'Stability', 'Allan deviations. Default: 0.'),
    uptime,
    available,
    ...candidate,
  },
  { atSite: true, exclusive: [['uptime', 'available']] },
);

export const link = object(
  'link',
  'A frequency link between two clocks.',
  {
    id: required(id('links'), 'Id', 'Name of the link.'),
    name,
    from: required(reference('clocks'), 'From clock', 'Clock A. y is the offset of clock B seen from A.'),
    to: required(reference('clocks'), 'To clock', 'Clock B. y > 0 when it is the higher one.'),
    kind: optional(
      text(LINK_KINDS),
      'Kind',
      'fibre, free-space, satellite, transported or local; another word is kept and gets no starting values.',
    ),
    length: optional(scalar('length', { min: 0 }), 'Length', 'Length of the path, m.'),
    segments: optional(
      number({ integer: true, min: 1 }),
      'Segments',
      'Unbroken stretches the link’s data fall into. Default: 1.',
    ),
    systematic,
    stability: optional(linkStability, 'Stability', 'Allan deviations. Default: 0.'),
    uptime,
    available,
    ...candidate,
  },
  { exclusive: [['uptime', 'available']], distinct: [['from', 'to']] },
);
