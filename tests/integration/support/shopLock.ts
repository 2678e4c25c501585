import { setTimeout as sleep } from 'node:timers/promises';
import pg from 'pg';
import type { TestServer } from './testServer';

/** Holds the row that every transaction of a shop needs last: what is under way has inserted, and cannot commit. */
export interface ShopLock {
  /** Waits until so many transactions of the server wait, and answers how many of them have inserted events. */
  untilWaiting(count: number): Promise<{ inserted: number }>;
  /** Lets them go on. */
  release(): Promise<void>;
}

const WAITING = `
  select a.pid, exists (
    select from pg_locks l where l.pid = a.pid and l.granted and l.mode = 'RowExclusiveLock'
      and l.relation = 'walk_events'::regclass
  ) as inserted
  from pg_stat_activity a where a.datname = current_database() and a.usename = 'boltwalk_app' and a.wait_event_type = 'Lock'`;

const connected = async (server: TestServer): Promise<pg.Client> => {
  const client = new pg.Client({ connectionString: server.database.superUrl });
  client.on('error', () => undefined); // the database itself may be killed meanwhile
  await client.connect();
  return client;
};

/** Takes the row lock of a shop's catalogue counter on a connection of its own. */
export const holdShop = async (server: TestServer, shop: string): Promise<ShopLock> => {
  const holder = await connected(server);
  await holder.query('begin');
  await holder.query(`select value from shop_counters where shop_id = $1 and name = 'catalogue' for update`, [shop]);
  const release = () => holder.end().catch(() => undefined);
  return {
    release,
    async untilWaiting(count) {
      // A connection of its own: within a transaction the list of what runs stays as it was first seen.
      const watcher = await connected(server);
      try {
        for (let tries = 0; tries < 400; tries += 1) {
          const { rows } = await watcher.query<{ inserted: boolean }>(WAITING);
          if (rows.length >= count) return { inserted: rows.filter(({ inserted }) => inserted).length };
          await sleep(25);
        }
      } finally {
        await watcher.end();
      }
      await release();
      throw new Error(`fewer than ${count} transactions wait for the shop`);
    },
  };
};

/** Waits until no connection of the server is left in a transaction: what it had begun is committed or rolled back. */
export const untilSettled = async (server: TestServer): Promise<void> => {
  const client = await connected(server);
  try {
    for (let tries = 0; tries < 400; tries += 1) {
      const { rows } = await client.query(
        `select from pg_stat_activity where datname = current_database() and usename = 'boltwalk_app' and xact_start is not null`,
      );
      if (rows.length === 0) return;
      await sleep(25);
    }
    throw new Error('a transaction of the server does not end');
  } finally {
    await client.end();
  }
};
