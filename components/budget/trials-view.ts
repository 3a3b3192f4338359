import { html, nothing, type TemplateResult } from 'lit';
import { linearDensity } from '../../lib/answers/linear-density.js';
import type { LinkUncertainty } from '../../lib/answers/what-if.js';
import { formatDuration } from '../../lib/quantity/index.js';
import { histogram } from '../charts/histogram.js';
import { quantityText } from '../shared/number.js';
import { richText } from '../shared/rich-text.js';
import { trialDecimals, trialsWords } from './budget-words.js';
import { OWN_TRIALS, type Running, type TrialsController } from './trials-controller.js';

const SCALE = 1e18;
/** What a reader can ask for beyond what the page runs by itself. */
const MORE = 1_000_000;

/** The trials beside the linear result: figure, verdict in words, how to run more of them.
 * @param width px of the figure
 * @param isTrying something is changed, of which the trials know nothing */
export function trialsView(
  trials: TrialsController,
  uncertainty: LinkUncertainty,
  width: number,
  isTrying: boolean,
): TemplateResult {
  const { result, failure } = trials;
  const [output] = result?.outputs ?? [];
  if (uncertainty.y.u === 0) return html``;
  const words = result && output ? trialsWords(output, result) : null;
  return html`<section class="two" aria-label="Is the linear result right">
    <div>${output && result ? figure(trials, uncertainty, width) : nothing}</div>
    <div>
      <h3>${words?.title ?? 'Is the linear result right'}</h3>
      ${trials.isCurrent || !result ? nothing : html`<p class="tagc">before the last change of the campaign</p>`}
      ${words ? html`<p>${richText(words.text)}</p>` : nothing}
      ${words && isTrying ? html`<p class="dim no-print">The trials are of the stated values.</p>` : nothing}
      ${failure === null ? nothing : html`<div class="flt"><p class="hd">Not computed</p><p>${failure}</p></div>`}
      ${trials.running ? progress(trials, trials.running) : more(trials)}
      ${
        output
          ? html`<ul class="key-row">
              <li>
                <svg width="44" height="18" aria-hidden="true"><rect x="0" y="4" width="44" height="11" class="s-hist" /></svg>
                trials
              </li>
              <li>
                <svg width="44" height="18" aria-hidden="true"><line x1="0" x2="44" y1="9" y2="9" class="s-curve" /></svg>
                linear
              </li>
            </ul>`
          : nothing
      }
    </div>
  </section>`;
}

function figure({ result }: TrialsController, { y, expanded }: LinkUncertainty, width: number): TemplateResult {
  const output = result!.outputs[0]!;
  const { histogram: bins, validation } = output;
  const density = linearDensity(y.u, expanded.degreesOfFreedom);
  return histogram(
    {
      low: bins.low * SCALE,
      high: bins.high * SCALE,
      densities: bins.densities.map((d) => d / SCALE),
      linear: (deviation) => density(deviation / SCALE) / SCALE,
      linearInterval: [validation.linear.low * SCALE, validation.linear.high * SCALE],
      trialsInterval: [validation.trials.low * SCALE, validation.trials.high * SCALE],
      decimals: trialDecimals(output),
      coverage: `${100 * result!.coverage}\u00a0%`,
    },
    width,
  );
}

/** Name, bar, done of total, time left, a way to stop. */
function progress(trials: TrialsController, { wanted, progress: at, startedMs, isSlow }: Running): TemplateResult {
  if (!isSlow) return html``;
  const elapsedS = (performance.now() - startedMs) / 1000;
  const left = at.trials > 0 && wanted !== 'auto' ? (elapsedS * (at.of - at.trials)) / at.trials : null;
  return html`<div class="working no-print">
    <svg class="prog" width="100%" height="7" aria-hidden="true">
      <rect x="0" y="0" width="100%" height="7" class="s-grp" />
      <rect x="0" y="0" width=${`${at.of > 0 ? (100 * at.trials) / at.of : 0}%`} height="7" class="s-bar" />
    </svg>
    <p role="progressbar" aria-label="Monte Carlo" aria-valuemin="0" aria-valuemax=${at.of} aria-valuenow=${at.trials}>
      ${
        wanted === 'auto'
          ? html`${quantityText(String(at.trials))} trials, until results are stable`
          : html`${quantityText(String(at.trials))} of ${quantityText(String(at.of))} trials`
      }${left === null ? nothing : `, ${formatDuration(Math.max(left, 0.1), 1)} left`}
    </p>
    <button type="button" class="btn" @click=${() => trials.cancel()}>Cancel</button>
  </div>`;
}

const more = (trials: TrialsController): TemplateResult =>
  html`<p class="buttons no-print">
    ${
      trials.result === null
        ? html`<button type="button" class="btn" @click=${() => trials.run(OWN_TRIALS)}>
            Run ${quantityText(String(OWN_TRIALS))} trials
          </button>`
        : nothing
    }
    <button type="button" class="btn" @click=${() => trials.run(MORE)}>Run ${quantityText(String(MORE))} trials</button>
    <button type="button" class="btn" @click=${() => trials.run('auto')}>Run until stable</button>
  </p>`;
