import type { Checkpoint } from '../../checkpoint.ts';

/** Work that says at each yield how many units it did since the last, so that whoever drives it may pause or stop. */
export type Steps<T> = Generator<number, T>;

/** Drives the work to its end in one go. */
export function runSteps<T>(steps: Steps<T>): T {
  for (;;) {
    const { done, value } = steps.next();
    if (done === true) return value;
  }
}

/**
 * Drives the work with pauses, so that a cancel is heard.
 *
 * @param total units of all work, at least about
 * @returns undefined when cancelled
 */
export async function paceSteps<T>(steps: Steps<T>, checkpoint: Checkpoint, total: number): Promise<T | undefined> {
  let spent = 0;
  for (;;) {
    const { done, value } = steps.next();
    if (done === true) return value;
    spent += value;
    if (checkpoint.isDue() && !(await checkpoint.pause(Math.min(spent, total), total))) return undefined;
  }
}
