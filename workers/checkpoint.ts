import type { OnProgress } from '../src/contract/outcome.ts';

/** Work between two looks at the mail: short enough that a cancel feels immediate. */
const SLICE_MS = 25;
const PROGRESS_MS = 100;

/** Where a kernel lets the worker hear a cancel. Ask `isDue` often (it is cheap), and await `pause` when it says so. */
export interface Checkpoint {
  isDue(): boolean;
  /** Reports progress, lets waiting messages in, and resolves to false when the job was cancelled meanwhile. */
  pause(done: number, total: number): Promise<boolean>;
}

/** A checkpoint of one job; progress is monotone and at most ten a second. */
export function createCheckpoint(isCancelled: () => boolean, onProgress?: OnProgress): Checkpoint {
  let sliceStart = performance.now();
  let lastReport = sliceStart;
  let furthest = 0;
  const report = (done: number, total: number): void => {
    const now = performance.now();
    if (onProgress === undefined || now - lastReport < PROGRESS_MS || done <= furthest) return;
    lastReport = now;
    furthest = done;
    onProgress({ done, total });
  };
  return {
    isDue: () => performance.now() - sliceStart >= SLICE_MS,
    pause: async (done, total) => {
      report(done, total);
      await yieldToMessages();
      sliceStart = performance.now();
      return !isCancelled();
    },
  };
}

/** A whole turn of the event loop. A message and not a timer: nested timers are held back four milliseconds. */
function yieldToMessages(): Promise<void> {
  return new Promise((resolve) => {
    const { port1, port2 } = new MessageChannel();
    port1.onmessage = () => {
      port1.close();
      resolve();
    };
    port2.postMessage(undefined);
  });
}
