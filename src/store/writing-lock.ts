/**
 * One tab writes a session, any other reads it. The browser's lock is given up by itself when a tab is closed or
 * killed, so a crash never leaves a session locked.
 */
export interface WritingLock {
  /** True when this tab may write; `onLost` is called when another tab takes over. */
  take(sessionId: string, options: { steal: boolean; onLost: () => void }): Promise<boolean>;
  release(): void;
}

export function createWritingLock(locks: LockManager | undefined = globalThis.navigator?.locks): WritingLock {
  let release = () => {};
  return {
    take(sessionId, { steal, onLost }) {
      release();
      // Where the browser has no locks there is nothing to arbitrate with: write.
      if (locks === undefined) return Promise.resolve(true);
      return new Promise<boolean>((resolve) => {
        const held = new Promise<void>((end) => {
          release = end;
        });
        locks
          .request(`candling ${sessionId}`, steal ? { steal } : { ifAvailable: true }, (lock) => {
            resolve(lock !== null);
            return lock === null ? undefined : held;
          })
          .catch(onLost);
      });
    },
    release() {
      release();
    },
  };
}
