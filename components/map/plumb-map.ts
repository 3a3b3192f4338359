import {
  type CSSResultGroup,
  html,
  nothing,
  type PropertyDeclarations,
  type PropertyValues,
  type TemplateResult,
} from 'lit';
import { type SitePair, sitePairs, sourcesBetweenSites } from '../../lib/answers/site-pairs.js';
import type { Campaign, Site, Source } from '../../lib/campaign/campaign.js';
import type { GeodeticPosition } from '../../lib/earth/geodesic-distance.js';
import { pointAtDistance } from '../../lib/earth/geodesic-line.js';
import { degToRad, radToDeg } from '../../lib/quantity/index.js';
import { linkLineClass, linkLineStyles } from '../charts/link-line.js';
import { type MapLink, type MapPlan, mapPlan } from '../charts/map-plan.js';
import { clamped, fitted, type MapFrame, MapProjection, type MapView } from '../charts/map-projection.js';
import { PlumbElement } from '../plumb-element.js';
import { DrawingElement } from '../shared/drawing-element.js';
import { plainText, richText } from '../shared/rich-text.js';
import { WidthController } from '../shared/width-controller.js';
import { oncePerCampaign, solvedOf } from '../state/answers.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { mapLinks, mapSites } from './map-content.js';
import * as figure from './map-figure.js';
import { mapStyles } from './map-styles.js';
import { mapKey, pairsTable } from './map-tables.js';
import * as words from './map-words.js';
import { type Coast, outlinePath, readOutline } from './outline.js';

/** Detail of `plumb-move`: a reader has moved a site on an editable map. */
export interface PlumbMove {
  readonly site: string;
  /** degrees, north positive */
  readonly latitude: number;
  /** degrees, east positive, −180 … 180 */
  readonly longitude: number;
}

declare global {
  interface HTMLElementEventMap {
    'plumb-move': CustomEvent<PlumbMove>;
  }
}

let coasts: Promise<readonly Coast[]> | null = null;
/** Read once for all maps of a page, and only where there is one. */
const outline = (): Promise<readonly Coast[]> => {
  coasts ??= import('./outline-data.js').then(({ OUTLINE }) => readOutline(OUTLINE));
  return coasts;
};

const pairsFor = oncePerCampaign((campaign) => {
  const known = new Map<string | null, readonly SitePair[]>();
  return (source: string | null): readonly SitePair[] => {
    const pairs = known.get(source) ?? sitePairs(solvedOf(campaign), source);
    known.set(source, pairs);
    return pairs;
  };
});

const MARGIN = { left: 46, right: 8, top: 6, bottom: 28 };
const ZOOM = 1.5;
/** px per degree: a kilometre to 40 px */
const MOST_PX_PER_DEGREE = 4500;
const STEP_M = { small: 1000, large: 10_000 };
const ARROWS: Readonly<Record<string, readonly [east: number, north: number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};

/** Sites and links on a world outline: links as geodesics, the reach of an error source as a circle round each site, and per pair
 *  of sites what they share of it.
 *
 *  Inside a `<plumb-campaign>`: `<plumb-map source="quasigeoid"></plumb-map>`.
 *
 * @slot Fallback: what the page shows without script.
 * @fires plumb-select A reader has taken a link in hand; detail: `link`, its id or null.
 * @fires plumb-move A reader has moved a site; detail: `site`, `latitude`, `longitude` in degrees. Only with `editable`.
 * @csspart base The sheet.
 * @csspart figure The map.
 * @csspart provenance The line that says who computed it and when.
 * @cssproperty [--plumb-paper] Ground; likewise `--plumb-ink` and the other colours. */
export class PlumbMap extends DrawingElement {
  static override properties: PropertyDeclarations = {
    source: { type: String },
    editable: { type: Boolean },
    view: { state: true },
    pointed: { state: true },
    moved: { state: true },
    coasts: { state: true },
  };
  static override styles: CSSResultGroup = [PlumbElement.styles, linkLineStyles, mapStyles];

