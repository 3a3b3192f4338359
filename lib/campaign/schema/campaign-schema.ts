import { candidate, datumReference, GRADIENT, GRAVITY, name, POTENTIAL, SMALL_FRACTION, use } from './common.js';
import {
  boolean,
  id,
  instant,
  list,
  number,
  object,
  oneOf,
  optional,
  quantity,
  reference,
  required,
  scalar,
  text,
} from './descriptor.js';
import { determination } from './determinations.js';
import { EPOCH, FRAME } from './epoch-and-frame.js';
import { clock, interval, link } from './instruments.js';
import { latitude, longitude, oceanLoading, pole, position } from './places.js';
import { series } from './series.js';

/** Datums that are built in, exact, and cannot be defined again. */
export const BUILT_IN_DATUMS = datumReference.descriptor.builtIn;

export const CAMPAIGN_FORMAT = 'plumbtick-campaign/1';

export const source = object(
  'source',
  'A shared error source: what makes inputs correlated.',
  {
    id: required(id('sources'), 'Id', 'Name by which inputs refer to the source.'),
    name,
    correlation: optional(
      scalar('fraction', { min: -1, max: 1 }),
      'Correlation ρ',
      'Correlation between different sites, −1 to 1. Without it and without a correlation length: 1.',
    ),
    correlationLength: optional(
      scalar('length', { above: 0 }),
      'Correlation length L',
      'Correlation between sites exp(−d/L) with d the geodesic distance, m.',
    ),
  },
  { exclusive: [['correlation', 'correlationLength']] },
);

export const datum = object('datum', 'A zero level: the potential that heights and geopotential numbers count from.', {
  id: required(id('datums', BUILT_IN_DATUMS), 'Id', 'Name by which determinations refer to the datum.'),
  name,
  W0: required(
    quantity('potential', { tide: true, ...POTENTIAL }),
    'Zero potential W0',
    'Potential of the zero level, m²/s².',
  ),
  origin: optional(
    object('origin', 'The benchmark that carries the datum.', {
      lat: required(latitude, 'Latitude φ', 'Geodetic latitude, degrees, north positive.'),
      lon: optional(longitude, 'Longitude λ', 'Geodetic longitude, degrees, east positive.'),
    }),
    'Origin',
    'Benchmark that carries the datum: C and H are converted between tide systems by the shift at the site minus the shift here.',
  ),
  estimateOffset: optional(
    boolean(),
    'Estimate offset',
    'adjust finds the datum’s offset; the stated u of W0 is then left out.',
  ),
  estimateTilt: optional(boolean(), 'Estimate tilt', 'adjust finds the datum’s tilt to north and east.'),
  frame: optional(FRAME, 'Frame', 'Terrestrial reference frame of the geoid model.'),
  epoch: optional(
    EPOCH,
    'Epoch',
    'Epoch of the datum and its geoid model, decimal years: heights with a rate are brought to it.',
  ),
});

export const transition = object(
  'transition',
  'A clock transition whose frequency ratio was measured, or without a recommended frequency.',
  {
    id: required(id('transitions'), 'Id', 'Name of the transition, such as 87Sr or 171Yb+ E3.'),
    offset: optional(
      quantity('fraction', SMALL_FRACTION),
      'Offset',
      'True over recommended frequency − 1, shared by all clocks of the transition. Default: 0 with the u of the recommended value.',
    ),
    frequency: optional(
      quantity('frequency', { above: 0 }),
      'Frequency',
      'Hz; only for a transition without a recommended frequency.',
    ),
  },
);

export const site = object(
  'site',
  'A marker in the ground, and what is known of its potential.',
  {
    id: required(id('sites'), 'Id', 'Name by which clocks and levelling refer to the site.'),
    name,
    lat: optional(latitude, 'Latitude φ', 'Geodetic latitude, degrees, north positive.'),
    lon: optional(longitude, 'Longitude λ', 'Geodetic longitude, degrees, east positive.'),
    position: optional(position, 'Position', 'In place of lat and lon: a national grid or geocentric coordinates.'),
    h: optional(
      quantity('length', { tide: true, frame: true }),
      'Ellipsoidal height h',
      'Height of the marker above the GRS80 ellipsoid, m.',
    ),
    g: optional(
      quantity('acceleration', GRAVITY),
      'Gravity g',
      'Gravity at the marker, m/s². Default: normal gravity with its uncertainty, and a warning.',
    ),
    gradient: optional(
      quantity('gradient', GRADIENT),
      'Gravity gradient Γ',
      'Decrease of gravity with height, s⁻². Default: 3.086e-6 s⁻² with u = 10 %.',
    ),
    variable: optional(
      quantity('potential'),
      'Variable part',
      'Loading, groundwater and air, m²/s², added to W of the site’s clocks. Default: none.',
    ),
    oceanLoading: optional(
      list(oceanLoading),
      'Ocean loading',
      'Load of the ocean tide, by constituent; an empty list states that there is none. Used by tide.',
    ),
    determinations: optional(
      list(determination),
      'Determinations',
      'How W is known; several are combined by least squares. Default: none.',
    ),
    ...candidate,
  },
  {
    atSite: true,
    alternatives: [['lat', 'lon'], ['position']],
    exclusive: [
      ['lat', 'position'],
      ['lon', 'position'],
    ],
  },
);

