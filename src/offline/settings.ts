import { del, entries, get, promisifyRequest, set, update, type UseStore } from 'idb-keyval';
import { connection, type ConnectionDeps } from './connection';
import type { SettingValues } from './settingValues';
import { isConnectionLost, storageErrorOf } from './storageError';

const STORE = 'keyval';

/** What the settings need from the world. */
export interface SettingsDeps extends ConnectionDeps {
  name?: string;
}

/** Small things the tablet keeps: each value is written whole, strictly, and is saved when the promise resolves. */
export interface Settings {
  get<K extends keyof SettingValues>(key: K): Promise<SettingValues[K] | undefined>;
  set<K extends keyof SettingValues>(key: K, value: SettingValues[K]): Promise<void>;
  /** Reads and writes in one transaction: nothing can come between. */
  update<K extends keyof SettingValues>(
    key: K,
    change: (old: SettingValues[K] | undefined) => SettingValues[K],
  ): Promise<SettingValues[K]>;
  remove(key: keyof SettingValues): Promise<void>;
  keys(): Promise<(keyof SettingValues)[]>;
  all(): Promise<[string, unknown][]>;
  close(): void;
}

/** The settings database: idb-keyval over a store of our own, so that every write is strictly durable. */
export function tabletSettings(deps: SettingsDeps): Settings {
  const upgrade = (database: IDBDatabase): void => void database.createObjectStore(STORE);
  const link = connection({ name: deps.name ?? 'boltwalk-settings', version: 1, upgrade }, deps);
  const useStore: UseStore = async (mode, work) => {
    try {
      return await work((await link.begin([STORE], mode)).objectStore(STORE));
    } catch (error) {
      if (isConnectionLost(error)) link.drop();
      throw storageErrorOf(error);
    }
  };
  return {
    get: (key) => get(key, useStore),
    set: (key, value) => set(key, value, useStore),
    update: async (key, change) => {
      let changed: ReturnType<typeof change> | undefined;
      await update<ReturnType<typeof change>>(key, (old) => (changed = change(old)), useStore);
      return changed as ReturnType<typeof change>;
    },
    remove: (key) => del(key, useStore),
    keys: () =>
      useStore('readonly', (store) => promisifyRequest(store.getAllKeys())) as Promise<(keyof SettingValues)[]>,
    all: () => entries<string, unknown>(useStore),
    close: () => link.close(),
  };
}
