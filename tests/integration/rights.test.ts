import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROLES, hasRight, type Role } from '@shared/people/roles';
import type { ProofWhole } from '@shared/contracts/proofs.contract';
import { sha256Hex } from '../../server/deps';
import { anybody, callerWith, signedIn, type Caller, type Reply } from './support/calls';
import { allEndpoints, nameOf } from './support/endpoints';
import { bodyFor, filled, type Rows } from './support/requests';
import { stored } from './support/stored';
import { enrolledTablet, walked, type TestTablet } from './support/testTablet';
import { makeTestShop, type TestShop } from './support/testShop';
import { startTestServer, type TestServer } from './support/testServer';

/*
 * Every office and tablet address × every role × own and other shop. The table of addresses comes from the contracts, the
 * rights from shared/people: an endpoint without its right, or one that finds a row of another shop, fails here.
 */

interface Side {
  shop: TestShop;
  tablet: TestTablet;
  rows: Rows;
}

let server: TestServer;
let own: Side;
let other: Side;
const callers = new Map<Role, Caller>();

const personOf = (shop: TestShop, role: Role) => shop.people[role];

const makeSide = async (): Promise<Side> => {
  const shop = await makeTestShop(server.deps);
  const tablet = await enrolledTablet(server, shop);
  const walk = await walked(tablet);
  await walk.send();
  const clerk = await signedIn(server, shop.people.clerk);
  const issued = await clerk.send('POST', `/api/walks/${walk.id}/proof`, {});
  const proof = issued.body as unknown as ProofWhole;
  const bytes = new TextEncoder().encode(`a photo of ${shop.id}`);
  await tablet.send('PUT', `/api/tablet/blobs/${sha256Hex(bytes)}`, bytes);
  // Revoked by the matrix: not the tablet that goes on being used.
  const spare = await enrolledTablet(server, shop);
  const [use] = await stored<{ id: string }>(server, 'select id from pin_uses where walk_id = $1', [walk.id]);
  const rows = {
    job: shop.job,
    procedure: shop.procedure.id,
    walk: walk.id,
    person: shop.people.colleague.id,
    tablet: spare.enrolled.tablet.id,
    proof: proof.id,
    pinUse: use?.id ?? '',
    blob: sha256Hex(bytes),
    shop: shop.id,
    token: proof.publicUrl.split('/p/')[1] ?? '',
    head: '0'.repeat(64),
  };
  return { shop, tablet, rows };
};

beforeAll(async () => {
  server = await startTestServer();
  own = await makeSide();
  other = await makeSide();
  for (const role of ROLES) callers.set(role, await signedIn(server, personOf(own.shop, role)));
});
afterAll(() => server.close());

const ask = (caller: Caller, method: string, path: string, side: Side): Promise<Reply> =>
  caller.send(method, filled(path, side.rows), bodyFor(`${method} ${path}`, side.rows));

const callerOf = (role: Role): Caller => {
  const caller = callers.get(role);
  if (!caller) throw new Error(`nobody signed in as ${role}`);
  return caller;
};

const office = allEndpoints.filter(({ auth, path }) => auth === 'office' && path !== '/api/office/sign-out');
const tabletOnes = allEndpoints.filter(({ auth }) => auth === 'tablet');
const named = <E extends { method: string; path: string }>(endpoints: E[]): [string, E][] =>
  endpoints.map((endpoint) => [`${endpoint.method} ${endpoint.path}`, endpoint]);

describe('rights', () => {
  const guarded = named(office.filter(({ right }) => right !== undefined));
  for (const [name, { method, path, right }] of guarded) {
    it.each(ROLES.map((role) => [role]))(`${name} as %s`, async (role) => {
      const reply = await ask(callerOf(role), method, path, own);
      const refused = reply.status === 403 && reply.body.error?.code === 'right.missing';
      expect(reply.status).not.toBe(401);
      expect(refused).toBe(!hasRight([role], right ?? 'see'));
    });
  }

  it('of an office address without one are looked at by its handler, or need none', () => {
    expect(office.filter(({ right }) => right === undefined).map(nameOf)).toEqual(
      [
        'GET /api/office/me',
        'POST /api/people/me/pin',
        'PATCH /api/jobs/:id',
        'GET /api/pin-uses',
        'POST /api/pin-uses/:id/disown',
        'POST /api/pin-uses/:id/own',
      ].sort((a, b) => office.map(nameOf).indexOf(a) - office.map(nameOf).indexOf(b)),
    );
  });

  it('of a job let a clerk and a supervisor change its claim, a keeper nothing', async () => {
    const path = `/api/jobs/${own.rows.job}`;
    for (const role of ROLES) {
      const claim = await callerOf(role).send('PATCH', path, { claim: 'WR-1' });
      const engine = await callerOf(role).send('PATCH', path, { engineModel: 'D6 3.8' });
      const mayClaim = hasRight([role], 'keepJobs') || hasRight([role], 'keepProofs');
      expect([role, claim.status, engine.status]).toEqual([
        role,
        mayClaim ? 200 : 403,
        hasRight([role], 'keepJobs') ? 200 : 403,
      ]);
    }
  });
});

