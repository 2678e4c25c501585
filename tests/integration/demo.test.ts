import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import pg from 'pg';
import type { PublicJwk } from '@shared/record/crypto';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import { pinProblem } from '@shared/people/pin';
import { verifyChain } from '@shared/record/chain';
import { checkVin } from '@shared/vehicle/vin';
import { replay } from '@shared/walk/evolve';
import { initialWalk, type WalkState } from '@shared/walk/state';
import { eventOfEnvelope } from '@shared/walk/upcasts';
import { view } from '@shared/walk/view';
import { DEMO_ACCOUNTS } from '../../db/demoAccounts';
import { brindleLane } from '../../db/seed/shops';
import { createTestDatabase, type TestDatabase } from '../support/testDatabase';
import { testCrypto } from '../support/testSigner';

/* The demo as it stands in the tables after seeding: what the two doors open on. */

interface StoredWalk {
  id: string;
  code: string;
  state: string;
  writer: string;
  hash: string;
  document: ProcedureDocument;
}

let database: TestDatabase;
let pool: pg.Pool;
let walks: (StoredWalk & { replayed: WalkState; chain: Awaited<ReturnType<typeof verifyChain>> })[];

const rows = async <T>(query: string, values: unknown[] = []): Promise<T[]> =>
  (await pool.query(query, values)).rows as T[];

async function keysOf(): Promise<Map<string, PublicJwk>> {
  const found = await rows<{ kid: string; public_jwk: PublicJwk }>(
    `select kid, public_jwk from tablets union all select kid, public_jwk from shop_keys where purpose = 'signing'`,
  );
  return new Map(found.map(({ kid, public_jwk }) => [kid, public_jwk]));
}

async function chainOf(walk: StoredWalk, keys: Map<string, PublicJwk>) {
  const events = await rows<{ text: string; hash: string; sig: string }>(
    `select convert_from(bytes, 'UTF8') as text, hash, sig from walk_events where walk_id = $1 order by seq`,
    [walk.id],
  );
  const chain = await verifyChain(events, keys, testCrypto);
  const envelopes = chain.ok ? chain.envelopes : chain.envelopesBefore;
  const replayed = replay(
    initialWalk(walk.document, walk.hash),
    envelopes.flatMap((envelope) => eventOfEnvelope(envelope) ?? []),
  );
  return { ...walk, chain, replayed };
}

beforeAll(async () => {
  database = await createTestDatabase({ seeded: true });
  pool = new pg.Pool({ connectionString: database.superUrl, max: 2 });
  const stored = await rows<StoredWalk>(
    `select w.id, w.procedure_code as code, w.state, w.writer, w.procedure_hash as hash, r.document
     from walks w join procedure_revisions r on r.shop_id = w.shop_id and r.hash = w.procedure_hash order by w.opened_at`,
  );
  const keys = await keysOf();
  walks = await Promise.all(stored.map((walk) => chainOf(walk, keys)));
}, 120_000);

afterAll(async () => {
  await pool?.end();
  database?.drop();
});

const now = { at: '2026-06-13T12:00:00Z', mono: 0, boot: 'another' };
const only = (code: string, state: string) => {
  const found = walks.filter((walk) => walk.code === code && walk.state === state);
  expect(found).toHaveLength(1);
  return found[0] ?? expect.fail('no such walk');
};

