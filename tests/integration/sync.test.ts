import net from 'node:net';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { Receipt } from '@shared/contracts/sync.contract';
import { sealEvent } from '@shared/record/chain';
import type { Envelope } from '@shared/record/envelope';
import { canonicalJson } from '@shared/record/canonicalJson';
import { sha256Hex } from '../../server/deps';
import { makeTestSigner, testCrypto } from '../support/testSigner';
import type { Reply } from './support/calls';
import { stored, storedHashes } from './support/stored';
import { enrolledTablet, walked, type TabletWalk, type TestTablet } from './support/testTablet';
import { makeJob, makeTestShop } from './support/testShop';
import { withShop } from '../../server/tenancy/withShop';
import { startTestServer, type TestServer } from './support/testServer';

let server: TestServer;
let tablet: TestTablet;

beforeAll(async () => {
  server = await startTestServer();
  tablet = await enrolledTablet(server, await makeTestShop(server.deps));
});
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

const receiptOf = (reply: Reply): Receipt => {
  expect(reply.status, JSON.stringify(reply.body)).toBe(200);
  return reply.body as unknown as Receipt;
};

const fortyEvents = { until: (_: unknown, book: { events: readonly unknown[] }) => book.events.length >= 40 };
const begun = (): Promise<TabletWalk> => walked(tablet, fortyEvents);
const hashes = (walk: TabletWalk, to?: number): string[] => walk.log.signed.slice(0, to).map(({ hash }) => hash);
const withoutAccepted = ({ accepted: _accepted, ...rest }: Receipt) => rest;

describe('a batch', () => {
  it('stores a whole walk: 56 final readings, signed, countersigned, released, every PIN accepted', async () => {
    const walk = await walked(tablet);
    const receipt = receiptOf(await walk.send());
    expect(receipt).toMatchObject({ accepted: walk.log.signed.length, next: walk.log.signed.length, quarantined: [] });
    expect(receipt.confirmations.map(({ meaning, result }) => [meaning, result])).toEqual([
      ['tightenedAsRecorded', 'accepted'],
      ['recordedAsTold', 'accepted'],
      ['checkedRecordAndJoint', 'accepted'],
    ]);
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk));
    const [row] = await stored(
      server,
      'select state, readings_done, readings_due, refused_seals, writer from walks where id = $1',
      [walk.id],
    );
    expect(row).toEqual({ state: 'finished', readings_done: 56, readings_due: 56, refused_seals: 0, writer: 'office' });
    expect(await stored(server, 'select head_hash from ledger where walk_id = $1', [walk.id])).toEqual([
      { head_hash: receipt.hash },
    ]);
  });

  it('is answered with the same receipt when its reply was lost, and adds nothing (fault 6)', async () => {
    const walk = await begun();
    const first = receiptOf(await walk.send());
    const again = receiptOf(await walk.send());
    expect(again.accepted).toBe(0);
    expect(withoutAccepted(again)).toEqual(withoutAccepted(first));
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk));
  });

  it('delivered twice at the same moment is stored once, and both get the same receipt (fault 7)', async () => {
    const walk = await begun();
    const receipts = (await Promise.all(Array.from({ length: 6 }, () => walk.send()))).map(receiptOf);
    expect(receipts.map(({ accepted }) => accepted).sort((a, b) => b - a)).toEqual([40, 0, 0, 0, 0, 0]);
    expect(new Set(receipts.map((one) => JSON.stringify(withoutAccepted(one)))).size).toBe(1);
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk));
  });

  it('that overlaps what is stored adds only what is new (fault 8)', async () => {
    const walk = await begun();
    expect(receiptOf(await walk.send(0, 20)).accepted).toBe(20);
    expect(receiptOf(await walk.send(10, 30)).accepted).toBe(10);
    expect(receiptOf(await walk.send(5, 25))).toMatchObject({ accepted: 0, next: 30 });
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, 30));
  });

  it('with a hole before it is refused with the number expected, and stores nothing (fault 8)', async () => {
    const walk = await begun();
    const early = await walk.send(10, 20);
    expect([early.status, early.body.error?.code]).toEqual([409, 'batch.hole']);
    expect(early.body.error?.details).toEqual({ branch: 0, expectedSeq: 0 });
    receiptOf(await walk.send(0, 10));
    const later = await walk.send(15, 20);
    expect(later.body.error).toMatchObject({ code: 'batch.hole', details: { branch: 0, expectedSeq: 10 } });
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, 10));
  });

  it('cut off at any byte leaves nothing behind (fault 9)', async () => {
    const walk = await begun();
    const body = Buffer.from(JSON.stringify(walk.batch(0, 6)));
    const head = [
      `POST /api/tablet/walks/${walk.id}/events HTTP/1.1`,
      'Host: localhost',
      `Authorization: Bearer ${tablet.enrolled.token}`,
      'Content-Type: application/json',
      `Content-Length: ${body.length}`,
    ].join('\r\n');
    const whole = Buffer.concat([Buffer.from(`${head}\r\n\r\n`), body]);
    const port = Number(new URL(server.url).port);
    const cutAt = (byte: number) =>
      new Promise<void>((resolve) => {
        const socket = net.connect(port, '127.0.0.1', () => {
          socket.write(whole.subarray(0, byte), () => socket.destroy());
        });
        socket.on('error', () => resolve());
        socket.on('close', () => resolve());
      });
    for (let byte = 1; byte < whole.length; byte += 61) await cutAt(byte);
    await cutAt(whole.length - 1);
    expect(await storedHashes(server, walk.id)).toEqual([]);
    expect(receiptOf(await walk.send(0, 6)).accepted).toBe(6);
  });

  it('larger than the limit is refused as such', async () => {
    const walk = await begun();
    const [event] = walk.log.signed;
    const large = { ...walk.batch(0, 1), padding: 'x'.repeat(5_000_000) };
    const reply = await tablet.send('POST', `/api/tablet/walks/${walk.id}/events`, large);
    expect([reply.status, reply.body.error?.code]).toEqual([413, 'batch.tooLarge']);
    const many = { branch: 0, events: Array.from({ length: 501 }, () => event), seals: [] };
    const tooMany = await tablet.send('POST', `/api/tablet/walks/${walk.id}/events`, many);
    expect([tooMany.status, tooMany.body.error?.code]).toEqual([400, 'request.invalid']);
  });
});

