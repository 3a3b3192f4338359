import { nothing, type SVGTemplateResult, svg } from 'lit';
import { geodesicDistanceM } from '../../lib/earth/geodesic-distance.js';
import { degToRad, formatLength } from '../../lib/quantity/index.js';
import type { MapPlan, PlacedMapLink, PlacedMapSite, Points } from '../charts/map-plan.js';
import { gridStep, type MapProjection, wrapped } from '../charts/map-projection.js';
import { multiples, roundStep, stepLabel } from '../charts/round-step.js';
import { svgNumber } from '../charts/svg-number.js';

export interface MapFigureOptions {
  readonly inHand: string | null;
  readonly pointed: string | null;
  readonly lineClass: (link: string) => string;
  /** spoken name of a mark */
  readonly label: (mark: string) => string;
  readonly isTabStop: (mark: string) => boolean;
  readonly editable: boolean;
}

const path = (points: Points): string =>
  points.map(([x, y], i) => `${i === 0 ? 'M' : 'L'}${x.toFixed(1)} ${y.toFixed(1)}`).join('');

/** Lines of the grid and the degrees outside the frame. */
export function grid(projection: MapProjection): SVGTemplateResult {
  const { view, frame, pxPerDegreeEast } = projection;
  const { width, height } = frame;
  const stepEast = gridStep(pxPerDegreeEast, 78);
  const stepNorth = gridStep(view.pxPerDegree, 62);
  const meridians = multiples(stepEast, projection.toDegreesUnwrapped(0), projection.toDegreesUnwrapped(width));
  const parallels = multiples(stepNorth, projection.toDegrees(0, height).latitude, projection.toDegrees(0, 0).latitude);
  const x = (degrees: number) => projection.toPx(0, degrees)[0].toFixed(1);
  const y = (degrees: number) => projection.toPx(degrees, 0)[1].toFixed(1);
  return svg`<path d=${meridians.map((lon) => `M${x(lon)} 0V${height}`).join('') + parallels.map((lat) => `M0 ${y(lat)}H${width}`).join('')} class="s-grid"/>
    <path d=${meridians.map((lon) => `M${x(lon)} ${height}v6`).join('') + parallels.map((lat) => `M0 ${y(lat)}h-6`).join('')} class="s-axis"/>
    ${meridians.map((lon) => svg`<text x=${x(lon)} y=${height + 20} text-anchor="middle" class="l2">${degreesText(wrapped(lon), stepEast, 'W')}</text>`)}
    ${parallels.map((lat) => svg`<text x="-10" y=${Number(y(lat)) + 4} text-anchor="end" class="l2">${degreesText(lat, stepNorth, 'S')}</text>`)}`;
}

/** North and east are plain, south and west say so. */
const degreesText = (degrees: number, step: number, negative: 'S' | 'W'): string =>
  `${stepLabel(Math.abs(degrees), step)}°${degrees < -step / 2 ? `\u00a0${negative}` : ''}`;

/** A length in the lower right corner: true along every meridian and along the standard parallel. */
export function scaleBar({ view, frame }: MapProjection): SVGTemplateResult {
  const { width, height, parallel } = frame;
  const at = (latitude: number) => ({ latitudeRad: degToRad(latitude), longitudeRad: degToRad(0) });
  const metresPerPx = geodesicDistanceM(at(parallel - 0.5), at(parallel + 0.5)) / view.pxPerDegree;
  const length = roundStep(metresPerPx * 48);
  const px = length / metresPerPx;
  const right = width - 18;
  return svg`<g><path d="M${right - px} ${height - 22}v8M${right - px} ${height - 18}H${right}M${right} ${height - 22}v8" class="s-axis"/>
    <text x=${right - px / 2} y=${height - 27} text-anchor="middle" class="l2 halo">${formatLength(length)}</text></g>`;
}

const classes = (mark: string, held: boolean, { pointed }: MapFigureOptions): string =>
  `mark ${held ? 'held' : ''} ${pointed === mark ? 'pointed' : ''}`;

/** How far the source reaches round each site. */
export const reaches = ({ sites }: MapPlan): SVGTemplateResult =>
  svg`<path d=${sites.map(({ reach }) => path(reach)).join('')} class="s-reach"/>`;

export function linkMark({ link, points }: PlacedMapLink, options: MapFigureOptions): SVGTemplateResult {
  const mark = `link ${link.id}`;
  const held = link.id === options.inHand;
  const d = path(points);
  return svg`<g class=${classes(mark, held, options)} data-mark=${mark} role="button" tabindex=${options.isTabStop(mark) ? '0' : '-1'}
    aria-pressed=${held ? 'true' : 'false'} aria-label=${options.label(mark)}>
    <path d=${d} class="hit"/><path d=${d} class="ring-focus"/><path d=${d} class=${options.lineClass(link.id)}/></g>`;
}

export function linkLabel(
  { link, label }: PlacedMapLink,
  options: MapFigureOptions,
): SVGTemplateResult | typeof nothing {
  if (!label) return nothing;
  const { x, y, width, anchor } = label;
  const at = anchor === 'start' ? x : anchor === 'end' ? x + width : x + width / 2;
  return svg`<g aria-hidden="true" data-mark=${`link ${link.id}`} class=${classes(`link ${link.id}`, link.id === options.inHand, options)}>${link.lines.map(
    (line, i) => {
      const [first = '', ...rest] = line.split(' ');
      return svg`<text x=${at} y=${y + 11 + 14 * i} text-anchor=${anchor} class="l halo ${i > 0 ? 'l-2' : ''}">${
        i === 0 ? svg`<tspan class="b id">${first}</tspan> ${svgNumber(rest.join(' '))}` : svgNumber(line)
      }</text>`;
    },
  )}</g>`;
}

/** The ring of a site. */
export function siteMark({ site, x, y }: PlacedMapSite, held: boolean, options: MapFigureOptions): SVGTemplateResult {
  const mark = `site ${site.id}`;
  return svg`<g class="${classes(mark, held, options)} ${options.editable ? 'movable' : ''}" data-mark=${mark} role="button"
    tabindex=${options.isTabStop(mark) ? '0' : '-1'} aria-label=${options.label(mark)}>
    <circle cx=${x} cy=${y} r="5" class="s-ring"/><circle cx=${x} cy=${y} r="1.8" class="s-dot"/>
    <circle cx=${x} cy=${y} r="10" class="focus"/><circle cx=${x} cy=${y} r="13" class="hit flat"/></g>`;
}

/** Its name outside the reach, the ids of its clocks beside the ring. */
export const siteLabel = ({ site, name, clocks }: PlacedMapSite, held: boolean): SVGTemplateResult => svg`<g
  aria-hidden="true" data-mark=${`site ${site.id}`} class=${held ? 'held' : ''}>
    ${name ? svg`<text x=${name.x} y=${name.y + 14} class="sn halo">${site.name}</text>` : nothing}
    ${clocks ? svg`<text x=${clocks.x} y=${clocks.y + 11} class="lb halo id">${site.clocks}</text>` : nothing}
  </g>`;
