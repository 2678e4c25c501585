import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Receipt } from '@shared/contracts/sync.contract';
import { clusterVariable, openTestCluster } from '../support/testCluster.mjs';
import type { Reply } from './support/calls';
import { startRealServer, type RealServer } from './support/realServer';
import { holdShop } from './support/shopLock';
import { stored, storedHashes } from './support/stored';
import { enrolledTablet, walked, type TabletWalk, type TestTablet } from './support/testTablet';
import { makeTestShop } from './support/testShop';

/*
 * Fault 5: the database is killed with all its backends. It writes to the disk here (the stage's own cluster may not),
 * and it is a cluster of this file's own, since nobody else may notice.
 */

let cluster: Awaited<ReturnType<typeof openTestCluster>>;
let shared: string | undefined;
let server: RealServer;
let tablet: TestTablet;

beforeAll(async () => {
  cluster = await openTestCluster({ fsync: true });
  shared = process.env[clusterVariable];
  process.env[clusterVariable] = JSON.stringify(cluster.settings);
  server = await startRealServer();
  tablet = await enrolledTablet(server, await makeTestShop(server.deps));
}, 120_000);
afterAll(async () => {
  await server.close();
  process.env[clusterVariable] = shared;
  await cluster.close();
});

const EVENTS = 40;
const fortyEvents = { until: (_: unknown, book: { events: readonly unknown[] }) => book.events.length >= EVENTS };
const begun = (): Promise<TabletWalk> => walked(tablet, fortyEvents);
const hashes = (walk: TabletWalk, to?: number): string[] => walk.log.signed.slice(0, to).map(({ hash }) => hash);

const receiptOf = (reply: Reply): Receipt => {
  expect(reply.status, JSON.stringify(reply.body)).toBe(200);
  return reply.body as unknown as Receipt;
};

const fsyncNow = async () => (await stored<{ fsync: string }>(server, 'show fsync'))[0]?.fsync;

/** A tablet that sends in small batches until it gets no receipt; what it was told is stored stands in `acknowledged`. */
const sendUntilRefused = async (walk: TabletWalk, onReceipt: () => void) => {
  let acknowledged = 0;
  while (acknowledged < EVENTS) {
    const reply = await walk.send(acknowledged, acknowledged + 2);
    if (reply.status !== 200) return { acknowledged, refusal: reply };
    acknowledged = receiptOf(reply).next;
    onReceipt();
  }
  return { acknowledged, refusal: null };
};

describe('a database killed with every backend (fault 5)', () => {
  it('between insert and commit: nothing is acknowledged, nothing stored, and the server goes on by itself', async () => {
    expect(await fsyncNow()).toBe('on');
    const walk = await begun();
    receiptOf(await walk.send(0, 10));
    const lock = await holdShop(server, tablet.shop.id);
    const sent = walk.send(10, 30);
    const { inserted } = await lock.untilWaiting(1);
    await cluster.kill9();
    expect(inserted).toBe(1);
    const refused = await sent;
    expect([refused.status, refused.body.error?.code]).toEqual([503, 'server.database']);
    const meanwhile = await walk.send(10, 30);
    expect([meanwhile.status, meanwhile.body.error?.code]).toEqual([503, 'server.database']);

    await cluster.start();
    await lock.release();
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, 10));
    expect(receiptOf(await walk.send(10, 30))).toMatchObject({ accepted: 20, next: 30 });
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, 30));
  });

  it.each([9, 30, 55])(
    'after %i receipts, in the middle of others: every row that was acknowledged is there, none is double',
    async (count) => {
      const walks = await Promise.all(Array.from({ length: 5 }, begun));
      let receipts = 0;
      let enough: () => void;
      const reached = new Promise<void>((resolve) => (enough = resolve));
      const onReceipt = () => {
        receipts += 1;
        if (receipts === count) enough();
      };
      const sending = Promise.all(walks.map((walk) => sendUntilRefused(walk, onReceipt)));
      await reached;
      await cluster.kill9();
      const outcomes = await sending;
      const refusals = outcomes.map(({ refusal }) => refusal).filter((refusal) => refusal !== null);
      expect(refusals.length).toBeGreaterThan(0);
      for (const refusal of refusals) {
        expect([refusal.status, refusal.body.error?.code]).toEqual([503, 'server.database']);
      }

      await cluster.start();
      for (const [index, walk] of walks.entries()) {
        const kept = await storedHashes(server, walk.id);
        const acknowledged = outcomes[index]?.acknowledged ?? 0;
        // What was acknowledged, and at most the one batch whose receipt was lost: never a hole, never a part of it.
        expect([acknowledged, acknowledged + 2]).toContain(kept.length);
        expect(kept).toEqual(hashes(walk, kept.length));
      }

      for (const walk of walks) {
        expect(receiptOf(await walk.send())).toMatchObject({ next: EVENTS, quarantined: [] });
        expect(await storedHashes(server, walk.id)).toEqual(hashes(walk));
      }
    },
  );
});
