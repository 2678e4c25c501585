// @vitest-environment node
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { tabletDatabase, rowsOf } from './database';
import { exportTablet } from './exportTablet';
import { aheadAtServer } from './aheadAtServer';
import { KEEP_DAYS, walksToPrune } from './pruneWalks';
import type { HeadRow, StandingRow } from './rows';
import { tabletSettings } from './settings';
import { StorageError } from './storageError';
import { failingIndexedDb, type FailingIndexedDb } from './testing/failingIndexedDb';
import { byTechnician, note, opened, openTestWalk, testTablet, TABLET, WALK } from './testing/tabletKit';
import { askToPersist, storageRoom } from './storage';

let disk: FailingIndexedDb;
beforeEach(() => {
  disk = failingIndexedDb();
});

const ballast = (id: string) => (transaction: IDBTransaction) =>
  void transaction.objectStore('ballast').put({ id, bytes: new ArrayBuffer(1) });

describe('the walk database', () => {
  it('opens again by itself when the browser has dropped the connection (fault 19)', async () => {
    const database = tabletDatabase({ factory: disk.factory });
    await database.write(['ballast'], ballast('a'));
    disk.failAt(1, 'lost');
    await database.write(['ballast'], ballast('b'));
    const rows = await database.read(['ballast'], (transaction) => rowsOf<{ id: string }>(transaction, 'ballast'));
    expect(rows.map(({ id }) => id)).toEqual(['a', 'b']);
  });

  it('says so when the connection breaks inside a transaction, and works again with the next', async () => {
    const database = tabletDatabase({ factory: disk.factory });
    await database.write(['ballast'], ballast('a'));
    await new Promise((settled) => setTimeout(settled, 5));
    disk.failAt(2, 'lost');
    await expect(database.write(['ballast'], ballast('b'))).rejects.toMatchObject({ code: 'storage.lost' });
    await database.write(['ballast'], ballast('c'));
  });

  it('gives way to a newer version in another tab, and says so (fault 15)', async () => {
    const onGivenWay = vi.fn();
    const database = tabletDatabase({ factory: disk.factory, onGivenWay });
    await database.write(['ballast'], ballast('a'));
    await new Promise<void>((resolve, reject) => {
      const request = disk.factory.open('boltwalk-walks', 2);
      request.onsuccess = () => resolve();
      request.onerror = () => reject(new Error('not opened'));
    });
    expect(onGivenWay).toHaveBeenCalledOnce();
    await expect(database.write(['ballast'], ballast('b'))).rejects.toMatchObject({ code: 'storage.newerVersion' });
  });

  it('does not wait for ever while another tab holds an older version', async () => {
    const onBlocked = vi.fn();
    const stuck = {
      open: () => {
        const request = new EventTarget() as IDBOpenDBRequest;
        setTimeout(() => void request.onblocked?.(new Event('blocked') as IDBVersionChangeEvent), 1);
        return request;
      },
    } as unknown as IDBFactory;
    const database = tabletDatabase({ factory: stuck, onBlocked, patienceMs: 20 });
    await expect(database.write(['ballast'], ballast('a'))).rejects.toMatchObject({ code: 'storage.blocked' });
    expect(onBlocked).toHaveBeenCalledOnce();
  });

  it('undoes everything when the work throws, and passes that on', async () => {
    const database = tabletDatabase({ factory: disk.factory });
    const failing = database.write(['ballast'], (transaction) => {
      ballast('a')(transaction);
      throw new StorageError('storage.headMoved');
    });
    await expect(failing).rejects.toMatchObject({ code: 'storage.headMoved' });
    expect(await database.read(['ballast'], (transaction) => rowsOf(transaction, 'ballast'))).toEqual([]);
  });
});

describe('settings', () => {
  it('are read and changed in one transaction', async () => {
    const settings = tabletSettings({ factory: disk.factory });
    const add = () => settings.update('lostWalks', (old = []) => [...old, `${old.length}`]);
    await Promise.all([add(), add(), add()]);
    expect(await settings.get('lostWalks')).toEqual(['0', '1', '2']);
  });

  it('fail aloud when the disk is full', async () => {
    const settings = tabletSettings({ factory: disk.factory });
    await settings.set('lostWalks', ['a']);
    await new Promise((settled) => setTimeout(settled, 5));
    disk.failAt(2, 'quota');
    await expect(settings.set('lostWalks', ['a', 'b'])).rejects.toMatchObject({ code: 'storage.full' });
    expect(await settings.get('lostWalks')).toEqual(['a']);
  });
});

