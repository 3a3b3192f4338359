import type { ReactiveController, ReactiveControllerHost } from 'lit';
import type { Campaign } from '../../lib/campaign/campaign.js';
import type { MonteCarloProgress, MonteCarloResult } from '../../lib/uncertainty/monte-carlo/index.js';
import { runTrials, runTrialsInSlices } from '../worker/run-trials.js';

/** So many trials a page runs by itself, between its frames; more only when a reader asks, in a worker. */
export const OWN_TRIALS = 100_000;
export const SEED = 1;
/** Edits that follow each other faster than this share one run. */
const SETTLE_MS = 250;
/** Nothing is said about a run that is shorter. */
const PATIENCE_MS = 200;

export interface Running {
  /** 'auto': until results are stable */
  readonly wanted: number | 'auto';
  readonly progress: MonteCarloProgress;
  readonly startedMs: number;
  /** long enough to be told */
  readonly isSlow: boolean;
}

/** The trials of the link in hand: run when the campaign changes, or when a reader wants more of them. */
export class TrialsController implements ReactiveController {
  /** of the link in hand; may be those before the last edit while new ones run */
  result: MonteCarloResult | null = null;
  running: Running | null = null;
  failure: string | null = null;
  readonly #host: ReactiveControllerHost;
  #task: { readonly campaign: Campaign; readonly link: number; readonly id: string } | null = null;
  #resultOf: Campaign | null = null;
  #abort: AbortController | null = null;
  #timer: ReturnType<typeof setTimeout> | undefined;

  constructor(host: ReactiveControllerHost) {
    this.#host = host;
    host.addController(this);
  }

  hostDisconnected(): void {
    this.#stop();
    this.#task = null;
  }

  /** The result is of the campaign as it is now. */
  get isCurrent(): boolean {
    return this.result !== null && this.#resultOf === this.#task?.campaign;
  }

  /** Runs the trials of a link unless they are there or under way. @param own trials to run unasked; 0: none */
  want(campaign: Campaign, link: number, own: number): void {
    const id = campaign.links[link]!.id;
    if (this.#task?.campaign === campaign && this.#task.link === link) return;
    if (this.#task?.id !== id) this.result = null;
    this.#task = { campaign, link, id };
    this.#stop();
    this.failure = null;
    if (own > 0) this.#timer = setTimeout(() => void this.#run(own), SETTLE_MS);
  }

  /** There is nothing to run. */
  clear(): void {
    this.#stop();
    this.#task = null;
    this.result = null;
  }

  /** A reader wants more. */
  run(trials: number | 'auto'): void {
    this.#stop();
    void this.#run(trials);
  }

  cancel(): void {
    this.#stop();
    this.#host.requestUpdate();
  }

  #stop(): void {
    clearTimeout(this.#timer);
    this.#abort?.abort();
    this.#abort = null;
    this.running = null;
  }

  async #run(trials: number | 'auto'): Promise<void> {
    if (!this.#task) return;
    const { campaign, link } = this.#task;
    const abort = new AbortController();
    this.#abort = abort;
    this.failure = null;
    const startedMs = performance.now();
    const onProgress = (progress: MonteCarloProgress) => {
      if (abort !== this.#abort) return;
      const isSlow = performance.now() - startedMs > PATIENCE_MS;
      this.running = { wanted: trials, progress, startedMs, isSlow };
      if (isSlow) this.#host.requestUpdate();
    };
    onProgress({ trials: 0, of: trials === 'auto' ? 0 : trials });
    try {
      const run = trials === 'auto' || trials > OWN_TRIALS ? runTrials : runTrialsInSlices;
      const result = await run({ campaign, link, trials, seed: SEED }, { signal: abort.signal, onProgress });
      if (abort !== this.#abort) return;
      this.result = result;
      this.#resultOf = campaign;
    } catch (error) {
      if (abort !== this.#abort) return;
      this.failure = error instanceof Error ? error.message : String(error);
    }
    this.#abort = null;
    this.running = null;
    this.#host.requestUpdate();
  }
}