/** An event like another but for some fields, properly hashed and signed. */
const forged = async (walk: TabletWalk, index: number, change: Partial<Envelope>, signer = tablet.key.signer) => {
  const envelope = JSON.parse(walk.log.signed[index]?.text ?? '{}') as Envelope;
  return sealEvent({ ...envelope, ...change }, signer, testCrypto);
};

const sendEvents = (walk: TabletWalk, events: unknown[]) =>
  tablet.send('POST', `/api/tablet/walks/${walk.id}/events`, { branch: 0, events, seals: [] });

describe('a batch that is wrong in itself stores nothing and says why', () => {
  const cases: [string, (walk: TabletWalk) => Promise<unknown[]>, string][] = [
    ['unsigned', async (walk) => Promise.resolve([{ ...walk.log.signed[0], sig: '' }]), 'batch.badSignature'],
    [
      'signed by another key',
      async (walk) => [await forged(walk, 0, {}, (await makeTestSigner()).signer)],
      'batch.badSignature',
    ],
    [
      'changed after signing',
      async (walk) => {
        const [event] = walk.log.signed;
        const text = event?.text.replace('"finalAssembly"', '"trialFit"') ?? '';
        return Promise.resolve([{ ...event, text, hash: sha256Hex(text) }]);
      },
      'batch.badSignature',
    ],
    [
      'of a wrong hash',
      async (walk) => Promise.resolve([{ ...walk.log.signed[0], hash: '0'.repeat(64) }]),
      'batch.wrongHash',
    ],
    [
      'not canonical',
      async (walk) => {
        const text = ` ${walk.log.signed[0]?.text ?? ''}`;
        return Promise.resolve([{ ...walk.log.signed[0], text, hash: sha256Hex(text) }]);
      },
      'batch.notCanonical',
    ],
    [
      'of an unknown version',
      async (walk) => {
        const envelope = JSON.parse(walk.log.signed[0]?.text ?? '{}') as Envelope;
        const text = canonicalJson({ ...envelope, v: 2 });
        return Promise.resolve([{ ...walk.log.signed[0], text, hash: sha256Hex(text) }]);
      },
      'batch.unknownVersion',
    ],
    ['of an unknown kind', async (walk) => [await forged(walk, 0, { type: 'walk.danced' })], 'batch.unknownType'],
    [
      'of another shop',
      async (walk) => [await forged(walk, 0, { shop: '01900000-0000-7000-8000-0000000000a0' })],
      'batch.otherShop',
    ],
    [
      'of another walk',
      async (walk) => [await forged(walk, 0, { walk: '01900000-0000-7000-8000-0000000000b0' })],
      'batch.otherWalk',
    ],
    [
      'by another tablet',
      async (walk) => [await forged(walk, 0, { tablet: '01900000-0000-7000-8000-0000000000d0' })],
      'batch.otherTablet',
    ],
    [
      'with a gap inside',
      async (walk) => Promise.resolve([walk.log.signed[0], walk.log.signed[2]]),
      'batch.notConsecutive',
    ],
  ];
  it.each(cases)('%s', async (_name, eventsOf, code) => {
    const walk = await begun();
    const reply = await sendEvents(walk, await eventsOf(walk));
    expect([reply.status, reply.body.error?.code]).toEqual([400, code]);
    expect(await storedHashes(server, walk.id)).toEqual([]);
    expect(await stored(server, 'select hash from quarantined_events where walk_id = $1', [walk.id])).toEqual([]);
  });

  it.each([
    ['no JSON', 'application/json', '{"branch":0,', 400, 'body.notJson'],
    ['no JSON type', 'text/plain', 'hello', 415, 'body.wrongType'],
    ['JSON of another shape', 'application/json', '[]', 400, 'request.invalid'],
  ])('%s', async (_name, type, body, status, code) => {
    const walk = await begun();
    const headers = { authorization: `Bearer ${tablet.enrolled.token}`, 'content-type': type };
    const response = await fetch(`${server.url}/api/tablet/walks/${walk.id}/events`, { method: 'POST', headers, body });
    const answer = (await response.json()) as { error: { code: string } };
    expect([response.status, answer.error.code]).toEqual([status, code]);
  });
});

