import { type TrialsMessage, type TrialsTask, trialsSteps } from './trials-task.js';

/** What a worker needs of its surroundings; the DOM's types describe a window. */
interface WorkerScope {
  onmessage: ((event: MessageEvent<TrialsTask>) => void) | null;
  postMessage(message: TrialsMessage): void;
}

/** Progress is told no oftener than a screen shows it. */
const TELL_EVERY_MS = 50;

const scope = globalThis as unknown as WorkerScope;

scope.onmessage = ({ data }) => {
  try {
    const steps = trialsSteps(data);
    let told = 0;
    for (;;) {
      const step = steps.next();
      if (step.done) {
        scope.postMessage({ kind: 'result', result: step.value });
        return;
      }
      const now = performance.now();
      if (now - told < TELL_EVERY_MS) continue;
      told = now;
      scope.postMessage({ kind: 'progress', progress: step.value });
    }
  } catch (error) {
    scope.postMessage({ kind: 'failed', message: error instanceof Error ? error.message : String(error) });
  }
};
