import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Receipt } from '@shared/contracts/sync.contract';
import type { OfficeWalk, OfficeWalkWhole } from '@shared/contracts/walks.contract';
import type { ProofWhole, PublicProof } from '@shared/contracts/proofs.contract';
import { canonicalJson } from '@shared/record/canonicalJson';
import { verifyDetached } from '@shared/record/signature';
import { atKind } from '../../db/seed/walker/walkOn';
import { withShop } from '../../server/tenancy/withShop';
import { testCrypto } from '../support/testSigner';
import { anybody, signedIn, type Caller, type Reply } from './support/calls';
import { stored } from './support/stored';
import { enrolledTablet, walked, type TabletWalk, type TestTablet } from './support/testTablet';
import { makeJob, makeTestShop, type TestShop } from './support/testShop';
import { startTestServer, type TestServer } from './support/testServer';

let server: TestServer;
let shop: TestShop;
let tablet: TestTablet;
let supervisor: Caller;
let clerk: Caller;

beforeAll(async () => {
  server = await startTestServer();
  shop = await makeTestShop(server.deps);
  tablet = await enrolledTablet(server, shop);
  supervisor = await signedIn(server, shop.people.supervisor);
  clerk = await signedIn(server, shop.people.clerk);
});
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

let joints = 0;
let place: { job: string; joint: string };
beforeEach(async () => {
  const made = await withShop(server.deps.client, shop.id, (tx) => makeJob(tx, 'HEAD-D6', `25-${(joints += 1)}`));
  place = { job: made.id, joint: made.joint };
});

const bodyOf = <T>(reply: Reply, status = 200): T => {
  expect(reply.status, JSON.stringify(reply.body)).toBe(status);
  return reply.body as unknown as T;
};
const codeOf = (reply: Reply) => [reply.status, reply.body.error?.code];

/** Signed on the tablet and released to the shop without a countersignature there. */
const released = async (more: Parameters<typeof walked>[2] = {}): Promise<TabletWalk> => {
  const walk = await walked(tablet, { until: atKind('countersign') }, { ...place, ...more });
  const { records } = walk.log.book.state.hands;
  await walk.log.issue({ type: 'walk.released', by: records, data: { to: 'shop' } });
  bodyOf<Receipt>(await walk.send());
  return walk;
};
const headOf = (walk: TabletWalk): string => walk.log.signed.at(-1)?.hash ?? '';
const whole = async (walk: TabletWalk) => bodyOf<OfficeWalkWhole>(await supervisor.get(`/api/walks/${walk.id}`));
const { pin } = { pin: '481526' };
const act = (walk: TabletWalk, what: string, body: object, as = supervisor) =>
  as.send('POST', `/api/walks/${walk.id}/${what}`, body);

describe('countersigning at the office', () => {
  it('appends an event signed by the shop over the head that was looked at', async () => {
    const walk = await released();
    const waiting = bodyOf<{ walks: OfficeWalk[] }>(await supervisor.get('/api/walks?waiting=me'));
    expect(waiting.walks.map(({ id }) => id)).toContain(walk.id);
    const body = { head: headOf(walk), pin, meaning: 'checkedRecord' };
    expect(bodyOf<OfficeWalk>(await act(walk, 'countersign', body))).toMatchObject({ state: 'finished' });
    const { events, confirmations, issueBlocks, keys } = await whole(walk);
    const last = events.at(-1);
    expect(JSON.parse(last?.text ?? '{}')).toMatchObject({
      type: 'walk.countersigned',
      tablet: 'office',
      by: shop.people.supervisor.id,
      prev: headOf(walk),
    });
    const signed = await verifyDetached(
      last?.text ?? '',
      last?.sig ?? '',
      new Map(keys.map((key) => [key.kid, key])),
      testCrypto,
    );
    expect(signed.ok).toBe(true);
    expect(confirmations.at(-1)).toMatchObject({ seq: last?.seq, result: 'accepted' });
    expect(issueBlocks).toEqual([]);
    expect(codeOf(await act(walk, 'countersign', body))).toEqual([409, 'walk.headMoved']);
    const twice = await act(walk, 'countersign', { ...body, head: last?.hash });
    expect(codeOf(twice)).toEqual([409, 'signedAlready']);
  });

  it('refuses whoever took readings, a wrong PIN, a walk that a tablet still writes, and everybody without the right', async () => {
    const walk = await released();
    const body = { head: headOf(walk), pin, meaning: 'checkedRecord' };
    expect(codeOf(await act(walk, 'countersign', { ...body, pin: '000000' }))).toEqual([403, 'pin.wrong']);
    expect(codeOf(await act(walk, 'countersign', body, clerk))).toEqual([403, 'right.missing']);
    const writing = await walked(tablet, { until: atKind('countersign') }, place);
    await writing.send();
    const early = await act(writing, 'countersign', { ...body, head: headOf(writing) });
    expect(codeOf(early)).toEqual([409, 'walk.notReleased']);
    const own = await released({ pulls: shop.people.supervisor.id });
    const self = await act(own, 'countersign', { ...body, head: headOf(own) });
    expect(codeOf(self)).toEqual([409, 'ownReadings']);
    const waiting = bodyOf<{ walks: OfficeWalk[] }>(await supervisor.get('/api/walks?waiting=me'));
    expect(waiting.walks.map(({ id }) => id)).not.toContain(own.id);
  });

  it('answers two at the same moment with one signature (fault 25)', async () => {
    const walk = await released();
    const body = { head: headOf(walk), pin, meaning: 'checkedRecord' };
    const replies = await Promise.all([act(walk, 'countersign', body), act(walk, 'countersign', body)]);
    expect(replies.map(({ status }) => status).sort()).toEqual([200, 409]);
  });
});

