/** Runs the project's own programs as children. Imports only `node:`. */
import { spawn } from 'node:child_process';
import fs from 'node:fs';
import http from 'node:http';
import https from 'node:https';
import { setTimeout as sleep } from 'node:timers/promises';
import { root } from './place.mjs';

/**
 * Starts a TypeScript program. `node --import tsx`, not `npx tsx`: a killed npx would leave its child behind.
 * @param {string} program @param {Record<string, string>} environment
 * @param {{ args?: string[], stdio?: import('node:child_process').StdioOptions }} [options]
 */
export const spawnTypeScript = (program, environment, { args = [], stdio = ['ignore', 'inherit', 'inherit'] } = {}) =>
  spawn(process.execPath, ['--import', 'tsx', program, ...args], {
    cwd: root,
    env: { ...process.env, ...environment },
    stdio,
    detached: true, // Ctrl-C comes to us alone: we stop the children in their order
  });

/**
 * Runs a TypeScript program to its end and answers what it printed; throws with its output when it fails.
 * @param {string} program @param {Record<string, string>} environment
 * @returns {Promise<string>}
 */
export const runTypeScript = (program, environment) =>
  new Promise((resolve, reject) => {
    const child = spawnTypeScript(program, environment, { stdio: ['ignore', 'pipe', 'pipe'] });
    let said = '';
    for (const stream of [child.stdout, child.stderr]) stream?.on('data', (data) => (said += data));
    child.once('error', reject);
    child.once('exit', (code) => (code === 0 ? resolve(said) : reject(new Error(`${program} failed:\n${said}`))));
  });

/**
 * Asks a child to stop and waits; kills it when it does not in time.
 * @param {import('node:child_process').ChildProcess} child @param {number} [milliseconds]
 * @param {NodeJS.Signals} [signal]
 * @returns {Promise<void>}
 */
export const stopChild = (child, milliseconds = 10_000, signal = 'SIGTERM') =>
  new Promise((resolve) => {
    if (child.exitCode !== null || child.signalCode !== null) return resolve();
    const impatience = setTimeout(() => child.kill('SIGKILL'), milliseconds);
    child.once('exit', () => {
      clearTimeout(impatience);
      resolve();
    });
    child.kill(signal);
  });

/**
 * Ends the server that a killed run left behind.
 * @param {number} pid as it was written down then; by now it may be anybody's
 */
export const endLeftoverServer = async (pid) => {
  const commandLine = `/proc/${pid}/cmdline`;
  const isOurs = () => fs.existsSync(commandLine) && fs.readFileSync(commandLine, 'utf8').includes('server/main.ts');
  if (!pid || !isOurs()) return;
  process.kill(pid, 'SIGKILL');
  for (let waits = 0; isOurs() && waits < 100; waits += 1) await sleep(50);
};

/** Whether the server on this port of our own machine says that it is well. @param {number} port @param {boolean} tls */
const isWell = (port, tls) =>
  new Promise((resolve) => {
    // The certificate is the shop's own; only our own child on 127.0.0.1 is asked.
    const options = { host: '127.0.0.1', port, path: '/api/health', timeout: 2000, rejectUnauthorized: false };
    const request = (tls ? https : http).get(options, (answer) => {
      answer.resume();
      resolve(answer.statusCode === 200);
    });
    request.on('timeout', () => request.destroy());
    request.on('error', () => resolve(false));
  });

/**
 * Waits until a server that was just started answers; throws when it ends instead.
 * @param {import('node:child_process').ChildProcess} child @param {{ port: number, tls?: boolean }} where
 */
export const untilAnswering = async (child, { port, tls = false }) => {
  for (const end = Date.now() + 60_000; Date.now() < end; await sleep(50)) {
    if (child.exitCode !== null || child.signalCode !== null) throw new Error('The server ended while starting.');
    if (await isWell(port, tls)) return;
  }
  throw new Error('The server does not answer.');
};
