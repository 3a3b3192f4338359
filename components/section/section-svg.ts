import { render, svg } from 'lit';
import { formatConcise } from '../../lib/quantity/index.js';
import { linkLineClass, linkLineStyles } from '../charts/link-line.js';
import { plainText } from '../shared/rich-text.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { figureStyles } from '../theme/figure-styles.js';
import { tokens } from '../theme/tokens.js';
import { drawnOf } from './section-drawn.js';
import * as figure from './section-figure.js';
import { zeroWords } from './section-plate.js';
import { sectionStyles } from './section-styles.js';
import * as words from './section-words.js';

const WIDTH_PX = 900;
const LINE_PX = 16;
/** What only a page makes use of. */
const LIVE = ['role', 'tabindex', 'aria-label', 'aria-hidden', 'aria-pressed', 'data-mark'];

/** Values of the light palette by their names: a file has no page round it to take them from. */
function palette(): ReadonlyMap<string, string> {
  const values = new Map<string, string>();
  for (const [, name = '', value = ''] of tokens.cssText.matchAll(
    /--p-([\w-]+):\s*var\(\s*--plumb-[\w-]+,\s*([^;]+?)\s*\);/g,
  ))
    if (!values.has(name)) values.set(name, value.replace(/\s+/g, ' '));
  const face = /--p-symbol-face:\s*([^;]+);/.exec(tokens.cssText)?.[1]?.replace(/\s+/g, ' ') ?? 'serif';
  return values.set('symbol-face', face);
}

function styles(): string {
  const values = palette();
  return [figureStyles, linkLineStyles, sectionStyles]
    .map(({ cssText }) => cssText.replace(/@(media|container)[^{]*\{(?:[^{}]*\{[^}]*\})*[^}]*\}/g, ''))
    .join('')
    .replace(/var\(--p-([\w-]+)\)/g, (whole, name: string) => values.get(name) ?? whole)
    .replace(/\s+/g, ' ');
}

/** The section as an SVG file that stands alone: its styles, and in words what was drawn, by whom and when. Nothing is in hand. */
export function sectionSvg(answered: AnsweredCampaign, provenance: string): string {
  const { campaign } = answered;
  const drawn = drawnOf(answered, { inHand: null, chosen: null, width: WIDTH_PX, bare: false });
  const { plan, section } = drawn;
  const kinds = new Map(campaign.links.map(({ id, kind }) => [id, kind]));
  const options: figure.FigureOptions = {
    inHand: null,
    pointed: null,
    tabStop: '',
    narrow: false,
    lineClass: (id) => linkLineClass(kinds.get(id) ?? null),
    label: ({ id }) => id,
  };
  const key = [
    `Equipotential every ${formatConcise(plan.scale.levelStep, null)} m²/s²`,
    plan.multiple === 1 ? '± u to scale' : `± u ${plan.multiple} times the height scale`,
    `metre scale C/(${section.scaleGravity.toFixed(4)} m/s²)`,
    `C = W0(IHRS) − W, ${campaign.tide} tide`,
  ].join('; ');
  // what found no room on the plate stands below it
  const foot = [
    ...plan.links.filter(({ label }) => label === null).map(({ link }) => `${link.lines.join(', ')}.`),
    `${key}.`,
    `${provenance}.`,
  ];
  const [width, height] = [plan.right + 8, plan.height + 24 + LINE_PX * foot.length];
  const box = document.createElement('div');
  render(
    svg`<svg xmlns="http://www.w3.org/2000/svg" width=${width} height=${height} viewBox="0 0 ${width} ${height}">
      <title>${campaign.title ?? 'Potential section'}</title>
      <desc>${`${plainText(words.sentence(section, null))} ${key}; ${provenance}.`}</desc>
      <rect width=${width} height=${height} class="s-paper"/>
      ${figure.sectionScales(plan, section.scaleGravity, { length: 42, potential: 106, offset: plan.left - 10 })}
      ${figure.sectionLevels(plan)} ${figure.knockOuts(plan)} ${plan.links.map((link) => figure.linkBand(link, false))}
      ${plan.sites.map((site) => figure.siteMark(site, options))}
      ${plan.links.map((link) => figure.linkMark(link, plan.scale, options))} ${plan.clocks.map(figure.ladder)}
      ${plan.clocks.map((clock) => figure.clockMark(clock, false, options))} ${figure.breakWords(plan)}
      ${figure.zeroName(plan, zeroWords(section, drawn.layout))} ${plan.sites.map((site) => figure.siteLabelOf(site, options))}
      ${plan.links.map((link) => figure.linkLabelOf(link, options))}
      ${foot.map((line, i) => svg`<text x="8" y=${plan.height + 32 + LINE_PX * i} class="l2">${line}</text>`)}
    </svg>`,
    box,
  );
  const root = box.querySelector('svg')!;
  for (const one of root.querySelectorAll('.hit, .focus')) one.remove();
  for (const one of root.querySelectorAll('*')) for (const name of LIVE) one.removeAttribute(name);
  const style = document.createElementNS('http://www.w3.org/2000/svg', 'style');
  style.textContent = styles();
  root.prepend(style);
  return `${new XMLSerializer().serializeToString(root).replace(/<!--[\s\S]*?-->/g, '')}\n`;
}