describe('a countersignature by whoever took readings', () => {
  it('made on a tablet goes into quarantine, never a 500, and the database refuses it by itself', async () => {
    const walk = await walked(tablet, { until: atKind('countersign') }, { ...place, pulls: shop.people.supervisor.id });
    const rules = walk.log.book.attempt({
      type: 'walk.countersigned',
      by: shop.people.supervisor.id,
      data: { meaning: 'checkedRecord', seal: 'a'.repeat(64) },
    });
    expect(rules).toEqual({ ok: false, error: { code: 'ownReadings' } });
    bodyOf<Receipt>(await walk.send());
    const insert = `
      insert into walk_events select shop_id, walk_id, branch, seq + 1, md5(hash), hash, bytes, sig, 'walk.countersigned',
        $2, tablet, at, mono, boot, known, body, flags, received_at
      from walk_events where walk_id = $1 order by seq desc limit 1`;
    await expect(stored(server, insert, [walk.id, shop.people.supervisor.id])).rejects.toMatchObject({ code: 'BW001' });
    await expect(stored(server, insert, [walk.id, shop.people.clerk.id])).resolves.toEqual([]);
  });
});

describe('sending back and taking over', () => {
  it('hands the walk to a tablet again, which answers and signs anew', async () => {
    const walk = await released();
    const items = [{ hole: 'h5', action: 'look', note: 'Is the stripe where it should be?' }];
    const back = bodyOf<OfficeWalk>(await act(walk, 'send-back', { head: headOf(walk), pin, items }));
    expect(back).toMatchObject({ state: 'sentBack', writer: 'office' });
    const { technician } = shop.people;
    const taken = await tablet.send('POST', `/api/tablet/walks/${walk.id}/take-over`, {
      forced: false,
      person: technician.id,
    });
    const { next, branch } = bodyOf<{ next: number; branch: number }>(taken);
    expect({ next, branch }).toEqual({ next: walk.log.signed.length + 2, branch: 0 });
    const row = await stored(server, 'select writer, state from walks where id = $1', [walk.id]);
    expect(row).toEqual([{ writer: tablet.enrolled.tablet.id, state: 'sentBack' }]);
    const other = await enrolledTablet(server, shop);
    const held = await other.send('POST', `/api/tablet/walks/${walk.id}/take-over`, {
      forced: false,
      person: technician.id,
    });
    expect(codeOf(held)).toEqual([409, 'walk.heldElsewhere']);
  });

  it('by force begins a branch; what the lost tablet sends later is the fork, and a supervisor chooses', async () => {
    const walk = await walked(tablet, { until: (_, book) => book.state.readings.length >= 20 }, place);
    bodyOf<Receipt>(await walk.send(0, walk.log.signed.length - 3));
    const other = await enrolledTablet(server, shop);
    const person = shop.people.supervisor.id;
    const sealed = { pin, person, walk: walk.id, seq: 0, prev: '', meaning: 'takeOver', pinVersion: 1 };
    const force = async (jwe?: string) =>
      other.send('POST', `/api/tablet/walks/${walk.id}/take-over`, { forced: true, person, jwe });
    expect(codeOf(await force())).toEqual([400, 'seal.missing']);
    expect(codeOf(await force(await other.seal({ ...sealed, pin: '111111' })))).toEqual([403, 'pin.wrong']);
    const taken = bodyOf<{ next: number; branch: number }>(await force(await other.seal(sealed)));
    expect(taken).toMatchObject({ branch: 1, next: walk.log.signed.length - 2 });
    const chain = bodyOf<OfficeWalkWhole>(await other.get(`/api/tablet/walks/${walk.id}`));
    expect(chain.branch).toBe(1);
    expect(JSON.parse(chain.events.at(-1)?.text ?? '{}')).toMatchObject({ type: 'walk.takenOver', branch: 1 });
    expect((await whole(walk)).walk.forked).toBe(false);

    const late = bodyOf<Receipt>(await walk.send());
    expect(late).toMatchObject({ branch: 0, forked: true, accepted: 3, quarantined: [] });
    expect((await whole(walk)).branches.map(({ branch, next, stands }) => [branch, next, stands])).toEqual([
      [0, walk.log.signed.length, false],
      [1, walk.log.signed.length - 2, true],
    ]);
    const chosen = await act(walk, 'branch', { pin, branch: 1, reason: 'the other tablet is at the engine' });
    expect(bodyOf<OfficeWalk>(chosen)).toMatchObject({ branch: 1, forked: false });
    expect(
      await stored(server, 'select nth, branch from branch_choices where walk_id = $1 order by nth', [walk.id]),
    ).toEqual([
      { nth: 0, branch: 1 },
      { nth: 1, branch: 1 },
    ]);
  });
});

