import { type CSSResultGroup, html, nothing, type SVGTemplateResult, svg, type TemplateResult } from 'lit';
import { type NetworkItem, type NetworkView, networkView } from '../../lib/answers/network-view.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatLength } from '../../lib/quantity/index.js';
import { bentLine, controlWeight, lanes, type NetworkPlan, networkPlan } from '../charts/network-plan.js';
import {
  type LabelToPlace,
  type LineSpot,
  lineObstacles,
  type Obstacle,
  placeLabels,
  spotsAlong,
} from '../charts/place-labels.js';
import { textWidth } from '../charts/text-width.js';
import { PlumbElement } from '../plumb-element.js';
import { CampaignElement } from '../shared/campaign-element.js';
import { quantityText } from '../shared/number.js';
import { richText } from '../shared/rich-text.js';
import { WidthController } from '../shared/width-controller.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { networkStyles } from './network-styles.js';
import { controlText, detectableText, networkSentence, whatItIs } from './network-words.js';

type Point = readonly [number, number];

/** The network: how well every link and determination is controlled by the others, the weakest spot in words, the sites before
 *  and after, and what each candidate would bring to the least certain site.
 *
 *  Inside a `<plumb-campaign>`.
 *
 * @slot Fallback: what the page shows without script.
 * @csspart base The sheet.
 * @csspart provenance The line that says who computed it and when. */
export class PlumbNetwork extends CampaignElement {
  static override properties = { ...CampaignElement.properties, links: { type: String } };
  static override styles: CSSResultGroup = [PlumbElement.styles, networkStyles];

  /** `planned`: every link runs through the window; `measured`: only what was measured. Without it: planned where there is a
   *  window and a link without a measurement. */
  declare links: 'planned' | 'measured' | null;

  readonly #width = new WidthController(this);
  #view: { readonly campaign: Campaign; readonly planned: boolean; readonly view: NetworkView } | null = null;

  constructor() {
    super();
    this.links = null;
  }

