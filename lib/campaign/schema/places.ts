import { CONSTITUENT_NAMES, readConstituent } from '../../earth/earth-tide/astronomical-arguments.js';
import { angle, instant, list, number, object, optional, required, scalar, text } from './descriptor.js';

export const latitude = angle('latitude');
export const longitude = angle('longitude');

const coordinate = scalar('length', { min: -1e9, max: 1e9, because: 'a coordinate on the Earth, in m' });

/** A place in coordinates of its own system. */
export const position = object(
  'position',
  'The place in a national grid, in latitude and longitude, or in geocentric coordinates; in place of lat and lon.',
  {
    crs: required(
      text(),
      'Coordinate system',
      'EPSG code such as "EPSG:25832", a PROJ definition such as "+proj=utm +zone=32 +ellps=GRS80", or "geocentric".',
    ),
    x: optional(coordinate, 'Easting x', 'Easting, m, whatever the official order of the axes; or geocentric X.'),
    y: optional(coordinate, 'Northing y', 'Northing, m; or geocentric Y.'),
    easting: optional(coordinate, 'Easting', 'The same as x.'),
    northing: optional(coordinate, 'Northing', 'The same as y.'),
    z: optional(coordinate, 'Z', 'Geocentric Z, m. Heights do not stand here but in h.'),
    lat: optional(latitude, 'Latitude φ', 'For a system of latitude and longitude, degrees.'),
    lon: optional(longitude, 'Longitude λ', 'For a system of latitude and longitude, degrees.'),
  },
  {
    exclusive: [
      ['x', 'easting'],
      ['y', 'northing'],
    ],
  },
);

export const oceanLoading = object(
  'ocean loading',
  'One constituent of the load of the ocean tide, as felt at the site.',
  {
    constituent: required(
      text(CONSTITUENT_NAMES, (name) => (readConstituent(name) ? null : `one of ${CONSTITUENT_NAMES.join(', ')}`)),
      'Constituent',
      'Name of the tide.',
    ),
    amplitude: required(
      scalar('potential', { min: 0, max: 10 }),
      'Amplitude',
      'Amplitude of the potential that a clock fixed to the crust feels, m²/s². From a height N of the loading potential and an upward displacement u it is g·(N − u), both complex.',
    ),
    phase: required(
      number({ min: -360, max: 360 }),
      'Phase lag',
      'Greenwich phase lag, degrees; positive comes later.',
    ),
  },
);

const poleCoordinate = number({ min: -2, max: 2, because: 'arc-seconds' });

export const pole = object('pole', 'Coordinates of the pole, for the pole tide.', {
  time: optional(instant(), 'Time', 'When it holds, UTC; without it, one position holds at all times.'),
  x: required(poleCoordinate, 'Pole x', 'Towards Greenwich, arc-seconds.'),
  y: required(poleCoordinate, 'Pole y', 'Towards 90° west, arc-seconds.'),
});

const wayPoint = object('way point', 'A point that the signal or the clock passes.', {
  lat: required(latitude, 'Latitude φ', 'Geodetic latitude, degrees, north positive.'),
  lon: required(longitude, 'Longitude λ', 'Geodetic longitude, degrees, east positive.'),
  height: optional(
    scalar('length', { min: -12_000, max: 4e8, because: 'a height on the Earth or of a satellite, in m' }),
    'Height',
    'Height above sea level, or of a satellite, m. Default: 0.',
  ),
  time: optional(instant(), 'Time', 'When a moved clock passes, UTC.'),
});

export const route = object(
  'route',
  'The way between the two clocks, for time transfer: what rotation and gravity do to a signal or a moved clock.',
  {
    via: optional(list(wayPoint), 'Via', 'Points between the two sites, in order; a satellite for a satellite link.'),
    departure: optional(instant(), 'Departure', 'When a moved clock leaves the first site, UTC.'),
    arrival: optional(instant(), 'Arrival', 'When it reaches the second, UTC.'),
  },
  {
    needs: [
      ['departure', 'arrival'],
      ['arrival', 'departure'],
    ],
    ordered: [['departure', 'arrival']],
  },
);