  /** Id of the error source whose reach is drawn; without it the first with a correlation length. */
  declare source: string | null;
  /** Sites can be dragged, or moved with the arrow keys. */
  declare editable: boolean;
  /** where the reader has gone; null: all sites */
  declare view: MapView | null;
  declare pointed: string | null;
  /** a site on its way */
  declare moved: { readonly id: string; readonly position: GeodeticPosition } | null;
  declare coasts: readonly Coast[];

  readonly #width = new WidthController(this);
  #tabStop: string | null = null;
  #drag: { readonly x: number; readonly y: number; readonly view: MapView; readonly site: string | null } | null = null;
  #projection: MapProjection | null = null;
  #path = { key: '', d: '' };

  constructor() {
    super();
    this.source = null;
    this.editable = false;
    this.view = null;
    this.pointed = null;
    this.moved = null;
    this.coasts = [];
  }

  override connectedCallback(): void {
    super.connectedCallback();
    void outline().then((read) => {
      this.coasts = read;
    });
  }

  protected override willUpdate(changed: PropertyValues): void {
    // the site has come to where it was moved, or nobody took it there
    if (!changed.has('moved') && this.moved && this.#drag === null) this.moved = null;
  }

  // --- what is drawn

  #source(campaign: Campaign): Source | null {
    const between = sourcesBetweenSites(solvedOf(campaign));
    const candidates = campaign.sources.filter(({ id }) => between.includes(id));
    return (
      candidates.find(({ id }) => id === this.source) ??
      candidates.find(({ correlationLengthM }) => correlationLengthM !== undefined) ??
      candidates.find(({ correlation }) => correlation !== undefined) ??
      null
    );
  }

  readonly #position = (site: Site): GeodeticPosition => (this.moved?.id === site.id ? this.moved.position : site);

