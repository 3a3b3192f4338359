import type { TideSystem } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import type { PairInput } from './pair-campaign.js';
import type { LinkPrediction } from './prediction.js';

const SYSTEMS: readonly TideSystem[] = ['mean', 'zero', 'free'];
/** An example of what one model at both sites does, for the warning that none was stated. */
const SHARED_EXAMPLE = 0.9;

/** The link predicted again with something changed. */
type Again = (changed: PairInput) => LinkPrediction;

/** What was left unsaid about two sites, each with its size in the difference. */
export const pairWarnings = (input: PairInput, link: LinkPrediction, again: Again): readonly Warning[] => [
  ...gravityWarnings(input, link),
  ...tideWarnings(input, link, again),
  ...correlationWarning(input, link, again),
];

/** Default gravity: it enters ΔW only where N is used, else the length equivalent alone. */
function gravityWarnings({ a, b }: PairInput, { dH }: LinkPrediction): Warning[] {
  const without = Object.entries({ a, b }).filter(([, site]) => site.gMs2 === null);
  const [first] = without;
  if (!first) return [];
  const names = without.map(([, site]) => site.name).join(' and ');
  const where = without.some(([, site]) => site.nM)
    ? 'It enters ΔW through N and the length equivalent'
    : 'It enters the length equivalent alone, ΔW, y and normal height are free of it';
  return [
    {
      code: 'default-gravity',
      path: `${first[0]}-g`,
      message: `no gravity given for ${names}: normal gravity is used, with u of 50 mGal and more. ${where}; that is known to ${millimetres(dH!.u)}. Write ${first[0]}-g="9.8125(1) m/s²" or what was measured.`,
    },
  ];
}

/** A label missing at both sites is the same mistake twice: what counts is its difference, found by trying the other systems. */
function tideWarnings(input: PairInput, { dH, y }: LinkPrediction, again: Again): Warning[] {
  const missing = [
    { option: 'h-tide', key: 'hTide', what: 'h', taken: 'free' },
    { option: 'geoid-tide', key: 'geoidTide', what: input.a.zetaM ? 'ζ' : 'N', taken: 'zero' },
  ] as const;
  return missing.flatMap(({ option, key, what, taken }) => {
    if (input[key] !== null) return [];
    const others = SYSTEMS.filter((system) => system !== taken).map((system) => {
      const link = again({ ...input, [key]: system });
      return { system, dH: link.dH!.value - dH!.value, y: link.y!.value - y!.value };
    });
    const worst = others.reduce((one, other) => (Math.abs(other.y) > Math.abs(one.y) ? other : one));
    return [
      {
        code: 'tide-label-missing',
        path: option,
        message: `no permanent-tide label for ${what}; taken as ${taken} at both sites. ${
          // a hundredth of the smallest digit that anyone states
          Math.abs(worst.dH) < 1e-6
            ? 'Between these sites it cancels'
            : `If it is ${worst.system}, the difference is off by ${millimetres(worst.dH)} (${Math.abs(worst.y).toExponential(1)})`
        }. Write ${option}="${taken}" or what is right.`,
      },
    ];
  });
}

/** What an unknown correlation may cost, by an example. */
function correlationWarning(input: PairInput, { dHNormal }: LinkPrediction, again: Again): Warning[] {
  const { a, b, correlation } = input;
  const geoid = [a.zetaM ?? a.nM, b.zetaM ?? b.nM];
  if (correlation !== null || geoid.some((one) => !one || one.u === 0)) return [];
  const shared = again({ ...input, correlation: SHARED_EXAMPLE }).dHNormal!;
  const symbol = a.zetaM && b.zetaM ? 'ζ' : a.zetaM || b.zetaM ? 'ζ and N' : 'N';
  return [
    {
      code: 'correlation-missing',
      path: 'correlation',
      message: `the errors of ${symbol} at the two sites are taken as independent. If one model serves both, what they share cancels: with ρ = ${SHARED_EXAMPLE} u would be ${millimetres(shared.u)} instead of ${millimetres(dHNormal!.u)}. Write correlation="0" or what is right.`,
    },
  ];
}

const millimetres = (metres: number): string => `${Number((1000 * Math.abs(metres)).toPrecision(2))} mm`;
