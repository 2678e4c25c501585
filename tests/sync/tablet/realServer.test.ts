import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { doors } from '@shared/contracts/demo.contract';
import type { z } from 'zod';
import type { Role } from '@shared/people/roles';
import { tabletClient } from '@/api/tabletClient';
import type { ShopWalkLog } from '@/offline/shopRules';
import { Tablet } from '@/offline/tablet';
import { failingIndexedDb } from '@/offline/testing/failingIndexedDb';
import { memoryHolds } from '@/offline/testing/memoryHolds';
import { browserClock } from '@/offline/tabletClock';
import type { WalkAct } from '@/offline/walkAct';
import { startServerProcess, type ServerProcess } from '../../support/serverProcess';
import { walkDrafts, type Draft, type WalkBook, type WalkPlan } from '../../support/walker';

/* The real tablet before the real server on a real database: what one side means, the other understands. */

type Doors = z.output<(typeof doors)['responses'][200]>;

let server: ServerProcess;
let shown: Doors;

beforeAll(async () => {
  server = await startServerProcess({ seeded: true });
  shown = doors.responses[200].parse(await (await fetch(`${server.url}/api/demo/doors`)).json());
}, 120_000);
afterAll(() => server.close());

interface Stand {
  tablet: Tablet;
  network: { up: boolean };
}

async function stand(): Promise<Stand> {
  const network = { up: true };
  const reach: typeof fetch = (input, init) =>
    network.up ? fetch(input, init) : Promise.reject(new TypeError('Failed to fetch'));
  const tablet = new Tablet({
    factory: failingIndexedDb().factory,
    holds: memoryHolds(),
    client: tabletClient({ fetch: reach, origin: server.url }),
    clock: browserClock(),
    storage: undefined,
    random: () => 0.5,
    isOnline: () => network.up,
    setTimer: () => null,
    clearTimer: () => undefined,
    tell: () => undefined,
    listen: () => undefined,
    version: 'test',
  });
  await tablet.start();
  const enrolled = await tablet.enrolDemo();
  if (!enrolled.ok) throw new Error(enrolled.error.code);
  return { tablet, network };
}

const personWith = (role: Role) => {
  const found = shown.accounts.find(({ roles, pin }) => roles.includes(role) && pin !== null);
  if (!found) throw new Error(`nobody in the demo is ${role}`);
  return { id: found.id, pin: found.pin ?? '', roles: found.roles };
};
const pinOf = (person: string): string => shown.accounts.find(({ id }) => id === person)?.pin ?? '';

const bookOf = ({ tablet }: Stand, log: ShopWalkLog): WalkBook => {
  const { clock } = tablet.world;
  const { procedure } = log.snapshot().state;
  const setting = {
    procedure,
    supervisor: personWith('supervisor').id,
    wrenches: Object.values(tablet.catalogue.wrenches)
      .filter(({ state }) => state === 'inService')
      .map(({ snapshot }) => snapshot),
  };
  return {
    setting,
    get state() {
      return log.snapshot().state;
    },
    now: () => ({ at: new Date(clock.now()).toISOString(), mono: clock.mono(), boot: clock.boot }),
    pass: () => {
      throw new Error('this walk has no waits');
    },
  } as unknown as WalkBook;
};

async function follow({ tablet }: Stand, log: ShopWalkLog, draft: Draft): Promise<void> {
  const signs = draft.type === 'walk.signed' || draft.type === 'walk.countersigned';
  const pin = { pin: pinOf(draft.by), person: draft.by, pinVersion: tablet.personById(draft.by)?.pinVersion ?? 0 };
  const saved = await log.append({
    act: { type: draft.type, data: draft.data } as WalkAct,
    by: draft.by,
    roles: tablet.personById(draft.by)?.roles ?? [],
    head: log.snapshot().head,
    ...(signs ? { pin } : {}),
  });
  if (!saved.ok) throw new Error(`${draft.type} refused: ${JSON.stringify(saved.error)}`);
}