describe('the people and jobs of the demo', () => {
  it('are six with all roles among them, and PINs that a shop would let pass (P4)', () => {
    expect(DEMO_ACCOUNTS).toHaveLength(6);
    expect(new Set(DEMO_ACCOUNTS.flatMap(({ roles }) => roles)).size).toBe(5);
    for (const { name, roles } of [
      { name: 'Ilse Marchetti-Vane', roles: ['technician'] },
      { name: 'Tobias Renquist', roles: ['supervisor'] },
      { name: 'Oda Fennimore-Hale', roles: ['keeper'] },
    ]) {
      expect(DEMO_ACCOUNTS).toContainEqual(expect.objectContaining({ name, roles }));
    }
    expect(DEMO_ACCOUNTS.map(({ pin }) => pinProblem(pin))).toEqual(Array(6).fill(null));
    expect(DEMO_ACCOUNTS.every(({ email }) => email.endsWith('.example'))).toBe(true);
  });

  it('have invented VINs that no maker has, with the right check digit', () => {
    const vins = brindleLane(0).jobs.flatMap(({ vin }) => (vin === '' ? [] : [vin]));
    expect(vins.length).toBeGreaterThan(1);
    for (const vin of vins) expect(checkVin(vin)).toEqual({ vin, problems: [] });
    expect(vins.every((vin) => vin.startsWith('ZZ9'))).toBe(true);
  });

  it('stand in two shops, each with its own people, wrenches, procedures and jobs', async () => {
    const counts = await rows<Record<string, number>>(
      `select (select count(*)::int from people p where p.shop_id = s.id) as people,
        (select count(*)::int from wrenches w where w.shop_id = s.id) as wrenches,
        (select count(*)::int from procedures p where p.shop_id = s.id) as procedures,
        (select count(*)::int from jobs j where j.shop_id = s.id) as jobs from shops s order by people desc`,
    );
    expect(counts).toHaveLength(2);
    expect(counts[0]?.['people']).toBe(6);
    expect(counts[1]?.['people']).toBe(2);
    for (const count of counts.flatMap((shop) => Object.values(shop))) expect(count).toBeGreaterThan(0);
  });

  it('have a wrench that has lapsed, one quarantined, and one in pound-feet', async () => {
    const crib = await rows<{ tag: string; state: string; due: string; unit: string }>(
      `select tag, state, snapshot->'due'->>'date' as due, snapshot->>'unit' as unit from wrenches`,
    );
    const today = new Date().toISOString().slice(0, 10);
    expect(crib.some(({ state, due }) => state === 'inService' && due < today)).toBe(true);
    expect(crib.some(({ state }) => state === 'quarantined')).toBe(true);
    expect(crib.some(({ state, unit }) => state === 'inService' && unit === 'lbf.ft')).toBe(true);
  });
});

describe('the walks of the demo', () => {
  it('verify from the first event to the last, and nobody has to look at anything', async () => {
    expect(walks.length).toBeGreaterThanOrEqual(5);
    for (const { chain, code } of walks) expect(chain, code).toMatchObject({ ok: true });
    expect(await rows('select hash from quarantined_events')).toEqual([]);
    expect(await rows(`select seq from confirmations where result <> 'accepted'`)).toEqual([]);
    expect(await rows(`select seq from walk_events where flags <> '[]'::jsonb`)).toEqual([]);
  });

  it('end in the past, each event after the one before', () => {
    const ends = walks.flatMap(({ chain }) => (chain.ok ? [chain.envelopes.map(({ at }) => Date.parse(at))] : []));
    for (const times of ends) {
      expect(times).toEqual([...times].sort((a, b) => a - b));
      expect(times.at(-1)).toBeLessThanOrEqual(Date.now());
    }
  });

  it('hold a finished head with a replaced bolt, a typing error, and a proof', async () => {
    const { replayed, id } = only('HEAD-D6', 'finished');
    expect(view(replayed, now)).toMatchObject({ signed: true, countersigned: true, doNotRun: false });
    expect(replayed.holes['h5']?.fastenerNo).toBe(2);
    expect(replayed.deviations.map(({ kind }) => kind)).toEqual(expect.arrayContaining(['over', 'voidedOutOfWindow']));
    const proofs = await rows<{ state: string; number: string }>(
      'select state, number from proofs where walk_id = $1',
      [id],
    );
    expect(proofs).toEqual([{ state: 'issued', number: expect.stringMatching(/^BL-\d{4}-\d{5}$/) as string }]);
  });

  it('hold a head half walked, which a tablet may take over: six bolts of pass 3 are done', () => {
    const { replayed, writer } = only('HEAD-D6', 'walking');
    expect(writer).not.toBe('office');
    expect(view(replayed, now)).toMatchObject({ instruction: { kind: 'paused', cause: 'handedOver' }, doNotRun: true });
    expect(replayed.paused).toBe('handedOver');
    const pass = view({ ...replayed, paused: null }, { ...now, boot: replayed.boot });
    expect(pass.instruction).toMatchObject({ kind: 'pull', slot: { pass: 'p3', hole: 'h7' } });
    expect(pass.progress).toEqual({ done: 6, toGo: 8 });
  });

  it('hold one that waits for its countersignature and one that was sent back', () => {
    expect(view(only('HEAD-D6', 'signed').replayed, now)).toMatchObject({ signed: true, countersigned: false });
    const back = only('MAN-F4', 'sentBack').replayed;
    expect(back.deviations.filter(({ kind, status }) => kind === 'sentBack' && status === 'open')).toHaveLength(1);
    expect(view(back, now)).toMatchObject({ signed: false, doNotRun: true });
  });
});
