import type { Campaign, Clock } from '../../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../constants/defining-constants.js';
import { exactly, type Mistake, withClockTie } from './mistake.js';

/** Atoms over the floor on which a clock stands, m: 1.2 with a spread of 0.4 (common practice, no source). */
const ATOMS_OVER_FLOOR_M = 1.2;
const ATOMS_OVER_FLOOR_U_M = 0.4;
const ROUND_GRAVITY = 9.81;

/** Mistakes on the way from the marker to the atoms. */
export function tieMistakes(campaign: Campaign, clocks: readonly Clock[]): Mistake[] {
  return clocks.flatMap((clock): Mistake[] => {
    const path = `clocks.${clock.id}.tie`;
    const scaled = (factor: number, only: number | null) =>
      withClockTie(campaign, clock.id, (tie) =>
        tie.map((step, i) =>
          only === null || i === only ? { ...step, dH: { ...step.dH, value: factor * step.dH.value } } : step,
        ),
      );
    const lookAt = 'the sketch of the local tie: from which point to which, and which way is up';
    const steps: readonly (number | null)[] =
      clock.tie.length > 1 ? [null, ...clock.tie.keys()] : clock.tie.length === 1 ? [0] : [];
    return [
      ...steps.flatMap((only): Mistake[] => {
        const at = only === null ? path : `${path}.${only}.dH`;
        const what = only === null ? 'the tie' : `the step ${clock.tie[only]!.name ?? only}`;
        return [
          {
            code: 'tie-sign',
            path: at,
            mistake: `${what} has the wrong sign`,
            lookAt,
            corrected: scaled(-1, only),
            uOffset: 0,
          },
          {
            code: 'tie-applied',
            path: at,
            mistake: `${what} does not belong: the height already refers to its upper end`,
            lookAt: 'to which mark the height of the site refers',
            corrected: scaled(0, only),
            uOffset: 0,
          },
        ];
      }),
      {
        code: 'floor-for-atoms',
        path,
        mistake: 'the tie ends at the floor, not at the atoms: about 1.2 m are missing',
        lookAt: 'the height of the atoms over the last mark',
        corrected: withClockTie(campaign, clock.id, (tie) => [...tie, { dH: exactly(ATOMS_OVER_FLOOR_M) }]),
        uOffset: (ATOMS_OVER_FLOOR_U_M * ROUND_GRAVITY) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2,
      },
    ];
  });
}
