import type { Hold, Holds } from '../locks';

/** Holds as Web Locks give them, for several tabs in one test. `drop` is what the death of a tab does. */
export function memoryHolds(): Holds & { drop(name: string): void } {
  const holders = new Map<string, Hold>();
  const waiting = new Map<string, ((hold: Hold) => void)[]>();
  const grant = (name: string): Hold => {
    const hold: Hold = {
      release: () => {
        if (holders.get(name) === hold) free(name);
      },
    };
    holders.set(name, hold);
    return hold;
  };
  const free = (name: string): void => {
    holders.delete(name);
    const next = waiting.get(name)?.shift();
    if (next) next(grant(name));
  };
  return {
    tryHold: (name) => Promise.resolve(holders.has(name) ? null : grant(name)),
    waitForHold: (name, signal) =>
      new Promise((resolve, reject) => {
        const queue = waiting.get(name) ?? [];
        waiting.set(name, [...queue, resolve]);
        signal.addEventListener('abort', () => {
          waiting.set(
            name,
            (waiting.get(name) ?? []).filter((one) => one !== resolve),
          );
          reject(new DOMException('left', 'AbortError'));
        });
      }),
    drop: free,
  };
}
