import { tabletClient } from '@/api/tabletClient';
import { SyncEngine, type SyncEngineDeps } from '../syncEngine';
import { syncRequests } from '../syncRequests';
import { tabletSettings, type Settings } from '../settings';
import { tokenFor } from '../tabletAuth';
import { FakeServer } from './fakeServer';
import { handClock, SHOP, TABLET, testTablet, type TestTablet } from './tabletKit';
import { unreliableNetwork, type Fate } from './unreliableNetwork';

/** A tablet with its engine, the server it speaks to, and the network between them. */
export interface SyncKit {
  tablet: TestTablet;
  settings: Settings;
  server: FakeServer;
  engine: SyncEngine;
  clock: ReturnType<typeof handClock>;
  network: { fateOf: (path: string) => Fate; online: boolean; requests: string[] };
  /** Lets time pass and the engine wake, until nothing is planned before `ms` are over. */
  pass(ms: number): Promise<void>;
}

const identity = {
  tablet: { id: TABLET, name: 'Stand 1' },
  shop: { id: SHOP, name: 'Brindle Lane Engine Works' },
  signingKeys: [],
  sealingKey: { kty: 'EC', crv: 'P-256', x: '', y: '', kid: '' } as const,
  enrolledAt: '2026-06-13T08:00:00.000Z',
};

function handTimers(clock: ReturnType<typeof handClock>) {
  let dueAt: number | null = null;
  return {
    forEngine: {
      setTimer: (_work: () => void, ms: number) => (dueAt = clock.now() + ms),
      clearTimer: () => (dueAt = null),
    },
    pass: async (ms: number, wake: () => Promise<void>): Promise<void> => {
      const end = clock.now() + ms;
      await wake();
      while (dueAt !== null && dueAt <= end) {
        clock.pass(dueAt - clock.now());
        dueAt = null;
        await wake();
      }
      clock.pass(end - clock.now());
    },
  };
}

/** Makes an enrolled tablet with an engine that has not started. */
export async function syncKit(more: Partial<SyncEngineDeps> = {}, before?: SyncKit): Promise<SyncKit> {
  const clock = before?.clock ?? handClock();
  const tablet = await testTablet(before?.tablet, { clock });
  const settings = tabletSettings({ factory: tablet.disk.factory });
  await settings.set('deviceKey', tablet.key);
  const server = before?.server ?? new FakeServer(tablet.key);
  const network: SyncKit['network'] = { fateOf: () => 'fine', online: true, requests: [] };
  const fetch = unreliableNetwork(server, (path) => {
    network.requests.push(path);
    server.answer = { ...server.answer, now: new Date(clock.now()).toISOString() };
    return network.fateOf(path);
  });
  const client = tabletClient({ fetch });
  const { record } = tablet.deps;
  const timers = handTimers(clock);
  const engine = new SyncEngine({
    database: tablet.database,
    settings,
    record,
    clock,
    requests: syncRequests(client),
    authenticate: () => tokenFor({ client, settings, record, clock }, identity),
    tablet: () => TABLET,
    random: () => 0.5,
    report: () => Promise.resolve({ waiting: 0, refused: 0, stored: 0, lost: [], version: 'test' }),
    onCatalogue: () => undefined,
    onWalk: () => undefined,
    isOnline: () => network.online,
    ...timers.forEngine,
    ...more,
  });
  const pass = (ms: number): Promise<void> => timers.pass(ms, () => engine.poke());
  return { tablet, settings, server, engine, clock, network, pass };
}