  #planned(campaign: Campaign): boolean {
    if (this.links !== null) return this.links !== 'measured';
    const measured = new Set(campaign.measurements.map((m) => m.link));
    return campaign.window !== null && campaign.links.some((l) => !measured.has(l.id));
  }

  #viewOf(campaign: Campaign): NetworkView {
    const planned = this.#planned(campaign);
    if (this.#view?.campaign !== campaign || this.#view.planned !== planned)
      this.#view = { campaign, planned, view: networkView(campaign, planned) };
    return this.#view.view;
  }

  protected override answered({ campaign }: AnsweredCampaign): TemplateResult {
    const view = this.#viewOf(campaign);
    return html`<p class="say">${richText(networkSentence(view))}</p>
      ${this.#modes(campaign, view)} ${this.#figure(campaign, view)} ${this.#key(view)}
      <div class="parts">${observationTable(view)} ${siteTable(view)} ${candidateTable(view)}</div>
      <p class="note">
        Smallest mistake that shows: at test size ${view.adjustment.test.size} and power ${view.adjustment.test.power}, as a length.
        ${view.planned ? 'Links without a measurement are taken as run through the window.' : 'Only what was measured.'}
        Sites stand by position; no line is a route.
      </p>`;
  }

  #modes(campaign: Campaign, view: NetworkView): TemplateResult | typeof nothing {
    if (campaign.window === null || campaign.links.length === 0) return nothing;
    const choose = (links: 'planned' | 'measured') => () => {
      this.links = links;
    };
    return html`<fieldset class="modes no-print">
      <legend class="only-spoken">Links in the network</legend>
      <label><input type="radio" name="mode" ?checked=${view.planned} @change=${choose('planned')} />planned and measured</label>
      <label><input type="radio" name="mode" ?checked=${!view.planned} @change=${choose('measured')} />measured only</label>
    </fieldset>`;
  }

  #figure(campaign: Campaign, view: NetworkView): TemplateResult {
    const shown = campaign.sites.filter(
      (s) => view.sites.some((x) => x.id === s.id) || view.candidates.some((c) => c.from === s.id || c.to === s.id),
    );
    const plan = networkPlan(shown, Math.min(this.#width.width, 900));
    const held = this.linkInHand({ campaign } as AnsweredCampaign);
    const lines = view.items.filter((x) => x.to !== null && x.from !== x.to);
    const candidates = view.candidates.filter((c) => c.to !== null && c.from !== c.to);
    const lane = lanes([...lines, ...candidates].map((x) => [x.from, x.to!]));
    const bent = [...lines, ...candidates].map((x, i) => bentLine(plan.at.get(x.from)!, plan.at.get(x.to!)!, lane[i]!));
    const labels = this.#labels(view, plan, lines, bent);
    return html`<svg
      width=${plan.width}
      height=${plan.height}
      viewBox="0 0 ${plan.width} ${plan.height}"
      role="img"
      aria-label="Network of ${view.sites.length} sites: line weight shows how well each observation is controlled. The same values stand in the tables below."
    >
      ${candidates.map((_, i) => svg`<path d=${bent[lines.length + i]!.d} class="s-cand"/>`)}
      ${lines.map((x, i) => this.#line(x, bent[i]!.d, held))}
      ${shown.map((s) => this.#stems(view, plan, s.id))}
      ${shown.map((s) => {
        const [x, y] = plan.at.get(s.id)!;
        return svg`<circle cx=${x} cy=${y} r="5.5" class="s-ring"/><circle cx=${x} cy=${y} r="1.8" class="s-dot"/>
          <text x=${x + 11} y=${y - 10} class="site-name halo">${s.name ?? s.id}</text>`;
      })}
      ${lines.map((x) => labels.get(x.id) ?? nothing)}
    </svg>`;
  }

  #line(item: NetworkItem, d: string, held: string | null): SVGTemplateResult {
    const inHand = item.kind === 'link' && item.name === held;
    const dash = item.linkKind === 'satellite' ? 's-sat' : item.linkKind === 'fibre' ? '' : 's-other';
    if (item.smallestDetectableM === null)
      return svg`<g class=${inHand ? 'held' : ''}><path d=${d} class="s-none"/></g>`;
    return svg`<g class=${inHand ? 'held' : ''}><path d=${d} class="s-ctl ${dash}" stroke-width=${controlWeight(item.control ?? 1).toFixed(2)}/></g>`;
  }

  /** Each determination a stem at its site, on the ground that it stands for. */
  #stems(view: NetworkView, plan: NetworkPlan, site: string): SVGTemplateResult[] {
    const own = view.items.filter((x) => x.kind === 'determination' && x.from === site);
    const [x, y] = plan.at.get(site)!;
    const step = plan.width < 656 ? 30 : 40;
    return own.map((item, i) => {
      const at = x + (i - (own.length - 1) / 2) * step;
      const stem =
        item.smallestDetectableM === null
          ? svg`<path d="M${at} ${y + 8}V${y + 34}" class="s-none"/>`
          : svg`<path d="M${at} ${y + 8}V${y + 34}" class="s-ctl" stroke-width=${controlWeight(item.control ?? 1).toFixed(2)}/>`;
      return svg`${own.length > 1 ? svg`<path d="M${x} ${y}L${at} ${y + 8}" class="s-axis" stroke-width="0.5"/>` : nothing}${stem}
        <path d="M${at - 9} ${y + 34}H${at + 9}" class="s-ground"/>
        <path d="M${at - 4} ${y + 34}l-4 5M${at + 2} ${y + 34}l-4 5M${at + 8} ${y + 34}l-4 5" class="s-hatch"/>
        <text x=${at} y=${y + 52} text-anchor="middle" class="l2 halo"><tspan class="sy">${item.name}</tspan> ${controlText(item.control)}</text>`;
    });
  }

  #labels(
    view: NetworkView,
    plan: NetworkPlan,
    lines: readonly NetworkItem[],
    bent: readonly { readonly d: string; readonly middle: Point }[],
  ): ReadonlyMap<string, SVGTemplateResult> {
    const narrow = plan.width < 656;
    const words = (x: NetworkItem) =>
      `${x.name} ${controlText(x.control)}${narrow || x.smallestDetectableM === null ? '' : `, ${formatLength(x.smallestDetectableM, 2)}`}`;
    const obstacles: Obstacle[] = [
      ...lines.flatMap((x) => lineObstacles(plan.at.get(x.from)!, plan.at.get(x.to!)!, 3, 2)),
      ...view.sites.map((s) => {
        const [x, y] = plan.at.get(s.id)!;
        return { box: { x: x - 44, y: y - 26, width: 88 + textWidth(s.name, 16), height: 84 }, weight: 6 };
      }),
    ];
    const toPlace: LabelToPlace<LineSpot>[] = lines.map((x, i) => {
      const { middle } = bent[i]!;
      const [a, b] = [plan.at.get(x.from)!, plan.at.get(x.to!)!];
      const shift: Point = [middle[0] - (a[0] + b[0]) / 2, middle[1] - (a[1] + b[1]) / 2];
      const moved = (p: Point): Point => [p[0] + shift[0], p[1] + shift[1]];
      return {
        id: x.id,
        spots: spotsAlong(moved(a), moved(b), 3, textWidth(words(x), 11.5) + 6, 14),
        essential: false,
      };
    });
    const placed = placeLabels(toPlace, obstacles, { x: 0, y: 0, width: plan.width, height: plan.height });
    return new Map(
      lines.flatMap((x) => {
        const spot = placed.get(x.id);
        if (!spot) return [];
        const middleX = spot.x + spot.width / 2;
        return [
          [
            x.id,
            svg`<text x=${middleX} y=${spot.y + 11} text-anchor="middle" class="halo"><tspan font-weight="700">${x.name}</tspan>${words(x).slice(x.name.length)}</text>`,
          ] as const,
        ];
      }),
    );
  }

  #key(view: NetworkView): TemplateResult {
    return html`<ul class="key-row">
      <li>
        <svg width="90" height="12" aria-hidden="true">
          <path d="M0 6H26" class="s-ctl" stroke-width="0.9" /><path d="M32 6H58" class="s-ctl" stroke-width="2.5" />
          <path d="M64 6H90" class="s-ctl" stroke-width="4.5" />
        </svg>
        <span>control 0.1, 0.5, 1${this.#width.width < 656 ? '' : ', and the smallest mistake that would show'}</span>
      </li>
      <li>
        <svg width="40" height="12" aria-hidden="true"><path d="M0 6H40" class="s-none" /></svg><span>control none</span>
      </li>
      ${
        view.candidates.length > 0
          ? html`<li><svg width="40" height="12" aria-hidden="true"><path d="M0 6H40" class="s-cand" /></svg><span>candidate</span></li>`
          : nothing
      }
    </ul>`;
  }
}

