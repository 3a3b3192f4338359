import { html, nothing, type SVGTemplateResult, svg, type TemplateResult } from 'lit';

/** One of the two levels. `marker`: atoms are a ring with a dot, a marker on the ground a half disc. */
export interface Level {
  readonly label: string;
  readonly marker: 'atoms' | 'ground';
}

export interface TwoLevelsFigure {
  /** the level that the height counts from */
  readonly from: Level;
  readonly to: Level;
  /** height of `to` over `from`, m; negative: below */
  readonly heightM: number;
  readonly uM: number;
  /** as printed along the arrow */
  readonly heightText: string;
  /** sites stand side by side, floors above each other */
  readonly sideBySide: boolean;
}

const WIDTH = 168;
const TOP = 34;
const BOTTOM = 160;
const STEPS = [1, 2, 5];

/** The round multiple at which ± u is easily seen beside the height: half a band of 4 to 12 px. */
export function bandMultiple(heightM: number, uM: number): number | null {
  if (uM <= 0 || heightM === 0) return null;
  const pxPerM = (BOTTOM - TOP) / Math.abs(heightM);
  let best = 1;
  for (let power = 1; power < 1e12; power *= 10)
    for (const step of STEPS) if (uM * pxPerM * step * power <= 11) best = step * power;
  return best;
}

const ground = (x: number, y: number, length: number): SVGTemplateResult => {
  const hatch = Array.from({ length: Math.floor(length / 7) }, (_, i) => `M${x + 7 * (i + 1)} ${y}l-7 7`).join('');
  return svg`<line x1=${x} y1=${y} x2=${x + length} y2=${y} class="s-ground"/><path d=${hatch} class="s-hatch"/>`;
};

const marked = (level: Level, x: number, y: number): SVGTemplateResult =>
  level.marker === 'atoms'
    ? svg`${ground(x - 40, y + 10, 80)}<circle cx=${x} cy=${y} r="6" class="s-ring"/><circle cx=${x} cy=${y} r="1.9" class="s-dot"/>`
    : svg`${ground(x - 30, y, 60)}<path d="M${x - 5} ${y}a5 5 0 0 1 10 0z" class="s-bolt"/>`;

/** Two equipotentials with the height between them, drawn to scale; u as thickness of the farther level at a stated multiple. */
export function twoLevels(figure: TwoLevelsFigure): TemplateResult {
  const { from, to, heightM, uM, heightText, sideBySide } = figure;
  // a height that its own uncertainty covers is drawn as one level, in words not to scale
  const level = Math.abs(heightM) < 4 * uM || heightM === 0;
  const up = heightM >= 0;
  const middle = (TOP + BOTTOM) / 2;
  const yFrom = level ? middle : up ? BOTTOM : TOP;
  const yTo = level ? middle : up ? TOP : BOTTOM;
  const multiple = level ? null : bandMultiple(heightM, uM);
  const half =
    level && uM > 0 ? 11 : multiple === null ? 0 : Math.max(1.5, (uM * multiple * (BOTTOM - TOP)) / Math.abs(heightM));
  const xFrom = sideBySide ? 38 : 48;
  const xTo = sideBySide ? 96 : level ? 116 : 48;
  const arrow = 138;
  const labelUp = (y: number) => y - Math.max(half, 8) - 6;
  const caption = level
    ? uM > 0
      ? `${heightText}, not to scale`
      : nothing
    : multiple === null
      ? 'exact: no band'
      : multiple === 1
        ? '± u, to scale'
        : null;
  return html`<svg
    class="levels"
    width=${WIDTH}
    height="206"
    viewBox="0 0 ${WIDTH} 206"
    role="img"
    aria-label=${`${to.label} ${heightText} ${heightM === 0 ? 'level with' : up ? 'above' : 'below'} ${from.label}`}
  >
    ${
      half > 0
        ? svg`<rect x="6" y=${yTo - half} width=${WIDTH - 18} height=${2 * half} class="s-band"/>
      <line x1="6" y1=${yTo - half} x2=${WIDTH - 12} y2=${yTo - half} class="s-edge"/>
      <line x1="6" y1=${yTo + half} x2=${WIDTH - 12} y2=${yTo + half} class="s-edge"/>`
        : nothing
    }
    <line x1="0" y1=${yFrom} x2=${WIDTH} y2=${yFrom} class="s-level"/>
    ${level ? nothing : svg`<line x1="0" y1=${yTo} x2=${WIDTH} y2=${yTo} class="s-level"/>`}
    ${marked(from, xFrom, yFrom)} ${marked(to, xTo, yTo)}
    <text x=${sideBySide ? xFrom : 8} y=${level ? labelUp(yFrom) : yFrom - 13} text-anchor=${sideBySide ? 'middle' : 'start'}>${from.label}</text>
    <text x=${sideBySide || level ? xTo : 8} y=${labelUp(yTo)} text-anchor=${sideBySide || level ? 'middle' : 'start'}>${to.label}</text>
    ${
      level
        ? nothing
        : svg`<line x1=${arrow} y1=${TOP} x2=${arrow} y2=${BOTTOM} class="s-dim"/>
      <path d="M${arrow} ${TOP}l-2.8 7h5.6zM${arrow} ${BOTTOM}l-2.8 -7h5.6z" class="s-arrow"/>
      <text x=${arrow - 6} y=${middle} class="lb halo" text-anchor="middle" transform="rotate(-90 ${arrow - 6} ${middle})">${heightText}</text>
`
    }
    <text x="8" y="199" class="l2">
      ${caption ?? svg`± <tspan class="sy">u</tspan> drawn ${String(multiple)} times`}
    </text>
  </svg>`;
}
