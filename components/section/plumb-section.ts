import { type CSSResultGroup, html, nothing, type PropertyDeclarations, type TemplateResult } from 'lit';
import { tieShare } from '../../lib/answers/section.js';
import { linkLineClass, linkLineStyles } from '../charts/link-line.js';
import { PlumbElement } from '../plumb-element.js';
import { DrawingElement } from '../shared/drawing-element.js';
import { quantityText } from '../shared/number.js';
import { richText } from '../shared/rich-text.js';
import { WidthController } from '../shared/width-controller.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { drawnOf, sectionOf } from './section-drawn.js';
import { type FigureOptions, type Mark, markKey } from './section-figure.js';
import { sectionKey } from './section-key.js';
import { type Loupe, loupe } from './section-loupe.js';
import { type Drawn, glassBelow, sectionPlate } from './section-plate.js';
import { sectionStyles } from './section-styles.js';
import { scaleTable, sectionTable, tieTable } from './section-tables.js';
import * as words from './section-words.js';

/** Links listed below the plate because their labels would meet; with more the table is the place. */
const MOST_BESIDE = 8;

/** The potential section: sites among the levels of the gravity field, the ladder from each marker to the atoms, links between
 *  the atoms, uncertainty as thickness.
 *
 *  Inside a `<plumb-campaign>`: `<plumb-section link="rp"></plumb-section>`.
 *
 * @slot Fallback: what the page shows without script.
 * @fires plumb-select A reader has taken a link in hand; detail: `link`, its id or null.
 * @csspart base The sheet.
 * @csspart figure The drawing.
 * @csspart provenance The line that says who computed it and when.
 * @cssproperty [--plumb-paper] Ground; likewise `--plumb-ink` and the other colours. */
export class PlumbSection extends DrawingElement {
  static override properties: PropertyDeclarations = {
    pointed: { state: true },
    glass: { state: true },
    asTable: { state: true },
  };
  static override styles: CSSResultGroup = [PlumbElement.styles, linkLineStyles, sectionStyles];

  declare pointed: Mark | null;
  /** id of the clock that the reader has put the loupe on */
  declare glass: string | null;
  declare asTable: boolean;

  readonly #width = new WidthController(this);
  /** key of the mark that Tab reaches */
  #tabStop: string | null = null;

  constructor() {
    super();
    this.pointed = null;
    this.glass = null;
    this.asTable = false;
  }

  // --- what a reader does

