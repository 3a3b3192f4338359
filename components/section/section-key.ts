import { html, nothing, type TemplateResult } from 'lit';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatConcise, formatLength } from '../../lib/quantity/index.js';
import { linkLineClass, linkLineWords } from '../charts/link-line.js';
import type { SectionPlan } from '../charts/section-plan.js';

/** A sample of uncertainty is drawn that thick, px. */
const SAMPLE_PX = { least: 5, most: 16 };

/** What the lines and marks of the drawing mean; one sample of uncertainty. */
export function sectionKey(
  plan: SectionPlan,
  campaign: Campaign,
  scaleGravity: number,
  inHand: string | null,
): TemplateResult {
  const kinds = [
    ...new Set(
      campaign.links.filter(({ id }) => plan.links.some(({ link }) => link.id === id)).map(({ kind }) => kind),
    ),
  ];
  const { sample, half } = sampleOf(plan, scaleGravity);
  return html`<ul class="key-row">
      <li>
        <svg width="44" height="16" aria-hidden="true"><path d="M0 8H44" class="s-level" /></svg>
        equipotential, every ${formatConcise(plan.scale.levelStep, null)} m²/s²
      </li>
      <li>
        <svg width="44" height="16" aria-hidden="true">
          <path d="M0 8H44" class="s-ground" /><path d="M8 8l-6 6M15 8l-6 6M22 8l-6 6M29 8l-6 6M36 8l-6 6M43 8l-6 6" class="s-hatch" /><path d="M17 8a5 5 0 0 1 10 0z" class="s-bolt" />
        </svg>
        marker of the site
      </li>
      <li>
        <svg width="48" height="16" aria-hidden="true">
          <path d="M1 3v10M1 8H38" class="s-tie" /><circle cx="38" cy="8" r="5" class="s-ring" /><circle cx="38" cy="8" r="1.8" class="s-dot" />
        </svg>
        tie to the atoms
      </li>
      ${kinds.map(
        (kind) => html`<li>
          <svg width="44" height="16" aria-hidden="true"><path d="M0 8H44" class=${linkLineClass(kind)} /></svg>
          ${linkLineWords(kind)}
        </li>`,
      )}
      ${
        inHand !== null && plan.links.some(({ link }) => link.id === inHand)
          ? html`<li class="in-hand no-print">
              <svg width="44" height="16" aria-hidden="true"><path d="M0 8H44" class="s-link held" /></svg>
              link in hand
            </li>`
          : nothing
      }
      ${
        half > 0
          ? html`<li>
              <svg width="32" height=${2 * half + 4} aria-hidden="true">
                <rect x="2" y="2" width="28" height=${2 * half} class="s-band" /><path d="M2 2H30M2 ${2 + 2 * half}H30" class="s-edge" />
              </svg>
              <span>± <i class="s">u</i>, ${plan.multiple === 1 ? 'to scale' : `${plan.multiple} times the height scale`}; this one is ± ${sample}</span>
            </li>`
          : nothing
      }
    </ul>`;
}

/** A round length whose band is easily seen, for the key. */
function sampleOf(
  { scale, multiple }: SectionPlan,
  gravity: number,
): { readonly sample: string; readonly half: number } {
  const pxPerM = scale.pxPerUnit * gravity * multiple;
  for (let power = 1e-9; power < 1e4; power *= 10)
    for (const mantissa of [1, 2, 5]) {
      const half = mantissa * power * pxPerM;
      if (half >= SAMPLE_PX.least && half <= SAMPLE_PX.most) return { sample: formatLength(mantissa * power), half };
    }
  return { sample: '', half: 0 };
}
