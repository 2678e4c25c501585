import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { verifyChain } from '@shared/record/chain';
import { newBlob } from '@/offline/blobs';
import { rowsOf } from '@/offline/database';
import type { BlobRow, EventRow, OutboxRow } from '@/offline/rows';
import type { Failure } from '@/offline/testing/failingIndexedDb';
import { syncKit, type SyncKit } from '@/offline/testing/syncKit';
import { byTechnician, note, opened, openTestWalk, WALK } from '@/offline/testing/tabletKit';
import { FATES, type Fate } from '@/offline/testing/unreliableNetwork';

/*
 * Random histories of one tablet and one server: whatever the network and the disk do in between, nothing that was shown
 * as saved is lost or doubled, the server never holds anything but a prefix of the tablet's chain (I3), and once the
 * network is well both hold the same.
 */

const WALKS = [WALK, WALK.replace('c1', 'c2'), WALK.replace('c1', 'c3')];

type Happening =
  | { kind: 'append'; walk: number; photo: boolean }
  | { kind: 'network'; fates: Fate[] }
  | { kind: 'time'; ms: number }
  | { kind: 'press' }
  | { kind: 'crash'; at: number; failure: Failure; walk: number }
  | { kind: 'olderBackup'; share: number };

const walkIndex = fc.nat({ max: WALKS.length - 1 });
const happening: fc.Arbitrary<Happening> = fc.oneof(
  { weight: 6, arbitrary: fc.record({ kind: fc.constant('append'), walk: walkIndex, photo: fc.boolean() }) },
  {
    weight: 4,
    arbitrary: fc.record({
      kind: fc.constant('network'),
      fates: fc.array(fc.constantFrom(...FATES), { minLength: 1, maxLength: 6 }),
    }),
  },
  { weight: 3, arbitrary: fc.record({ kind: fc.constant('time'), ms: fc.nat({ max: 600_000 }) }) },
  { weight: 1, arbitrary: fc.constant({ kind: 'press' as const }) },
  {
    weight: 2,
    arbitrary: fc.record({
      kind: fc.constant('crash'),
      at: fc.integer({ min: 1, max: 40 }),
      failure: fc.constantFrom<Failure>('killBefore', 'killAfter', 'quota', 'lost'),
      walk: walkIndex,
    }),
  },
  { weight: 1, arbitrary: fc.record({ kind: fc.constant('olderBackup'), share: fc.nat({ max: 100 }) }) },
);

interface World {
  kit: SyncKit;
  /** Hashes that a person was shown as saved, by walk. */
  shown: Map<string, string[]>;
  epoch: number;
  /** Programs that were killed: what they would go on to show, nobody sees. */
  dead: Set<SyncKit>;
}

async function append({ kit, shown, dead }: World, walk: string, photo: boolean): Promise<void> {
  const log = await openTestWalk(kit.tablet, walk);
  try {
    if (log.snapshot().next === 0) {
      const begun = await log.append(byTechnician(opened()));
      if (!begun.ok || dead.has(kit)) return;
      shown.set(walk, [begun.value.head]);
    }
    const seen = shown.get(walk) ?? [];
    const blob = await newBlob(new TextEncoder().encode(`${walk} ${seen.length}`).buffer, 'image/jpeg');
    const act = photo
      ? ({ type: 'photo.added', data: { blob: blob.sha256, hole: null, caption: 'x' } } as const)
      : note(`${seen.length}`);
    const saved = await log.append({ ...byTechnician(act), blobs: photo ? [blob] : [] });
    if (saved.ok && !dead.has(kit)) shown.set(walk, [...seen, saved.value.head]);
  } finally {
    log.close();
  }
}

