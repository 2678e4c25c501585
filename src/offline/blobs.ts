import { promisifyRequest } from 'idb-keyval';
import { bytesToHex } from '@shared/record/bytes';
import { rowOf, type TabletDatabase } from './database';
import type { BlobRow } from './rows';
import type { NewBlob } from './walkAct';

/** Largest photo the server takes: `MOST_BLOB_BYTES` of the contract (a test holds them together). */
export const MOST_PHOTO_BYTES = 2 * 1024 * 1024;

/** A file that waits for the server. */
export interface BlobBacklog {
  sha256: string;
  walk: string;
}

/** Makes a file ready to be saved with the event that names it: its address is the hash of its bytes. */
export async function newBlob(bytes: ArrayBuffer, contentType: string): Promise<NewBlob> {
  const digest = await crypto.subtle.digest('SHA-256', bytes);
  return { sha256: bytesToHex(new Uint8Array(digest)), contentType, bytes };
}

/** Files that wait and were not refused. The bytes are not kept in memory. */
export async function blobBacklog(database: TabletDatabase): Promise<BlobBacklog[]> {
  return database.read(['blobs'], async (transaction) => {
    const index = transaction.objectStore('blobs').index('waiting');
    const keys = await promisifyRequest(index.getAllKeys(IDBKeyRange.only(1)));
    const waiting: BlobBacklog[] = [];
    for (const key of keys) {
      const row = await rowOf<BlobRow>(transaction, 'blobs', key);
      if (row && row.refused === null) waiting.push({ sha256: row.sha256, walk: row.walk });
    }
    return waiting;
  });
}

/** A file's row, or undefined. */
export const blobBySha256 = (database: TabletDatabase, sha256: string): Promise<BlobRow | undefined> =>
  database.read(['blobs'], (transaction) => rowOf<BlobRow>(transaction, 'blobs', sha256));

async function changeBlob(database: TabletDatabase, sha256: string, change: Partial<BlobRow>): Promise<void> {
  await database.write(['blobs'], async (transaction) => {
    const row = await rowOf<BlobRow>(transaction, 'blobs', sha256);
    if (row) transaction.objectStore('blobs').put({ ...row, ...change });
  });
}

/** The server holds it: it stays here as long as its walk does. */
export const markBlobSent = (database: TabletDatabase, sha256: string): Promise<void> =>
  changeBlob(database, sha256, { waiting: 0, refused: null });

/** The server will not take it; a person has to look. */
export const markBlobRefused = (database: TabletDatabase, sha256: string, code: string): Promise<void> =>
  changeBlob(database, sha256, { refused: code });

/** The server says that it lacks these: those that are here go again (fault 18). */
export async function markBlobsMissing(database: TabletDatabase, hashes: readonly string[]): Promise<void> {
  for (const sha256 of hashes) await changeBlob(database, sha256, { waiting: 1 });
}
