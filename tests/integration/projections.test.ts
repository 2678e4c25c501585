import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { CatalogueAnswer } from '@shared/contracts/catalogue.contract';
import type { Receipt } from '@shared/contracts/sync.contract';
import { sha256Hex } from '../../server/deps';
import { FoldCache } from '../../server/modules/sync/foldCache';
import { rebuildWalk } from '../../server/modules/walks/rebuildWalk.usecases';
import { withShop } from '../../server/tenancy/withShop';
import { doWaitingWork } from '../../server/workers/outboxWorker';
import { signedIn } from './support/calls';
import { stored } from './support/stored';
import { enrolledTablet, walked, type TabletWalk, type TestTablet } from './support/testTablet';
import { makeJob, makeTestShop, type TestShop } from './support/testShop';
import { startTestServer, type TestServer } from './support/testServer';

let server: TestServer;
let shop: TestShop;
let tablet: TestTablet;

beforeAll(async () => {
  server = await startTestServer();
  shop = await makeTestShop(server.deps);
  tablet = await enrolledTablet(server, shop);
});
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

const catalogueSince = async (since: number, epoch: string): Promise<CatalogueAnswer> => {
  const reply = await tablet.get(`/api/tablet/catalogue?since=${since}&epoch=${epoch}`);
  expect(reply.status).toBe(200);
  return reply.body as unknown as CatalogueAnswer;
};

describe('what is derived from a chain (decision 14)', () => {
  const tables: [string, string][] = [
    ['walks', 'id'],
    ['walk_hands', 'walk_id'],
    ['deviations', 'walk_id'],
    ['walk_blobs', 'walk_id'],
  ];
  const derived = async (walk: TabletWalk) =>
    Object.fromEntries(
      await Promise.all(
        tables.map(async ([table, column]) => {
          const sql = `select to_jsonb(t) - 'changed' as row from ${table} t where ${column} = $1 order by to_jsonb(t)::text`;
          return [table, await stored(server, sql, [walk.id])] as const;
        }),
      ),
    ) as Record<string, unknown[]>;

  it('is made again from it to equal rows, whatever was remembered', async () => {
    const slips = [
      { at: { pass: 'p3', hole: 'h5' }, kind: 'value' as const, value: '104' },
      { at: { pass: 'p2', hole: 'h2' }, kind: 'typedWrong' as const, value: '6', reason: 'a digit is missing' },
    ];
    const walk = await walked(tablet, { slips });
    expect((await walk.send()).status).toBe(200);
    const before = await derived(walk);
    expect(before['deviations']?.length).toBeGreaterThan(1);
    await stored(server, `update walks set readings_done = 0, state = 'walking', used_holes = '[]' where id = $1`, [
      walk.id,
    ]);
    await stored(server, `update deviations set status = 'open' where walk_id = $1`, [walk.id]);
    server.deps.folds = new FoldCache();
    await withShop(server.deps.client, shop.id, (tx) => rebuildWalk(server.deps, tx, walk.id));
    expect(await derived(walk)).toEqual(before);
  });
});

describe('the catalogue (decision 9)', () => {
  it('comes whole at first, then only what changed, and whole again for another epoch or a cursor from the future', async () => {
    const first = await catalogueSince(0, '');
    expect(first).toMatchObject({ full: true, settings: { id: shop.id } });
    expect(first.people).toHaveLength(6);
    expect(first.wrenches).toHaveLength(shop.wrenches.length);
    expect(first.procedures.map(({ code, revision, state }) => [code, revision, state])).toEqual([
      ['HEAD-D6', 4, 'approved'],
    ]);
    const same = await catalogueSince(first.cursor, first.epoch);
    expect(same).toMatchObject({ full: false, settings: null, people: [], wrenches: [], jobs: [], procedures: [] });
    const clerk = await signedIn(server, shop.people.clerk);
    await clerk.send('PATCH', `/api/jobs/${shop.job}`, { claim: 'WR-90000' });
    const next = await catalogueSince(first.cursor, first.epoch);
    expect(next.jobs.map(({ id, claim }) => [id, claim])).toEqual([[shop.job, 'WR-90000']]);
    expect(next.cursor).toBeGreaterThan(first.cursor);
    expect((await catalogueSince(next.cursor, 'another')).full).toBe(true);
    expect((await catalogueSince(next.cursor + 1000, first.epoch)).full).toBe(true);
  });

  it('tells what an earlier walk left on a joint (W1)', async () => {
    const made = await withShop(server.deps.client, shop.id, (tx) => makeJob(tx, 'HEAD-D6', 'W1-1'));
    const before = await catalogueSince(0, '');
    const earlierOf = (answer: CatalogueAnswer) => answer.joints.find(({ id }) => id === made.joint)?.earlier;
    expect(earlierOf(before)).toEqual({ readingsTaken: false, usedHoles: [] });
    const plan = { until: (_: unknown, book: { state: { readings: unknown[] } }) => book.state.readings.length >= 30 };
    const walk = await walked(tablet, plan, { job: made.id, joint: made.joint });
    await walk.send();
    expect(earlierOf(await catalogueSince(before.cursor, before.epoch))).toEqual({
      readingsTaken: true,
      usedHoles: ['h1', 'h2'],
    });
  });

  it('never misses a row that was committed while others were: the counter goes in the order of commits', async () => {
    const { cursor, epoch } = await catalogueSince(0, '');
    const clerk = await signedIn(server, shop.people.clerk);
    const seen = new Set<string>();
    let at = cursor;
    const opening = Promise.all(
      Array.from({ length: 20 }, (_, index) => clerk.send('POST', '/api/jobs', { number: `C-${index}` })),
    );
    for (let rounds = 0; rounds < 40; rounds += 1) {
      const answer = await catalogueSince(at, epoch);
      at = answer.cursor;
      for (const { number } of answer.jobs) seen.add(number);
      if (seen.size >= 20) break;
    }
    await opening;
    for (const { number } of (await catalogueSince(at, epoch)).jobs) seen.add(number);
    expect([...seen].filter((number) => number.startsWith('C-'))).toHaveLength(20);
  });
});

