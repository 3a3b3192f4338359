import type { StartingValue } from '../constants/starting-value.js';

/** 1 mm/√km in m^½. */
export const MM_PER_ROOT_KM = 1e-3 / Math.sqrt(1000);

const order = (id: string, name: string, mmPerRootKm: number, evidence: StartingValue['evidence']): StartingValue => ({
  id,
  of: 'levelling',
  what: `${name}: largest standard error of an adjusted height difference that the class allows`,
  values: { bRootM: mmPerRootKm * MM_PER_ROOT_KM, k: 0 },
  write: `"levelling": { "b": "${mmPerRootKm.toFixed(1)} mm/√km" }`,
  source: 'FGCC 1984, Standards and Specifications for Geodetic Control Networks, section 2.2',
  evidence,
});

/** Classes of levelling, and what a (quasi)geoid was found to be worth, as starting values for break-even distances. */
export const METHOD_STARTING_VALUES: readonly StartingValue[] = [
  order('first-order-I', 'First order, class I', 0.5, 'memory'),
  order('first-order-II', 'First order, class II', 0.7, 'memory'),
  order('second-order-I', 'Second order, class I', 1.0, 'memory'),
  order('second-order-II', 'Second order, class II', 1.3, 'memory'),
  order('third-order', 'Third order', 2.0, 'memory'),
  {
    id: 'first-order-systematic',
    of: 'levelling',
    what: 'First order with an error in proportion to length: an illustration of its size, not an estimate',
    values: { bRootM: 0.4 * MM_PER_ROOT_KM, k: 0.6e-6 },
    write: '"levelling": { "b": "0.4 mm/√km", "k": "0.6 mm/km" }',
    source: 'transcribed in an open library of levelling models; origin not seen',
    evidence: 'memory',
  },
  {
    id: 'geoid-spread',
    of: 'gnss',
    what: 'Geoids of 14 groups along a line of 350 km in the mountains spread by 2 to 3 cm; GNSS heights not in it',
    values: { geoidM: 0.025 },
    write: '"gnss": { "h": "…", "geoid": "25 mm" }',
    source: 'Wang et al. 2021, J. Geod. 95 (GSVS17), second-hand',
    evidence: 'memory',
  },
];
