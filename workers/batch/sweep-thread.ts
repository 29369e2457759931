import { readFile as readBytes } from 'node:fs/promises';
import { parentPort } from 'node:worker_threads';
import { failed, type Outcome } from '../../src/contract/outcome.ts';
import { analyseFile } from './analyse-file.ts';
import { type Identified, identifyFile } from './identify-file.ts';
import type { FileJob, TargetResult } from './target-result.ts';

/** What a thread is asked: a file is read where it is worked on. */
export type ThreadTask =
  | { readonly kind: 'identify'; readonly path: string; readonly fileName: string }
  | ({ readonly kind: 'analyse'; readonly path: string } & Omit<FileJob, 'bytes'>);

export interface ThreadAnswers {
  readonly identify: Outcome<Identified>;
  readonly analyse: Outcome<TargetResult>;
}

async function answer(task: ThreadTask): Promise<Outcome<Identified | TargetResult>> {
  const { path, fileName } = task;
  const buffer = await readBytes(path).catch((cause: Error) => cause.message);
  if (typeof buffer === 'string') return failed(`${fileName} was not read. The system said: ${buffer}.`);
  try {
    const bytes = new Uint8Array(buffer).buffer;
    return task.kind === 'identify' ? await identifyFile(fileName, bytes) : await analyseFile({ ...task, bytes });
  } catch (cause) {
    const detail = cause instanceof Error ? cause.stack : String(cause);
    return failed(`${fileName} was not swept. Candling broke on it, which is a fault of Candling.`, detail);
  }
}

parentPort?.on('message', async (task: ThreadTask) => parentPort?.postMessage(await answer(task)));
