/** Where a run keeps its things, which port it takes, and who holds a place. Imports only `node:`. */
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { freePort } from '../../db/cluster.mjs';

/** The folder of the checkout. */
export const root = path.resolve(import.meta.dirname, '../..');

/**
 * The folder of one kind of run for this user, under `.local`, or under /var/tmp where the checkout cannot be written.
 * @param {'start' | 'test'} kind
 */
export const localPlace = (kind) => {
  const user = String(process.getuid?.() ?? 0);
  const wanted = path.join(root, '.local', user, kind);
  try {
    fs.mkdirSync(wanted, { recursive: true });
    fs.accessSync(wanted, fs.constants.W_OK);
    return wanted;
  } catch {
    const name = createHash('sha256').update(root).digest('hex').slice(0, 12);
    const fallback = path.join('/var/tmp', `boltwalk-${user}-${name}`, kind);
    fs.mkdirSync(fallback, { recursive: true, mode: 0o711 });
    return fallback;
  }
};

/**
 * The port of the first time, while it is free; else any for this once. It is kept because an address is more than a
 * number: what a browser stored under one port it does not show under another.
 * @param {string} place @param {number} preferred
 */
export const rememberedPort = async (place, preferred) => {
  const file = path.join(place, 'port');
  const first = fs.existsSync(file) ? Number(fs.readFileSync(file, 'utf8')) : 0;
  const port = await freePort(first || preferred);
  if (!first) fs.writeFileSync(file, String(port));
  return port;
};

/** @param {number} pid */
export const isAlive = (pid) => {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return /** @type {NodeJS.ErrnoException} */ (error).code === 'EPERM';
  }
};

/** The living process that holds a lock file, or null. @param {string} file */
export const holderOf = (file) => {
  if (!fs.existsSync(file)) return null;
  const pid = Number(fs.readFileSync(file, 'utf8').split('\n')[0]);
  return pid && pid !== process.pid && isAlive(pid) ? pid : null;
};

/** Takes a lock file unless somebody alive holds it. @param {string} file */
const tryLock = (file) => {
  if (holderOf(file) !== null) return false;
  fs.rmSync(file, { force: true });
  try {
    fs.writeFileSync(file, `${process.pid}\n`, { flag: 'wx' });
    return true;
  } catch {
    return false; // another one was quicker
  }
};

/**
 * Does one thing at a time across processes; a lock left by a dead process is taken over.
 * @template T
 * @param {string} file @param {() => T | Promise<T>} work
 * @returns {Promise<T>}
 */
export const oneAtATime = async (file, work) => {
  while (!tryLock(file)) await sleep(200);
  try {
    return await work();
  } finally {
    fs.rmSync(file, { force: true });
  }
};
