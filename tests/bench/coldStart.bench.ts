/**
 * Figures: cold_offline_start
 *
 * A tablet whose battery ended in the middle of a head and whose server is gone: from opening the address in a fresh browser
 * process to the frame that shows the exact instruction, with what was last done (W9). Median of several kills.
 */
import { figure } from './support/figure';
import { addHead, openStand, type StandBench } from './support/standBench';
import { beginWalk, recordReading, untilPull } from './support/walkHead';
import { untilPainted } from './support/watchStart';

const STARTS = 5;
const READINGS = 3;
const JOB = 'BENCH-1';

/** What the screen after the kill has to name: the first pass, and the bolt that follows the last reading. */
const INSTRUCTION = new RegExp(`pass 1 of 4.*bolt ${READINGS + 1}\\b`, 'i');

const median = (values: number[]): number => values.sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? NaN;

const walkSome = async (bench: StandBench): Promise<void> => {
  await addHead(bench, JOB);
  await bench.browser.page.reload();
  await beginWalk(bench, JOB);
  for (let count = 0; count < READINGS; count += 1) {
    if ((await untilPull(bench)) !== 'pull') throw new Error('the walk ended early');
    await recordReading(bench, count);
    await bench.browser.page.waitForTimeout(1000);
  }
  // The worker has put the program aside, and nothing is under way any more.
  await bench.browser.page.evaluate('navigator.serviceWorker.ready.then(() => true)');
  await bench.browser.page.waitForTimeout(2000);
};

const bench = await openStand();
try {
  await walkSome(bench);
  await bench.server.process.stop();
  const starts: number[] = [];
  for (let count = 0; count < STARTS; count += 1) {
    await bench.killBrowser();
    starts.push(await untilPainted(bench.browser.page, `http://localhost:${bench.server.process.port}/`, INSTRUCTION));
  }
  figure('cold_offline_start', median(starts), 'ms');
} finally {
  await bench.close();
}
