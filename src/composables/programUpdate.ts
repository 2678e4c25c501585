import { useUpdateStore } from '@/stores/useUpdateStore';

/** Message on which a waiting worker takes over; src/sw/sw.ts listens for it. */
const START = { type: 'start' } as const;
const LOOK_EVERY_MS = 60 * 60_000;

/** What watching for new versions needs of the browser. */
export interface UpdateWorld {
  workers: ServiceWorkerContainer;
  reload: () => void;
}

let waiting: ServiceWorker | null = null;

function offer(worker: ServiceWorker | null): void {
  if (!worker) return;
  waiting = worker;
  useUpdateStore().waiting = true;
}

function watchInstalling(worker: ServiceWorker | null, { workers }: UpdateWorld): void {
  worker?.addEventListener('statechange', () => {
    // The first worker of a browser has nothing to take over from: it is no update.
    if (worker.state === 'installed' && workers.controller) offer(worker);
  });
}

async function watch(world: UpdateWorld): Promise<void> {
  const { workers, reload } = world;
  const registration = await workers.register('/sw.js', { scope: '/' });
  if (workers.controller) offer(registration.waiting);
  watchInstalling(registration.installing, world);
  registration.addEventListener('updatefound', () => watchInstalling(registration.installing, world));
  workers.addEventListener('controllerchange', () => {
    // Only the version that somebody asked for loads the page again: never a reload under the hands.
    if (started) reload();
  });
  setInterval(() => void registration.update().catch(() => undefined), LOOK_EVERY_MS);
}

let started = false;

/** The program's own new versions. */
export const programUpdate = {
  /** Registers the worker and watches for new ones. Rejects where the browser allows none. */
  watch,
  /** Lets the waiting version take over; the page then loads again. */
  start: (): void => {
    started = true;
    waiting?.postMessage(START);
  },
};