describe('sealed PINs (decision 6)', () => {
  it('that are wrong leave the event standing, refused, and block the proof', async () => {
    const walk = await walked(tablet, {}, { ...place, pin: '999999' });
    const receipt = bodyOf<Receipt>(await walk.send());
    expect(receipt.quarantined).toEqual([]);
    expect(receipt.confirmations.map(({ result, reason }) => [result, reason])).toEqual([
      ['refused', 'pin.wrong'],
      ['refused', 'pin.wrong'],
      ['refused', 'pin.wrong'],
    ]);
    const { walk: row, issueBlocks } = await whole(walk);
    expect(row.refusedSeals).toBe(3);
    expect(issueBlocks.map(({ code }) => code)).toEqual(['proof.confirmationRefused']);
    expect(await stored(server, 'select seq from ledger where walk_id = $1', [walk.id])).toEqual([]);
  });

  it('that did not travel are waited for, and answered when they come', async () => {
    const walk = await walked(tablet, {}, place);
    const { events, branch } = walk.batch();
    const bare = { branch, events, seals: [] };
    const path = `/api/tablet/walks/${walk.id}/events`;
    expect(bodyOf<Receipt>(await tablet.send('POST', path, bare)).confirmations).toEqual([]);
    expect((await whole(walk)).issueBlocks.map(({ code }) => code)).toEqual(['proof.confirmationMissing']);
    const later = bodyOf<Receipt>(await walk.send());
    expect(later).toMatchObject({ accepted: 0 });
    expect(later.confirmations).toHaveLength(3);
    expect((await whole(walk)).issueBlocks).toEqual([]);
  });

  it('are confirmed with the shop’s signature over what is said', async () => {
    const walk = await walked(tablet, {}, place);
    const [confirmation] = bodyOf<Receipt>(await walk.send()).confirmations;
    const { jws, ...said } = confirmation ?? { jws: '' };
    const keys = new Map(tablet.enrolled.signingKeys.map((key) => [key.kid, key]));
    expect((await verifyDetached(canonicalJson(said), jws, keys, testCrypto)).ok).toBe(true);
  });

  it('are listed to their owner, and *not mine* blocks the proof from then on (P3)', async () => {
    const walk = await walked(tablet, {}, place);
    bodyOf<Receipt>(await walk.send());
    const list = bodyOf<{ uses: { id: string; walk: string; meaning: string }[] }>(
      await supervisor.get('/api/pin-uses'),
    );
    const use = list.uses.find((one) => one.walk === walk.id);
    expect(use?.meaning).toBe('checkedRecordAndJoint');
    expect(codeOf(await clerk.send('POST', `/api/pin-uses/${use?.id}/disown`))).toEqual([404, 'pinUse.unknown']);
    expect((await supervisor.send('POST', `/api/pin-uses/${use?.id}/disown`)).status).toBe(200);
    expect(codeOf(await supervisor.send('POST', `/api/pin-uses/${use?.id}/own`))).toEqual([409, 'pinUse.answered']);
    const { issueBlocks, confirmations } = await whole(walk);
    expect(issueBlocks.map(({ code }) => code)).toEqual(['proof.confirmationRefused']);
    expect(confirmations.at(-1)).toMatchObject({ result: 'refused', reason: 'pin.disowned' });
    expect(codeOf(await act(walk, 'proof', {}, clerk))).toEqual([409, 'proof.blocked']);
  });

  it('of a countersigner are renewed by countersigning again, and only then (decision 6)', async () => {
    const walk = await walked(tablet, {}, place);
    bodyOf<Receipt>(await walk.send());
    const again = async () => {
      const { head } = (await whole(walk)).walk;
      return act(walk, 'countersign', { head, pin, meaning: 'checkedRecord' });
    };
    expect(codeOf(await again())).toEqual([409, 'signedAlready']);
    const list = bodyOf<{ uses: { id: string; walk: string }[] }>(await supervisor.get('/api/pin-uses'));
    const use = list.uses.find((one) => one.walk === walk.id);
    expect((await supervisor.send('POST', `/api/pin-uses/${use?.id}/disown`)).status).toBe(200);
    expect(bodyOf<OfficeWalk>(await again())).toMatchObject({ state: 'finished', refusedSeals: 0 });
    const { issueBlocks, events } = await whole(walk);
    expect(issueBlocks).toEqual([]);
    const [first, second] = events
      .map(({ text }) => JSON.parse(text) as { type: string; seq: number; data: { renews?: number } })
      .filter(({ type }) => type === 'walk.countersigned');
    expect(second?.data.renews).toBe(first?.seq);
  });
});