describe('another shop', () => {
  const addressed = named(office.filter(({ path }) => path.includes(':')));
  for (const [name, { method, path }] of addressed) {
    it.each(ROLES.map((role) => [role]))(`is as if it were not there: ${name} as %s`, async (role) => {
      const reply = await ask(callerOf(role), method, path, other);
      expect([403, 404], `${reply.status} ${JSON.stringify(reply.body)}`).toContain(reply.status);
      if (reply.status === 403) expect(reply.body.error?.code).toBe('right.missing');
    });
  }

  const lists = named(office.filter(({ method, path }) => method === 'GET' && !path.includes(':')));
  it.each(lists)('is not in a list: %s', async (_name, { path }) => {
    for (const role of ROLES) {
      const text = new TextDecoder().decode((await callerOf(role).get(path)).bytes);
      for (const id of [other.rows.job, other.rows.walk, other.rows.proof, other.rows.person, other.shop.id]) {
        expect(text).not.toContain(id);
      }
    }
  });

  it('is not in the catalogue of a tablet', async () => {
    const text = new TextDecoder().decode((await own.tablet.get('/api/tablet/catalogue')).bytes);
    expect(text).toContain(own.rows.walk);
    for (const id of [other.rows.job, other.rows.walk, other.rows.person, other.shop.id])
      expect(text).not.toContain(id);
  });

  it('cannot be read or taken over by a tablet, and a batch for its walk stores nothing there', async () => {
    const { tablet } = own;
    expect((await tablet.get(`/api/tablet/walks/${other.rows.walk}`)).status).toBe(404);
    const take = { forced: false, person: own.shop.people.technician.id };
    expect((await tablet.send('POST', `/api/tablet/walks/${other.rows.walk}/take-over`, take)).status).toBe(404);
    const walk = await walked(tablet, { until: (_, book) => book.events.length >= 3 }, { id: other.rows.walk });
    const before = await stored(server, 'select count(*) from walk_events where shop_id = $1', [other.shop.id]);
    expect((await walk.send()).status).toBe(200);
    expect(await stored(server, 'select count(*) from walk_events where shop_id = $1', [other.shop.id])).toEqual(
      before,
    );
  });

  it('gives no blob away, though it holds the same bytes', async () => {
    const bytes = new TextEncoder().encode('only in the other shop');
    await other.tablet.send('PUT', `/api/tablet/blobs/${sha256Hex(bytes)}`, bytes);
    const reply = await callerOf('supervisor').get(`/api/blobs/${sha256Hex(bytes)}`);
    expect([reply.status, reply.body.error?.code]).toEqual([404, 'blob.unknown']);
  });
});

describe('nobody', () => {
  it.each(named(office))('is told 401 by %s', async (_name, { method, path }) => {
    const reply = await ask(anybody(server), method, path, own);
    expect([reply.status, reply.body.error?.code]).toEqual([401, 'session.missing']);
  });

  it.each(named(tabletOnes))('is told 401 by %s', async (_name, { method, path }) => {
    const reply = await ask(anybody(server), method, path, own);
    expect([reply.status, reply.body.error?.code]).toEqual([401, 'token.missing']);
  });

  it.each(named(tabletOnes))('with an office cookie is still nobody to %s', async (_name, { method, path }) => {
    const reply = await ask(callerOf('admin'), method, path, own);
    expect([reply.status, reply.body.error?.code]).toEqual([401, 'token.missing']);
  });

  it.each(named(office))('with the bearer of a tablet is still nobody to %s', async (_name, { method, path }) => {
    const reply = await ask(own.tablet, method, path, own);
    expect([reply.status, reply.body.error?.code]).toEqual([401, 'session.missing']);
  });
});

describe('a write with the cookie alone', () => {
  const writes = named(office.filter(({ method }) => method !== 'GET'));
  it.each(writes)('is refused by %s: it may come from another site', async (_name, { method, path }) => {
    const { email, password } = own.shop.people.admin;
    const signed = await anybody(server).send('POST', '/api/office/sign-in', { email, password });
    const cookie = (signed.headers.get('set-cookie') ?? '').split(';')[0] ?? '';
    const reply = await ask(callerWith(server, { cookie }), method, path, own);
    expect([reply.status, reply.body.error?.code]).toEqual([403, 'csrf.wrong']);
  });
});

it('never answers 500 on the way', () => {
  expect(server.errors).toEqual([]);
});
