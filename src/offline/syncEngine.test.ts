// @vitest-environment node
import { describe, expect, it } from 'vitest';
import { newBlob } from './blobs';
import { rowsOf } from './database';
import { resendFrom } from './outbox';
import type { BlobRow, OutboxRow, ReceiptRow } from './rows';
import { openWalkLog } from './walkLog';
import { syncKit, type SyncKit } from './testing/syncKit';
import { byTechnician, note, opened, openTestWalk, PERSON, TABLET, WALK } from './testing/tabletKit';
import type { Fate } from './testing/unreliableNetwork';

const OTHER_WALK = WALK.replace('c1', 'c2');

const walkOf = async (kit: SyncKit, notes: string[], walk = WALK) => {
  const log = await openTestWalk(kit.tablet, walk);
  await log.append(byTechnician(opened()));
  for (const text of notes) await log.append(byTechnician(note(text)));
  return log;
};
const outboxOf = (kit: SyncKit) =>
  kit.tablet.database.read(['outbox'], (transaction) => rowsOf<OutboxRow>(transaction, 'outbox'));
const eventsOf = async (kit: SyncKit, walk = WALK) => {
  const rows = await kit.tablet.database.read(['events'], (transaction) =>
    rowsOf<{ walk: string; hash: string }>(transaction, 'events'),
  );
  return rows.filter((row) => row.walk === walk).map((row) => row.hash);
};
const hashesAt = (kit: SyncKit, walk = WALK) => kit.server.chainOf(walk).map(({ hash }) => hash);
const isEvents = (path: string) => path.endsWith('/events');
const batches = (kit: SyncKit) => kit.network.requests.filter(isEvents).length;
/** The first requests for events meet these fates, the rest go well. */
const fates = (kit: SyncKit, ...list: Fate[]) => {
  kit.network.fateOf = (path) => (isEvents(path) ? (list.shift() ?? 'fine') : 'fine');
};