async function walkOn(at: Stand, log: ShopWalkLog, plan: WalkPlan = {}): Promise<void> {
  for (const draft of walkDrafts(bookOf(at, log), plan)) await follow(at, log, draft);
}

/** A joint on which no walk was begun. */
function freshJoint({ catalogue }: Tablet) {
  const taken = new Set(Object.values(catalogue.walks).map(({ joint }) => joint));
  const joint = Object.values(catalogue.joints).find(
    ({ id, job }) => !taken.has(id) && catalogue.jobs[job]?.state === 'open',
  );
  if (!joint) throw new Error('every joint of the demo was begun');
  return joint;
}

describe('the tablet and the server', () => {
  it('agree on a walk from the first event to the countersignature, PINs and all', { timeout: 60_000 }, async () => {
    const at = await stand();
    const { tablet, network } = at;
    const tech = personWith('technician');
    expect(await tablet.signIn(tech.id, tech.pin)).toEqual({ ok: true, value: 'server' });
    network.up = false;
    const joint = freshJoint(tablet);
    const wanted = { joint: joint.id, purpose: 'finalAssembly', pulls: tech.id, records: tech.id } as const;
    const begun = await tablet.walks.begin(wanted, tech.id);
    if (!begun.ok) throw new Error(begun.error.code);
    const log = await tablet.walks.open(begun.value);
    await walkOn(at, log);
    expect(log.snapshot().view).toMatchObject({ signed: true, countersigned: true });
    network.up = true;
    await tablet.sync.press();
    expect(tablet.sync.status()).toMatchObject({ phase: 'idle', waiting: 0, blocked: 0, code: null });
    const said = tablet.catalogue.confirmations[begun.value] ?? [];
    expect(said.map(({ result, meaning }) => [meaning, result])).toEqual([
      ['tightenedAsRecorded', 'accepted'],
      ['checkedRecordAndJoint', 'accepted'],
    ]);
    expect(tablet.catalogue.walks[begun.value]).toMatchObject({
      state: 'finished',
      head: log.snapshot().head,
      next: log.snapshot().next,
      quarantined: 0,
      refusedSeals: 0,
    });
  });

  it('hand a walk over from one tablet to another, which walks it to its end (W11)', { timeout: 60_000 }, async () => {
    const at = await stand();
    const { tablet } = at;
    const half = shown.walk ?? '';
    const hands = tablet.catalogue.walks[half]?.records ?? '';
    expect((await tablet.signIn(hands, pinOf(hands))).ok).toBe(true);
    expect(await tablet.takeOver({ walk: half, person: hands, forced: null })).toEqual({ ok: true, value: half });
    const log = await tablet.walks.open(half);
    expect(log.snapshot().view.instruction.kind).not.toBe('open');
    await walkOn(at, log);
    await tablet.sync.press();
    expect(tablet.sync.status()).toMatchObject({ phase: 'idle', waiting: 0, blocked: 0 });
    expect(tablet.catalogue.walks[half]).toMatchObject({ head: log.snapshot().head, state: 'finished' });
    // Asking again, as after a lost reply, only fetches it.
    await log.reload();
    expect(log.snapshot().broken).toBeNull();
  });

  it(
    'keep both chains when a walk is taken by force from a tablet that was not lost (fault 11)',
    { timeout: 60_000 },
    async () => {
      const lost = await stand();
      const tech = personWith('technician');
      const supervisor = personWith('supervisor');
      await lost.tablet.signIn(tech.id, tech.pin);
      const joint = freshJoint(lost.tablet);
      const wanted = { joint: joint.id, purpose: 'finalAssembly', pulls: tech.id, records: tech.id } as const;
      const begun = await lost.tablet.walks.begin(wanted, tech.id);
      if (!begun.ok) throw new Error(begun.error.code);
      const walk = begun.value;
      const before = await lost.tablet.walks.open(walk);
      await walkOn(lost, before, { until: (_, book) => book.state.readings.length >= 2 });
      await lost.tablet.sync.poke();
      lost.network.up = false;

      const found = await stand();
      const { pinVersion = 0 } = found.tablet.personById(supervisor.id) ?? {};
      const wrong = { walk, person: supervisor.id, forced: { pin: '000001', pinVersion } };
      expect(await found.tablet.takeOver(wrong)).toMatchObject({ ok: false, error: { code: 'pin.wrong' } });
      const right = { walk, person: supervisor.id, forced: { pin: supervisor.pin, pinVersion } };
      expect(await found.tablet.takeOver(right)).toEqual({ ok: true, value: walk });
      const after = await found.tablet.walks.open(walk);
      expect(after.snapshot().view.instruction).toMatchObject({ kind: 'lookAtWork', forced: true });
      await walkOn(found, after, { until: (_, book) => book.state.readings.length >= 4 });
      await found.tablet.sync.press();
      expect(found.tablet.sync.status()).toMatchObject({ phase: 'idle', waiting: 0, blocked: 0 });

      const note = { type: 'note.added', data: { text: 'still here', hole: null } } as const;
      expect((await before.append({ act: note, by: tech.id, roles: tech.roles })).ok).toBe(true);
      lost.network.up = true;
      await lost.tablet.sync.press();
      expect(lost.tablet.sync.status()).toMatchObject({ waiting: 0, blocked: 0 });
      expect(await lost.tablet.walksHere()).toMatchObject([{ walk, forked: true, waiting: 0 }]);
      expect(before.snapshot()).toMatchObject({ broken: null });
      await found.tablet.sync.press();
      expect(found.tablet.catalogue.walks[walk]).toMatchObject({ forked: true, head: after.snapshot().head });
    },
  );

  it('keep a wrong PIN out of the chain and say that it was refused', { timeout: 60_000 }, async () => {
    const at = await stand();
    const { tablet } = at;
    const tech = personWith('technician');
    await tablet.signIn(tech.id, tech.pin);
    const joint = freshJoint(tablet);
    const wanted = { joint: joint.id, purpose: 'finalAssembly', pulls: tech.id, records: tech.id } as const;
    const begun = await tablet.walks.begin(wanted, tech.id);
    if (!begun.ok) throw new Error(begun.error.code);
    const log = await tablet.walks.open(begun.value);
    await walkOn(at, log, { until: (instruction) => instruction.kind === 'sign' });
    const act = { type: 'walk.signed', data: { meaning: 'tightenedAsRecorded' } } as const;
    const pin = { pin: '000001', person: tech.id, pinVersion: tablet.personById(tech.id)?.pinVersion ?? 0 };
    const signed = await log.append({ act, by: tech.id, roles: tech.roles, pin });
    expect(signed.ok).toBe(true);
    await tablet.sync.press();
    expect(tablet.sync.status()).toMatchObject({ waiting: 0, blocked: 0 });
    const said = tablet.catalogue.confirmations[begun.value] ?? [];
    expect(said).toMatchObject([{ result: 'refused', reason: 'pin.wrong', seq: log.snapshot().next - 1 }]);
  });

  it('lose nothing when the server is killed in the middle of sending', { timeout: 120_000 }, async () => {
    const at = await stand();
    const { tablet } = at;
    const tech = personWith('technician');
    await tablet.signIn(tech.id, tech.pin);
    const joint = freshJoint(tablet);
    const wanted = { joint: joint.id, purpose: 'finalAssembly', pulls: tech.id, records: tech.id } as const;
    const begun = await tablet.walks.begin(wanted, tech.id);
    if (!begun.ok) throw new Error(begun.error.code);
    const log = await tablet.walks.open(begun.value);
    await walkOn(at, log, { until: (instruction) => instruction.kind === 'sign' });
    const sending = tablet.sync.poke();
    await server.kill9();
    await sending;
    expect(['offline', 'idle']).toContain(tablet.sync.status().phase);
    await server.restart();
    await tablet.sync.press();
    await vi.waitFor(() => expect(tablet.sync.status()).toMatchObject({ phase: 'idle', waiting: 0 }), 10_000);
    expect(tablet.catalogue.walks[begun.value]).toMatchObject({
      head: log.snapshot().head,
      next: log.snapshot().next,
      quarantined: 0,
    });
  });
});
