import { pruneWalks } from './pruneWalks';
import { storageRoom } from './storage';
import { SyncEngine } from './syncEngine';
import { syncRequests, type TabletReport } from './syncRequests';
import { tokenFor } from './tabletAuth';
import type { TabletCore } from './tabletCore';
import { walksOnTablet } from './walkIndex';

/** What the engine tells the rest of the tablet. */
export interface SyncEars {
  onCatalogue: () => void;
  onWalk: (walk: string) => void;
  /** Walks of which events were lost here (fault 20). */
  lostWalks: () => readonly string[];
}

async function reportOf(core: TabletCore, lost: readonly string[]): Promise<TabletReport> {
  const walks = await walksOnTablet(core.database);
  const room = await storageRoom(core.world.storage);
  return {
    waiting: walks.reduce((sum, walk) => sum + walk.waiting + walk.waitingFiles, 0),
    refused: walks.filter((walk) => walk.blocked !== null || walk.refusedFiles > 0).length,
    stored: Math.round(room.usedBytes ?? 0),
    lost: lost.slice(0, 200),
    version: core.world.version.slice(0, 40),
  };
}

/** The engine of an enrolled (or not yet enrolled) tablet. */
export function tabletSync(core: TabletCore, ears: SyncEars): SyncEngine {
  const { world, database, settings, record } = core;
  const auth = { client: world.client, settings, record, clock: world.clock };
  return new SyncEngine({
    database,
    settings,
    record,
    clock: world.clock,
    requests: syncRequests(world.client),
    authenticate: () =>
      core.identity ? tokenFor(auth, core.identity) : Promise.resolve({ kind: 'unreachable' as const }),
    tablet: () => core.identity?.tablet.id ?? null,
    random: world.random,
    report: () => reportOf(core, ears.lostWalks()),
    onCatalogue: (catalogue) => {
      core.catalogue = catalogue;
      ears.onCatalogue();
    },
    onWalk: ears.onWalk,
    isOnline: world.isOnline,
    setTimer: world.setTimer,
    clearTimer: world.clearTimer,
  });
}

/** Clears away walks that have had their time. */
export async function pruneTablet({ database, catalogue, world }: TabletCore): Promise<void> {
  const isOver = (walk: string): boolean => {
    const state = catalogue.walks[walk]?.state;
    return state === 'finished' || state === 'voided';
  };
  await pruneWalks(database, isOver, world.clock.now());
}
