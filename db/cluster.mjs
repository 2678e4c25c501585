/**
 * A PostgreSQL cluster of the project's own, in a folder of the project's own. Imports only `node:`, because it runs
 * before any package is installed.
 *
 * PostgreSQL refuses to run as root: started by root it runs as the user `postgres`, else as oneself. It listens on
 * 127.0.0.1 alone, with passwords and without sockets (a socket's path has a limit of 107 bytes).
 */
import { spawn, spawnSync } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import fs from 'node:fs';
import net from 'node:net';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { findPrograms, makeRoles, programsHome, runSql } from './clusterSql.mjs';

/** @typedef {import('./clusterSql.mjs').ClusterSettings} ClusterSettings */

/** @param {string} data */
const programsFor = (data) => {
  const versionFile = path.join(data, 'PG_VERSION');
  if (!fs.existsSync(versionFile)) return findPrograms();
  const version = fs.readFileSync(versionFile, 'utf8').trim();
  const programs = `${programsHome}/${version}/bin`;
  if (fs.existsSync(programs)) return programs;
  throw new Error(`The data in ${data} belongs to PostgreSQL ${version}, which is not installed (${programs}).`);
};

/** Whom the server runs as: nothing to change when we are not root. */
const runAs = () => {
  if (process.getuid?.() !== 0) return {};
  const number = (/** @type {string} */ flag) =>
    spawnSync('id', [flag, 'postgres'], { encoding: 'utf8' }).stdout.trim();
  const [uid, gid] = [number('-u'), number('-g')];
  if (!uid || !gid) throw new Error('There is no user "postgres": install the Debian package postgresql.');
  return { uid: Number(uid), gid: Number(gid) };
};

/**
 * Where the data may live: the folder asked for, or one under /var/tmp when the server's user cannot enter it
 * (a home of mode 700, for instance).
 * @param {string} wanted
 */
export const enterableFolder = (wanted) => {
  const user = runAs();
  fs.mkdirSync(wanted, { recursive: true });
  if (user.uid === undefined || spawnSync('test', ['-x', wanted], { ...user, cwd: '/' }).status === 0) return wanted;
  const name = createHash('sha256').update(wanted).digest('hex').slice(0, 12);
  const fallback = path.join('/var/tmp', `boltwalk-${process.getuid?.() ?? 0}-${name}`);
  fs.mkdirSync(fallback, { recursive: true, mode: 0o711 });
  if (fs.statSync(fallback).uid !== process.getuid?.()) throw new Error(`${fallback} belongs to somebody else.`);
  return fallback;
};

/**
 * A free port on 127.0.0.1: the preferred one if it is free, else any.
 * @param {number} [preferred]
 * @returns {Promise<number>}
 */
export const freePort = (preferred = 0) =>
  new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.once('error', () => (preferred === 0 ? reject(new Error('No free port')) : resolve(freePort())));
    probe.listen(preferred, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() => resolve(typeof address === 'object' && address ? address.port : preferred));
    });
  });

/** Reads the settings a cluster's folder remembers, making them the first time. @param {string} folder */
const rememberedSettings = async (folder) => {
  const file = path.join(folder, 'cluster.json');
  const secret = () => randomBytes(16).toString('hex');
  /** @type {ClusterSettings} */
  const known = fs.existsSync(file)
    ? JSON.parse(fs.readFileSync(file, 'utf8'))
    : { port: 0, passwords: { super: secret(), owner: secret(), app: secret(), backup: secret() } };
  const settings = { ...known, port: await freePort(known.port) };
  fs.writeFileSync(file, JSON.stringify(settings), { mode: 0o600 });
  return settings;
};

/** @param {string} data @param {ClusterSettings['passwords']} passwords @param {boolean} fsync */
const initialise = (data, passwords, fsync) => {
  const user = runAs();
  const passwordFile = `${data}.password`;
  fs.writeFileSync(passwordFile, passwords.super, { mode: 0o600 });
  fs.mkdirSync(data, { mode: 0o700 });
  if (user.uid !== undefined) for (const place of [data, passwordFile]) fs.chownSync(place, user.uid, user.gid);
  const options = ['-U', 'boltwalk_super', `--pwfile=${passwordFile}`, '--auth=scram-sha-256', '--encoding=UTF8'];
  const result = spawnSync(
    path.join(findPrograms() ?? '', 'initdb'),
    ['-D', data, ...options, '--locale=C.UTF-8', ...(fsync ? [] : ['--no-sync'])],
    { ...user, cwd: '/', encoding: 'utf8' },
  );
  fs.rmSync(passwordFile);
  if (result.status !== 0) {
    fs.rmSync(data, { recursive: true, force: true });
    throw new Error(`initdb failed: ${result.stderr || result.error?.message || 'no message'}`);
  }
};

