import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestDatabase, type TestDatabase } from '../support/testDatabase';

let database: TestDatabase;
let owner: pg.Client;

const open = async (url: string): Promise<pg.Client> => {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  return client;
};

beforeAll(async () => {
  database = await createTestDatabase();
  owner = await open(database.ownerUrl);
});
afterAll(async () => {
  await owner.end();
  database.drop();
});

const namesOf = async (sql: string): Promise<string[]> =>
  (await owner.query<{ name: string }>(sql)).rows.map((row) => row.name);

const INSERT_ONLY = [
  ...['audit', 'branch_choices', 'confirmations', 'ledger', 'person_roles', 'pins', 'quarantine_settlings'],
  ...['quarantined_events', 'shop_policies', 'walk_events', 'wrench_history'],
];

describe('every table', () => {
  it('is listed here: a new one is looked at by whoever adds it', async () => {
    expect(await namesOf(`select tablename as name from pg_tables where schemaname = 'public' order by 1`)).toEqual([
      ...['audit', 'blobs', 'branch_choices', 'confirmations', 'deviations', 'enrolment_codes', 'job_joints', 'jobs'],
      ...['ledger', 'orders', 'outbox', 'people', 'person_roles', 'pin_failures', 'pin_uses', 'pins'],
      ...['procedure_revisions', 'procedures', 'proofs', 'quarantine_settlings', 'quarantined_events', 'sessions'],
      ...['shop_counters', 'shop_keys', 'shop_policies', 'shops', 'sign_in_failures', 'tablets', 'walk_blobs'],
      ...['walk_branches', 'walk_events', 'walk_hands', 'walks', 'wrench_history', 'wrenches'],
    ]);
  });

  it('has row-level security enabled and forced', async () => {
    const open = await namesOf(`
      select relname as name from pg_class where relnamespace = 'public'::regnamespace and relkind in ('r', 'p')
        and not (relrowsecurity and relforcerowsecurity)`);
    expect(open).toEqual([]);
  });

  it('has exactly one policy, which compares the shop for reading and for writing', async () => {
    const { rows } = await owner.query<{ tablename: string; qual: string; with_check: string; cmd: string }>(
      `select tablename, qual, with_check, cmd from pg_policies where schemaname = 'public' order by tablename`,
    );
    const tables = await namesOf(`select tablename as name from pg_tables where schemaname = 'public' order by 1`);
    expect(rows.map((row) => row.tablename)).toEqual(tables);
    for (const row of rows) {
      const column = row.tablename === 'shops' ? 'id' : 'shop_id';
      const wanted = `(${column} = (NULLIF(current_setting('app.shop_id'::text, true), ''::text))::uuid)`;
      expect(row).toEqual({ tablename: row.tablename, qual: wanted, with_check: wanted, cmd: 'ALL' });
    }
  });

  it('begins its primary key, and every unique one, with the shop', async () => {
    const odd = await namesOf(`
      select i.indexrelid::regclass::text as name from pg_index i join pg_class c on c.oid = i.indrelid
      join pg_attribute a on a.attrelid = i.indrelid and a.attnum = i.indkey[0]
      where c.relnamespace = 'public'::regnamespace and i.indisunique
        and a.attname <> case when c.relname = 'shops' then 'id' else 'shop_id' end`);
    expect(odd).toEqual([]);
  });

  it('has no foreign key that leaves the shop out', async () => {
    const odd = await namesOf(`
      select conname as name from pg_constraint k join pg_attribute a on a.attrelid = k.conrelid and a.attnum = k.conkey[1]
      where k.contype = 'f' and k.connamespace = 'public'::regnamespace and a.attname <> 'shop_id'`);
    expect(odd).toEqual([]);
  });

  it('lets the application delete nothing, and change nothing that is insert-only', async () => {
    const may = (privilege: string) =>
      namesOf(`
        select relname as name from pg_class where relnamespace = 'public'::regnamespace and relkind in ('r', 'p')
          and has_table_privilege('boltwalk_app', oid, '${privilege}') order by 1`);
    expect(await may('DELETE')).toEqual([]);
    expect(await may('TRUNCATE')).toEqual([]);
    const changeable = await may('UPDATE');
    expect(INSERT_ONLY.filter((name) => changeable.includes(name))).toEqual([]);
  });

  it('is owned by the owner, so that the application cannot switch its policy off', async () => {
    expect(await namesOf(`select distinct tableowner as name from pg_tables where schemaname = 'public'`)).toEqual([
      'boltwalk_owner',
    ]);
  });
});

describe('functions that look across shops', () => {
  it('are these three, owned by a role that nobody signs in as', async () => {
    const { rows } = await owner.query<{ name: string; owner: string; login: boolean; bypass: boolean }>(`
      select p.proname as name, r.rolname as owner, r.rolcanlogin as login, r.rolbypassrls as bypass
      from pg_proc p join pg_roles r on r.oid = p.proowner
      where p.pronamespace = 'public'::regnamespace and p.prosecdef order by 1`);
    const by = { owner: 'boltwalk_lookup', login: false, bypass: true };
    expect(rows).toEqual([
      { name: 'search_shop', ...by },
      { name: 'shops_for_email', ...by },
      { name: 'shops_with_outbox', ...by },
    ]);
  });

  it('fix the path in which they look names up', async () => {
    expect(
      await namesOf(`
        select proname as name from pg_proc where pronamespace = 'public'::regnamespace and prosecdef
          and not coalesce(proconfig @> array['search_path=public, pg_temp'], false)`),
    ).toEqual([]);
  });
});

describe('insert-only tables', () => {
  it.each(INSERT_ONLY)('%s refuses update, delete and truncate even from a superuser', async (table) => {
    const root = await open(database.superUrl);
    try {
      const triggers = await root.query<{ events: string }>(
        `select string_agg(distinct t.tgtype::text, ',' order by t.tgtype::text) as events from pg_trigger t
         join pg_proc p on p.oid = t.tgfoid where t.tgrelid = $1::regclass and p.proname = 'refuse_change'`,
        [table],
      );
      // 27: before, for each row, update or delete. 34: before, for each statement, truncate.
      expect(triggers.rows[0]?.events).toBe('27,34');
      await expect(root.query(`truncate ${table} cascade`)).rejects.toMatchObject({ code: 'BW002' });
    } finally {
      await root.end();
    }
  });

  it('keeps a stored row as it is', async () => {
    const root = await open(database.superUrl);
    try {
      await root.query(
        `insert into audit (shop_id, id, at, action) values (gen_random_uuid(), gen_random_uuid(), now(), 'test')`,
      );
      await expect(root.query(`update audit set action = 'other'`)).rejects.toMatchObject({ code: 'BW002' });
      await expect(root.query(`delete from audit`)).rejects.toMatchObject({ code: 'BW002' });
      expect((await root.query<{ action: string }>('select action from audit')).rows).toEqual([{ action: 'test' }]);
    } finally {
      await root.end();
    }
  });
});