describe('orders', () => {
  it('are signed, told to tablets, and obeyed once', async () => {
    const walk = await walked(tablet, { until: (_, book) => book.state.readings.length >= 4 }, place);
    bodyOf<Receipt>(await walk.send());
    const order = bodyOf<{ id: string }>(
      await act(walk, 'orders', { pin, kind: 'stop', reason: 'wrong gasket in this batch' }),
      201,
    );
    const catalogue = bodyOf<{ orders: { id: string; state: string }[] }>(await tablet.get('/api/tablet/catalogue'));
    expect(catalogue.orders).toContainEqual(expect.objectContaining({ id: order.id, state: 'open' }));
    const by = walk.log.book.state.hands.records;
    const data = { order: order.id, why: 'stop' as const, reason: 'wrong gasket in this batch' };
    await walk.log.issue({ type: 'walk.stopped', by, data });
    expect(bodyOf<Receipt>(await walk.send()).quarantined).toEqual([]);
    expect(await stored(server, 'select state from orders where id = $1', [order.id])).toEqual([{ state: 'obeyed' }]);
    expect((await whole(walk)).walk.state).toBe('stopped');
  });

  it('that were never placed cannot be obeyed', async () => {
    const walk = await walked(tablet, { until: (_, book) => book.state.readings.length >= 4 }, place);
    const by = walk.log.book.state.hands.records;
    const order = '01900000-0000-7000-8000-0000000000f0';
    await walk.log.issue({ type: 'walk.stopped', by, data: { order, why: 'stop', reason: 'because' } });
    expect(bodyOf<Receipt>(await walk.send()).quarantined[0]?.code).toBe('event.orderUnknown');
  });
});

