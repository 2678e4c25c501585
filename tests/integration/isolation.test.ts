import { sql } from 'drizzle-orm';
import pg from 'pg';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { openClient } from '../../server/tenancy/client';
import { withShop } from '../../server/tenancy/withShop';
import { makeTestShop, type TestShop } from './support/testShop';
import { startTestServer, type TestServer } from './support/testServer';

let server: TestServer;
let own: TestShop;
let other: TestShop;

beforeAll(async () => {
  server = await startTestServer();
  own = await makeTestShop(server.deps);
  other = await makeTestShop(server.deps);
});
afterAll(() => server.close());

const TABLES = [
  'shops',
  'people',
  'pins',
  'procedures',
  'procedure_revisions',
  'wrenches',
  'jobs',
  'job_joints',
  'shop_keys',
];

const shopsSeen = async (client: pg.ClientBase, table: string): Promise<string[]> => {
  const column = table === 'shops' ? 'id' : 'shop_id';
  const { rows } = await client.query<{ shop: string }>(`select distinct ${column}::text as shop from ${table}`);
  return rows.map(({ shop }) => shop);
};

it.each(TABLES)('%s shows a shop its own rows and no other, both ways', async (table) => {
  const client = new pg.Client({ connectionString: server.database.appUrl });
  await client.connect();
  try {
    for (const shop of [own.id, other.id]) {
      await client.query('begin');
      await client.query(`select set_config('app.shop_id', $1, true)`, [shop]);
      expect(await shopsSeen(client, table)).toEqual([shop]);
      await client.query('commit');
    }
  } finally {
    await client.end();
  }
});

it.each(TABLES)('%s shows nothing without the setting, and nothing on a connection used before', async (table) => {
  const client = new pg.Client({ connectionString: server.database.appUrl });
  await client.connect();
  try {
    expect(await shopsSeen(client, table)).toEqual([]);
    await client.query('begin');
    await client.query(`select set_config('app.shop_id', $1, true)`, [own.id]);
    expect(await shopsSeen(client, table)).toEqual([own.id]);
    await client.query('commit');
    expect(await shopsSeen(client, table)).toEqual([]);
  } finally {
    await client.end();
  }
});

it('forgets the shop when a transaction fails, on the one connection of a pool', async () => {
  const client = openClient(server.database.appUrl, () => undefined, 1);
  try {
    const failing = withShop(client, own.id, async (tx) => {
      await tx.db.execute(sql`select 1 / 0`);
    });
    await expect(failing).rejects.toThrow();
    const seen = await client.db.execute(sql`select id from shops`);
    expect(seen.rows).toEqual([]);
  } finally {
    await client.close();
  }
});

it('refuses to write a row of another shop', async () => {
  const writing = withShop(server.deps.client, own.id, (tx) =>
    tx.db.execute(sql`insert into jobs (shop_id, id, number) values (${other.id}, gen_random_uuid(), 'x')`),
  );
  await expect(writing).rejects.toMatchObject({ cause: { code: '42501' } });
});

it('holds the owner of the tables to the policies as well', async () => {
  const owner = new pg.Client({ connectionString: server.database.ownerUrl });
  await owner.connect();
  try {
    expect(await shopsSeen(owner, 'people')).toEqual([]);
  } finally {
    await owner.end();
  }
});

it('searches within the shop only, and takes a phrase as it is', async () => {
  const search = (shop: string, phrase: string) =>
    withShop(server.deps.client, shop, async (tx) => {
      const found = await tx.db.execute<{ id: string }>(sql`select id from search_shop('jobs', ${phrase}, 10)`);
      return found.rows.map(({ id }) => id);
    });
  expect(await search(own.id, 'quarry road')).toEqual([own.job]);
  expect(await search(other.id, 'quarry road')).toEqual([other.job]);
  expect(await search(own.id, '%')).toEqual([]);
  const bare = await server.deps.client.db.execute(sql`select id from search_shop('jobs', 'quarry', 10)`);
  expect(bare.rows).toEqual([]);
});
