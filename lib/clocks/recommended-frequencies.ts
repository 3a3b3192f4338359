/** A recommended frequency of a secondary representation of the second (and of clocks by their transition). */
export interface RecommendedFrequency {
  /** name of the transition as a campaign writes it */
  readonly transition: string;
  /** Hz, every published digit */
  readonly text: string;
  /** the same as the nearest double; for exact work take `text` */
  readonly frequencyHz: number;
  /** relative standard uncertainty */
  readonly relativeStandardUncertainty: number;
  readonly source: string;
}

const cipm2021 = (transition: string, text: string, relativeStandardUncertainty: number): RecommendedFrequency => ({
  transition,
  text,
  frequencyHz: Number(text),
  relativeStandardUncertainty,
  source: 'CIPM list of recommended frequencies, 2021 update (CCTF, March 2021; in force since 13 April 2022), BIPM',
});

/** CIPM recommended frequencies, 2021 update. */
export const RECOMMENDED_FREQUENCIES: readonly RecommendedFrequency[] = [
  cipm2021('87Sr', '429228004229872.99', 1.9e-16),
  cipm2021('88Sr', '429228066418007.01', 2.0e-16),
  cipm2021('171Yb', '518295836590863.63', 1.9e-16),
  cipm2021('171Yb+ E3', '642121496772645.12', 1.9e-16),
  cipm2021('171Yb+ E2', '688358979309308.24', 2.0e-16),
  cipm2021('27Al+', '1121015393207859.16', 1.9e-16),
  cipm2021('199Hg', '1128575290808154.32', 2.4e-16),
  cipm2021('199Hg+', '1064721609899146.96', 2.2e-16),
  cipm2021('88Sr+', '444779044095486.3', 1.3e-15),
  cipm2021('40Ca+', '411042129776400.4', 1.8e-15),
  cipm2021('115In+', '1267402452901041.3', 4.3e-15),
  cipm2021('87Rb', '6834682610.9043126', 3.4e-16),
];

const byTransition: ReadonlyMap<string, RecommendedFrequency> = new Map(
  RECOMMENDED_FREQUENCIES.map((f) => [f.transition, f]),
);

/** The recommended frequency of a transition; null if it has none and a campaign has to state one. */
export const recommendedFrequency = (transition: string): RecommendedFrequency | null =>
  byTransition.get(transition) ?? null;
