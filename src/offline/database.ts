import { promisifyRequest } from 'idb-keyval';
import { connection, type ConnectionDeps, type ConnectionPlan } from './connection';
import { isConnectionLost, StorageError, storageErrorOf } from './storageError';

/** Stores of the walk database; their rows are in rows.ts. */
export type StoreName = 'events' | 'heads' | 'outbox' | 'blobs' | 'ballast' | 'receipts' | 'standings' | 'documents';

const VERSION = 1;
const CHAIN_KEY = ['walk', 'branch', 'seq'];

/** Upgrade steps by the version they lead to; a shipped step is never edited, so that no old row is lost (fault 15). */
const UPGRADES: Record<number, (database: IDBDatabase) => void> = {
  1: (database) => {
    database.createObjectStore('events', { keyPath: CHAIN_KEY });
    database.createObjectStore('heads', { keyPath: 'walk' });
    database.createObjectStore('outbox', { keyPath: CHAIN_KEY });
    database.createObjectStore('blobs', { keyPath: 'sha256' }).createIndex('waiting', 'waiting');
    database.createObjectStore('ballast', { keyPath: 'id' });
    database.createObjectStore('receipts', { keyPath: ['walk', 'branch', 'next'] });
    database.createObjectStore('standings', { keyPath: 'walk' });
    database.createObjectStore('documents', { keyPath: 'hash' });
  },
};

const plan = (name: string): ConnectionPlan => ({
  name,
  version: VERSION,
  upgrade: (database, from) => {
    for (let version = from + 1; version <= VERSION; version++) UPGRADES[version]?.(database);
  },
});

/** What the walk database needs from the world. */
export interface DatabaseDeps extends ConnectionDeps {
  name?: string;
}

/** Work inside a transaction. It may await requests of that transaction only, else the transaction ends under it. */
export type TransactionWork<T> = (transaction: IDBTransaction) => Promise<T> | T;

/** The tablet's walk database. A promise that resolves means *committed*; anything else is thrown as `StorageError`. */
export interface TabletDatabase {
  read<T>(stores: readonly StoreName[], work: TransactionWork<T>): Promise<T>;
  write<T>(stores: readonly StoreName[], work: TransactionWork<T>): Promise<T>;
  close(): void;
}

type Ending = { ok: true } | { ok: false; error: unknown };

/**
 * Settles when the transaction has: on a full disk a request still reports success and the transaction aborts
 * afterwards, so only `complete` means saved (fault 13).
 */
function endingOf(transaction: IDBTransaction): Promise<Ending> {
  return new Promise((resolve) => {
    transaction.oncomplete = () => resolve({ ok: true });
    transaction.onabort = () => resolve({ ok: false, error: transaction.error ?? new StorageError('storage.broken') });
  });
}

function abort(transaction: IDBTransaction): void {
  try {
    transaction.abort();
  } catch (error) {
    // A transaction that has ended by itself cannot be aborted again; the failure that led here is the one reported.
    if (!isConnectionLost(error)) throw error;
  }
}

const isAbort = (error: unknown): boolean => error instanceof DOMException && error.name === 'AbortError';

async function run<T>(transaction: IDBTransaction, work: TransactionWork<T>): Promise<T> {
  const ending = endingOf(transaction);
  let result: T;
  try {
    result = await work(transaction);
  } catch (error) {
    abort(transaction);
    const end = await ending;
    // A request cut off by the abort says only that; the transaction knows why.
    throw isAbort(error) && !end.ok ? end.error : error;
  }
  const end = await ending;
  if (!end.ok) throw end.error;
  return result;
}

/** The walk database, opened on first use. */
export function tabletDatabase(deps: DatabaseDeps): TabletDatabase {
  const link = connection(plan(deps.name ?? 'boltwalk-walks'), deps);
  const transact = async <T>(stores: readonly StoreName[], mode: IDBTransactionMode, work: TransactionWork<T>) => {
    try {
      return await run(await link.begin(stores, mode), work);
    } catch (error) {
      if (isConnectionLost(error)) link.drop();
      throw storageErrorOf(error);
    }
  };
  return {
    read: (stores, work) => transact(stores, 'readonly', work),
    write: (stores, work) => transact(stores, 'readwrite', work),
    close: () => link.close(),
  };
}

/** One row, or undefined. */
export const rowOf = <T>(transaction: IDBTransaction, store: StoreName, key: IDBValidKey): Promise<T | undefined> =>
  promisifyRequest<T | undefined>(transaction.objectStore(store).get(key));

/** All rows of a store, or of a range of its keys, in key order. */
export const rowsOf = <T>(
  transaction: IDBTransaction,
  store: StoreName,
  range?: IDBKeyRange,
  most?: number,
): Promise<T[]> => promisifyRequest<T[]>(transaction.objectStore(store).getAll(range, most));
