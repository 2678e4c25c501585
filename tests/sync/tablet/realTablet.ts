import type { WrenchSnapshot } from '@shared/crib/wrench';
import { tabletClient } from '@/api/tabletClient';
import { Tablet } from '@/offline/tablet';
import type { TabletWorld } from '@/offline/tabletWorld';
import { failingIndexedDb, type FailingIndexedDb } from '@/offline/testing/failingIndexedDb';
import { memoryHolds } from '@/offline/testing/memoryHolds';
import { handClock } from '@/offline/testing/tabletKit';
import { unreliableNetwork, type Fate } from '@/offline/testing/unreliableNetwork';
import type { FakeShop } from './fakeShop';

/** A torque-angle wrench that suits every stage of the demo's procedures. Values invented. */
export const wideWrench: WrenchSnapshot = {
  id: '0190f0a0-0000-7000-8000-0000000000f3',
  tag: 'W-03',
  serial: 'T20-112',
  kind: 'torqueAngle',
  drive: '1/2 in',
  range: { low: '10', high: '340', unit: 'N.m' },
  unit: 'N.m',
  resolution: { torque: '0.1', angle: '1' },
  accuracy: { cw: '3', ccw: '4' },
  turnAccuracy: '2',
  due: { date: '2027-01-01', cycles: null },
  cycles: 0,
  state: 'inService',
  certificate: 'K-1',
};

/** The world of a tablet on a disk in memory, before a shop that a network may hide. */
export interface RealWorld {
  world: TabletWorld;
  disk: FailingIndexedDb;
  clock: ReturnType<typeof handClock>;
  network: { fateOf: (path: string) => Fate; online: boolean };
}

/** The whole tablet as it runs in a browser. */
export interface RealTablet extends RealWorld {
  tablet: Tablet;
}

/** A world; with `before`, the same tablet's after it was killed: same disk, another boot. */
export function realWorld(shop: FakeShop, before?: RealWorld): RealWorld {
  const disk = before?.disk ?? failingIndexedDb();
  if (before) disk.restart();
  const clock = before ? { ...before.clock, boot: `${before.clock.boot}x` } : handClock();
  const network: RealWorld['network'] = { fateOf: () => 'fine', online: before?.network.online ?? true };
  const fetch = unreliableNetwork(shop, (path) => {
    shop.answer = { ...shop.answer, now: new Date(clock.now()).toISOString() };
    return network.fateOf(path);
  });
  const world: TabletWorld = {
    factory: disk.factory,
    holds: memoryHolds(),
    client: tabletClient({ fetch }),
    clock,
    storage: undefined,
    random: () => 0.5,
    isOnline: () => network.online,
    // Only what follows an event at once happens by itself; for the rest a test pokes.
    setTimer: (work, ms) => (ms < 500 ? setTimeout(work, ms) : null),
    clearTimer: (timer) => clearTimeout(timer as NodeJS.Timeout | undefined),
    tell: () => undefined,
    listen: () => undefined,
    version: 'test',
  };
  return { world, disk, clock, network };
}

/** Starts a tablet; with `before`, the same one after it was killed. */
export async function realTablet(shop: FakeShop, before?: RealTablet): Promise<RealTablet> {
  before?.tablet.sync.stop();
  const real = realWorld(shop, before);
  const tablet = new Tablet(real.world);
  await tablet.start();
  await tablet.sync.poke();
  return { ...real, tablet };
}
