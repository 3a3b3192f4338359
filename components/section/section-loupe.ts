import { nothing, type SVGTemplateResult, svg } from 'lit';
import type { SectionClock } from '../../lib/answers/section.js';
import { formatConcise } from '../../lib/quantity/index.js';
import { svgNumber } from '../charts/svg-number.js';

export const LOUPE_RADIUS_PX = 128;
/** The levels inside lie within this of the centre. */
const REACH_PX = 74;
/** Nothing is drawn larger than this, 400 px to a metre: what is exact has no size of its own. */
const MOST_PX_PER_UNIT = 40;

/** What the loupe shows. */
export type LoupeSubject =
  | { readonly kind: 'tie'; readonly clock: SectionClock; readonly marker: string }
  | {
      /** two ends of a link that lie on one level of the section */
      readonly kind: 'near';
      readonly link: string;
      readonly from: SectionClock;
      readonly to: SectionClock;
      /** C(to) − C(from), m²/s² */
      readonly difference: { readonly value: number; readonly u: number };
      readonly text: string;
    };

export interface LoupeOptions {
  readonly subject: LoupeSubject;
  /** px per m²/s² of the section, and how many times it uncertainties are drawn */
  readonly sectionPxPerUnit: number;
  readonly multiple: number;
  readonly held: boolean;
}

export interface Loupe {
  /** drawn round 0, 0 */
  readonly drawing: SVGTemplateResult;
  readonly title: string;
  /** times the section's scale */
  readonly magnification: string;
  /** y of the marker, or of the first level, from the centre */
  readonly leaderY: number;
}

const chord = (y: number): number => Math.sqrt(Math.max(0, LOUPE_RADIUS_PX ** 2 - y * y));

const level = (y: number): SVGTemplateResult =>
  svg`<line x1=${-chord(y)} x2=${chord(y)} y1=${y} y2=${y} class="s-level"/>`;

const band = (y: number, half: number): SVGTemplateResult | typeof nothing => {
  if (half <= 0) return nothing;
  const [up, down] = [Math.max(-LOUPE_RADIUS_PX + 1, y - half), Math.min(LOUPE_RADIUS_PX - 1, y + half)];
  // edges end on the circle; the fill between them is cut to the narrower chord
  const reach = Math.min(chord(up), chord(down)) - 1;
  return svg`<rect x=${-reach} y=${up} width=${2 * reach} height=${down - up} class="s-band"/>
    <path d="M${-reach} ${up}H${reach}M${-reach} ${down}H${reach}" class="s-edge"/>`;
};

const atoms = (x: number, y: number): SVGTemplateResult =>
  svg`<circle cx=${x} cy=${y} r="7" class="s-ring"/><circle cx=${x} cy=${y} r="2.4" class="s-dot"/>`;

/** A double arrow between two levels with the height beside it. */
function dimension(
  x: number,
  from: number,
  to: number,
  text: string,
  side: -1 | 1,
  keepOff = Number.NaN,
): SVGTemplateResult {
  const [up, down] = [Math.min(from, to), Math.max(from, to)];
  const middle = (up + down) / 2;
  // beside the middle of the arrow, unless a level that is drawn thick runs there
  const textY = Math.abs(middle - keepOff) < 16 && down - up > 70 ? middle + (down - up) * 0.28 : middle;
  const long = down - up >= 18;
  return svg`<line x1=${x} x2=${x} y1=${up} y2=${down} class="s-dim"/>
    ${long ? svg`<path d="M${x} ${up}l-2.8 7h5.6zM${x} ${down}l-2.8 -7h5.6z" class="s-arrow"/>` : nothing}
    <text x=${x + side * 6} y=${textY + 4} class="lb halo" text-anchor=${side < 0 ? 'end' : 'start'}>${svgNumber(text)}</text>`;
}

/** What a step leads to: `pillar to table` → `table`. */
const endOf = (name: string): string => / to (.+)$/.exec(name)?.[1] ?? name;

export function loupe(options: LoupeOptions): Loupe {
  return options.subject.kind === 'tie' ? tieLoupe(options, options.subject) : nearLoupe(options, options.subject);
}

function times(pxPerUnit: number, { sectionPxPerUnit }: LoupeOptions): string {
  const ratio = Number((pxPerUnit / sectionPxPerUnit).toPrecision(2));
  return ratio === 1 ? 'at the section’s scale' : `${formatConcise(ratio, null)} times the section’s scale`;
}

const ring = svg`<circle r=${LOUPE_RADIUS_PX} class="s-loupe"/>`;