describe('photos and files (fault 18)', () => {
  const photo = new TextEncoder().encode('bytes of a photo');
  const address = sha256Hex(photo);
  const put = (to: string, bytes: Uint8Array) => tablet.send('PUT', `/api/tablet/blobs/${to}`, bytes);

  it('are waited for by name, and the walk is complete when they are held', async () => {
    const walk = await walked(tablet, { until: (_, book) => book.events.length >= 6 });
    const by = walk.log.book.state.hands.records;
    await walk.log.issue({ type: 'photo.added', by, data: { blob: address, hole: null, caption: 'the deck' } });
    const receipt = (await walk.send()).body as unknown as Receipt;
    expect(receipt.missingBlobs).toEqual([address]);
    const missing = async () => stored(server, 'select missing_blobs from walks where id = $1', [walk.id]);
    expect(await missing()).toEqual([{ missing_blobs: 1 }]);

    const wrong = await put(address, new TextEncoder().encode('other bytes'));
    expect([wrong.status, wrong.body.error?.code]).toEqual([400, 'blob.wrongHash']);
    const empty = await put(address, new Uint8Array());
    expect([empty.status, empty.body.error?.code]).toEqual([400, 'blob.empty']);
    const large = await put(address, new Uint8Array(2 * 1024 * 1024 + 1));
    expect([large.status, large.body.error?.code]).toEqual([413, 'blob.tooLarge']);
    expect(await missing()).toEqual([{ missing_blobs: 1 }]);

    expect((await put(address, photo)).body).toEqual({ sha256: address, bytes: photo.length });
    expect((await put(address, photo)).status).toBe(200);
    expect(await missing()).toEqual([{ missing_blobs: 0 }]);
    const again = (await walk.send()).body as unknown as Receipt;
    expect(again.missingBlobs).toEqual([]);
    const supervisor = await signedIn(server, shop.people.supervisor);
    const reply = await supervisor.get(`/api/blobs/${address}`);
    expect([reply.status, new TextDecoder().decode(reply.bytes)]).toEqual([200, 'bytes of a photo']);
    expect(reply.headers.get('content-disposition')).toMatch(/^attachment/);
  });
});

describe('work after a commit (decision 15)', () => {
  it('verifies what was stored once for many small batches, and is done', async () => {
    const walk = await walked(tablet, { until: (_, book) => book.events.length >= 9 });
    for (let index = 0; index < 9; index += 1) await walk.send(index, index + 1);
    const waiting = () =>
      stored<{ done: boolean; attempts: number }>(
        server,
        `select done_at is not null as done, attempts from outbox where payload->>'walk' = $1`,
        [walk.id],
      );
    expect(await waiting()).toEqual([{ done: false, attempts: 0 }]);
    await doWaitingWork(server.deps);
    expect(await waiting()).toEqual([{ done: false, attempts: 0 }]);
    server.pass(10_001);
    await Promise.all([doWaitingWork(server.deps), doWaitingWork(server.deps)]);
    expect(await waiting()).toEqual([{ done: true, attempts: 0 }]);
  });
});
