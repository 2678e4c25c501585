/** Runs one command of a stage and keeps what it says. Imports only `node:`. */
import { spawn } from 'node:child_process';
import { root } from '../../server/start/place.mjs';

/** @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set();

/** @typedef {{ code: number, output: string, seconds: number }} Outcome */

/**
 * Runs a JavaScript program of node_modules (or of ours) to its end; never throws for a failing one.
 * @param {string[]} args what follows `node`
 * @param {{ environment?: Record<string, string>, onLine?: (line: string) => void }} [options]
 * @returns {Promise<Outcome>}
 */
export const execute = (args, { environment = {}, onLine } = {}) =>
  new Promise((resolve) => {
    const begun = performance.now();
    const child = spawn(process.execPath, args, {
      cwd: root,
      env: { ...process.env, NO_COLOR: '1', ...environment },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    running.add(child);
    let output = '';
    let unfinished = '';
    child.stdout.on('data', (data) => {
      output += data;
      const lines = (unfinished + data).split('\n');
      unfinished = lines.pop() ?? '';
      if (onLine) lines.forEach(onLine);
    });
    child.stderr.on('data', (data) => (output += data));
    const end = (/** @type {number | null} */ code) => {
      running.delete(child);
      resolve({ code: code ?? 1, output, seconds: (performance.now() - begun) / 1000 });
    };
    child.once('error', (error) => {
      output += error.message;
      end(1);
    });
    child.once('close', end);
  });

/** Stops whatever still runs. */
export const stopRunning = () => {
  for (const child of running) child.kill('SIGTERM');
};

/**
 * Runs tasks with at most so many at once; answers in the order of the tasks.
 * @template T
 * @param {(() => Promise<T>)[]} tasks @param {number} atOnce
 * @returns {Promise<T[]>}
 */
export const inLanes = async (tasks, atOnce) => {
  /** @type {T[]} */
  const results = [];
  let next = 0;
  const lane = async () => {
    for (let index = next++; index < tasks.length; index = next++) {
      const task = tasks[index];
      if (task) results[index] = await task();
    }
  };
  await Promise.all(Array.from({ length: atOnce }, lane));
  return results;
};