describe('an event the rules refuse', () => {
  const readingIndex = (walk: TabletWalk) =>
    walk.log.signed.findIndex(({ text }) => text.includes('"type":"reading.taken"'));

  const withReading = async (change: Record<string, unknown>) => {
    const walk = await walked(tablet, { until: (_, book) => book.state.readings.length >= 3 });
    const index = readingIndex(walk);
    const envelope = JSON.parse(walk.log.signed[index]?.text ?? '{}') as Envelope<string, Record<string, unknown>>;
    const bad = await forged(walk, index, { data: { ...envelope.data, ...change } });
    const next = JSON.parse(walk.log.signed[index + 1]?.text ?? '{}') as Envelope;
    const follower = await sealEvent({ ...next, prev: bad.hash }, tablet.key.signer, testCrypto);
    return { walk, index, bad, follower };
  };

  it.each([
    ['a hole that does not exist', { hole: 'h99' }, 'unknownHole'],
    ['a figure that is none', { value: { value: '1O.5', unit: 'N.m' } }, 'event.malformed'],
    ['a figure with a decimal comma', { value: { value: '30,5', unit: 'N.m' } }, 'event.malformed'],
    ['a verdict that is not what the rules make of it', { verdict: 'under' }, 'event.notAsDecided'],
    ['no value at all', { value: null }, 'event.malformed'],
  ])('is kept in quarantine with what follows: %s', async (_name, change, code) => {
    const { walk, index, bad, follower } = await withReading(change);
    const receipt = receiptOf(await sendEvents(walk, [...walk.log.signed.slice(0, index), bad, follower]));
    expect(receipt.next).toBe(index);
    expect(receipt.quarantined.map((one) => [one.hash, one.code])).toEqual([
      [bad.hash, code],
      [follower.hash, 'event.followsRefused'],
    ]);
    expect(await storedHashes(server, walk.id)).toEqual(hashes(walk, index));
    const kept = await stored<{ text: string }>(
      server,
      `select convert_from(bytes, 'UTF8') as text from quarantined_events where walk_id = $1 order by seq`,
      [walk.id],
    );
    expect(kept).toEqual([{ text: bad.text }, { text: follower.text }]);
    const again = receiptOf(await sendEvents(walk, [bad, follower]));
    expect(again.quarantined).toHaveLength(2);
  });

  it('does not stop what comes later on the same chain from being kept', async () => {
    const { walk, index, bad, follower } = await withReading({ hole: 'h99' });
    receiptOf(await sendEvents(walk, [...walk.log.signed.slice(0, index), bad]));
    const receipt = receiptOf(await sendEvents(walk, [follower]));
    expect(receipt.quarantined.map((one) => one.code)).toEqual(['event.followsRefused']);
  });

  it('says so where the walk itself cannot begin: an unknown joint, an unknown procedure', async () => {
    const unknown = '01900000-0000-7000-8000-0000000000c9';
    const walk = await walked(tablet, { until: (_, book) => book.events.length >= 3 }, { joint: unknown });
    const receipt = receiptOf(await walk.send());
    expect(receipt).toMatchObject({ next: 0, accepted: 0 });
    expect(receipt.quarantined[0]?.code).toBe('event.jointUnknown');
    const other = await walked(tablet, { until: (_, book) => book.events.length >= 2 }, { revision: 9 });
    expect(receiptOf(await other.send()).quarantined[0]?.code).toBe('event.procedureUnknown');
  });

  it('holds a shop of one that never was to account', async () => {
    const policy = { judgement: 'simple', countersign: 'required', shopOfOne: true } as const;
    const walk = await walked(tablet, { until: (_, book) => book.events.length >= 2 }, { policy });
    expect(receiptOf(await walk.send()).quarantined[0]?.code).toBe('event.neverShopOfOne');
  });
});

