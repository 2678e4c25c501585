import { afterAll, afterEach, beforeAll, expect, it } from 'vitest';
import type { CatalogueAnswer } from '@shared/contracts/catalogue.contract';
import type { WalkChain } from '@shared/contracts/sync.contract';
import type { EnrolledTablet } from '@shared/contracts/tablets.contract';
import { verifyChain } from '@shared/record/chain';
import { makeTestSigner, testCrypto } from '../support/testSigner';
import { anybody, callerWith, signedIn } from './support/calls';
import { startTestServer, type TestServer } from './support/testServer';
import type { TestPerson } from './support/testShop';

let server: TestServer;

beforeAll(async () => {
  server = await startTestServer({ demo: true, seeded: true });
}, 120_000);
afterEach(() => expect(server.errors).toEqual([]));
afterAll(() => server.close());

interface Doors {
  shop: { id: string; name: string };
  accounts: TestPerson[];
  walk: string | null;
}

const doors = async () => (await anybody(server).get('/api/demo/doors')).body as unknown as Doors;

const enrolled = async (key?: Awaited<ReturnType<typeof makeTestSigner>>) => {
  const { publicJwk } = key ?? (await makeTestSigner());
  const reply = await anybody(server).send('POST', '/api/demo/tablet', { publicJwk });
  expect(reply.status, JSON.stringify(reply.body)).toBe(201);
  return reply.body as unknown as EnrolledTablet;
};

it('shows six people who can all sign in at the office, and a head half walked', async () => {
  const { shop, accounts, walk } = await doors();
  expect(shop.name).toBe('Brindle Lane Engine Works');
  expect(accounts).toHaveLength(6);
  for (const account of accounts) {
    const person = await signedIn(server, account);
    expect(person.me).toMatchObject({ person: { id: account.id, roles: account.roles }, shop: { id: shop.id } });
  }
  expect(walk).toMatch(/^[0-9a-f-]{36}$/);
});

it('lets a browser in at a tap, the same one always as the same tablet', async () => {
  const key = await makeTestSigner();
  const [first, again, other] = [await enrolled(key), await enrolled(key), await enrolled()];
  expect(again.tablet).toEqual(first.tablet);
  expect(other.tablet.id).not.toBe(first.tablet.id);
});

it('has PINs that are right, and walks whose chains verify', async () => {
  const { accounts, walk } = await doors();
  const tablet = await enrolled();
  const caller = callerWith(server, { authorization: `Bearer ${tablet.token}` });
  const catalogue = (await caller.get('/api/tablet/catalogue')).body as unknown as CatalogueAnswer;
  expect(catalogue.people.map(({ id }) => id).sort()).toEqual(accounts.map(({ id }) => id).sort());
  expect(catalogue.walks.map(({ id }) => id)).toContain(walk);
  for (const { id, next } of catalogue.walks) {
    const chain = (await caller.get(`/api/tablet/walks/${id}`)).body as unknown as WalkChain;
    const keys = new Map(chain.keys.map(({ kid, ...jwk }) => [kid, jwk]));
    expect(await verifyChain(chain.events, keys, testCrypto)).toMatchObject({ ok: true, next });
    expect(chain.confirmations.filter(({ result }) => result === 'refused')).toEqual([]);
  }
});
