/** A published figure to start planning with. It is never put in by itself: a reader copies it into the campaign and answers
 *  for it there. */
export interface StartingValue {
  /** stable word to choose it by */
  readonly id: string;
  /** what it is a figure of: a link kind, `levelling`, `gnss`, `flywheel` */
  readonly of: string;
  /** what was measured or laid down, in a few words */
  readonly what: string;
  /** numbers in SI, by the keys of the campaign file */
  readonly values: Readonly<Record<string, number>>;
  /** the same as the campaign file would say it */
  readonly write: string;
  readonly source: string;
  /** `seen`: the figure stands in the text cited; `memory`: cited from memory, to be looked up before it is relied on */
  readonly evidence: 'seen' | 'memory';
}