/** The program meets a failure of its disk while it writes and sends, and is started again. */
async function crash(world: World, { at, failure, walk }: Extract<Happening, { kind: 'crash' }>): Promise<void> {
  const { kit } = world;
  const { disk } = kit.tablet;
  disk.failAt(at, failure);
  void disk.death.then(() => world.dead.add(kit));
  const busy = async () => {
    await append(world, WALKS[walk] ?? WALK, false);
    await kit.pass(1000);
  };
  await Promise.race([busy().catch(() => undefined), disk.death]);
  kit.engine.stop();
  const again = await syncKit({}, kit);
  again.network.fateOf = kit.network.fateOf;
  again.engine.start();
  world.kit = again;
}

function restoreOlderBackup(world: World, share: number): void {
  const { server } = world.kit;
  for (const [walk, chain] of server.chains) {
    server.chains.set(walk, chain.slice(0, Math.floor((chain.length * share) / 100)));
  }
  server.blobs.clear();
  world.epoch += 1;
  server.answer = { ...server.answer, epoch: `epoch-${world.epoch}`, full: true };
}

async function happen(world: World, what: Happening): Promise<void> {
  const { kit } = world;
  switch (what.kind) {
    case 'append':
      return append(world, WALKS[what.walk] ?? WALK, what.photo);
    case 'network': {
      const fates = [...what.fates];
      kit.network.fateOf = () => fates.shift() ?? 'fine';
      return;
    }
    case 'time':
      return kit.pass(what.ms);
    case 'press':
      return kit.engine.press();
    case 'crash':
      return crash(world, what);
    case 'olderBackup':
      return restoreOlderBackup(world, what.share);
  }
}

const everything = (kit: SyncKit) =>
  kit.tablet.database.read(['events', 'outbox', 'blobs'], async (transaction) => ({
    events: await rowsOf<EventRow>(transaction, 'events'),
    outbox: await rowsOf<OutboxRow>(transaction, 'outbox'),
    blobs: await rowsOf<BlobRow>(transaction, 'blobs'),
  }));

async function expectNothingLost({ kit, shown }: World): Promise<void> {
  const { events } = await everything(kit);
  const keys = new Map([[kit.tablet.key.kid, kit.tablet.key.publicJwk]]);
  for (const walk of WALKS) {
    const chain = events.filter((row) => row.walk === walk);
    expect(await verifyChain(chain, keys, kit.tablet.deps.record)).toMatchObject({ ok: true, next: chain.length });
    const hashes = chain.map(({ hash }) => hash);
    // Saved means saved, in its order; a crash may have saved one more than was shown.
    expect(hashes.filter((hash) => shown.get(walk)?.includes(hash))).toEqual(shown.get(walk) ?? []);
    const there = kit.server.chainOf(walk).map(({ hash }) => hash);
    expect(hashes.slice(0, there.length)).toEqual(there);
  }
}

async function expectConverged({ kit }: World): Promise<void> {
  const { events, outbox, blobs } = await everything(kit);
  for (const walk of WALKS) {
    const here = events.filter((row) => row.walk === walk).map(({ hash }) => hash);
    expect(kit.server.chainOf(walk).map(({ hash }) => hash)).toEqual(here);
  }
  expect(outbox).toEqual([]);
  expect([...kit.server.blobs.keys()].sort()).toEqual(blobs.map(({ sha256 }) => sha256).sort());
  expect(kit.engine.status()).toMatchObject({ waiting: 0, blocked: 0 });
}

describe('a tablet and a server', () => {
  it('hold the same in the end, and lose nothing on the way', { timeout: 120_000 }, async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(happening, { minLength: 3, maxLength: 25 }), async (history) => {
        const world: World = { kit: await syncKit(), shown: new Map(), epoch: 1, dead: new Set() };
        world.kit.engine.start();
        for (const what of history) {
          await happen(world, what);
          await expectNothingLost(world);
        }
        world.kit.network.fateOf = () => 'fine';
        await world.kit.engine.press();
        await world.kit.pass(180_000);
        await expectNothingLost(world);
        await expectConverged(world);
        world.kit.engine.stop();
      }),
      { numRuns: 150 },
    );
  });
});
