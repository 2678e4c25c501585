/**
 * Figures: tap_to_painted_p50, tap_to_painted_p95, tap_to_painted_p99
 *
 * From the tap on Record until the next instruction is painted: decided, hashed, signed and strictly committed in between.
 * Chromium with its profile on the disk, CPU throttled four times, two heads of 14 bolts walked through four passes.
 */
import { figure } from './support/figure';
import { addHead, openStand, type StandBench } from './support/standBench';
import { beginWalk, recordReading, untilPull } from './support/walkHead';
import { watchTaps, type WatchedTaps } from './support/watchTaps';

const WALKS = 2;
/** Final readings of a head: 14 bolts, four passes. */
const READINGS = 56;
const SLOWER = 4;

/** The value below which this share of the sorted values lies (nearest rank). */
const percentile = (sorted: readonly number[], share: number): number =>
  sorted[Math.max(0, Math.ceil(sorted.length * share) - 1)] ?? NaN;

const slowDown = async ({ browser: { page } }: StandBench): Promise<void> => {
  const session = await page.context().newCDPSession(page);
  await session.send('Emulation.setCPUThrottlingRate', { rate: SLOWER });
};

/** Walks one head from its first pull to the review. */
const walkHead = async (bench: StandBench, taps: WatchedTaps): Promise<void> => {
  const before = (await taps.taken(0)).length;
  let count = 0;
  while ((await untilPull(bench)) === 'pull') {
    await recordReading(bench, count);
    count += 1;
    await taps.taken(before + count);
  }
  if (count !== READINGS) throw new Error(`${count} readings were recorded instead of ${READINGS}`);
};

const bench = await openStand();
try {
  const jobs = Array.from({ length: WALKS }, (_, index) => `BENCH-${index + 1}`);
  for (const job of jobs) await addHead(bench, job);
  const { page } = bench.browser;
  await page.reload(); // fetches the new jobs
  const taps = await watchTaps(page);
  await slowDown(bench);
  for (const job of jobs) {
    await beginWalk(bench, job);
    await walkHead(bench, taps);
    await page.getByTestId('leave').click();
  }
  const all = await taps.taken(WALKS * READINGS);
  if (all.length !== WALKS * READINGS) throw new Error(`${all.length} taps were seen`);
  const sorted = all.sort((a, b) => a - b);
  for (const share of [50, 95, 99]) figure(`tap_to_painted_p${share}`, percentile(sorted, share / 100), 'ms');
} finally {
  await bench.close();
}