  #markAt(event: Event): Mark | null {
    const target = event.target instanceof Element ? event.target.closest<SVGGElement>('[data-mark]') : null;
    const [kind, ...id] = target?.dataset['mark']?.split(' ') ?? [];
    return kind === undefined ? null : { kind: kind as Mark['kind'], id: id.join(' ') };
  }

  #marks(): readonly SVGGElement[] {
    return [...this.renderRoot.querySelectorAll<SVGGElement>('[data-mark][role]')];
  }

  readonly #point = (event: Event): void => {
    this.pointed = this.#markAt(event);
    if (event.type === 'focusin' && this.pointed) {
      this.#tabStop = markKey(this.pointed);
      this.requestUpdate();
    }
  };

  readonly #leave = (): void => {
    this.pointed = null;
  };

  #choose(mark: Mark | null): void {
    if (mark?.kind === 'link') {
      const held = this.link ?? this.campaign.inHand;
      this.glass = null;
      this.take(held === mark.id ? null : mark.id);
    } else if (mark?.kind === 'clock') this.glass = this.glass === mark.id ? null : mark.id;
  }

  readonly #key = (event: KeyboardEvent): void => {
    const marks = this.#marks();
    const at = marks.indexOf(event.target as SVGGElement);
    const to = {
      ArrowRight: at + 1,
      ArrowDown: at + 1,
      ArrowLeft: at - 1,
      ArrowUp: at - 1,
      Home: 0,
      End: marks.length - 1,
    }[event.key];
    if (to !== undefined) {
      marks[(to + marks.length) % marks.length]?.focus();
      event.preventDefault();
    } else if (event.key === 'Enter' || event.key === ' ') {
      this.#choose(this.#markAt(event));
      event.preventDefault();
    } else if (event.key === 'Escape') {
      this.glass = null;
      if ((this.link ?? this.campaign.inHand) !== null) this.take(null);
    }
  };

  readonly #on = {
    point: this.#point,
    leave: this.#leave,
    choose: (event: Event): void => this.#choose(this.#markAt(event)),
    key: this.#key,
  };

  // --- what is shown

  /** A mark with its numbers, as spoken and as read under the figure. */
  #reading(
    { section, links, campaign }: Drawn,
    mark: Mark,
  ): { name: string; texts: words.ScaleTexts | null; rest: string } {
    if (mark.kind === 'link') {
      const link = links.find(({ id }) => id === mark.id);
      const stated = campaign.links.find(({ id }) => id === mark.id);
      return { name: mark.id, texts: link ? words.linkTexts(link) : null, rest: stated ? words.linkEnds(stated) : '' };
    }
    if (mark.kind === 'clock') {
      const clock = section.clocks.find(({ id }) => id === mark.id);
      return {
        name: mark.id,
        texts: clock?.sum ? words.scaleTexts(clock.sum, 'signed') : null,
        rest: clock?.sum ? 'marker to atoms' : 'atoms at the marker',
      };
    }
    const site = section.sites.find(({ id }) => id === mark.id);
    return {
      name: site?.name ?? mark.id,
      texts: null,
      rest: site
        ? `W ${words.siteW(site)} m²/s², C ${words.siteC(site)} m²/s², normal height ${words.siteHeight(site)} m`
        : '',
    };
  }

  #options(drawn: Drawn): FigureOptions {
    const kinds = new Map(drawn.campaign.links.map(({ id, kind }) => [id, kind]));
    const marks = [
      ...drawn.plan.sites.map(({ site }) => `site ${site.id}`),
      ...drawn.plan.links.map(({ link }) => `link ${link.id}`),
      ...drawn.plan.clocks.map(({ clock }) => `clock ${clock.id}`),
    ];
    const tabStop = this.#tabStop !== null && marks.includes(this.#tabStop) ? this.#tabStop : (marks[0] ?? '');
    return {
      inHand: drawn.inHand,
      pointed: this.pointed,
      tabStop,
      narrow: drawn.layout === 'narrow',
      lineClass: (id) => linkLineClass(kinds.get(id) ?? null),
      label: (mark) => {
        const { name, texts, rest } = this.#reading(drawn, mark);
        const numbers = texts ? `: length ${texts.length} m, ${texts.potential} m²/s², ${texts.offset}e-18` : '';
        return `${mark.kind} ${name}, ${rest}${numbers}`;
      },
    };
  }

  #shares({ links, inHand, subject }: Drawn): string | null {
    if (subject?.kind !== 'tie' || !subject.clock.sum) return null;
    const { id } = subject.clock;
    const of = links
      .filter((link) => link.y && (link.from === id || link.to === id))
      .sort((a, b) => Number(b.id === inHand) - Number(a.id === inHand))
      .slice(0, 2)
      .map((link, i) => {
        const percent = Math.round(100 * tieShare(link.budget, id));
        return `${percent} %${i === 0 ? ' of the variance' : ''} of ${link.id}`;
      });
    return of.length === 0 ? null : of.join(', ');
  }

  #detail(drawn: Drawn, glass: Loupe | null): TemplateResult | typeof nothing {
    const { subject, layout } = drawn;
    if (!glass || !subject) return nothing;
    const shares = this.#shares(drawn);
    const below = layout !== 'wide';
    if (!below && subject.kind !== 'tie') return nothing;
    return html`<div class="detail ${layout}">
      ${below ? glassBelow(glass) : nothing}
      <div>
        <h3>${glass.title}</h3>
        ${subject.kind === 'tie' ? tieTable(subject.clock) : nothing}
        <p class="note">
          ${[below ? `Loupe: ${glass.magnification}.` : null, shares === null ? null : `${shares}.`].filter((s) => s !== null).join(' ')}
        </p>
      </div>
    </div>`;
  }

  #readingLine(drawn: Drawn): TemplateResult {
    const mark = this.pointed ?? (drawn.inHand === null ? null : { kind: 'link' as const, id: drawn.inHand });
    if (!mark)
      return html`<p class="reading dim no-print">
        Point at a site, a clock or a link, or go there with Tab and the arrow keys; Enter takes a link in hand and puts the
        loupe on a clock.
      </p>`;
    const { name, texts, rest } = this.#reading(drawn, mark);
    return html`<p class="reading no-print">
      <b class=${mark.kind === 'link' && mark.id === drawn.inHand ? 'in-hand' : ''}>${name}</b> <span class="dim">${rest}</span>
      ${
        texts
          ? html`<span>${quantityText(`${texts.length} m`)}</span> <span>${quantityText(`${texts.potential} m²/s²`)}</span>
              <span>${quantityText(`${texts.offset}e-18`)}</span>`
          : nothing
      }
    </p>`;
  }

  /** Links whose label found no room on the plate. */
  #beside({ links, campaign, plan }: Drawn): TemplateResult | typeof nothing {
    const without = plan.links.filter(({ label }) => label === null).map(({ link }) => link.id);
    const rows = links.flatMap((link) => {
      const texts = without.includes(link.id) ? words.linkTexts(link) : null;
      const ends = words.linkEnds(campaign.links.find(({ id }) => id === link.id)!);
      return texts ? [{ name: html`<b>${link.id}</b> ${ends}`, texts }] : [];
    });
    if (rows.length === 0) return nothing;
    const more = rows.length - MOST_BESIDE;
    return html`<div class="lists">
      ${scaleTable('Links without room for their numbers on the plate', rows.slice(0, MOST_BESIDE), 'difference')}
      ${more > 0 ? html`<p class="note">${more} more stand in the table.</p>` : nothing}
    </div>`;
  }

  /** In a narrow plate the numbers of every link stand below it. */
  #lists({ links, campaign, inHand }: Drawn): TemplateResult {
    return html`<div class="lists">
      ${links.map((link) => {
        const texts = words.linkTexts(link);
        const stated = campaign.links.find(({ id }) => id === link.id)!;
        return html`<section>
          <h3>
            <b class=${link.id === inHand ? 'in-hand' : ''}>${link.id}</b>
            <span>${words.linkEnds(stated)}${link.id === inHand ? ', in hand' : ''}</span>
          </h3>
          ${texts ? scaleTable(`Link ${link.id}`, [{ name: 'predicted', texts }], 'difference') : html`<p class="note">none: its ends have no common level</p>`}
        </section>`;
      })}
    </div>`;
  }

  protected override answered(answered: AnsweredCampaign): TemplateResult {
    const found = sectionOf(answered.campaign);
    const without =
      found.withoutLevel.length === 0
        ? nothing
        : html`<p class="note">
            Not drawn, for only differences to their neighbours are known: ${found.withoutLevel.join(', ')}.
          </p>`;
    if (found.sites.length === 0)
      return html`<p class="say">${richText(words.sentence(found, null))}</p>
        ${without}`;
    const drawn = drawnOf(answered, {
      inHand: this.linkInHand(answered),
      chosen: this.glass,
      width: this.#width.width,
      bare: this.bare,
    });
    const { plan, subject, layout } = drawn;
    const held = drawn.links.find(({ id }) => id === drawn.inHand);
    const glass = subject
      ? loupe({
          subject,
          sectionPxPerUnit: plan.scale.pxPerUnit,
          multiple: plan.multiple,
          held:
            subject.kind === 'near'
              ? subject.link === drawn.inHand
              : held?.from === subject.clock.id || held?.to === subject.clock.id,
        })
      : null;
    if (this.bare)
      return html`${sectionPlate({ ...drawn, subject: null }, null, this.#options(drawn), this.#on)}
        ${sectionKey(plan, answered.campaign, found.scaleGravity, drawn.inHand)} ${without}`;
    const tie = subject?.kind === 'tie' ? subject.clock : null;
    return html`<p class="say">${richText(words.sentence(found, tie))}</p>
      ${sectionPlate(drawn, glass, this.#options(drawn), this.#on)} ${this.#readingLine(drawn)} ${layout === 'wide' && !this.asTable ? nothing : this.#detail(drawn, glass)}
      ${layout === 'narrow' ? this.#lists(drawn) : this.#beside(drawn)} ${sectionKey(plan, answered.campaign, found.scaleGravity, drawn.inHand)} ${without}
      <p class="note">${richText(words.notes(found, plan.multiple, plan.scale.breaks.length > 0, answered.campaign))}</p>
      <p class="disclose no-print">
        <button
          type="button"
          class="word"
          aria-expanded=${this.asTable ? 'true' : 'false'}
          @click=${() => {
            this.asTable = !this.asTable;
          }}
        >
          ${this.asTable ? 'hide the table' : 'show as a table'}
        </button>
      </p>
      ${
        this.asTable
          ? sectionTable(
              found,
              drawn.links.map((link) => ({
                id: link.id,
                ends: words.linkEnds(answered.campaign.links.find(({ id }) => id === link.id)!),
                texts: words.linkTexts(link),
              })),
            )
          : nothing
      }`;
  }
}
