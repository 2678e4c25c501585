/** Sees to what must be installed: Debian packages and npm's. Imports only `node:`. */
import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { oneAtATime, root } from './place.mjs';
import { findPrograms } from '../../db/clusterSql.mjs';

/** Which program tells that a Debian package is there. @type {Record<string, () => boolean>} */
const isInstalled = {
  postgresql: () => findPrograms() !== null,
  chromium: () => fs.existsSync('/usr/bin/chromium'),
  'poppler-utils': () => fs.existsSync('/usr/bin/pdftotext'),
  'zbar-tools': () => fs.existsSync('/usr/bin/zbarimg'),
  qpdf: () => fs.existsSync('/usr/bin/qpdf'),
  units: () => fs.existsSync('/usr/bin/units'),
};

/** What `npm start` needs from Debian. */
export const startNeeds = ['postgresql'];

/** @param {string} text */
const say = (text) => process.stderr.write(`${text}\n`);

/** @param {string} command @param {string[]} args */
const runLoudly = (command, args) => {
  const environment = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  // Its chatter goes to standard error, so that standard output stays what the caller promises.
  const result = spawnSync(command, args, { cwd: root, stdio: ['ignore', 2, 2], env: environment });
  if (result.status !== 0) throw new Error(`${command} ${args.join(' ')} failed`);
};

/**
 * Installs missing Debian packages when root; else names the one command that does.
 * @param {string[]} needed
 */
export const ensureDebianPackages = (needed) => {
  const missing = needed.filter((name) => !isInstalled[name]?.());
  if (missing.length === 0) return;
  if (process.getuid?.() !== 0) {
    throw new Error(
      `Missing Debian packages. Please run:\n\n  sudo apt-get update && sudo apt-get install -y ${missing.join(' ')}\n`,
    );
  }
  say(`Installing ${missing.join(', ')} …`);
  runLoudly('apt-get', ['update', '-q']);
  runLoudly('apt-get', ['install', '-y', '-q', '--no-install-recommends', ...missing]);
};

/** @typedef {{ packages: Record<string, { version?: string, optional?: boolean }> }} Lock */

/** Whether node_modules holds exactly the versions of package-lock.json (packages of other systems may lack). */
export const packagesAreCurrent = () => {
  const installedFile = path.join(root, 'node_modules/.package-lock.json');
  if (!fs.existsSync(installedFile)) return false;
  const read = (/** @type {string} */ file) => /** @type {Lock} */ (JSON.parse(fs.readFileSync(file, 'utf8'))).packages;
  const installed = read(installedFile);
  return Object.entries(read(path.join(root, 'package-lock.json'))).every(
    ([place, wanted]) =>
      place === '' || (installed[place]?.version ?? (wanted.optional && wanted.version)) === wanted.version,
  );
};

/**
 * Runs `npm ci` when node_modules is missing or differs from package-lock.json; two runs wait for each other.
 * @param {string} place a folder this user can write
 */
export const ensurePackages = async (place) => {
  if (packagesAreCurrent()) return;
  await oneAtATime(path.join(path.dirname(place), 'npm.lock'), () => {
    if (packagesAreCurrent()) return;
    say('Installing packages (npm ci), about a minute the first time …');
    runLoudly('npm', ['ci', '--no-fund', '--no-audit', '--loglevel=error']);
  });
};

/** Refuses another Node.js than the one the packages are made for. */
export const ensureNode = () => {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major === 20 && minor >= 19) return;
  throw new Error(`Boltwalk runs on Node.js 20 (20.19 or later); this is ${process.versions.node}.`);
};