  #frame(wide: boolean): { readonly width: number; readonly height: number } {
    const across = wide ? 680 : this.#width.width;
    const width = across - MARGIN.left - MARGIN.right;
    return { width, height: wide ? 560 : Math.max(260, Math.min(560, Math.round(width * 0.78))) };
  }

  #project(campaign: Campaign, size: { readonly width: number; readonly height: number }): MapProjection {
    const places = campaign.sites.map(({ latitudeRad, longitudeRad }) => ({
      latitude: radToDeg(latitudeRad),
      longitude: radToDeg(longitudeRad),
    }));
    const { view: home, parallel } = fitted(places, size);
    const frame: MapFrame = { ...size, parallel };
    return new MapProjection(this.view ? clamped(this.view, frame) : home, frame);
  }

  #coast(projection: MapProjection): string {
    const { view, frame } = projection;
    const key = [
      view.latitude,
      view.longitude,
      view.pxPerDegree,
      frame.width,
      frame.height,
      frame.parallel,
      this.coasts.length,
    ].join();
    if (key !== this.#path.key) this.#path = { key, d: outlinePath(this.coasts, projection) };
    return this.#path.d;
  }

  // --- what a reader does

  #zoom(factor: number, x?: number, y?: number): void {
    const projection = this.#projection;
    if (!projection) return;
    const { view, frame } = projection;
    const pxPerDegree = Math.min(MOST_PX_PER_DEGREE, Math.max(frame.height / 180, view.pxPerDegree * factor));
    const shrink = Math.cos(degToRad(frame.parallel));
    // what lies under the pointer stays there
    const [dx, dy] = [(x ?? frame.width / 2) - frame.width / 2, (y ?? frame.height / 2) - frame.height / 2];
    this.#go({
      latitude: view.latitude - dy / view.pxPerDegree + dy / pxPerDegree,
      longitude: view.longitude + dx / shrink / view.pxPerDegree - dx / shrink / pxPerDegree,
      pxPerDegree,
    });
  }

  #go(view: MapView): void {
    this.view = this.#projection ? clamped(view, this.#projection.frame) : view;
  }

  #at(event: PointerEvent | WheelEvent | MouseEvent): readonly [x: number, y: number] {
    const plot = this.renderRoot.querySelector('.s-ground-of-map')!.getBoundingClientRect();
    return [event.clientX - plot.left, event.clientY - plot.top];
  }

  #markOf(event: Event): string | null {
    const target = event.target instanceof Element ? event.target.closest<SVGGElement>('[data-mark]') : null;
    return target?.dataset['mark'] ?? null;
  }

  readonly #down = (event: PointerEvent): void => {
    if (event.button !== 0 || !this.#projection) return;
    const mark = this.#markOf(event);
    const site = this.editable && mark?.startsWith('site ') ? mark.slice(5) : null;
    if (mark !== null && site === null) return;
    const [x, y] = this.#at(event);
    this.#drag = { x, y, view: this.#projection.view, site };
    (event.currentTarget as Element).setPointerCapture(event.pointerId);
  };

  readonly #move = (event: PointerEvent): void => {
    const drag = this.#drag;
    const projection = this.#projection;
    if (!drag || !projection) return;
    const [x, y] = this.#at(event);
    if (drag.site !== null) {
      const { latitude, longitude } = projection.toDegrees(x, y);
      this.moved = { id: drag.site, position: { latitudeRad: degToRad(latitude), longitudeRad: degToRad(longitude) } };
    } else
      this.#go({
        ...drag.view,
        latitude: drag.view.latitude + (y - drag.y) / drag.view.pxPerDegree,
        longitude: drag.view.longitude - (x - drag.x) / projection.pxPerDegreeEast,
      });
  };

  readonly #up = (): void => {
    const { moved } = this;
    const dragged = this.#drag?.site ?? null;
    this.#drag = null;
    if (dragged !== null && moved) this.#moveTo(moved.id, moved.position);
  };

  #moveTo(site: string, { latitudeRad, longitudeRad }: GeodeticPosition): void {
    // a metre: what a drag on a map can be meant to
    const rounded = (radians: number) => Number(((radians * 180) / Math.PI).toFixed(5));
    const longitude = rounded(longitudeRad);
    this.dispatchEvent(
      new CustomEvent<PlumbMove>('plumb-move', {
        detail: {
          site,
          latitude: rounded(latitudeRad),
          longitude: longitude > 180 ? longitude - 360 : longitude < -180 ? longitude + 360 : longitude,
        },
        bubbles: true,
        composed: true,
      }),
    );
    this.requestUpdate();
  }

  readonly #key = (event: KeyboardEvent): void => {
    const mark = this.#markOf(event);
    const arrow = ARROWS[event.key];
    if (event.key === '+' || event.key === '=') this.#zoom(ZOOM);
    else if (event.key === '-' || event.key === '\u2212') this.#zoom(1 / ZOOM);
    else if (event.key === '0') this.view = null;
    else if (arrow && mark === null) this.#pan(arrow);
    else if (arrow && this.editable && mark?.startsWith('site ')) this.#step(mark.slice(5), arrow, event.shiftKey);
    else if (arrow || event.key === 'Home' || event.key === 'End') this.#rove(event);
    else if ((event.key === 'Enter' || event.key === ' ') && mark?.startsWith('link ')) this.#toggle(mark.slice(5));
    else return;
    event.preventDefault();
  };

  #pan([east, north]: readonly [number, number]): void {
    const projection = this.#projection;
    if (!projection) return;
    const { view, frame } = projection;
    this.#go({
      ...view,
      latitude: view.latitude + (north * frame.height) / 6 / view.pxPerDegree,
      longitude: view.longitude + (east * frame.width) / 6 / projection.pxPerDegreeEast,
    });
  }

  #step(id: string, [east, north]: readonly [number, number], large: boolean): void {
    const { state } = this.campaign;
    const site = state?.status === 'ready' ? state.campaign.sites.find((one) => one.id === id) : undefined;
    if (!site) return;
    const distance = large ? STEP_M.large : STEP_M.small;
    this.#moveTo(
      id,
      pointAtDistance(this.#position(site), distance, degToRad(east !== 0 ? 90 * east : north > 0 ? 0 : 180)),
    );
  }

  #rove(event: KeyboardEvent): void {
    const marks = [...this.renderRoot.querySelectorAll<SVGGElement>('[data-mark][role]')];
    const at = marks.indexOf(event.target as SVGGElement);
    const to =
      event.key === 'Home'
        ? 0
        : event.key === 'End'
          ? -1
          : event.key === 'ArrowRight' || event.key === 'ArrowDown'
            ? at + 1
            : at - 1;
    marks[(to + marks.length) % marks.length]?.focus();
  }

  #toggle(link: string): void {
    this.take((this.link ?? this.campaign.inHand) === link ? null : link);
  }

  readonly #click = (event: Event): void => {
    const mark = this.#markOf(event);
    if (mark?.startsWith('link ')) this.#toggle(mark.slice(5));
  };

  readonly #point = (event: Event): void => {
    this.pointed = this.#markOf(event);
    if (event.type === 'focusin' && this.pointed !== null) this.#tabStop = this.pointed;
  };

  readonly #leave = (): void => {
    this.pointed = null;
  };

  readonly #wheel = {
    handleEvent: (event: WheelEvent): void => {
      // the wheel alone scrolls the page; a pinch arrives as a wheel with Ctrl
      if (!event.ctrlKey) return;
      event.preventDefault();
      this.#zoom(event.deltaY < 0 ? 1.15 : 1 / 1.15, ...this.#at(event));
    },
    passive: false,
  };

  // --- what is shown

  #label(campaign: Campaign, links: readonly MapLink[], mark: string): string {
    const id = mark.slice(mark.indexOf(' ') + 1);
    if (mark.startsWith('link ')) {
      const link = campaign.links.find((one) => one.id === id);
      const drawn = links.find((one) => one.id === id);
      return `link ${id}, ${link?.from} to ${link?.to}${link?.kind ? `, ${link.kind}` : ''}, geodesic ${drawn?.lines[1]?.replace('along ', '')}`;
    }
    const site = campaign.sites.find((one) => one.id === id);
    if (!site) return id;
    const { latitudeRad, longitudeRad } = this.#position(site);
    const degrees = (radians: number, positive: string, negative: string) =>
      `${Math.abs((radians * 180) / Math.PI).toFixed(4)}° ${radians < 0 ? negative : positive}`;
    return `site ${site.name ?? id}, ${degrees(latitudeRad, 'north', 'south')}, ${degrees(longitudeRad, 'east', 'west')}`;
  }

  #map(
    campaign: Campaign,
    plan: MapPlan,
    links: readonly MapLink[],
    projection: MapProjection,
    inHand: string | null,
    title: string,
  ): TemplateResult {
    const { width, height } = projection.frame;
    const first = plan.sites[0] ? `site ${plan.sites[0].site.id}` : '';
    const marks = [
      ...plan.links.map(({ link }) => `link ${link.id}`),
      ...plan.sites.map(({ site }) => `site ${site.id}`),
    ];
    const tabStop = this.#tabStop !== null && marks.includes(this.#tabStop) ? this.#tabStop : first;
    const held = campaign.links.find(({ id }) => id === inHand);
    const ends = campaign.clocks.filter(({ id }) => id === held?.from || id === held?.to).map(({ site }) => site);
    const kinds = new Map(campaign.links.map(({ id, kind }) => [id, kind]));
    const options: figure.MapFigureOptions = {
      inHand,
      pointed: this.pointed,
      editable: this.editable,
      lineClass: (id) => linkLineClass(kinds.get(id) ?? null),
      label: (mark) => this.#label(campaign, links, mark),
      isTabStop: (mark) => mark === tabStop || (this.editable && mark.startsWith('site ')),
    };
    const ordered = [...plan.links].sort((p, q) => Number(p.link.id === inHand) - Number(q.link.id === inHand));
    const full = { width: width + MARGIN.left + MARGIN.right, height: height + MARGIN.top + MARGIN.bottom };
    return html`<svg
      class="fig"
      part="figure"
      width=${full.width}
      height=${full.height}
      viewBox="${-MARGIN.left} ${-MARGIN.top} ${full.width} ${full.height}"
      role="group"
      tabindex="0"
      aria-label=${`Map. ${title} Plus and minus zoom, the arrow keys move the map.`}
      @pointerover=${this.#point}
      @pointerleave=${this.#leave}
      @focusin=${this.#point}
      @focusout=${this.#leave}
      @click=${this.#click}
      @dblclick=${(event: MouseEvent) => this.#zoom(ZOOM, ...this.#at(event))}
      @keydown=${this.#key}
      @wheel=${this.#wheel}
      @pointerdown=${this.#down}
      @pointermove=${this.#move}
      @pointerup=${this.#up}
      @pointercancel=${this.#up}
    >
      ${figure.grid(projection)}
      <svg class="clip" width=${width} height=${height}>
        <path d=${this.#coast(projection)} class="s-coast" />
        <rect class="s-ground-of-map" width=${width} height=${height} />
        ${figure.reaches(plan)} ${ordered.map((link) => figure.linkMark(link, options))}
        ${plan.sites.map((site) => figure.siteMark(site, ends.includes(site.site.id), options))}
        ${plan.sites.map((site) => figure.siteLabel(site, ends.includes(site.site.id)))}
        ${ordered.map((link) => figure.linkLabel(link, options))} ${figure.scaleBar(projection)}
      </svg>
      <rect width=${width} height=${height} class="s-frame" pointer-events="none" />
    </svg>`;
  }

  #bar(campaign: Campaign, source: Source | null): TemplateResult {
    const between = sourcesBetweenSites(solvedOf(campaign));
    const sources = campaign.sources.filter(({ id }) => between.includes(id));
    return html`<div class="bar no-print">
      <button type="button" class="btn" @click=${() => this.#zoom(ZOOM)}>Closer</button>
      <button type="button" class="btn" @click=${() => this.#zoom(1 / ZOOM)}>Farther</button>
      <button
        type="button"
        class="btn"
        @click=${() => {
          this.view = null;
        }}
      >
        All sites
      </button>
      ${
        sources.length > 1
          ? html`<label
              >shared error
              <select
                class="field"
                @change=${(event: Event) => {
                  this.source = (event.target as HTMLSelectElement).value;
                }}
              >
                ${sources.map((one) => html`<option value=${one.id} ?selected=${one.id === source?.id}>${words.sourceName(one)}</option>`)}
              </select></label
            >`
          : nothing
      }
    </div>`;
  }

  protected override answered(answered: AnsweredCampaign): TemplateResult {
    const { campaign } = answered;
    const source = this.#source(campaign);
    const pairs = pairsFor(campaign)(source?.id ?? null);
    const say = words.sentence(campaign, pairs, source);
    if (campaign.sites.length === 0) return html`<p class="say">${richText(say)}</p>`;
    const inHand = this.linkInHand(answered);
    const wide = this.#width.width >= 1120;
    const projection = this.#project(campaign, this.#frame(wide));
    this.#projection = projection;
    const links = mapLinks(campaign, this.#position);
    const plan = mapPlan(
      mapSites(campaign, source, this.#width.width < 656, this.#position),
      links,
      inHand,
      projection,
    );
    const drawing = this.#map(campaign, plan, links, projection, inHand, plainText(say));
    if (this.bare) return html`${drawing} ${mapKey(campaign, source, this.editable)}`;
    const reading = this.pointed ?? (inHand === null ? null : `link ${inHand}`);
    return html`<p class="say">${richText(say)}</p>
      <div class="sheet ${wide ? 'wide' : ''}">
        <div>
          ${drawing} ${this.#bar(campaign, source)}
          <p class="reading dim no-print">${reading === null ? '' : this.#label(campaign, links, reading)}</p>
        </div>
        <div>${pairsTable(campaign, pairs, inHand)} ${mapKey(campaign, source, this.editable)}</div>
      </div>
      <p class="note">
        Meridians and parallels as straight lines, true to scale along ${Math.abs(Math.round(projection.frame.parallel))}°
        ${projection.frame.parallel < 0 ? 'south' : 'north'}. Distances are geodesics on GRS80.
      </p>`;
  }
}
