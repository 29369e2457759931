import { createHash } from 'node:crypto';
import { appendFileSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { canonicalText } from '../../src/core/stable-key.ts';
import { KERNELS } from './result-key.ts';
import type { FileJob, TargetResult } from './target-result.ts';

/** Results that are done, kept beside the session until it is written, so that a broken sweep can go on. */
export interface PartialResults {
  readonly known: ReadonlyMap<string, TargetResult>;
  /** On the disk when it returns. */
  add(key: string, result: TargetResult): void;
  remove(): void;
}

export const partialPath = (out: string): string => `${out}.partial`;

/** Of everything that a result depends on: one of other kernels, or of another version, is not taken. */
export function partialKey(job: Omit<FileJob, 'bytes'>, sha256: string, app: string): string {
  return createHash('sha256')
    .update(canonicalText({ KERNELS, app, sha256, ...job }))
    .digest('hex');
}

/** Throws where the file cannot be written. */
export function openPartialResults(out: string, isResumed: boolean): PartialResults {
  const path = partialPath(out);
  const known = isResumed ? readLines(path) : new Map<string, TargetResult>();
  // Written anew, for the last line of a broken sweep may be torn.
  writeFileSync(path, [...known].map(([key, result]) => lineOf(key, result)).join(''));
  return {
    known,
    add: (key, result) => appendFileSync(path, lineOf(key, result)),
    remove: () => rmSync(path, { force: true }),
  };
}

const lineOf = (key: string, result: TargetResult): string => `${JSON.stringify({ key, result })}\n`;

function readLines(path: string): Map<string, TargetResult> {
  const known = new Map<string, TargetResult>();
  for (const line of readText(path).split('\n').slice(0, -1)) {
    const entry = parseLine(line);
    if (entry !== undefined) known.set(entry.key, entry.result);
  }
  return known;
}

function readText(path: string): string {
  try {
    return readFileSync(path, 'utf8');
  } catch {
    return '';
  }
}

function parseLine(line: string): { readonly key: string; readonly result: TargetResult } | undefined {
  try {
    const { key, result } = JSON.parse(line);
    return typeof key === 'string' && Array.isArray(result?.signals) ? { key, result } : undefined;
  } catch {
    return undefined;
  }
}
