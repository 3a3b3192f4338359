import { FIBRE_CARRIER_HZ, FIBRE_GROUP_INDEX } from '../../clocks/fibre-noise.js';
import { RECOMMENDED_FREQUENCIES } from '../../clocks/recommended-frequencies.js';
import { candidate, name, SMALL_DEVIATION, SMALL_FRACTION, systematicPiece } from './common.js';
import {
  id,
  instant,
  list,
  number,
  object,
  oneOf,
  optional,
  pieces,
  quantity,
  reference,
  required,
  scalar,
  text,
} from './descriptor.js';
import { route } from './places.js';

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

const flywheel = object(
  'flywheel',
  'An oscillator beside the clock that runs without gaps and bridges those of the clock.',
  {
    stability: required(
      object('flywheel stability', 'Allan deviations of a flywheel.', {
        white,
        flicker,
        randomWalk: optional(
          scalar('fraction', SMALL_DEVIATION),
          'Random walk',
          'Allan deviation at 1 s of the random-walk frequency noise, rising as τ^(1/2). Default: 0.',
        ),
        phase: optional(
          scalar('fraction', SMALL_DEVIATION),
          'White phase noise',
          'Allan deviation at 1 s, falling as 1/τ, of the flywheel and of its comparison with the clock. Default: 0.',
        ),
      }),
      'Stability',
      'Noise of the flywheel.',
    ),
    driftPerDay: optional(
      scalar('fraction', SMALL_DEVIATION),
      'Drift per day',
      'Standard uncertainty of its linear frequency drift after correction, per day. Default: 0.',
    ),
    cycle: optional(
      scalar('duration', { min: 3600 }),
      'Cycle',
      'Length of the cycle at whose beginning the clock runs for its uptime, 1 h or more. Not beside available intervals of the clock.',
    ),
  },
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
    flywheel: optional(
      flywheel,
      'Flywheel',
      'Oscillator that bridges the gaps of the clock; plan then says what bridging brings and costs. Default: none.',
    ),
    ...candidate,
  },
  { atSite: true, exclusive: [['uptime', 'available']] },
);

const fibre = object('fibre', 'Noise of the fibre, from which the phase noise of its stabilised link follows.', {
  noise: required(
    number({ above: 0 }),
    'Fibre noise',
    'Phase noise of the fibre without stabilisation, S(f)·f² per length, rad²·Hz/km: S falls as 1/f².',
  ),
  bandwidth: required(
    scalar('frequency', { above: 0 }),
    'Bandwidth',
    'Bandwidth in which the phase is read: that of counter or filter, at most c/(4·n·length) of the servo, Hz.',
  ),
  carrier: optional(
    scalar('frequency', { above: 0 }),
    'Carrier',
    `Optical frequency in the fibre. Default: ${FIBRE_CARRIER_HZ / 1e12} THz.`,
  ),
  groupIndex: optional(number({ min: 1, max: 3 }), 'Group index', `Default: ${FIBRE_GROUP_INDEX}.`),
});

const sideBySide = object(
  'side-by-side',
  'The two clocks of the link compared in one place: that of the clock that stays.',
  {
    when: required(oneOf('before', 'after'), 'When', 'Before the journey or after it.'),
    y: optional(
      quantity('fraction', SMALL_FRACTION),
      'Offset y',
      'Offset of clock B (to) seen from clock A (from), gravity’s part left in; its u is statistics alone. Not measured yet: time.',
    ),
    time: optional(
      scalar('duration', { above: 0 }),
      'Time',
      'Time of data that is planned for it, where y is not there yet.',
    ),
    dH: required(
      quantity('length'),
      'Height difference dH',
      'Height of the atoms of clock B (to) over those of clock A (from), m.',
    ),
    systematic: optional(
      pieces(scalar('fraction', SMALL_DEVIATION), systematicPiece),
      'Systematic uncertainty',
      'Pieces of the travelling clock’s systematic in that place. Default: those of the clock. A piece cancels against the remote one if both name the same source.',
    ),
    start: optional(instant(), 'Start', 'Beginning, ISO 8601 in UTC or MJD.'),
    end: optional(instant(), 'End', 'End, ISO 8601 in UTC or MJD.'),
  },
  { ordered: [['start', 'end']], exclusive: [['y', 'time']] },
);

const transported = object(
  'transported',
  'One clock of the link travels and is compared with the other in one place.',
  {
    clock: required(reference('clocks'), 'Clock', 'The end of the link that travels.'),
    reproducibility: optional(
      scalar('fraction', SMALL_DEVIATION),
      'Reproducibility',
      'Standard uncertainty of what setting the clock up anew changes: once for every place and time. Default: 0.',
    ),
    sideBySide: required(list(sideBySide, { min: 1 }), 'Side by side', 'Comparisons in one place, before and after.'),
  },
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
    route: optional(
      route,
      'Route',
      'Way of the signal or of a moved clock, for path. Default: the geodesic between the sites.',
    ),
    segments: optional(
      number({ integer: true, min: 1 }),
      'Segments',
      'Unbroken stretches the link’s data fall into. Default: 1.',
    ),
    systematic,
    stability: optional(linkStability, 'Stability', 'Allan deviations. Default: 0.'),
    uptime,
    available,
    fibre: optional(
      fibre,
      'Fibre',
      'Noise of the fibre, from which the phase noise follows, in place of stability.phase. Without a length the geodesic is taken, with a warning.',
    ),
    transported: optional(
      transported,
      'Transported clock',
      'Comparisons in one place before and after. Default: none.',
    ),
    ...candidate,
  },
  { exclusive: [['uptime', 'available']], distinct: [['from', 'to']] },
);