describe('sync', () => {
  it('sends a walk in order, stores the receipt and empties the outbox', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a', 'b']);
    kit.engine.start();
    await kit.pass(1);
    expect(hashesAt(kit)).toEqual(await eventsOf(kit));
    expect(await outboxOf(kit)).toEqual([]);
    expect(kit.engine.status()).toMatchObject({ phase: 'idle', waiting: 0, code: null });
    const receipts = await kit.tablet.database.read(['receipts'], (transaction) =>
      rowsOf<ReceiptRow>(transaction, 'receipts'),
    );
    expect(receipts).toMatchObject([{ walk: WALK, next: 3, hash: hashesAt(kit).at(-1) }]);
  });

  it('sends at most 500 events in a batch', async () => {
    const kit = await syncKit();
    await walkOf(
      kit,
      Array.from({ length: 600 }, (_, index) => `${index}`),
    );
    kit.engine.start();
    await kit.pass(1);
    expect(batches(kit)).toBe(2);
    expect(kit.server.chainOf(WALK)).toHaveLength(601);
  });

  it('runs once at a time however often it is poked', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    kit.engine.start();
    await Promise.all([kit.engine.poke(), kit.engine.poke(), kit.engine.poke()]);
    expect(batches(kit)).toBe(1);
  });

  it.each<Fate>(['replyLost', 'replyCut', 'doubled', 'notReached'])(
    'stores every event once when a batch meets %s (faults 6, 7)',
    async (fate) => {
      const kit = await syncKit();
      await walkOf(kit, ['a', 'b']);
      fates(kit, fate, fate);
      kit.engine.start();
      await kit.pass(60_000);
      expect(hashesAt(kit)).toEqual(await eventsOf(kit));
      expect(kit.server.stored).toBe(3);
      expect(await outboxOf(kit)).toEqual([]);
    },
  );

  it.each<[Fate, string, string]>([
    ['portalPage', 'portal', 'server.notOurs'],
    ['portalRedirect', 'portal', 'server.notOurs'],
    ['foreignJson', 'portal', 'server.notOurs'],
    ['notReached', 'offline', 'server.unreachable'],
    ['tooMany', 'waiting', 'rate.tooMany'],
    ['illServer', 'waiting', 'server.ill'],
  ])('marks nothing as sent while %s answers, says so, and tries again (fault 23)', async (fate, phase, code) => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    kit.network.fateOf = (path) => (isEvents(path) ? fate : 'fine');
    kit.engine.start();
    await kit.pass(1);
    expect(kit.engine.status()).toMatchObject({ phase, code, waiting: 2 });
    expect(kit.engine.status().retryAt).toBeGreaterThan(kit.clock.now());
    expect(await outboxOf(kit)).toHaveLength(2);
    await kit.pass(3600_000);
    expect(await outboxOf(kit)).toHaveLength(2);
    kit.network.fateOf = () => 'fine';
    await kit.pass(300_000);
    expect(await outboxOf(kit)).toEqual([]);
  });

  it('waits longer from failure to failure, and not at all once a person presses', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    kit.network.fateOf = (path) => (isEvents(path) ? 'illServer' : 'fine');
    kit.engine.start();
    await kit.pass(3600_000);
    const inAnHour = batches(kit);
    expect(inAnHour).toBeGreaterThan(10);
    expect(inAnHour).toBeLessThan(30);
    kit.network.fateOf = () => 'fine';
    await kit.engine.press();
    expect(await outboxOf(kit)).toEqual([]);
  });

  it('waits as long as the server asks', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    fates(kit, 'tooMany');
    kit.engine.start();
    await kit.pass(6_900);
    expect(batches(kit)).toBe(1);
    await kit.pass(200);
    expect(batches(kit)).toBe(2);
  });

  it('gets a new token and sends again when the old one has ended (fault 24)', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    fates(kit, 'tokenEnded');
    kit.engine.start();
    await kit.pass(1);
    expect(await outboxOf(kit)).toEqual([]);
    expect(kit.network.requests.filter((path) => path === '/api/tablets/token')).toHaveLength(2);
  });

  it('does not ask for tokens in a circle when none is taken', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    kit.network.fateOf = (path) => (isEvents(path) ? 'tokenEnded' : 'fine');
    kit.engine.start();
    await kit.pass(1);
    expect(kit.engine.status()).toMatchObject({ phase: 'waiting', code: 'token.expired' });
    expect(batches(kit)).toBe(2);
  });

  it('halves a batch that is too large until it goes through', async () => {
    const kit = await syncKit();
    await walkOf(
      kit,
      Array.from({ length: 15 }, (_, index) => `${index}`),
    );
    fates(kit, 'tooLarge', 'tooLarge');
    kit.engine.start();
    await kit.pass(1);
    expect(hashesAt(kit)).toEqual(await eventsOf(kit));
    // 16, 8, 4 sent, then 8, then the last 4: it grows again as carefully as it shrank.
    expect(batches(kit)).toBe(5);
  });

  it('blocks a walk whose single event is too large, and tells', async () => {
    const kit = await syncKit();
    await walkOf(kit, []);
    kit.network.fateOf = (path) => (isEvents(path) ? 'tooLarge' : 'fine');
    kit.engine.start();
    await kit.pass(1);
    expect(kit.engine.status()).toMatchObject({ phase: 'blocked', blocked: 1, code: 'batch.tooLarge', waiting: 1 });
  });

  it('sends from where the server asks after a hole (fault 8)', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a', 'b', 'c']);
    kit.engine.start();
    await kit.pass(1);
    // The server is restored from a backup that is two events older.
    kit.server.chains.set(WALK, kit.server.chainOf(WALK).slice(0, 2));
    const log = await openWalkLog(kit.tablet.deps, { walk: WALK }).catch(() => null);
    expect(log?.snapshot().readOnly).toBe(true);
    await resendFrom(kit.tablet.database, WALK, 3, TABLET);
    await kit.pass(1);
    expect(hashesAt(kit)).toEqual(await eventsOf(kit));
    expect(await outboxOf(kit)).toEqual([]);
  });

  it('offers everything again when the server’s epoch changed (decision 9)', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a', 'b']);
    kit.engine.start();
    await kit.pass(1);
    kit.server.chains.clear();
    kit.server.answer = { ...kit.server.answer, epoch: 'epoch-2', full: true };
    await kit.pass(120_000);
    expect(hashesAt(kit)).toEqual(await eventsOf(kit));
    expect((await kit.settings.get('catalogue'))?.epoch).toBe('epoch-2');
  });

  it('parks a walk that is refused with its code, keeps it whole, and sends the others (poison event)', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a', 'b', 'c']);
    await walkOf(kit, ['x'], OTHER_WALK);
    const [, , poisoned] = await eventsOf(kit);
    kit.server.poison.add(poisoned ?? '');
    kit.engine.start();
    await kit.pass(3600_000);
    expect(kit.engine.status()).toMatchObject({ phase: 'blocked', blocked: 1, code: 'event.refused', waiting: 2 });
    expect(hashesAt(kit, OTHER_WALK)).toEqual(await eventsOf(kit, OTHER_WALK));
    expect(await eventsOf(kit)).toHaveLength(4);
    expect(batches(kit)).toBe(2);
    kit.server.poison.clear();
    await kit.engine.press();
    expect(hashesAt(kit)).toEqual(await eventsOf(kit));
    expect(kit.engine.status()).toMatchObject({ phase: 'idle', blocked: 0, waiting: 0 });
  });

  it('keeps everything when the tablet is revoked, and stops sending (fault 17)', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    kit.server.revoked = true;
    kit.engine.start();
    await kit.pass(3600_000);
    expect(kit.engine.status()).toMatchObject({ phase: 'revoked', code: 'tablet.revoked', waiting: 2 });
    expect(kit.network.requests.length).toBeLessThan(4);
    expect(await outboxOf(kit)).toHaveLength(2);
  });

  it('removes nothing for a receipt that does not fit this chain', async () => {
    const kit = await syncKit();
    const log = await walkOf(kit, ['a']);
    const handle = kit.server.handle.bind(kit.server);
    kit.server.handle = async (request) => {
      const answer = await handle(request);
      if (!isEvents(new URL(request.url).pathname)) return answer;
      return Response.json({ ...((await answer.json()) as object), hash: 'e'.repeat(64) });
    };
    kit.engine.start();
    await kit.pass(1);
    expect(kit.engine.status()).toMatchObject({ phase: 'blocked', code: 'receipt.mismatch', waiting: 2 });
    expect((await log.append(byTechnician(note('still walking')))).ok).toBe(true);
  });

  it('takes a receipt for a chain on which the office has already written further, and fetches the rest', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    const handle = kit.server.handle.bind(kit.server);
    kit.server.handle = async (request) => {
      const answer = await handle(request);
      if (!isEvents(new URL(request.url).pathname)) return answer;
      return Response.json({ ...((await answer.json()) as object), next: 3, hash: 'e'.repeat(64) });
    };
    kit.engine.start();
    await kit.pass(1);
    expect(await outboxOf(kit)).toEqual([]);
    expect(kit.network.requests).toContain(`/api/tablet/walks/${WALK}`);
  });

  it('waits quietly without a network and goes on when it is back', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    kit.network.online = false;
    kit.engine.start();
    await kit.pass(600_000);
    expect(kit.network.requests).toEqual([]);
    expect(kit.engine.status()).toMatchObject({ phase: 'offline', waiting: 2, code: null });
    kit.network.online = true;
    await kit.engine.poke();
    expect(await outboxOf(kit)).toEqual([]);
  });

  it('sends a photo after the events that name it, and again when the server lacks it (fault 18)', async () => {
    const kit = await syncKit();
    const log = await walkOf(kit, []);
    const blob = await newBlob(new Uint8Array([1, 2, 3]).buffer, 'image/jpeg');
    const photo = { type: 'photo.added', data: { blob: blob.sha256, hole: null, caption: 'x' } } as const;
    await log.append({ ...byTechnician(photo), blobs: [blob] });
    kit.engine.start();
    await kit.pass(1);
    expect([...kit.server.blobs.keys()]).toEqual([blob.sha256]);
    const order = kit.network.requests.filter((path) => isEvents(path) || path.includes('/blobs/'));
    expect(order.map((path) => (isEvents(path) ? 'events' : 'blob'))).toEqual(['events', 'blob']);
    kit.server.blobs.clear();
    await log.append(byTechnician(note('later')));
    await kit.pass(1);
    expect([...kit.server.blobs.keys()]).toEqual([blob.sha256]);
  });

  it('keeps a photo the server refuses, names the reason, and does not send it in a circle', async () => {
    const kit = await syncKit();
    const log = await walkOf(kit, []);
    const blob = { ...(await newBlob(new Uint8Array([1]).buffer, 'image/jpeg')), bytes: new Uint8Array([2]).buffer };
    const photo = { type: 'photo.added', data: { blob: blob.sha256, hole: null, caption: 'x' } } as const;
    await log.append({ ...byTechnician(photo), blobs: [blob] });
    kit.engine.start();
    await kit.pass(3600_000);
    const [row] = await kit.tablet.database.read(['blobs'], (transaction) => rowsOf<BlobRow>(transaction, 'blobs'));
    expect(row).toMatchObject({ waiting: 1, refused: 'blob.wrongHash' });
    expect(kit.network.requests.filter((path) => path.includes('/blobs/'))).toHaveLength(1);
  });

  it('sends the sealed PIN with its event and forgets it with the receipt', async () => {
    const kit = await syncKit();
    const sealer = () => Promise.resolve({ jwe: 'a..b.c.d', hash: 'f'.repeat(64) });
    const log = await openTestWalk({ ...kit.tablet, deps: { ...kit.tablet.deps, sealer } });
    await log.append(byTechnician(opened()));
    const act = { type: 'walk.signed', data: { meaning: 'tightenedAsRecorded' } } as const;
    await log.append({ ...byTechnician(act), pin: { pin: '482915', person: PERSON, pinVersion: 1 } });
    kit.engine.start();
    await kit.pass(1);
    expect([...kit.server.seals]).toEqual([[log.snapshot().head, 'a..b.c.d']]);
    expect(await outboxOf(kit)).toEqual([]);
  });

  it('says that the tablet’s storage failed, and goes on when it is well again (fault 19)', async () => {
    const kit = await syncKit();
    await walkOf(kit, ['a']);
    const read = kit.tablet.database.read.bind(kit.tablet.database);
    let ill = true;
    kit.tablet.database.read = (stores, work) =>
      ill ? Promise.reject(new DOMException('disk', 'UnknownError')) : read(stores, work);
    kit.engine.start();
    await kit.engine.poke();
    expect(kit.engine.status()).toMatchObject({ phase: 'storage', code: 'storage.broken' });
    ill = false;
    await kit.pass(60_000);
    expect(await outboxOf(kit)).toEqual([]);
  });
});
