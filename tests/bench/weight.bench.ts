/**
 * Figures: walk_js_gzip
 *
 * How much JavaScript, compressed as the server sends it, reaches a tablet that opens the walk screen: the entry and every
 * chunk that the screen loads on its way to a pull, the service worker's later copies left out.
 */
import fs from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import { ensurePages } from '../../server/start/build.mjs';
import { localPlace } from '../../server/start/place.mjs';
import { figure } from './support/figure';
import { addHead, openStand } from './support/standBench';
import { beginWalk, untilPull } from './support/walkHead';

const JOB = 'BENCH-1';
const LOADED = `[...new Set(performance.getEntriesByType('resource').map(({ name }) => new URL(name).pathname))]`;

const bench = await openStand();
try {
  await addHead(bench, JOB);
  const { page } = bench.browser;
  await page.reload();
  await beginWalk(bench, JOB);
  // Opened by its own address: nothing of the pages that led here is counted.
  await page.reload();
  if ((await untilPull(bench)) !== 'pull') throw new Error('the walk shows no pull');
  const scripts = (await page.evaluate<string[]>(LOADED)).filter((name) => name.endsWith('.js'));
  if (scripts.length === 0) throw new Error('the page loaded no script');
  const pages = await ensurePages(localPlace('test'));
  const bytes = scripts.reduce((sum, name) => sum + gzipSync(fs.readFileSync(path.join(pages, name))).length, 0);
  figure('walk_js_gzip', bytes / 1000, 'kB');
} finally {
  await bench.close();
}
