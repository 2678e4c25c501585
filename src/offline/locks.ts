/** Gives a hold on a name: one holder at a time over all tabs of this tablet (fault 12). */
export interface Holds {
  /** The hold, or null when another tab has it. */
  tryHold(name: string): Promise<Hold | null>;
  /** Waits for the hold; the signal ends the waiting (rejects with its reason). */
  waitForHold(name: string, signal: AbortSignal): Promise<Hold>;
}

/** Something held until it is let go (or this tab ends). */
export interface Hold {
  release(): void;
}

const holdWith = (manager: LockManager, name: string, options: LockOptions): Promise<Hold | null> =>
  new Promise((resolve, reject) => {
    manager
      .request(name, options, (lock) => {
        if (!lock) return resolve(null);
        return new Promise<void>((release) => resolve({ release: () => release() }));
      })
      .catch(reject);
  });

/** Holds over the browser's Web Locks. */
export const webHolds = (manager: LockManager): Holds => ({
  tryHold: (name) => holdWith(manager, name, { ifAvailable: true }),
  waitForHold: async (name, signal) => {
    const hold = await holdWith(manager, name, { signal });
    if (!hold) throw new Error(`no hold on ${name}`);
    return hold;
  },
});
