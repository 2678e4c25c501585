/**
 * `npm start`: from a bare checkout to a running shop. Installs what is missing, starts a database of its own, brings
 * the tables to the present, fills an empty one with the demo, builds the pages and serves them until Ctrl-C.
 * `--reset` throws the data away and fills the demo anew. Imports only `node:`, because no package may be there yet.
 */
import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { openCluster } from '../db/cluster.mjs';
import { dropDatabase } from '../db/clusterSql.mjs';
import { ensurePages } from './start/build.mjs';
import { endLeftoverServer, runTypeScript, spawnTypeScript, stopChild, untilAnswering } from './start/children.mjs';
import { environmentOf, isEmptyDatabase, migrateDatabase, seedDatabase } from './start/database.mjs';
import { databaseName } from './start/installation.mjs';
import { ensureDebianPackages, ensureNode, ensurePackages, startNeeds } from './start/packages.mjs';
import { holderOf, localPlace, rememberedPort } from './start/place.mjs';

const place = localPlace('start');
const lock = path.join(place, 'running.pid');

/** @param {string} text */
const say = (text) => process.stdout.write(`${text}\n`);

/** A secret made once for this checkout, so that sessions survive a restart. */
const rememberedSecret = () => {
  const file = path.join(place, 'secret');
  if (!fs.existsSync(file)) fs.writeFileSync(file, randomBytes(32).toString('hex'), { mode: 0o600 });
  return fs.readFileSync(file, 'utf8').trim();
};

/**
 * What the server reads; whatever is set outside wins.
 * @returns {Promise<Record<string, string> & { PORT: string, PUBLIC_URL: string, BLOB_DIR: string }>}
 */
const serverEnvironment = async () => {
  const port = process.env.PORT ?? String(await rememberedPort(place, 4180));
  const scheme = process.env.TLS_CERT ? 'https' : 'http';
  return {
    DEMO: process.env.NODE_ENV === 'production' ? '0' : '1', // the server refuses a demo in production
    HOST: '127.0.0.1',
    PUBLIC_URL: `${scheme}://localhost:${port}`,
    APP_SECRET: rememberedSecret(),
    BLOB_DIR: path.join(place, 'blobs'),
    ...process.env,
    PORT: port,
  };
};

/** @param {import('../db/cluster.mjs').Cluster} cluster @param {Record<string, string>} environment */
const prepareDatabase = async (cluster, environment) => {
  await migrateDatabase(cluster.settings, databaseName);
  if (!['1', 'true'].includes(environment.DEMO ?? '') || !isEmptyDatabase(cluster.settings, databaseName)) return;
  say('Filling the demo …');
  await seedDatabase(cluster.settings, databaseName, environment);
};

/**
 * A database ready for the server: the one named outside (which is migrated, never filled), else our own.
 * @param {Record<string, string>} environment @param {Closers} closers
 */
const openDatabase = async (environment, closers) => {
  if (environment.DATABASE_URL) {
    if (environment.OWNER_DATABASE_URL) await runTypeScript('db/migrate.ts', {});
    return {};
  }
  const cluster = await openCluster({ folder: path.join(place, 'postgresql') });
  closers.push(cluster.stop);
  await prepareDatabase(cluster, environment);
  return environmentOf(cluster.settings, databaseName);
};

/** Brings everything up, in the order it is needed. @param {Closers} closers */
const start = async (closers) => {
  const environment = await serverEnvironment();
  const pages = ensurePages(place);
  pages.catch(() => undefined); // awaited below; a failing database is told first
  const database = await openDatabase(environment, closers);
  const server = spawnTypeScript('server/main.ts', { ...environment, ...database, DIST_DIR: await pages });
  closers.push(() => stopChild(server));
  fs.writeFileSync(lock, `${process.pid}\n${environment.PUBLIC_URL}\n${server.pid}\n`);
  await untilAnswering(server, { port: Number(environment.PORT), tls: Boolean(environment.TLS_CERT) });
  say(`\nBoltwalk is ready: ${environment.PUBLIC_URL}\nCtrl-C stops it; the data stays in ${place}.`);
  await new Promise((resolve) => server.once('exit', resolve));
  throw new Error('The server ended by itself.');
};

/** Throws the demo's data away and fills it anew. @param {Closers} closers */
const reset = async (closers) => {
  if (process.env.DATABASE_URL) throw new Error('DATABASE_URL names a database of yours: it is not reset from here.');
  const environment = await serverEnvironment();
  const cluster = await openCluster({ folder: path.join(place, 'postgresql') });
  closers.push(cluster.stop);
  dropDatabase(cluster.settings, databaseName);
  fs.rmSync(environment.BLOB_DIR, { recursive: true, force: true });
  await prepareDatabase(cluster, environment);
  say('The data is as on the first day. `npm start` opens it.');
};

/** @typedef {(() => Promise<void>)[]} Closers what must be stopped, the last first */

/** @param {Closers} closers */
const closeAll = async (closers) => {
  for (let close = closers.pop(); close; close = closers.pop()) await close();
  fs.rmSync(lock, { force: true });
};

let isStopping = false;

const main = async () => {
  const isReset = process.argv.includes('--reset');
  const holder = holderOf(lock);
  if (holder !== null) {
    const address = fs.readFileSync(lock, 'utf8').split('\n')[1];
    if (isReset) throw new Error(`Boltwalk is running (process ${holder}): stop it first with Ctrl-C.`);
    say(`Boltwalk is already running (process ${holder}): ${address || 'it is just starting'}`);
    return;
  }
  if (fs.existsSync(lock)) await endLeftoverServer(Number(fs.readFileSync(lock, 'utf8').split('\n')[2]));
  fs.writeFileSync(lock, `${process.pid}\n`);
  /** @type {Closers} */
  const closers = [];
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(signal, () => {
      if (isStopping) return; // npm passes on the Ctrl-C that the terminal sent us as well
      isStopping = true;
      void closeAll(closers).then(() => process.exit(0));
    });
  }
  try {
    ensureNode();
    ensureDebianPackages(process.env.DATABASE_URL ? [] : startNeeds);
    await ensurePackages(place);
    await (isReset ? reset(closers) : start(closers));
  } finally {
    await closeAll(closers);
  }
};

main().catch((/** @type {Error} */ error) => {
  if (isStopping) return; // somebody asked for the end: what breaks on the way is no news
  process.stderr.write(`\n${error.message}\n`);
  process.exit(1);
});