/** The postmaster that holds this data, if one is alive. @param {string} data */
const postmasterOf = (data) => {
  try {
    const pid = Number(fs.readFileSync(path.join(data, 'postmaster.pid'), 'utf8').split('\n')[0]);
    return fs.readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes(data) ? pid : null;
  } catch {
    return null; // no such file: nobody holds it
  }
};

/** @param {() => boolean} done @param {number} milliseconds */
const waitUntil = async (done, milliseconds) => {
  for (const end = Date.now() + milliseconds; Date.now() < end; await sleep(20)) if (done()) return true;
  return done();
};

/** Stops what an earlier run left behind after it was killed itself. @param {string} data */
export const stopLeftover = async (data) => {
  const pid = postmasterOf(data);
  if (pid === null) return;
  process.kill(pid, 'SIGINT');
  if (await waitUntil(() => postmasterOf(data) === null, 10_000)) return;
  process.kill(pid, 'SIGQUIT');
  await waitUntil(() => postmasterOf(data) === null, 10_000);
};

/** @param {string} data @param {number} port */
const startPostmaster = async (data, port) => {
  const logFile = `${data}.log`;
  if (fs.existsSync(logFile)) fs.renameSync(logFile, `${logFile}.1`);
  const log = fs.openSync(logFile, 'a');
  const settings = ['listen_addresses=127.0.0.1', 'unix_socket_directories=', 'max_connections=200'];
  const child = spawn(
    path.join(programsFor(data) ?? '', 'postgres'),
    ['-D', data, '-p', String(port), ...settings.flatMap((setting) => ['-c', setting])],
    // Its own group: Ctrl-C must reach the web server first, and this one only through stop().
    { ...runAs(), cwd: '/', detached: true, stdio: ['ignore', log, log] },
  );
  fs.closeSync(log);
  child.unref();
  const statusFile = path.join(data, 'postmaster.pid');
  const isReady = () => {
    if (!fs.existsSync(statusFile)) return false;
    const status = fs.readFileSync(statusFile, 'utf8').split('\n');
    return Number(status[0]) === child.pid && status[7]?.trim() === 'ready';
  };
  await waitUntil(() => isReady() || hasEnded(child), 60_000);
  if (!isReady()) {
    throw new Error(`PostgreSQL did not start:\n${fs.readFileSync(logFile, 'utf8').slice(-2000)}`);
  }
  return child;
};

/** Every process whose parent is the postmaster. @param {number} pid */
const backendsOf = (pid) => {
  const result = spawnSync('ps', ['-o', 'pid=', '--ppid', String(pid)], { encoding: 'utf8' });
  return result.stdout.split('\n').map(Number).filter(Boolean);
};

/** @param {number} pid */
const killIfAlive = (pid) => {
  try {
    process.kill(pid, 'SIGKILL');
  } catch {
    // It followed its postmaster already, which is what we want.
  }
};

/** @param {import('node:child_process').ChildProcess} child */
const hasEnded = (child) => child.exitCode !== null || child.signalCode !== null;

/**
 * Opens the cluster of a folder: makes it the first time, starts it, and sees to the roles.
 *
 * `kill9` ends the postmaster and every backend at once, as a fault test wants it; `start` brings the cluster back on
 * the same port. Whoever opens a cluster reaps it: it is a child of this process, and ends with it.
 * @param {{ folder: string, fsync?: boolean }} options `fsync: false` only where a lost file would not matter
 */
export const openCluster = async ({ folder, fsync = true }) => {
  const home = enterableFolder(folder);
  const data = path.join(home, 'data');
  await stopLeftover(data);
  const settings = await rememberedSettings(home);
  if (!fs.existsSync(path.join(data, 'PG_VERSION'))) initialise(data, settings.passwords, fsync);
  let child = await startPostmaster(data, settings.port);
  const endWithUs = () => child.kill('SIGINT');
  process.once('exit', endWithUs);

  const setFsync = (/** @type {boolean} */ on) => {
    const names = ['fsync', 'synchronous_commit', 'full_page_writes'];
    const lines = names.map((name) => `alter system set ${name} = ${on ? 'on' : 'off'};`);
    runSql(settings, [...lines, 'select pg_reload_conf();'].join('\n'));
  };
  setFsync(fsync);
  makeRoles(settings);

  return {
    settings,
    home,
    setFsync,
    async stop() {
      child.kill('SIGINT');
      if (!(await waitUntil(() => hasEnded(child), 10_000))) child.kill('SIGQUIT');
      await waitUntil(() => hasEnded(child), 10_000);
      process.removeListener('exit', endWithUs);
    },
    async kill9() {
      const backends = backendsOf(child.pid ?? 0);
      child.kill('SIGKILL');
      for (const pid of backends) killIfAlive(pid);
      await waitUntil(() => hasEnded(child), 10_000);
    },
    async start() {
      child = await startPostmaster(data, settings.port);
    },
  };
};

/** @typedef {Awaited<ReturnType<typeof openCluster>>} Cluster */
