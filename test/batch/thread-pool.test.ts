import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { createThreadPool } from '../../workers/batch/thread-pool.ts';

/** A thread that answers with its number and the path it was given, or dies, or breaks, as the name says. */
const THREAD = `
import { parentPort, threadId } from 'node:worker_threads';
parentPort.on('message', ({ fileName, path }) => {
  if (fileName === 'dies') process.exit(3);
  if (fileName === 'breaks') throw new Error('out of cheese');
  parentPort.postMessage({ kind: 'done', value: { kind: 'light curve', label: path, sha256: String(threadId) } });
});`;

const folder = mkdtempSync(join(tmpdir(), 'candling-pool-'));
const threadFile = join(folder, 'thread.mjs');
writeFileSync(threadFile, THREAD);
afterAll(() => rmSync(folder, { recursive: true }));

async function runAll(size: number, names: readonly string[]) {
  const pool = createThreadPool(threadFile, size);
  const outcomes = await Promise.all(
    names.map((fileName, index) => pool.run({ kind: 'identify', path: `p${index}`, fileName })),
  );
  await pool.close();
  return outcomes;
}

describe('threads of a sweep', () => {
  it('answer every task with its own outcome, on no more threads than asked for', async () => {
    const outcomes = await runAll(2, ['a', 'b', 'c', 'd', 'e', 'f']);
    const values = outcomes.map((outcome) => (outcome.kind === 'done' ? outcome.value : undefined));
    expect(values.map((value) => value?.kind === 'light curve' && value.label)).toEqual([
      'p0',
      'p1',
      'p2',
      'p3',
      'p4',
      'p5',
    ]);
    expect(new Set(values.map((value) => value?.kind === 'light curve' && value.sha256)).size).toBeLessThanOrEqual(2);
  });

  it('that die take only their own task with them', async () => {
    const outcomes = await runAll(1, ['a', 'dies', 'b', 'breaks', 'c']);
    expect(outcomes.map(({ kind }) => kind)).toEqual(['done', 'failed', 'done', 'failed', 'done']);
    const broken = outcomes[3]!;
    expect(broken.kind === 'failed' && broken.error.sentence).toBe(
      'breaks was not swept. Its thread died: out of cheese.',
    );
  });
});
