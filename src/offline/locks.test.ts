// @vitest-environment node
import { describe, expect, it } from 'vitest';
import { webHolds } from './locks';

/** Web Locks in small: exclusive locks, `ifAvailable`, a queue, and waiting that can be given up. */
function lockManager(): LockManager {
  const held = new Map<string, Promise<unknown>>();
  const request = async (name: string, options: LockOptions, work: (lock: Lock | null) => unknown) => {
    if (options.ifAvailable && held.has(name)) return work(null);
    while (held.has(name)) {
      await Promise.race([held.get(name), ...(options.signal ? [aborted(options.signal)] : [])]);
    }
    const run = Promise.resolve(work({ name, mode: 'exclusive' }));
    held.set(name, run);
    await run.finally(() => held.delete(name));
    return undefined;
  };
  return { request } as unknown as LockManager;
}

const aborted = (signal: AbortSignal): Promise<never> =>
  new Promise((_, reject) => {
    const leave = () => reject(new DOMException('left', 'AbortError'));
    if (signal.aborted) leave();
    else signal.addEventListener('abort', leave);
  });

describe('holds over Web Locks', () => {
  it('let one tab in and the next when it has left', async () => {
    const holds = webHolds(lockManager());
    const first = await holds.tryHold('w');
    expect(first).not.toBeNull();
    expect(await holds.tryHold('w')).toBeNull();
    expect(await holds.tryHold('other')).not.toBeNull();
    const waiting = holds.waitForHold('w', new AbortController().signal);
    first?.release();
    await expect(waiting).resolves.toHaveProperty('release');
  });

  it('stop waiting when asked to', async () => {
    const holds = webHolds(lockManager());
    await holds.tryHold('w');
    const leaving = new AbortController();
    const waiting = holds.waitForHold('w', leaving.signal);
    leaving.abort();
    await expect(waiting).rejects.toMatchObject({ name: 'AbortError' });
  });
});
