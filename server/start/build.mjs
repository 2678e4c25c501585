/** Builds the pages when their sources have changed. Imports only `node:`. */
import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { oneAtATime, root } from './place.mjs';

const sources = ['src', 'shared', 'public', 'index.html', 'verify.html', 'vite.config.ts', 'tsconfig.json'];

/** @param {string} place @returns {string[]} */
const filesUnder = (place) => {
  if (!fs.existsSync(place)) return [];
  if (!fs.statSync(place).isDirectory()) return [place];
  return fs
    .readdirSync(place)
    .sort()
    .flatMap((name) => filesUnder(path.join(place, name)));
};

/** One hash of everything the pages are made of; tests are no part of them. */
const sourcesHash = () => {
  const hash = createHash('sha256');
  for (const source of [...sources, 'package-lock.json']) {
    for (const file of filesUnder(path.join(root, source)).filter((name) => !name.endsWith('.test.ts'))) {
      hash.update(path.relative(root, file)).update('\0').update(fs.readFileSync(file)).update('\0');
    }
  }
  return hash.digest('hex');
};

/** @param {string} output */
const runVite = (output) =>
  new Promise((resolve, reject) => {
    const vite = path.join(root, 'node_modules/vite/bin/vite.js');
    const args = [vite, 'build', '--outDir', output, '--emptyOutDir', '--logLevel', 'warn'];
    const child = spawn(process.execPath, args, { cwd: root, stdio: ['ignore', 'pipe', 'pipe'] });
    let said = '';
    for (const stream of [child.stdout, child.stderr]) stream.on('data', (data) => (said += data));
    child.once('error', reject);
    child.once('exit', (code) => (code === 0 ? resolve(said) : reject(new Error(`The pages do not build:\n${said}`))));
  });

/**
 * The folder of the built pages, built anew only when a source changed. A build that fails leaves the old one alone.
 * @param {string} place the folder of this kind of run
 * @returns {Promise<string>}
 */
export const ensurePages = (place) =>
  oneAtATime(path.join(place, 'build.lock'), async () => {
    const pages = path.join(place, 'dist');
    const mark = path.join(place, 'dist.hash');
    const hash = sourcesHash();
    if (fs.existsSync(mark) && fs.readFileSync(mark, 'utf8') === hash && fs.existsSync(pages)) return pages;
    await runVite(`${pages}.new`);
    fs.rmSync(pages, { recursive: true, force: true });
    fs.renameSync(`${pages}.new`, pages);
    fs.writeFileSync(mark, hash);
    return pages;
  });
