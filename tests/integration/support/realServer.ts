import { randomBytes } from 'node:crypto';
import path from 'node:path';
import { readConfig } from '../../../server/config';
import { makeDeps } from '../../../server/makeDeps';
import { startServerProcess, type ServerProcess } from '../../support/serverProcess';
import { createTestDatabase } from '../../support/testDatabase';
import type { TestServer } from './testServer';

/** The server in a process of its own, which a test may kill; its callers and tablets are those of every other test. */
export interface RealServer extends TestServer {
  process: ServerProcess;
}

/** Lines of the server's log at level error, which say what a 500 or a 503 was about. */
export const errorLines = (log: string): string[] => log.split('\n').filter((line) => line.includes('"level":50'));

/**
 * Starts it on a database of its own, with the built pages if asked for. `deps` are the test's own connection to the same
 * database, for making shops; they share nothing with the server's memory. Its clock is the real one.
 */
export const startRealServer = async ({ pages = false } = {}): Promise<RealServer> => {
  const database = await createTestDatabase();
  const APP_SECRET = randomBytes(32).toString('hex');
  const process = await startServerProcess({ database, pages, environment: { APP_SECRET } });
  const config = readConfig({
    NODE_ENV: 'test',
    DATABASE_URL: database.appUrl,
    APP_SECRET,
    PUBLIC_URL: process.url,
    BLOB_DIR: process.blobFolder,
    DIST_DIR: path.join(process.blobFolder, '../dist'),
    LOG_LEVEL: 'silent',
  });
  const deps = makeDeps(config);
  return {
    process,
    deps,
    database,
    url: `http://127.0.0.1:${process.port}`,
    get errors() {
      return errorLines(process.log());
    },
    pass: () => {
      throw new Error('the clock of a real server is the real one');
    },
    async close() {
      await deps.client.close();
      await process.close();
      database.drop();
    },
  };
};
