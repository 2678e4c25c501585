import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { freePort } from '../../db/cluster.mjs';
import { ensurePages } from '../../server/start/build.mjs';
import { endLeftoverServer, spawnTypeScript, stopChild, untilAnswering } from '../../server/start/children.mjs';
import { isAlive, localPlace } from '../../server/start/place.mjs';
import type { TestDatabase } from './testDatabase';
import { createTestDatabase } from './testDatabase';

/** The real server in a process of its own, on a database of its own. */
export interface ServerProcess {
  url: string;
  port: number;
  database: TestDatabase;
  blobFolder: string;
  /** What the server wrote so far. */
  log(): string;
  /** Asks it to end, as an orderly shutdown would. */
  stop(): Promise<void>;
  /** Ends it at once, as a power cut would. */
  kill9(): Promise<void>;
  /** Starts it again (after stopping it if it runs) on the same port, database and blobs. */
  restart(): Promise<void>;
  /** Stops it and removes its database and folder. */
  close(): Promise<void>;
}

interface ServerOptions {
  /** With the demo's shops and doors. */
  seeded?: boolean;
  /** With the built pages, which takes a build; without them only the API answers. */
  pages?: boolean;
  /** On a database that the caller made, and drops. */
  database?: TestDatabase;
  environment?: Record<string, string>;
}

/** Ends the servers of runs that were killed before they could do so themselves. */
const removeOrphans = async (servers: string) => {
  for (const name of fs.readdirSync(servers)) {
    if (isAlive(Number(name.split('-')[0]))) continue;
    const pidFile = path.join(servers, name, 'pid');
    if (fs.existsSync(pidFile)) await endLeftoverServer(Number(fs.readFileSync(pidFile, 'utf8')));
    fs.rmSync(path.join(servers, name), { recursive: true, force: true });
  }
};

const makeFolder = async () => {
  const servers = path.join(localPlace('test'), 'servers');
  fs.mkdirSync(servers, { recursive: true });
  await removeOrphans(servers);
  return fs.mkdtempSync(path.join(servers, `${process.pid}-`));
};

const environmentFor = async (folder: string, port: number, database: TestDatabase, options: ServerOptions) => {
  const pages = options.pages ? await ensurePages(localPlace('test')) : path.join(folder, 'dist');
  fs.mkdirSync(pages, { recursive: true });
  return {
    NODE_ENV: 'test',
    DATABASE_URL: database.appUrl,
    OWNER_DATABASE_URL: database.ownerUrl,
    PORT: String(port),
    HOST: '127.0.0.1',
    PUBLIC_URL: `http://localhost:${port}`,
    APP_SECRET: randomBytes(32).toString('hex'),
    BLOB_DIR: path.join(folder, 'blobs'),
    DIST_DIR: pages,
    DEMO: options.seeded ? '1' : '0',
    LOG_LEVEL: 'info',
    ...options.environment,
  };
};

/** Starts the real server and waits until it answers. Close it in `afterAll`. */
export const startServerProcess = async (options: ServerOptions = {}): Promise<ServerProcess> => {
  const folder = await makeFolder();
  const port = await freePort();
  const database = options.database ?? (await createTestDatabase({ seeded: options.seeded }));
  const environment = await environmentFor(folder, port, database, options);
  const logFile = path.join(folder, 'server.log');
  const log = () => fs.readFileSync(logFile, 'utf8');

  const launch = async () => {
    const output = fs.openSync(logFile, 'a');
    const child = spawnTypeScript('server/main.ts', environment, { stdio: ['ignore', output, output] });
    fs.closeSync(output);
    fs.writeFileSync(path.join(folder, 'pid'), String(child.pid));
    await untilAnswering(child, { port }).catch((error: Error) => {
      child.kill('SIGKILL');
      throw new Error(`${error.message}\n${log().slice(-4000)}`);
    });
    return child;
  };
  let child = await launch();
  const endWithUs = () => child.kill('SIGKILL');
  process.once('exit', endWithUs);

  const stop = () => stopChild(child);
  return {
    url: environment.PUBLIC_URL,
    port,
    database,
    blobFolder: environment.BLOB_DIR,
    log,
    stop,
    kill9: () => stopChild(child, 10_000, 'SIGKILL'),
    async restart() {
      await stop();
      child = await launch();
    },
    async close() {
      await stop();
      process.removeListener('exit', endWithUs);
      if (!options.database) database.drop();
      fs.rmSync(folder, { recursive: true, force: true });
    },
  };
};
