import 'fake-indexeddb/auto';
import { expect, vi } from 'vitest';
import type { Timing } from '../../src/core/ephemeris.ts';
import { type Candling, createCandling } from '../../src/store/candling.ts';
import { createSessionStorage } from '../../src/store/session-storage.ts';
import { createFakeJobs } from '../store/fake-jobs.ts';

/** Candling without a screen, on a database of its own. */
export function openCandling(): Candling {
  return createCandling({
    jobs: createFakeJobs().jobs,
    storage: createSessionStorage(globalThis.crypto.randomUUID()),
    lock: { take: async () => true, release: () => undefined },
    app: '0.1.0',
    now: () => new Date('2026-01-02T03:04:05Z'),
    newId: () => globalThis.crypto.randomUUID(),
  });
}

/** An invented star with a box of 1 % every 1.5 days; `depth` tells files of several stars apart. */
function starFile(name: string, depth = 0.01) {
  const rows = Array.from({ length: 400 }, (_, i) => {
    const days = i / 48;
    return `${2459000 + days},${Math.abs(((days + 0.25) % 1.5) - 0.75) < 0.05 ? 1 - depth : 1},0.0003`;
  });
  const text = ['bjd_tdb,flux,flux_err', ...rows].join('\n');
  return { name, bytes: async () => new Uint8Array(new TextEncoder().encode(text)).buffer };
}

export async function openStars(candling: Candling, names: readonly string[]): Promise<void> {
  await candling.startSession('test');
  await candling.files.add(names.map((name, index) => starFile(name, 0.01 + index / 1000)));
  await vi.waitFor(() => expect(candling.actions.bench().prepared).toBeDefined());
}

export const timing = {
  kind: 'linear',
  periodDays: 1.5,
  periodErrorDays: 0.0002,
  epochDays: 0.5,
  epochErrorDays: 0.001,
  durationDays: 0.1,
} as const satisfies Timing;
