import workerSource from 'inline-worker:./trials.worker.ts';
import type { MonteCarloProgress, MonteCarloResult } from '../../lib/uncertainty/monte-carlo/index.js';
import { type TrialsMessage, type TrialsTask, trialsSteps } from './trials-task.js';

/** How a run is followed and stopped. */
export interface TrialsControl {
  readonly signal: AbortSignal;
  onProgress(progress: MonteCarloProgress): void;
}

/** On the page itself no piece of work holds it up for longer, so that it can be scrolled and typed into meanwhile. */
const SLICE_MS = 8;

/** Runs the trials of a link in a worker of its own; where the page's policy refuses one, on the page in slices. The numbers are
 *  the same.
 * @throws {DOMException} `AbortError` when it is cancelled */
export async function runTrials(task: TrialsTask, control: TrialsControl): Promise<MonteCarloResult> {
  const worker = startWorker();
  if (worker) {
    const result = await inWorker(worker, task, control);
    if (result) return result;
  }
  return runTrialsInSlices(task, control);
}

/** The page's policy may answer with an error at once, or with an event later. */
function startWorker(): { readonly worker: Worker; readonly address: string } | null {
  const address = URL.createObjectURL(new Blob([workerSource], { type: 'text/javascript' }));
  try {
    return { worker: new Worker(address), address };
  } catch {
    URL.revokeObjectURL(address);
    return null;
  }
}

/** @returns null where the worker never came to life */
function inWorker(
  { worker, address }: { readonly worker: Worker; readonly address: string },
  task: TrialsTask,
  { signal, onProgress }: TrialsControl,
): Promise<MonteCarloResult | null> {
  return new Promise((resolve, reject) => {
    const end = (then: () => void) => {
      worker.terminate();
      URL.revokeObjectURL(address);
      signal.removeEventListener('abort', cancel);
      then();
    };
    const cancel = () => end(() => reject(signal.reason));
    if (signal.aborted) return cancel();
    signal.addEventListener('abort', cancel);
    worker.onmessage = ({ data }: MessageEvent<TrialsMessage>) => {
      if (data.kind === 'progress') onProgress(data.progress);
      else if (data.kind === 'result') end(() => resolve(data.result));
      else end(() => reject(new Error(data.message)));
    };
    worker.onerror = (event) => {
      event.preventDefault();
      end(() => resolve(null));
    };
    worker.postMessage(task);
  });
}

/** On the page, between its frames.
 * @throws {DOMException} `AbortError` when it is cancelled */
export async function runTrialsInSlices(
  task: TrialsTask,
  { signal, onProgress }: TrialsControl,
): Promise<MonteCarloResult> {
  await nextTurn();
  signal.throwIfAborted();
  const steps = trialsSteps(task);
  for (;;) {
    const until = performance.now() + SLICE_MS;
    let last: MonteCarloProgress | null = null;
    do {
      const step = steps.next();
      if (step.done) return step.value;
      last = step.value;
    } while (performance.now() < until);
    onProgress(last);
    await nextTurn();
    signal.throwIfAborted();
  }
}

/** Lets input and painting through. A message is not held back like a timer, which waits 4 ms at least. */
const nextTurn = (): Promise<void> =>
  new Promise((resolve) => {
    const { port1, port2 } = new MessageChannel();
    port1.onmessage = () => {
      port1.close();
      resolve();
    };
    port2.postMessage(null);
  });
