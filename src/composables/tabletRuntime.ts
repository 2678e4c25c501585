import { useSessionStore, type SignedIn } from '@/stores/useSessionStore';
import { useTabletStore } from '@/stores/useTabletStore';
import { useUpdateStore } from '@/stores/useUpdateStore';
import { Tablet } from '@/offline/tablet';
import { browserWorld, type TabletWorld } from '@/offline/tabletWorld';

let running: Tablet | null = null;

/** This browser's tablet. Throws before `startTablet`. */
export function tabletRuntime(): Tablet {
  if (!running) throw new Error('the tablet has not been started');
  return running;
}

function showIdentity(tablet: Tablet): void {
  const store = useTabletStore();
  store.tablet = tablet.identity?.tablet ?? null;
  store.shop = tablet.identity?.shop ?? null;
}

function showSession(tablet: Tablet): void {
  const { session } = tablet;
  const known = session ? tablet.personById(session.person) : null;
  const person: SignedIn | null = known ? { id: known.id, name: known.name, roles: known.roles } : null;
  useSessionStore().person = person;
}

const show = (tablet: Tablet) => ({
  identity: () => showIdentity(tablet),
  catalogue: () => {
    useTabletStore().catalogue = tablet.catalogue;
    showSession(tablet);
  },
  session: () => showSession(tablet),
  walks: () => {
    useUpdateStore().openWalks = tablet.walks.openWalks;
  },
  storage: () => {
    useTabletStore().trouble = tablet.trouble;
  },
});

/** Wakes the engine when something outside may have changed: the network, or somebody looking at the screen again. */
function listenToBrowser(tablet: Tablet): void {
  window.addEventListener('online', () => void tablet.sync.poke());
  document.addEventListener('visibilitychange', () => {
    if (document.visibilityState === 'visible') void tablet.sync.poke();
  });
}

/**
 * Starts the tablet of this browser once: reads what is kept, shows it in the stores, and begins to send. Needs an active
 * Pinia. Resolves when the storage was read; a storage that fails is told in the store, not thrown.
 */
export async function startTablet(version: string, world: TabletWorld = browserWorld(version)): Promise<Tablet> {
  if (running) return running;
  const tablet = new Tablet(world);
  running = tablet;
  const shown = show(tablet);
  tablet.onChange((what) => shown[what]());
  listenToBrowser(tablet);
  await tablet.start();
  useTabletStore().ready = true;
  return tablet;
}

/** Stops the tablet; a test starts the next one on a clean page. */
export function stopTablet(): void {
  running?.stop();
  running = null;
}
