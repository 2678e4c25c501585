// @vitest-environment node
import { describe, expect, it } from 'vitest';
import { verifyChain } from '@shared/record/chain';
import { rowOf, rowsOf } from './database';
import type { EventRow, HeadRow, OutboxRow } from './rows';
import { openWalkLog } from './walkLog';
import { UnknownWalk } from './walkStanding';
import type { Failure } from './testing/failingIndexedDb';
import { byTechnician, note, opened, openTestWalk, testTablet, WALK, type TestTablet } from './testing/tabletKit';
import { keepBallast } from './ballast';

const ACTS = [opened(), note('a'), note('b'), note('c'), note('d')];

/** A short walk; `shown` gathers the hash of each event that a person was shown as saved. */
async function walkUntilItFails(tablet: TestTablet, shown: string[]): Promise<void> {
  try {
    const log = await openTestWalk(tablet);
    for (const act of ACTS) {
      const saved = await log.append(byTechnician(act));
      if (!saved.ok) break;
      shown.push(saved.value.head);
    }
  } catch (error) {
    // The program died in the middle of something: what counts is what is found afterwards.
    expect(error).toBeInstanceOf(Error);
  }
}

const everything = (tablet: TestTablet) =>
  tablet.database.read(['events', 'outbox', 'heads'], async (transaction) => ({
    events: await rowsOf<EventRow>(transaction, 'events'),
    outbox: await rowsOf<OutboxRow>(transaction, 'outbox'),
    head: await rowOf<HeadRow>(transaction, 'heads', WALK),
  }));

async function expectWholePrefix(again: TestTablet, shown: string[]): Promise<void> {
  const { events, outbox, head } = await everything(again);
  const keys = new Map([[again.key.kid, again.key.publicJwk]]);
  expect(await verifyChain(events, keys, again.deps.record)).toMatchObject({ ok: true, next: events.length });
  // I1: everything shown as saved is there, in its place.
  expect(events.slice(0, shown.length).map((row) => row.hash)).toEqual(shown);
  // Never half: head, events and outbox say the same.
  expect(outbox.map((row) => row.hash)).toEqual(events.map((row) => row.hash));
  expect(head?.next ?? 0).toBe(events.length);
  expect(head?.hash).toBe(events.at(-1)?.hash);
}

async function goOn(again: TestTablet): Promise<void> {
  const before = (await everything(again)).events.length;
  const log = await openTestWalk(again);
  const act = before === 0 ? opened() : note('after');
  expect((await log.append(byTechnician(act))).ok).toBe(true);
  await expectWholePrefix(again, []);
  expect((await everything(again)).events).toHaveLength(before + 1);
}

async function operationsOfTheWalk(): Promise<number> {
  const tablet = await testTablet();
  tablet.disk.failAt(0, 'killBefore');
  const shown: string[] = [];
  await walkUntilItFails(tablet, shown);
  expect(shown).toHaveLength(ACTS.length);
  return tablet.disk.count;
}

describe.each<Failure>(['killBefore', 'killAfter', 'quota', 'lost'])(
  'the N-th storage operation fails: %s',
  (failure) => {
    it('for every N of a short walk nothing shown is lost, nothing is half there, and the walk goes on', async () => {
      const operations = await operationsOfTheWalk();
      expect(operations).toBeGreaterThan(30);
      for (let number = 1; number <= operations; number++) {
        const tablet = await testTablet();
        tablet.disk.failAt(number, failure);
        const shown: string[] = [];
        // A dead tab never answers: its death ends the waiting.
        await Promise.race([walkUntilItFails(tablet, shown), tablet.disk.death]);
        expect(tablet.disk.count).toBeGreaterThanOrEqual(number);
        const again = await testTablet(tablet);
        await expectWholePrefix(again, shown);
        await goOn(again);
      }
    });
  },
);

describe('a full disk', () => {
  it('still saves a reading from the kept space, and says that it was used (fault 13)', async () => {
    let used = 0;
    const tablet = await testTablet(undefined, { onBallastUsed: () => (used += 1) });
    expect(await keepBallast(tablet.database, 1000)).toBe(true);
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    // The fifth operation of an append is one of its writes.
    tablet.disk.failAt(5, 'quota');
    const saved = await log.append(byTechnician(note('on a full disk')));
    expect(saved.ok && saved.value.view.last).toBe('on a full disk');
    expect(used).toBe(1);
    await expectWholePrefix(tablet, []);
  });

  it('refuses without kept space, keeps what was there, and the step does not go on', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    tablet.disk.failAt(5, 'quota');
    expect(await log.append(byTechnician(note('no room')))).toEqual({ ok: false, error: { code: 'storage.full' } });
    expect(log.snapshot().state.notes).toEqual([]);
    expect((await log.append(byTechnician(note('room again')))).ok).toBe(true);
    await expectWholePrefix(tablet, []);
  });

  it('does not give the kept space to a photo', async () => {
    const tablet = await testTablet();
    await keepBallast(tablet.database, 1000);
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    tablet.disk.failAt(5, 'quota');
    const blobs = [{ sha256: 'a'.repeat(64), contentType: 'image/jpeg', bytes: new ArrayBuffer(8) }];
    const refused = await log.append({ ...byTechnician(note('photo')), blobs });
    expect(refused).toEqual({ ok: false, error: { code: 'storage.full' } });
    const held = await tablet.database.read(['ballast'], (transaction) => rowsOf(transaction, 'ballast'));
    expect(held).toHaveLength(1);
  });
});

describe('a disk that does not heal', () => {
  it('says so and writes nothing, never falls back to memory (fault 19)', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    tablet.disk.failAt(1, 'killBefore');
    const refused = await log.append(byTechnician(note('nowhere')));
    expect(refused.ok).toBe(false);
    expect(log.snapshot().state.notes).toEqual([]);
    await expect(openWalkLog(tablet.deps, { walk: WALK })).rejects.not.toBeInstanceOf(UnknownWalk);
  });
});
