import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import pg from 'pg';

/** The server's connections, as the role that passes by no policy. */
export interface DatabaseClient {
  db: NodePgDatabase;
  close(): Promise<void>;
}

/**
 * Opens the pool. A connection that breaks (the database was killed) is told to `onLost` and replaced at the next
 * request: the server goes on by itself (fault 5). The pool listens only to connections that are idle; one that breaks
 * inside a transaction would otherwise be an error nobody hears, which ends the process.
 */
export const openClient = (url: string, onLost: (error: Error) => void, most = 20): DatabaseClient => {
  const pool = new pg.Pool({ connectionString: url, max: most, connectionTimeoutMillis: 5_000 });
  pool.on('error', () => undefined); // said by the connection itself, below
  pool.on('connect', (connection) => void connection.on('error', onLost));
  return { db: drizzle(pool), close: () => pool.end() };
};
