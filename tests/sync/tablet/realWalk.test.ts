import { describe, expect, it, vi } from 'vitest';
import { commandOf } from '@shared/walk/commands';
import { decide } from '@shared/walk/decide';
import { evolve } from '@shared/walk/evolve';
import { instructionOf } from '@shared/walk/instruction';
import { verifyChain } from '@shared/record/chain';
import { jwkThumbprint } from '@shared/record/jwkThumbprint';
import { initialWalk } from '@shared/walk/state';
import type { Role } from '@shared/people/roles';
import type { ShopWalkLog } from '@/offline/shopRules';
import { SHOP, TABLET } from '@/offline/testing/tabletKit';
import { walkEventOf } from '@/offline/walkChain';
import type { WalkAct } from '@/offline/walkAct';
import { webRecordCrypto } from '@/offline/webCrypto';
import { demoProcedures, walkDrafts, type Draft, type WalkBook, type WalkPlan } from '../../support/walker';
import { FakeShop, JOB, JOINT, PINS, SUPERVISOR, TECH } from './fakeShop';
import { realTablet, wideWrench, type RealTablet } from './realTablet';

/*
 * The whole tablet with the real rules: enrolled, signed in, walked without a network, killed on the way, signed,
 * countersigned by somebody new to it, and sent.
 */

const found = demoProcedures.find(({ holes }) => holes.length === 14);
if (!found) throw new Error('the demo has no head of fourteen bolts');
const head = found;
const PEOPLE: Record<string, Role[]> = { [TECH]: ['technician'], [SUPERVISOR]: ['supervisor'] };

/** The ideal technician's book, kept by the tablet. */
const bookOf = (real: RealTablet, log: ShopWalkLog): WalkBook => {
  const { clock, tablet } = real;
  const [procedure] = Object.values(tablet.catalogue.procedures);
  const setting: WalkBook['setting'] = {
    job: JOB,
    joint: JOINT,
    procedure: head,
    revision: 1,
    hash: procedure?.hash ?? '',
    tablet: TABLET,
    boot: clock.boot,
    known: tablet.catalogue.cursor,
    startMs: clock.now(),
    people: PEOPLE,
    pulls: TECH,
    records: TECH,
    supervisor: SUPERVISOR,
    wrenches: [wideWrench],
  };
  return {
    setting,
    get state() {
      return log.snapshot().state;
    },
    now: () => ({ at: new Date(clock.now()).toISOString(), mono: clock.mono(), boot: clock.boot }),
    pass: (ms: number) => clock.pass(ms),
  } as WalkBook;
};

async function follow(real: RealTablet, log: ShopWalkLog, draft: Draft): Promise<void> {
  real.clock.pass((draft.after ?? 1) * 1000);
  const pin = PINS[draft.by] ?? '';
  const sealed = draft.type === 'walk.signed' || draft.type === 'walk.countersigned';
  if (sealed) expect((await real.tablet.checkPin(draft.by, pin)).ok).toBe(true);
  const saved = await log.append({
    act: { type: draft.type, data: draft.data } as WalkAct,
    by: draft.by,
    roles: PEOPLE[draft.by] ?? [],
    head: log.snapshot().head,
    ...(sealed ? { pin: { pin, person: draft.by, pinVersion: 1 } } : {}),
  });
  if (!saved.ok) throw new Error(`${draft.type} refused: ${JSON.stringify(saved.error)}`);
}

async function walkOn(real: RealTablet, log: ShopWalkLog, plan: WalkPlan = {}): Promise<void> {
  for (const draft of walkDrafts(bookOf(real, log), plan)) await follow(real, log, draft);
}

async function signedInAtTheStand(shop: FakeShop): Promise<RealTablet> {
  const real = await realTablet(shop);
  expect((await real.tablet.enrol(shop.code, 'Stand 1')).ok).toBe(true);
  expect(await real.tablet.signIn(TECH, PINS[TECH] ?? '')).toEqual({ ok: true, value: 'server' });
  real.network.online = false;
  return real;
}

async function begun(real: RealTablet): Promise<string> {
  const wanted = { joint: JOINT, purpose: 'finalAssembly', pulls: TECH, records: TECH } as const;
  const walk = await real.tablet.walks.begin(wanted, TECH);
  if (!walk.ok) throw new Error(JSON.stringify(walk.error));
  return walk.value;
}

/** Every event of the chain decided again from the state before it, as the server does (decision 1). */
async function decidedAgain(shop: FakeShop, walk: string) {
  const keys = new Map([[shop.office.kid, shop.officeJwk]]);
  if (shop.tabletJwk) keys.set(await jwkThumbprint(shop.tabletJwk, webRecordCrypto()), shop.tabletJwk);
  const chain = await verifyChain(shop.chainOf(walk), keys, webRecordCrypto(), { shop: SHOP, walk });
  if (!chain.ok) throw new Error(`broken at ${chain.seq}: ${chain.code}`);
  let state = initialWalk(head, shop.answer.procedures[0]?.hash ?? '');
  for (const event of chain.envelopes.map(walkEventOf)) {
    const decided = decide(state, commandOf(event, PEOPLE[event.by] ?? []));
    expect(decided).toEqual({ ok: true, value: { type: event.type, data: event.data } });
    state = evolve(state, event);
  }
  return state;
}