describe('a proof', () => {
  const proved = async () => {
    const walk = await walked(tablet, {}, place);
    bodyOf<Receipt>(await walk.send());
    return { walk, proof: bodyOf<ProofWhole>(await act(walk, 'proof', {}, clerk), 201) };
  };

  it('is issued with the next number of the year, found by serial, VIN, job and claim, and seen by anybody', async () => {
    const { walk, proof } = await proved();
    expect(proof.number).toMatch(/^BL-2026-\d{5}$/);
    for (const q of [`OD6-25-${joints}`, 'ZZ9KD63X5TB004417', 'wr-88120', proof.number]) {
      const found = bodyOf<{ proofs: { id: string }[] }>(await clerk.get(`/api/proofs?q=${encodeURIComponent(q)}`));
      expect(found.proofs.map(({ id }) => id)).toContain(proof.id);
    }
    const token = proof.publicUrl.split('/p/')[1] ?? '';
    const seen = bodyOf<PublicProof>(await anybody(server).get(`/api/public/proofs/${token}`));
    expect(seen).toMatchObject({ number: proof.number, state: 'issued', supersededBy: null });
    expect(Buffer.from(seen.jws.split('~').slice(1).join('.'), 'base64url').toString()).not.toContain('Quarry Road');
    expect(codeOf(await anybody(server).get(`/api/public/proofs/${token.slice(0, -1)}_`))).toEqual([
      404,
      'proof.unknown',
    ]);
    const again = bodyOf<ProofWhole>(await act(walk, 'proof', {}, clerk), 201);
    expect(again.id).toBe(proof.id);
  });

  it('issued anew takes the place of the last, and the old code tells so', async () => {
    const { walk, proof } = await proved();
    const next = bodyOf<ProofWhole>(await act(walk, 'proof', { note: 'Claim number corrected' }, clerk), 201);
    expect([next.number, next.issue]).toEqual([proof.number, 2]);
    const token = proof.publicUrl.split('/p/')[1] ?? '';
    const seen = bodyOf<PublicProof>(await anybody(server).get(`/api/public/proofs/${token}`));
    expect(seen).toMatchObject({ state: 'superseded', supersededBy: { issue: 2, publicUrl: next.publicUrl } });
  });

  it('revoked says so to anybody, with the reason', async () => {
    const { proof } = await proved();
    bodyOf(await clerk.send('POST', `/api/proofs/${proof.id}/revoke`, { reason: 'wrong engine on the job' }));
    const token = proof.publicUrl.split('/p/')[1] ?? '';
    const seen = bodyOf<PublicProof>(await anybody(server).get(`/api/public/proofs/${token}`));
    expect(seen).toMatchObject({ state: 'revoked', reason: 'wrong engine on the job' });
    const twice = await clerk.send('POST', `/api/proofs/${proof.id}/revoke`, { reason: 'again' });
    expect(codeOf(twice)).toEqual([409, 'proof.notInForce']);
  });

  it('is not issued on a record of which one bit changed in the database, and names the event (fault 21)', async () => {
    const walk = await walked(tablet, {}, place);
    bodyOf<Receipt>(await walk.send());
    await stored(
      server,
      `begin; alter table walk_events disable trigger insert_only;
       update walk_events set bytes = set_byte(bytes, 40, get_byte(bytes, 40) # 1) where walk_id = '${walk.id}' and seq = 77;
       alter table walk_events enable trigger insert_only; commit`,
    );
    const reply = await act(walk, 'proof', {}, clerk);
    expect(codeOf(reply)).toEqual([409, 'walk.broken']);
    expect(reply.body.error?.details).toMatchObject({ seq: 77 });
  });

  it('is not issued while the walk goes on, was voided, or waits for files', async () => {
    const half = await walked(tablet, { until: (_, book) => book.state.readings.length >= 4 }, place);
    await half.send();
    const blocks = (reply: Reply) =>
      (reply.body.error?.details as { blocks: { code: string }[] } | undefined)?.blocks.map(({ code }) => code);
    expect(blocks(await act(half, 'proof', {}, clerk))).toEqual(['proof.notSigned']);
    const walk = await released();
    expect(blocks(await act(walk, 'proof', {}, clerk))).toEqual(['proof.notCountersigned']);
    bodyOf(await act(walk, 'void', { head: headOf(walk), pin, reason: 'wrong procedure' }));
    expect(blocks(await act(walk, 'proof', {}, clerk))).toEqual(['proof.voided']);
  });
});