describe('many tablets at once', () => {
  it('that bring whole walks signed by the same people wait for each other and never in a circle', async () => {
    const shop = await makeTestShop(server.deps);
    const joints = await Promise.all(
      [1, 2, 3, 4, 5, 6].map((n) => withShop(server.deps.client, shop.id, (tx) => makeJob(tx, 'HEAD-D6', `M-${n}`))),
    );
    const tablets = await Promise.all(joints.map(() => enrolledTablet(server, shop)));
    const { technician, colleague } = shop.people;
    const walks = await Promise.all(
      tablets.map((one, index) => {
        const { id: job, joint = '' } = joints[index] ?? { id: '' };
        const hands = index % 2 === 0 ? [technician.id, colleague.id] : [colleague.id, technician.id];
        return walked(one, {}, { job, joint, pulls: hands[0] ?? '', records: hands[1] ?? '' });
      }),
    );
    const receipts = (await Promise.all(walks.map((walk) => walk.send()))).map(receiptOf);
    for (const { confirmations } of receipts) {
      expect(confirmations.map(({ result }) => result)).toEqual(['accepted', 'accepted', 'accepted']);
    }
    const lines = await stored<{ seq: number; prev: string; hash: string }>(
      server,
      'select seq, prev, hash from ledger where shop_id = $1 order by seq',
      [shop.id],
    );
    expect(lines.map(({ seq }) => seq)).toEqual([0, 1, 2, 3, 4, 5]);
    expect(lines.map(({ prev }) => prev)).toEqual(['0'.repeat(64), ...lines.slice(0, -1).map(({ hash }) => hash)]);
  });
});

describe('a fork (fault 11)', () => {
  it('opens another branch, keeps both whole and asks for a choice', async () => {
    const walk = await begun();
    receiptOf(await walk.send(0, 40));
    const envelope = JSON.parse(walk.log.signed[20]?.text ?? '{}') as Envelope;
    const note = { text: 'written after a clock was lost', hole: null };
    const other = await sealEvent({ ...envelope, type: 'note.added', data: note }, tablet.key.signer, testCrypto);
    const receipt = receiptOf(await sendEvents(walk, [other]));
    expect(receipt).toMatchObject({ branch: 1, forked: true, accepted: 1, next: 21, hash: other.hash });
    expect(await storedHashes(server, walk.id)).toEqual([...hashes(walk), other.hash]);
    const [row] = await stored(server, 'select branch, next_seq, forked from walks where id = $1', [walk.id]);
    expect(row).toEqual({ branch: 0, next_seq: 40, forked: true });
    const whole = await tablet.get(`/api/tablet/walks/${walk.id}?branch=1`);
    const chain = whole.body as unknown as { events: { hash: string }[] };
    expect(chain.events.map(({ hash }) => hash)).toEqual([...hashes(walk, 20), other.hash]);
  });
});

describe('the clock (fault 10)', () => {
  it('may jump: the order stays, and the record says so', async () => {
    const walk = await begun();
    const index = 12;
    const envelope = JSON.parse(walk.log.signed[index]?.text ?? '{}') as Envelope;
    const jumped = await forged(walk, index, { at: '1970-01-01T00:00:05.000Z', mono: envelope.mono });
    const receipt = receiptOf(await sendEvents(walk, [...walk.log.signed.slice(0, index), jumped]));
    expect(receipt).toMatchObject({ next: index + 1, quarantined: [] });
    const rows = await stored<{ flags: string[] }>(server, 'select flags from walk_events where hash = $1', [
      jumped.hash,
    ]);
    expect(rows).toEqual([{ flags: ['clockJumped'] }]);
  });
});