describe('a tablet with the real rules', () => {
  it('walks a whole head offline, survives a kill in the middle, is signed, countersigned and sent', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const real = await signedInAtTheStand(shop);
    const walk = await begun(real);
    const log = await real.tablet.walks.open(walk);
    await walkOn(real, log, {
      until: (instruction, book) => instruction.kind === 'pull' && book.state.readings.length >= 31,
    });
    const before = log.snapshot();

    const again = await realTablet(shop, real);
    expect(again.tablet.session?.person).toBe(TECH);
    const reopened = await again.tablet.walks.open(walk);
    expect(reopened.snapshot().head).toBe(before.head);
    const book = bookOf(again, reopened);
    const asked = instructionOf(before.state, { ...book.now(), boot: real.clock.boot });
    const looking = instructionOf(reopened.snapshot().state, book.now());
    expect(looking.kind).toBe('lookAtWork');
    expect('slot' in looking && looking.slot).toEqual('slot' in asked && asked.slot);

    await walkOn(again, reopened);
    const done = reopened.snapshot();
    expect(done.view).toMatchObject({ signed: true, countersigned: true });
    expect(done.view.instruction).toMatchObject({ kind: 'withShop' });
    expect(shop.chainOf(walk)).toHaveLength(0);

    again.network.online = true;
    await again.tablet.sync.poke();
    expect(again.tablet.sync.status()).toMatchObject({ phase: 'idle', waiting: 0, blocked: 0 });
    const state = await decidedAgain(shop, walk);
    expect(state).toEqual(done.state);
    expect(state.readings.filter((reading) => reading.status === 'stands')).toHaveLength(56);
  });

  it('sends each PIN sealed for its own event, which only the shop can open', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const real = await signedInAtTheStand(shop);
    const walk = await begun(real);
    const log = await real.tablet.walks.open(walk);
    await walkOn(real, log);
    real.network.online = true;
    await real.tablet.sync.poke();
    const opened = await Promise.all([...shop.seals.values()].map((jwe) => shop.opened(jwe)));
    const signed = shop.chainOf(walk).flatMap(({ text }) => {
      const { type, seq, prev, by, data } = JSON.parse(text) as Record<string, unknown>;
      const { meaning } = data as { meaning?: string };
      return meaning === undefined ? [] : [{ type, seq, prev, by, meaning }];
    });
    expect(opened).toEqual(
      signed.map(({ seq, prev, by, meaning }) => ({
        pin: PINS[String(by)],
        person: by,
        pinVersion: 1,
        walk,
        seq,
        prev,
        meaning,
      })),
    );
    expect(signed.map(({ type }) => type)).toEqual(['walk.signed', 'walk.countersigned']);
  });

  it('shows what the office writes after the release', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const real = await signedInAtTheStand(shop);
    const walk = await begun(real);
    const log = await real.tablet.walks.open(walk);
    await walkOn(real, log);
    real.network.online = true;
    await real.tablet.sync.poke();
    const note = { items: [{ hole: 'h1', action: 'look', note: 'look at 1' }], seal: 'f'.repeat(64) };
    await shop.write(walk, 'walk.sentBack', note, SUPERVISOR);
    shop.answer = { ...shop.answer, cursor: 6, full: false, walks: [shop.rowOf(walk, { writer: 'office' })] };
    await real.tablet.sync.press();
    await vi.waitFor(() => expect(log.snapshot().head).toBe(shop.chainOf(walk).at(-1)?.hash));
    expect(log.snapshot().next).toBe(shop.chainOf(walk).length);
  });

  it('obeys an order of the office at the next instruction, signed by the shop', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const real = await signedInAtTheStand(shop);
    real.network.online = true;
    const walk = await begun(real);
    const log = await real.tablet.walks.open(walk);
    const nothing = { deviation: null, choice: null, pass: null, branch: null, at: '2026-06-13T09:00:00.000Z' };
    const order = { id: '0190f0a0-0000-7000-8000-000000000aa1', walk, kind: 'stop', reason: 'new revision' } as const;
    await shop.order({ ...order, ...nothing, by: SUPERVISOR });
    await real.tablet.sync.press();
    expect(await real.tablet.walks.obey(walk)).toEqual([]);
    expect(log.snapshot().view.instruction).toMatchObject({ kind: 'stopped', order: order.id, reason: 'new revision' });
    const { next } = log.snapshot();
    expect(await real.tablet.walks.obey(walk)).toEqual([]);
    expect(log.snapshot().next).toBe(next);
  });

  it('does not obey an order that the shop did not sign', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const real = await signedInAtTheStand(shop);
    real.network.online = true;
    const walk = await begun(real);
    await real.tablet.walks.open(walk);
    const nothing = { deviation: null, choice: null, pass: null, branch: null, at: '2026-06-13T09:00:00.000Z' };
    const order = { id: '0190f0a0-0000-7000-8000-000000000aa1', walk, kind: 'stop', reason: 'x' } as const;
    await shop.order({ ...order, ...nothing, by: SUPERVISOR });
    shop.answer = { ...shop.answer, orders: shop.answer.orders.map((one) => ({ ...one, reason: 'other words' })) };
    await real.tablet.sync.press();
    expect(await real.tablet.walks.obey(walk)).toMatchObject([{ why: { code: 'order.badSignature' } }]);
  });

  it('counts the work of a walk the server has not heard of when the next begins on the joint (W1)', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const real = await signedInAtTheStand(shop);
    const walk = await begun(real);
    const log = await real.tablet.walks.open(walk);
    await walkOn(real, log, { until: (_, book) => book.state.readings.length >= 30 });
    const second = await real.tablet.walks.open(await begun(real));
    const { earlier } = second.snapshot().state.opened ?? {};
    expect(earlier?.readingsTaken).toBe(true);
    expect(earlier?.usedHoles).toEqual(
      Object.entries(log.snapshot().state.holes).flatMap(([hole, { used }]) => (used ? [hole] : [])),
    );
  });

  it('remembers that it lost events, gets them back, and tells the office (fault 20)', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const real = await signedInAtTheStand(shop);
    const walk = await begun(real);
    const log = await real.tablet.walks.open(walk);
    await walkOn(real, log, { until: (_, book) => book.state.readings.length >= 3 });
    const { head: last } = log.snapshot();
    real.network.online = true;
    await real.tablet.sync.poke();
    shop.answer = { ...shop.answer, cursor: 6, full: false, walks: [shop.rowOf(walk)] };
    // Somebody clears the browser's storage by hand; the settings stay, as when a disk lost its end.
    const cleared = await realTablet(shop, { ...real, disk: real.disk });
    await new Promise<void>((resolve, reject) => {
      const request = real.disk.factory.open('boltwalk-walks');
      request.onerror = () => reject(new Error('not opened'));
      request.onsuccess = () => {
        const transaction = request.result.transaction(['events', 'heads', 'standings'], 'readwrite');
        for (const store of ['events', 'heads', 'standings']) transaction.objectStore(store).clear();
        transaction.addEventListener('complete', () => resolve());
      };
    });
    await cleared.tablet.sync.press();
    expect(cleared.tablet.sync.lostWalks()).toEqual([walk]);
    expect(shop.reports.at(-1)).toMatchObject({ lost: [walk] });
    expect(await cleared.tablet.fetchWalk(walk)).toEqual({ ok: true, value: walk });
    expect((await cleared.tablet.walks.open(walk)).snapshot().head).toBe(last);
    const again = await realTablet(shop, cleared);
    expect(again.tablet.sync.lostWalks()).toEqual([walk]);
    await again.tablet.forgetLost();
    expect(again.tablet.sync.lostWalks()).toEqual([]);
  });

  it('signs somebody out when the shop says that they left, and keeps the walk (fault 16)', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const real = await signedInAtTheStand(shop);
    const walk = await begun(real);
    real.network.online = true;
    shop.answer = {
      ...shop.answer,
      cursor: 7,
      full: false,
      people: shop.answer.people.map((one) => (one.id === TECH ? { ...one, state: 'left' } : one)),
    };
    await real.tablet.sync.press();
    expect(real.tablet.session).toBeNull();
    expect(await real.tablet.signIn(TECH, PINS[TECH] ?? '')).toEqual({ ok: false, error: { code: 'pin.personLeft' } });
    expect((await real.tablet.walksHere()).map((one) => one.walk)).toEqual([walk]);
  });

  it('exports everything but keys and PINs', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const real = await signedInAtTheStand(shop);
    const walk = await begun(real);
    const text = JSON.stringify(await real.tablet.exportAll());
    const file = JSON.parse(text) as { stores: { events: { walk: string }[] }; unreadable: unknown[] };
    expect(file.stores.events.map((row) => row.walk)).toEqual([walk]);
    expect(file.unreadable).toEqual([]);
    expect(text).not.toMatch(/privateKey|"mac"|"salt"|482915/);
  });

  it('refuses a used code with the server’s own words and stays as it was', async () => {
    const shop = await FakeShop.open(head, [wideWrench]);
    const first = await realTablet(shop);
    await first.tablet.enrol(shop.code, 'Stand 1');
    const second = await realTablet(shop);
    expect(await second.tablet.enrol(shop.code, 'Stand 2')).toEqual({
      ok: false,
      error: { code: 'enrolment.codeUsed', params: {} },
    });
    expect(second.tablet.identity).toBeNull();
  });
});