describe('the export', () => {
  it('holds every walk, and names what cannot be read without hiding the rest (fault 19)', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    await log.append(byTechnician(note('a')));
    const settings = tabletSettings({ factory: tablet.disk.factory });
    await settings.set('deviceKey', tablet.key);
    const whole = await exportTablet(tablet.database, settings, 'now');
    expect(whole.stores.events).toHaveLength(2);
    expect(whole.unreadable).toEqual([]);
    expect(whole.settings.publicKey).toMatchObject({ kid: tablet.key.kid });
    expect(JSON.stringify(whole)).not.toContain('privateKey');

    const read = tablet.database.read.bind(tablet.database);
    let count = 0;
    tablet.database.read = (stores, work) =>
      stores[0] === 'events' && ++count === 2 ? Promise.reject(new StorageError('storage.broken')) : read(stores, work);
    const partial = await exportTablet(tablet.database, settings, 'now');
    expect(partial.stores.events).toHaveLength(1);
    expect(partial.unreadable).toEqual([{ store: 'events', key: `["${WALK}",0,0]`, code: 'storage.broken' }]);
    expect(partial.stores.heads).toHaveLength(1);
  });
});

const DAY = 86_400_000;
const NOW = Date.parse('2026-09-01T00:00:00.000Z');
const head = (more: Partial<HeadRow> = {}): HeadRow => ({
  ...{ walk: WALK, branch: 0, lineage: [{ branch: 0, from: 0 }], next: 4, hash: 'h', procedure: 'p' },
  ...{ job: '', joint: '', purpose: '', openedAt: '2026-06-01T00:00:00.000Z', lastAt: '2026-06-01T00:00:00.000Z' },
  ...more,
});
const standing = (more: Partial<StandingRow> = {}): StandingRow => ({
  ...{ walk: WALK, branch: 0, confirmed: 4, blocked: null, sentAt: null, forked: false },
  ...more,
});

describe('clearing away', () => {
  const kept = { heads: [head()], standings: [standing()], outbox: [], blobs: [] };
  const over = () => true;

  it('lets a walk go that is over, confirmed and 60 days old', () => {
    expect(walksToPrune(kept, over, NOW)).toEqual([WALK]);
    const fresh = new Date(NOW - KEEP_DAYS * DAY).toISOString();
    expect(walksToPrune({ ...kept, heads: [head({ lastAt: fresh })] }, over, NOW)).toEqual([]);
    expect(walksToPrune({ ...kept, standings: [standing({ sentAt: fresh })] }, over, NOW)).toEqual([]);
  });

  it('keeps whatever is in doubt (I5)', () => {
    expect(walksToPrune(kept, () => false, NOW)).toEqual([]);
    expect(walksToPrune({ ...kept, standings: [] }, over, NOW)).toEqual([]);
    expect(walksToPrune({ ...kept, standings: [standing({ confirmed: 3 })] }, over, NOW)).toEqual([]);
    expect(walksToPrune({ ...kept, standings: [standing({ forked: true })] }, over, NOW)).toEqual([]);
    const blob = { sha256: 'f', walk: WALK, contentType: '', bytes: new ArrayBuffer(0), refused: null, at: '' };
    expect(walksToPrune({ ...kept, blobs: [{ ...blob, waiting: 1 }] }, over, NOW)).toEqual([]);
    expect(walksToPrune({ ...kept, blobs: [{ ...blob, waiting: 0 }] }, over, NOW)).toEqual([WALK]);
  });
});

describe('what the server holds beyond this tablet (fault 20)', () => {
  const row = { id: WALK, next: 6, writer: TABLET, forked: false, state: 'walking' } as never;

  it('is a loss where this tablet wrote it, a growth where the office did', () => {
    expect(aheadAtServer([row], [], [], TABLET)).toEqual({ grown: [], lost: [WALK] });
    expect(aheadAtServer([row], [head()], [standing()], TABLET)).toEqual({ grown: [WALK], lost: [WALK] });
    const office = { ...(row as object), writer: 'office' } as never;
    expect(aheadAtServer([office], [head()], [standing()], TABLET)).toEqual({ grown: [WALK], lost: [] });
    expect(aheadAtServer([office], [], [], TABLET)).toEqual({ grown: [], lost: [] });
  });

  it('is not asked about while our own events wait, nor when the walk is over and gone', () => {
    expect(aheadAtServer([row], [head()], [standing({ confirmed: 2 })], TABLET)).toEqual({ grown: [], lost: [] });
    const finished = { ...(row as object), state: 'finished' } as never;
    expect(aheadAtServer([finished], [], [], TABLET)).toEqual({ grown: [], lost: [] });
  });
});

describe('what the browser tells of its storage', () => {
  it('is passed on, and unknown where it tells nothing', async () => {
    const storage = {
      estimate: () => Promise.resolve({ usage: 5, quota: 10 }),
      persisted: () => Promise.resolve(true),
      persist: () => Promise.resolve(true),
    } as StorageManager;
    expect(await storageRoom(storage)).toEqual({ usedBytes: 5, quotaBytes: 10, persisted: true });
    expect(await askToPersist(storage)).toBe(true);
    expect(await storageRoom(undefined)).toEqual({ usedBytes: null, quotaBytes: null, persisted: null });
    expect(await askToPersist({} as StorageManager)).toBe(false);
  });
});