function tieLoupe(options: LoupeOptions, { clock, marker }: Extract<LoupeSubject, { kind: 'tie' }>): Loupe {
  const ends = [0, ...clock.tie.map(({ endC }) => endC)];
  const [low, high] = [Math.min(...ends), Math.max(...ends)];
  const extent = high - low;
  const pxPerUnit = extent > 0 ? Math.min(MOST_PX_PER_UNIT, (2 * REACH_PX) / extent) : options.sectionPxPerUnit;
  const y = (C: number) => ((high + low) / 2 - C) * pxPerUnit;
  const x = -2;
  const last = ends.length - 1;
  const yAtoms = y(ends[last]!);
  const half = options.multiple * (clock.sum?.potential.u ?? 0) * options.sectionPxPerUnit;
  const hatchFrom = -chord(y(0)) + 2;
  const hatch = Array.from(
    { length: Math.max(0, Math.floor((x - hatchFrom) / 7)) },
    (_, i) => `M${hatchFrom + 7 * (i + 1)} ${y(0)}l-6 6`,
  );
  // labels of levels closer than a line keep the last one, the atoms
  const named = ends.map((C, i) => ({ y: y(C), text: i === 0 ? marker : endOf(clock.tie[i - 1]!.name) }));
  const shown = named.filter(
    (one, i) => i === last || !named.some((other, k) => k > i && Math.abs(other.y - one.y) < 14),
  );
  const nameX = 16;
  const drawing = svg`${ring}
    ${band(yAtoms, half)}
    ${ends.map((C) => level(y(C)))}
    <line x1=${hatchFrom - 2} x2=${x} y1=${y(0)} y2=${y(0)} class="s-ground"/><path d=${hatch.join('')} class="s-hatch"/>
    <line x1=${x} x2=${x} y1=${y(low)} y2=${y(high)} class="s-tie"/>
    <path d=${ends
      .slice(1, -1)
      .map((C) => `M${x - 7} ${y(C)}h14`)
      .join('')} class="s-tie"/>
    <path d="M${x - 7} ${y(0)}a7 7 0 0 1 14 0z" class="s-bolt"/>
    ${
      clock.tie.length <= 4
        ? clock.tie.map(({ step, digits }, i) => {
            const side = i % 2 === 0 ? -1 : 1;
            const text = `${formatConcise(step.length.value, step.length.u, { sign: 'always', digits })} m`;
            return dimension(x + side * (i < 2 ? 26 : 40), y(ends[i]!), y(ends[i + 1]!), text, side, yAtoms);
          })
        : dimension(
            x - 26,
            y(0),
            yAtoms,
            `${formatConcise(clock.sum!.length.value, clock.sum!.length.u, { sign: 'always' })} m`,
            -1,
          )
    }
    <g class=${options.held ? 'held' : ''}>${atoms(x, yAtoms)}
    ${shown.map(({ y: at, text }) =>
      at === yAtoms
        ? svg`<text x=${nameX} y=${at - 9} class="l halo">atoms <tspan class="b id">${clock.id}</tspan></text>`
        : svg`<text x=${nameX} y=${at === y(low) && at !== y(0) ? at + 15 : at - 7} class="l halo">${text}</text>`,
    )}</g>`;
  return {
    drawing,
    title: `Tie of clock ${clock.id}, marker to atoms`,
    magnification: extent > 0 ? times(pxPerUnit, options) : 'the atoms are at the marker',
    leaderY: y(0),
  };
}

function nearLoupe(
  options: LoupeOptions,
  { link, from, to, difference, text }: Extract<LoupeSubject, { kind: 'near' }>,
): Loupe {
  const { value, u } = difference;
  const sizes = [Math.abs(value) / 80, u / 44].filter((size) => size > 0);
  const pxPerUnit = sizes.length === 0 ? options.sectionPxPerUnit : 1 / Math.max(...sizes);
  const yFrom = (value * pxPerUnit) / 2;
  const yTo = -yFrom;
  const [xFrom, xTo] = [-56, 4];
  const drawing = svg`${ring}
    ${band(yTo, u * pxPerUnit)} ${level(yFrom)} ${level(yTo)}
    <g class=${options.held ? 'held' : ''}>${atoms(xFrom, yFrom)}${atoms(xTo, yTo)}
      <text x=${xFrom - 10} y=${yFrom - 10} class="lb halo id" text-anchor="end">${from.id}</text>
      <text x=${xTo - 10} y=${yTo - 10} class="lb halo id" text-anchor="end">${to.id}</text></g>
    ${dimension(44, yFrom, yTo, '', 1)}
    <text x="0" y=${Math.max(yFrom, yTo, u * pxPerUnit) + 34} class="lb halo" text-anchor="middle">${svgNumber(text)}</text>`;
  return {
    drawing,
    title: `The ends of ${link}`,
    magnification: `${times(pxPerUnit, options)}; ± u of the difference to scale`,
    leaderY: yFrom,
  };
}