export const measurement = object(
  'measurement',
  'A measured frequency offset, gravity’s part left in.',
  {
    id: optional(id('measurements'), 'Id', 'Name by which correlations refer to the measurement.'),
    link: required(reference('links'), 'Link', 'Link that was measured.'),
    y: optional(
      quantity('fraction', { tide: true, ...SMALL_FRACTION }),
      'Offset y',
      '[ν_B/ν_B,rec]/[ν_A/ν_A,rec] − 1, every correction applied except gravity’s. Its u is statistics alone.',
    ),
    series: optional(
      series,
      'Series',
      'In place of y: frequency data, a file beside the campaign: its name, or {"file", "columns", "tau"}. y is its mean over the time in which clocks and link are valid, the tide taken off each sample; u comes from its noise.',
    ),
    tide: optional(oneOf('mean', 'zero', 'free'), 'Tide system', 'Permanent-tide system of y. Default: mean.'),
    includesSystematic: optional(
      boolean(),
      'Includes systematics',
      'u of y already contains the systematics of clocks and link. Default: false.',
    ),
    use,
    start: optional(instant(), 'Start', 'Beginning of the measurement, ISO 8601 in UTC or MJD.'),
    end: optional(instant(), 'End', 'End of the measurement, ISO 8601 in UTC or MJD.'),
  },
  {
    alternatives: [['y'], ['series']],
    exclusive: [
      ['y', 'series'],
      ['series', 'tide'],
      ['series', 'includesSystematic'],
    ],
    ordered: [['start', 'end']],
  },
);

export const correlation = object('correlation', 'Correlation of the statistical parts of two measurements.', {
  between: required(list(reference('measurements'), { min: 2, max: 2 }), 'Between', 'Ids of the two measurements.'),
  rho: required(scalar('fraction', { min: -1, max: 1 }), 'Correlation ρ', '−1 to 1.'),
});

export const methods = object(
  'methods',
  'What levelling and GNSS would do over any distance, to compare the clocks with.',
  {
    levelling: optional(
      object('levelling model', 'u = b·√d ⊕ k·d over a line of length d.', {
        b: optional(scalar('root-length', { min: 0 }), 'Random error b', 'mm/√km. Default: 0.'),
        k: optional(scalar('length-ratio', { min: 0 }), 'Systematic error k', 'mm/km. Default: 0.'),
        detour: optional(
          number({ min: 1, max: 10 }),
          'Detour',
          'Length of the levelling line over the geodesic. Default: 1.',
        ),
      }),
      'Levelling',
      'Default: b and k of the levelled-from lines of this file.',
    ),
    gnss: optional(
      object(
        'GNSS model',
        'u² = 2·(h² + geoid²·(1 − ρ)).',
        {
          h: required(scalar('length', { min: 0 }), 'u of h', 'Standard uncertainty of an ellipsoidal height, m.'),
          geoid: required(
            scalar('length', { min: 0 }),
            'u of ζ or N',
            'Standard uncertainty of a (quasi)geoid height, m.',
          ),
          correlationLength: optional(scalar('length', { above: 0 }), 'Correlation length L', 'ρ = exp(−d/L), m.'),
          correlation: optional(
            scalar('fraction', { min: -1, max: 1 }),
            'Correlation ρ',
            'ρ at any distance. Default: 0.',
          ),
        },
        { exclusive: [['correlation', 'correlationLength']] },
      ),
      'GNSS and geoid',
      'Default: what the gnss determinations of this file state.',
    ),
  },
);

const tide = oneOf('mean', 'zero', 'free');

/** The whole file. Validation, the JSON Schema and the forms of the desk all come from this one description. */
export const campaignSchema = object('campaign', 'A comparison of heights by clocks, as planned or as measured.', {
  format: required(oneOf(CAMPAIGN_FORMAT), 'Format', 'Name and version of the format.'),
  title: optional(text(), 'Title', 'One line on what the campaign is.'),
  tide: optional(tide, 'Tide system', 'Permanent-tide system in which W, C, H and dW are given. Default: mean.'),
  window: optional(interval, 'Window', 'The time the campaign takes.'),
  target: optional(scalar('length', { above: 0 }), 'Target', 'Wanted standard uncertainty, as length equivalent, m.'),
  effect: optional(
    scalar('length', { above: 0 }),
    'Effect',
    'Discrepancy the comparison is to reveal, as length equivalent, m. Default: 10 × target.',
  ),
  love: optional(
    object('love', 'Degree-2 Love numbers of the permanent tide.', {
      h2: optional(scalar('fraction', { min: 0, max: 2 }), 'h₂', 'Default: 0.6078.'),
      k2: optional(scalar('fraction', { min: 0, max: 2 }), 'k₂', 'Default: 0.30190.'),
    }),
    'Love numbers',
    'Default: h₂ = 0.6078, k₂ = 0.30190.',
  ),
  epoch: optional(
    EPOCH,
    'Epoch',
    'Decimal year at which the potentials are wanted; heights with a rate are brought to it. Default: the epoch of the datum, else the middle of the window.',
  ),
  pole: optional(
    list(pole, { min: 1 }),
    'Pole',
    'Coordinates of the pole through the window, for the pole tide. Used by tide.',
  ),
  sources: optional(list(source), 'Sources', 'Shared error sources.'),
  datums: optional(list(datum, { pathBy: 'id' }), 'Datums', 'Zero levels besides the built-in ones.'),
  transitions: optional(list(transition, { pathBy: 'id' }), 'Transitions', 'Measured ratios, and further transitions.'),
  sites: required(list(site, { pathBy: 'id' }), 'Sites', 'Markers whose potential is wanted.'),
  clocks: optional(list(clock, { pathBy: 'id' }), 'Clocks', 'Clocks at the sites.'),
  links: optional(list(link, { pathBy: 'id' }), 'Links', 'Frequency links between the clocks.'),
  measurements: optional(list(measurement), 'Measurements', 'Measured offsets of the links.'),
  correlations: optional(list(correlation), 'Correlations', 'Between the statistical parts of measurements.'),
  methods: optional(methods, 'Classical methods', 'What the clocks are compared with in break-even.'),
});
