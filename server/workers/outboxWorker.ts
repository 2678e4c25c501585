import type { Deps } from '../deps';
import { shopsWithWork, takeWork, markDone, markFailed, type Work } from '../modules/outbox/outbox.repository';
import { verifyStoredWalk } from '../modules/walks/verifyWalk.usecases';
import { withShop, type ShopTx } from '../tenancy/withShop';

const EVERY_MS = 2_000;
const LONGEST_WAIT_MS = 3_600_000;

type Job = (deps: Deps, tx: ShopTx, payload: Record<string, unknown>) => Promise<void>;

/** What is done after a commit, by kind. */
const jobs: Record<string, Job> = {
  'walk.stored': verifyStoredWalk,
};

const waitAfter = (attempts: number): number => Math.min(LONGEST_WAIT_MS, 1_000 * 2 ** attempts);

/** Does one piece of work of a shop in a transaction of its own; a failure is kept with it and tried again later. */
const doOne = async (deps: Deps, shop: string): Promise<boolean> => {
  let taken: Work | null = null;
  try {
    return await withShop(deps.client, shop, async (tx) => {
      taken = await takeWork(tx, deps.clock.now());
      if (!taken) return false;
      const job = jobs[taken.kind];
      if (!job) throw new Error(`nobody does ${taken.kind}`);
      await job(deps, tx, taken.payload);
      await markDone(tx, taken.id, deps.clock.now());
      return true;
    });
  } catch (error) {
    const failed = taken as Work | null;
    if (!failed) throw error;
    deps.log.error({ err: error, work: failed.id, kind: failed.kind }, 'work after a commit failed');
    const nextAt = new Date(deps.clock.now().getTime() + waitAfter(failed.attempts));
    const message = error instanceof Error ? error.message : String(error);
    await withShop(deps.client, shop, (tx) => markFailed(tx, failed.id, nextAt, message));
    return true;
  }
};

/** Does what waits in every shop (decision 15). Several servers may do so at once: each takes what no other holds. */
export const doWaitingWork = async (deps: Deps): Promise<void> => {
  for (const shop of await shopsWithWork(deps.client, deps.clock.now())) {
    while (await doOne(deps, shop));
  }
};

/** Looks for work every few seconds until it is stopped; waits for what it is doing then. */
export const startOutboxWorker = (deps: Deps): { stop(): Promise<void> } => {
  let running: Promise<void> = Promise.resolve();
  let stopped = false;
  const round = async (): Promise<void> => {
    try {
      await doWaitingWork(deps);
    } catch (error) {
      deps.log.warn({ err: error }, 'the worker could not look for work');
    }
  };
  const timer = setInterval(() => {
    running = running.then(() => (stopped ? undefined : round()));
  }, EVERY_MS);
  return {
    async stop() {
      stopped = true;
      clearInterval(timer);
      await running;
    },
  };
};
