import { promisifyRequest } from 'idb-keyval';
import { bytesToBase64url } from '@shared/record/bytes';
import type { StoreName, TabletDatabase } from './database';
import type { Settings } from './settings';
import { storageErrorOf } from './storageError';

/** Everything on a tablet as one file: for a tablet that cannot send, and for whoever has to look into it. */
export interface TabletExport {
  format: 'boltwalk-tablet';
  version: 1;
  exportedAt: string;
  stores: Partial<Record<StoreName, unknown[]>>;
  settings: Record<string, unknown>;
  /** What could not be read, and why; all else is complete (fault 19). */
  unreadable: { store: string; key: string; code: string }[];
}

const STORES: readonly StoreName[] = ['heads', 'events', 'outbox', 'receipts', 'standings', 'documents', 'blobs'];

/** Keys and what opens them stay where they are: the file must not be worth stealing for its PINs. */
const isSecret = (key: string): boolean => key === 'deviceKey' || key === 'pinKey' || /^(pin|tries):/.test(key);

function asJson(value: unknown): unknown {
  if (value instanceof ArrayBuffer) return { base64url: bytesToBase64url(new Uint8Array(value)) };
  if (Array.isArray(value)) return value.map(asJson);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([key, member]) => [key, asJson(member)]));
}

const nameOf = (key: IDBValidKey): string => JSON.stringify(key);

/** Row by row, so that one that cannot be read does not hide the others. */
async function readStore(database: TabletDatabase, store: StoreName, unreadable: TabletExport['unreadable']) {
  const rows: unknown[] = [];
  const keys = await database.read([store], (transaction) =>
    promisifyRequest(transaction.objectStore(store).getAllKeys()),
  );
  for (const key of keys) {
    try {
      const row: unknown = await database.read([store], (transaction) =>
        promisifyRequest<unknown>(transaction.objectStore(store).get(key)),
      );
      rows.push(asJson(row));
    } catch (error) {
      unreadable.push({ store, key: nameOf(key), code: storageErrorOf(error).code });
    }
  }
  return rows;
}

async function readSettings(settings: Settings, unreadable: TabletExport['unreadable']) {
  const kept: Record<string, unknown> = {};
  try {
    for (const [key, value] of await settings.all()) if (!isSecret(key)) kept[key] = asJson(value);
    const key = await settings.get('deviceKey');
    if (key) kept.publicKey = { kid: key.kid, ...key.publicJwk };
  } catch (error) {
    unreadable.push({ store: 'settings', key: '', code: storageErrorOf(error).code });
  }
  return kept;
}

/** Reads all that can be read. Never throws for what cannot: it is named in `unreadable`. */
export async function exportTablet(
  database: TabletDatabase,
  settings: Settings,
  exportedAt: string,
): Promise<TabletExport> {
  const unreadable: TabletExport['unreadable'] = [];
  const stores: TabletExport['stores'] = {};
  for (const store of STORES) {
    try {
      stores[store] = await readStore(database, store, unreadable);
    } catch (error) {
      unreadable.push({ store, key: '', code: storageErrorOf(error).code });
    }
  }
  const kept = await readSettings(settings, unreadable);
  return { format: 'boltwalk-tablet', version: 1, exportedAt, stores, settings: kept, unreadable };
}
