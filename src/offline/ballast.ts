import { rowOf, type TabletDatabase } from './database';
import type { BallastRow } from './rows';

/** Key of the one row of kept space. */
export const BALLAST_ID = 'readings';

/** Room for a few hundred events with all their rows. */
const BALLAST_BYTES = 1024 * 1024;

const CHUNK = 65_536;

function incompressible(size: number): ArrayBuffer {
  const bytes = new Uint8Array(size);
  for (let from = 0; from < size; from += CHUNK) crypto.getRandomValues(bytes.subarray(from, from + CHUNK));
  return bytes.buffer;
}

/**
 * Keeps space so that readings can still be saved on a full disk (fault 13). True when it is there afterwards; a disk
 * that is full already cannot keep any, and the person is told.
 */
export async function keepBallast(database: TabletDatabase, size = BALLAST_BYTES): Promise<boolean> {
  const held = await database.read(['ballast'], (transaction) => rowOf<BallastRow>(transaction, 'ballast', BALLAST_ID));
  if (held) return true;
  const row: BallastRow = { id: BALLAST_ID, bytes: incompressible(size) };
  return database
    .write(['ballast'], (transaction) => void transaction.objectStore('ballast').put(row))
    .then(
      () => true,
      () => false,
    );
}
