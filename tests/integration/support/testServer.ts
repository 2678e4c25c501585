import { mkdtempSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { pino } from 'pino';
import { createApp } from '../../../server/app';
import { folderBlobStore } from '../../../server/blobs/folderBlobStore';
import { readConfig } from '../../../server/config';
import { systemIds, type Deps } from '../../../server/deps';
import { FailureMemory } from '../../../server/http/rateLimit';
import { keyringCache } from '../../../server/keys/keyring';
import { nodeRecordCrypto } from '../../../server/keys/nodeRecordCrypto';
import { FoldCache } from '../../../server/modules/sync/foldCache';
import { openClient } from '../../../server/tenancy/client';
import { createTestDatabase, type TestDatabase } from '../../support/testDatabase';

/** A server in this process, on a database of its own, whose clock the test moves. */
export interface TestServer {
  deps: Deps;
  database: TestDatabase;
  url: string;
  /** Lines of the log at level error: a 500 is seen there, whatever the answer says. */
  errors: string[];
  /** Moves the clock. */
  pass(milliseconds: number): void;
  close(): Promise<void>;
}

/** When the tests' clock stands at first. */
export const START = Date.parse('2026-06-13T15:00:00.000Z');

const configFor = (database: TestDatabase, folder: string, demo: boolean) =>
  readConfig({
    NODE_ENV: 'test',
    DATABASE_URL: database.appUrl,
    APP_SECRET: 'only-for-integration-tests-0123456789',
    PUBLIC_URL: 'http://localhost:4180',
    BLOB_DIR: path.join(folder, 'blobs'),
    DIST_DIR: path.join(folder, 'dist'),
    DEMO: demo ? '1' : '0',
  });

const logInto = (errors: string[]) => pino({ level: 'error' }, { write: (line: string) => void errors.push(line) });

const depsFor = (database: TestDatabase, folder: string, demo: boolean, errors: string[]) => {
  let now = START;
  const clock = { now: () => new Date(now), mono: () => now - START, boot: 'test-server' };
  const config = configFor(database, folder, demo);
  const deps: Deps = {
    config,
    clock,
    log: logInto(errors),
    client: openClient(config.databaseUrl, (error) => void errors.push(error.message)),
    blobs: folderBlobStore(config.blobDir),
    keyring: keyringCache(config),
    crypto: nodeRecordCrypto(),
    failures: new FailureMemory(),
    folds: new FoldCache(),
    proofPdf: () => Promise.resolve(new TextEncoder().encode('%PDF- of a test')),
    ids: systemIds(clock.now),
  };
  return { deps, pass: (milliseconds: number) => void (now += milliseconds) };
};

/** Starts the real application on a free port. Close it in `afterAll`. */
export const startTestServer = async ({ demo = false, seeded = false } = {}): Promise<TestServer> => {
  const database = await createTestDatabase({ seeded });
  const folder = mkdtempSync(path.join(os.tmpdir(), 'boltwalk-test-'));
  const errors: string[] = [];
  const { deps, pass } = depsFor(database, folder, demo, errors);
  const listening = createApp(deps).listen(0, '127.0.0.1');
  await new Promise((resolve) => listening.once('listening', resolve));
  const { port } = listening.address() as AddressInfo;
  return {
    deps,
    database,
    url: `http://127.0.0.1:${port}`,
    errors,
    pass,
    async close() {
      listening.closeAllConnections();
      await new Promise((resolve) => listening.close(resolve));
      await deps.client.close();
      database.drop();
      rmSync(folder, { recursive: true, force: true });
    },
  };
};
