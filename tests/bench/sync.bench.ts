/**
 * Figures: sync_events_500
 *
 * How many signed events a second the server takes in: one tablet, one HTTP request after the other, each with 500 events
 * of a real walk, every one verified, decided again and committed to a database that writes to the disk (fsync on).
 */
import { MOST_EVENTS, type Receipt } from '@shared/contracts/sync.contract';
import { startRealServer } from '../integration/support/realServer';
import { stored, storedHashes } from '../integration/support/stored';
import { enrolledTablet, walked, type TestTablet } from '../integration/support/testTablet';
import { makeTestShop } from '../integration/support/testShop';
import { ensureMigratedTemplate } from '../support/testDatabase';
import { figure } from './support/figure';
import { longHead } from './support/longHead';

const WARM_UP = 2;
const WALKS = 12;

const makeWalk = (tablet: TestTablet) => walked(tablet, { until: (_, book) => book.events.length >= MOST_EVENTS });

/** Sends a walk as one batch and answers how many seconds that took. */
const sendAll = async (walk: Awaited<ReturnType<typeof makeWalk>>): Promise<number> => {
  const begun = performance.now();
  const reply = await walk.send(0, MOST_EVENTS);
  const seconds = (performance.now() - begun) / 1000;
  const receipt = reply.body as unknown as Receipt;
  if (reply.status !== 200 || receipt.accepted !== MOST_EVENTS || receipt.quarantined.length > 0) {
    throw new Error(`the server took ${receipt.accepted} of ${MOST_EVENTS}: ${JSON.stringify(reply.body)}`);
  }
  return seconds;
};

await ensureMigratedTemplate();
const server = await startRealServer();
try {
  const [disk] = await stored<{ fsync: string }>(server, 'show fsync');
  if (disk?.fsync !== 'on') throw new Error('the database does not write to the disk');
  const tablet = await enrolledTablet(server, await makeTestShop(server.deps, { document: longHead() }));
  let seconds = 0;
  for (let count = 0; count < WARM_UP + WALKS; count += 1) {
    const walk = await makeWalk(tablet);
    const took = await sendAll(walk);
    if (count >= WARM_UP) seconds += took;
    if ((await storedHashes(server, walk.id)).length !== MOST_EVENTS) throw new Error('not every event is stored');
  }
  figure('sync_events_500', (WALKS * MOST_EVENTS) / seconds, '1/s');
} finally {
  await server.close();
}
