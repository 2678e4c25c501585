import net from 'node:net';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { Receipt } from '@shared/contracts/sync.contract';
import type { Reply } from './support/calls';
import { cuttingProxy } from './support/cuttingProxy';
import { startRealServer, type RealServer } from './support/realServer';
import { holdShop, untilSettled } from './support/shopLock';
import { storedHashes } from './support/stored';
import { enrolledTablet, walked, type TabletWalk, type TestTablet } from './support/testTablet';
import { makeTestShop } from './support/testShop';

/*
 * The server in a process of its own, killed and cut off at moments that a lock holds still. What is proved with a server
 * inside the test (sync.test.ts) is not proved again here.
 */

let server: RealServer;
let tablet: TestTablet;

beforeAll(async () => {
  server = await startRealServer();
  tablet = await enrolledTablet(server, await makeTestShop(server.deps));
}, 120_000);
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

const thirtyEvents = { until: (_: unknown, book: { events: readonly unknown[] }) => book.events.length >= 30 };
const begun = (): Promise<TabletWalk> => walked(tablet, thirtyEvents);
const hashes = (walk: TabletWalk, to?: number): string[] => walk.log.signed.slice(0, to).map(({ hash }) => hash);
const withoutAccepted = ({ accepted: _accepted, ...rest }: Receipt) => rest;

const receiptOf = (reply: Reply): Receipt => {
  expect(reply.status, JSON.stringify(reply.body)).toBe(200);
  return reply.body as unknown as Receipt;
};

/** The request as a tablet's browser would write it. */
const requestOf = (walk: TabletWalk, from: number, to: number): Buffer => {
  const body = JSON.stringify(walk.batch(from, to));
  const head = [
    `POST /api/tablet/walks/${walk.id}/events HTTP/1.1`,
    'Host: localhost',
    `Authorization: Bearer ${tablet.enrolled.token}`,
    'Content-Type: application/json',
    `Content-Length: ${Buffer.byteLength(body)}`,
  ];
  return Buffer.from(`${head.join('\r\n')}\r\n\r\n${body}`);
};

describe('a server killed between insert and commit (fault 4)', () => {
  it('has acknowledged nothing and stored nothing; the batch sent again is stored whole', async () => {
    const walk = await begun();
    expect(receiptOf(await walk.send(0, 10)).accepted).toBe(10);
    const lock = await holdShop(server, tablet.shop.id);
    const sent = walk.send(10, 30).then(
      (reply) => `answered ${reply.status}`,
      () => 'no answer',
    );
    const { inserted } = await lock.untilWaiting(1);
    await server.process.kill9();
    await lock.release();
    expect(inserted).toBe(1);
    expect(await sent).toBe('no answer');
    await untilSettled(server);
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, 10));

    await server.process.restart();
    expect(receiptOf(await walk.send(10, 30))).toMatchObject({ accepted: 20, next: 30, quarantined: [] });
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk));
  });

  it('judges on what is stored, not on what it remembered: a walk goes on at another process', async () => {
    const walk = await begun();
    receiptOf(await walk.send(0, 15));
    await server.process.kill9();
    await server.process.restart();
    expect(receiptOf(await walk.send(12, 30))).toMatchObject({ accepted: 15, next: 30 });
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk));
  });
});

describe('an answer that never arrived (fault 6)', () => {
  it('is given again as it was to the batch sent again, and not one row is added', async () => {
    const walk = await begun();
    const proxy = await cuttingProxy(server.process.port);
    try {
      await expect(
        fetch(`${proxy.url}/api/tablet/walks/${walk.id}/events`, {
          method: 'POST',
          headers: { authorization: `Bearer ${tablet.enrolled.token}`, 'content-type': 'application/json' },
          body: JSON.stringify(walk.batch(0, 20)),
        }),
      ).rejects.toThrow();
      await expect.poll(() => proxy.swallowed(), { timeout: 10_000 }).toMatch(/\}(\r\n0\r\n\r\n)?$/);
      expect(proxy.swallowed()).toMatch(/^HTTP\/1\.1 200 /);
      expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, 20));

      const lost = JSON.parse(/\{.*\}/s.exec(proxy.swallowed())?.[0] ?? '') as Receipt;
      const again = receiptOf(await walk.send(0, 20));
      expect([lost.accepted, again.accepted]).toEqual([20, 0]);
      expect(withoutAccepted(again)).toEqual(withoutAccepted(lost));
      expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, 20));
    } finally {
      await proxy.close();
    }
  });

  it('does not keep a batch from being stored whole where the tablet hung up after its last byte', async () => {
    const walk = await begun();
    const request = requestOf(walk, 0, 20);
    const lock = await holdShop(server, tablet.shop.id);
    const socket = net.connect(server.process.port, '127.0.0.1');
    socket.on('error', () => undefined);
    await new Promise<void>((resolve) => socket.write(request, () => resolve()));
    await lock.untilWaiting(1);
    socket.destroy();
    await lock.release();
    await untilSettled(server);
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, 20));
    expect(receiptOf(await walk.send(0, 20))).toMatchObject({ accepted: 0, next: 20 });
  });
});

describe('a batch on two connections (fault 7)', () => {
  it('that are both inside at the same moment is stored once, and both get the same receipt', async () => {
    const walk = await begun();
    receiptOf(await walk.send(0, 5));
    const lock = await holdShop(server, tablet.shop.id);
    const both = Promise.all([walk.send(5, 30), walk.send(5, 30)]);
    await lock.untilWaiting(2);
    await lock.release();
    const receipts = (await both).map(receiptOf);
    expect(receipts.map(({ accepted }) => accepted).sort((a, b) => a - b)).toEqual([0, 25]);
    expect(new Set(receipts.map((one) => JSON.stringify(withoutAccepted(one)))).size).toBe(1);
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk));
  });
});

describe('a connection cut inside the request (fault 9)', () => {
  it('leaves no part of the batch behind, wherever it was cut', async () => {
    const walk = await begun();
    receiptOf(await walk.send(0, 5));
    const whole = requestOf(walk, 5, 9);
    const headEnds = whole.indexOf('\r\n\r\n') + 4;
    const cuts = new Set([1, headEnds - 1, headEnds, headEnds + 1, whole.length - 1]);
    for (let byte = 40; byte < whole.length; byte += 97) cuts.add(byte);
    const cutAt = (byte: number) =>
      new Promise<void>((resolve) => {
        const socket = net.connect(server.process.port, '127.0.0.1', () => {
          socket.write(whole.subarray(0, byte), () => setTimeout(() => socket.destroy(), 5));
        });
        socket.on('error', () => resolve());
        socket.on('close', () => resolve());
      });
    await Promise.all([...cuts].map(cutAt));
    await untilSettled(server);
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, 5));
    expect(receiptOf(await walk.send(5, 9))).toMatchObject({ accepted: 4, next: 9 });
  });
});
