// @vitest-environment node
import { describe, expect, it, vi } from 'vitest';
import { verifyChain } from '@shared/record/chain';
import { rowsOf } from './database';
import type { EventRow, OutboxRow } from './rows';
import { sealerFor } from './seal';
import { UnknownWalk } from './walkStanding';
import { openWalkLog } from './walkLog';
import {
  byTechnician,
  note,
  opened,
  openTestWalk,
  PERSON,
  SHOP,
  testTablet,
  WALK,
  type TestTablet,
} from './testing/tabletKit';

const storedEvents = (tablet: TestTablet) =>
  tablet.database.read(['events'], (transaction) => rowsOf<EventRow>(transaction, 'events'));
const storedOutbox = (tablet: TestTablet) =>
  tablet.database.read(['outbox'], (transaction) => rowsOf<OutboxRow>(transaction, 'outbox'));

const verified = async (tablet: TestTablet) => {
  const keys = new Map([[tablet.key.kid, tablet.key.publicJwk]]);
  return verifyChain(await storedEvents(tablet), keys, tablet.deps.record, { shop: SHOP, walk: WALK });
};

describe('walk log', () => {
  it('saves what it shows: event, head and outbox row, in a chain that verifies', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    const saved = await log.append(byTechnician(note('first')));
    expect(saved.ok && saved.value.view.last).toBe('first');
    expect(await verified(tablet)).toMatchObject({ ok: true, next: 2, head: log.snapshot().head });
    expect((await storedOutbox(tablet)).map((row) => row.seq)).toEqual([0, 1]);
  });

  it('goes on where it was after the program is started again', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    await log.append(byTechnician(note('before')));
    const again = await testTablet(tablet);
    const reopened = await openWalkLog(again.deps, { walk: WALK });
    expect(reopened.snapshot().state).toEqual(log.snapshot().state);
    await reopened.append(byTechnician(note('after')));
    expect(await verified(again)).toMatchObject({ ok: true, next: 3 });
  });

  it('writes nothing when the rules refuse', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    expect(await log.append(byTechnician(note('refuse me')))).toEqual({ ok: false, error: { code: 'reasonMissing' } });
    expect(await storedEvents(tablet)).toHaveLength(1);
  });

  it('refuses the second of two taps made against one head (decision 11)', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    const { head } = log.snapshot();
    const [first, second] = await Promise.all([
      log.append(byTechnician(note('tap'), head)),
      log.append(byTechnician(note('tap'), head)),
    ]);
    expect(first.ok).toBe(true);
    expect(second).toEqual({ ok: false, error: { code: 'staleHead' } });
    expect(log.snapshot().state.notes).toEqual(['tap']);
  });

  it('is read-only in a second tab and takes over when the first lets go (fault 12)', async () => {
    const tablet = await testTablet();
    const first = await openTestWalk(tablet);
    await first.append(byTechnician(opened()));
    const second = await openTestWalk(tablet);
    expect(second.snapshot().readOnly).toBe(true);
    expect(await second.append(byTechnician(note('no')))).toEqual({ ok: false, error: { code: 'log.readOnly' } });
    await first.append(byTechnician(note('yes')));
    first.close();
    await vi.waitFor(() => expect(second.snapshot().readOnly).toBe(false));
    expect(second.snapshot().state.notes).toEqual(['yes']);
    expect((await second.append(byTechnician(note('mine')))).ok).toBe(true);
    expect(await verified(tablet)).toMatchObject({ ok: true, next: 3 });
  });

  it('never doubles a seq even where no lock keeps the second writer away (fault 12, I4)', async () => {
    const tablet = await testTablet();
    const first = await openTestWalk(tablet);
    await first.append(byTechnician(opened()));
    const lockless = {
      tryHold: () => Promise.resolve({ release: () => undefined }),
      waitForHold: () => Promise.reject(new Error()),
    };
    const second = await openWalkLog({ ...tablet.deps, holds: lockless }, { walk: WALK });
    await first.append(byTechnician(note('one')));
    expect(await second.append(byTechnician(note('two')))).toEqual({ ok: false, error: { code: 'staleHead' } });
    expect((await second.append(byTechnician(note('two')))).ok).toBe(true);
    expect(await verified(tablet)).toMatchObject({ ok: true, next: 3 });
  });

  it('names the event that was changed on the disk and writes nothing more (fault 21)', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    for (const text of ['a', 'b', 'c']) await log.append(byTechnician(note(text)));
    log.close();
    await tablet.database.write(['events'], async (transaction) => {
      const [, , row] = await rowsOf<EventRow>(transaction, 'events');
      if (row) transaction.objectStore('events').put({ ...row, text: row.text.replace('"b"', '"B"') });
    });
    const reopened = await openWalkLog(tablet.deps, { walk: WALK });
    expect(reopened.snapshot().broken).toEqual({ seq: 2, code: 'wrongHash' });
    expect(reopened.snapshot().state.notes).toEqual(['a']);
    expect(await reopened.append(byTechnician(note('d')))).toEqual({
      ok: false,
      error: { code: 'log.chainBroken', params: { seq: 2 } },
    });
  });

  it('never begins a walk a second time when its storage was cleared under it (fault 20)', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    await tablet.database.write(['events', 'heads', 'outbox'], (transaction) => {
      for (const store of ['events', 'heads', 'outbox']) transaction.objectStore(store).clear();
    });
    expect(await log.append(byTechnician(note('x')))).toEqual({ ok: false, error: { code: 'storage.cleared' } });
    expect(await storedEvents(tablet)).toHaveLength(0);
    await expect(openWalkLog(tablet.deps, { walk: WALK })).rejects.toThrow();
  });

  it('does not know a walk that is not here', async () => {
    const tablet = await testTablet();
    await expect(openWalkLog(tablet.deps, { walk: WALK })).rejects.toBeInstanceOf(UnknownWalk);
  });

  it('refuses text that no chain can hold, and text beyond the longest event', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    expect(await log.append(byTechnician(note('half \ud83d')))).toEqual({
      ok: false,
      error: { code: 'log.textNotWritable' },
    });
    expect(await log.append(byTechnician(note('x'.repeat(70_000))))).toEqual({
      ok: false,
      error: { code: 'log.tooLong' },
    });
    expect(await storedEvents(tablet)).toHaveLength(1);
  });

  it('seals a PIN for the very place of its event and keeps it beside the event until it is sent (decision 6)', async () => {
    const shop = await crypto.subtle.generateKey({ name: 'ECDH', namedCurve: 'P-256' }, true, ['deriveBits']);
    const jwk = await crypto.subtle.exportKey('jwk', shop.publicKey);
    const record = (await testTablet()).deps.record;
    const sealer = sealerFor({ kty: 'EC', crv: 'P-256', x: jwk.x ?? '', y: jwk.y ?? '', kid: 'shop' }, record);
    const tablet = await testTablet(undefined, { sealer });
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    const before = log.snapshot();
    const pin = { pin: '482915', person: PERSON, pinVersion: 3 };
    const act = { type: 'walk.signed', data: { meaning: 'tightenedAsRecorded' } } as const;
    await log.append({ ...byTechnician(act), pin });
    const row = (await storedOutbox(tablet)).at(-1);
    const { compactDecrypt, importJWK } = await import('jose');
    const key = await importJWK(await crypto.subtle.exportKey('jwk', shop.privateKey), 'ECDH-ES');
    const opened2 = await compactDecrypt(row?.seal?.jwe ?? '', key);
    expect(JSON.parse(new TextDecoder().decode(opened2.plaintext))).toEqual({
      ...pin,
      walk: WALK,
      seq: before.next,
      prev: before.head,
      meaning: 'tightenedAsRecorded',
    });
    expect(row?.seal?.hash).toBe(log.snapshot().head);
    expect((await storedEvents(tablet)).at(-1)?.text).not.toContain(pin.pin);
    expect(log.snapshot().state.signed[0]).toMatch(/^[0-9a-f]{64}$/);
  });

  it('refuses to sign where it has no shop key to seal to', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    const act = { type: 'walk.signed', data: { meaning: 'tightenedAsRecorded' } } as const;
    const pin = { pin: '482915', person: PERSON, pinVersion: 1 };
    expect(await log.append({ ...byTechnician(act), pin })).toEqual({ ok: false, error: { code: 'log.sealFailed' } });
  });
});
