import pg from 'pg';
import type { TestServer } from './testServer';

/** Looks at what is really stored, past every policy: for expectations, never for the code under test. */
export const stored = async <T extends pg.QueryResultRow>(
  server: TestServer,
  sql: string,
  values: unknown[] = [],
): Promise<T[]> => {
  const client = new pg.Client({ connectionString: server.database.superUrl });
  await client.connect();
  try {
    return (await client.query<T>(sql, values)).rows;
  } finally {
    await client.end();
  }
};

/** Hashes of a walk's stored events, branch by branch in order. */
export const storedHashes = async (server: TestServer, walk: string): Promise<string[]> =>
  (
    await stored<{ hash: string }>(server, 'select hash from walk_events where walk_id = $1 order by branch, seq', [
      walk,
    ])
  ).map(({ hash }) => hash);