function observationTable(view: NetworkView): TemplateResult {
  const weakest = view.items.find((x) => x.control !== null);
  return html`<div>
    <h3 id="obs">Observations, weakest first</h3>
    <table aria-labelledby="obs">
      <thead>
        <tr><th scope="col">observation</th><th scope="col" class="num">control</th><th scope="col" class="num">smallest mistake that shows</th></tr>
      </thead>
      <tbody>
        ${view.items.map(
          (x) => html`<tr class=${x === weakest ? 'weak' : ''}>
            <th scope="row">${whatItIs(x)}</th>
            <td class="num">${controlText(x.control)}</td>
            <td class="num">${quantityText(detectableText(x))}</td>
          </tr>`,
        )}
      </tbody>
    </table>
  </div>`;
}

function siteTable(view: NetworkView): TemplateResult {
  const most = Math.max(...view.sites.flatMap((s) => [s.uAfterM, s.uBeforeM ?? 0]));
  const percent = (x: number) => `${((100 * x) / most).toFixed(1)}%`;
  return html`<div>
    <h3 id="sites">Sites: standard uncertainty of <i class="s">W</i> as a length, before (outlined) and after (solid)</h3>
    <table aria-labelledby="sites">
      <thead>
        <tr><th scope="col">site</th><th scope="col" class="num">before</th><th scope="col" class="num">after</th><th scope="col"><span class="only-spoken">as bars</span></th></tr>
      </thead>
      <tbody>
        ${view.sites.map(
          (s) => html`<tr>
            <th scope="row">${s.name}</th>
            <td class="num">${s.uBeforeM === null ? html`<span class="none">none</span>` : quantityText(formatLength(s.uBeforeM, 2))}</td>
            <td class="num">${quantityText(formatLength(s.uAfterM, 2))}</td>
            <td class="bar">
              <svg width="100%" height="18" aria-hidden="true">
                ${s.uBeforeM === null ? nothing : svg`<rect x="0.5" y="1.5" width=${percent(s.uBeforeM)} height="5" class="before"/>`}
                <rect x="0" y="10" width=${percent(s.uAfterM)} height="6" class="after" />
              </svg>
            </td>
          </tr>`,
        )}
      </tbody>
    </table>
  </div>`;
}

function candidateTable(view: NetworkView): TemplateResult | typeof nothing {
  if (view.candidates.length === 0) return nothing;
  const text = (metres: number | null) =>
    metres === null ? html`<span class="none">not computed</span>` : quantityText(formatLength(metres, 2));
  return html`<div>
    <h3 id="cand">
      Candidates: least certain site now
      ${view.worstM === null ? 'undetermined' : quantityText(formatLength(view.worstM, 2))}, and with each alone
    </h3>
    <table aria-labelledby="cand">
      <thead>
        <tr><th scope="col">candidate</th><th scope="col" class="num">with it</th><th scope="col" class="num">gain</th></tr>
      </thead>
      <tbody>
        ${view.candidates.map(
          (c) =>
            html`<tr><th scope="row">${c.id}</th><td class="num">${text(c.aimM)}</td><td class="num">${text(c.gainM)}</td></tr>`,
        )}
      </tbody>
    </table>
  </div>`;
}
