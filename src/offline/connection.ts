import { isConnectionLost, StorageError, storageErrorOf } from './storageError';

const OPEN_PATIENCE_MS = 10_000;

/** What a database needs from the world. */
export interface ConnectionDeps {
  factory: IDBFactory;
  /** Another tab holds an older version open: ask for it to be closed (fault 15). */
  onBlocked?: () => void;
  /** This tab gave way to a newer version in another tab. */
  onGivenWay?: () => void;
  patienceMs?: number;
}

/** A database by name, its version, and how it is brought there. */
export interface ConnectionPlan {
  name: string;
  version: number;
  upgrade: (database: IDBDatabase, from: number) => void;
}

/** A handle on an IndexedDB database that is dropped and opened again when the browser loses it (fault 19). */
export interface Connection {
  /** Begins a strictly durable transaction; opens the database where it is not open. */
  begin(stores: readonly string[], mode: IDBTransactionMode): Promise<IDBTransaction>;
  /** Forgets the handle: the next `begin` opens the database again. */
  drop(): void;
  close(): void;
}

function openHandle(plan: ConnectionPlan, deps: ConnectionDeps, onClosed: () => void): Promise<IDBDatabase> {
  return new Promise((resolve, reject) => {
    const request = deps.factory.open(plan.name, plan.version);
    let late = false;
    const timer = setTimeout(() => {
      late = true;
      reject(new StorageError('storage.blocked'));
    }, deps.patienceMs ?? OPEN_PATIENCE_MS);
    request.onupgradeneeded = (event) => plan.upgrade(request.result, event.oldVersion);
    request.onblocked = () => deps.onBlocked?.();
    request.onerror = () => {
      clearTimeout(timer);
      reject(storageErrorOf(request.error));
    };
    request.onsuccess = () => {
      clearTimeout(timer);
      const database = request.result;
      if (late) return database.close();
      database.onclose = onClosed;
      database.onversionchange = () => {
        database.close();
        onClosed();
        deps.onGivenWay?.();
      };
      resolve(database);
    };
  });
}

/** Connects on first use. A transaction that could not begin is tried once more on a fresh handle. */
export function connection(plan: ConnectionPlan, deps: ConnectionDeps): Connection {
  let handle: Promise<IDBDatabase> | null = null;
  const drop = (): void => {
    handle = null;
  };
  const open = (): Promise<IDBDatabase> => {
    if (handle) return handle;
    const opening = openHandle(plan, deps, () => {
      if (handle === opening) drop();
    });
    opening.catch(() => {
      if (handle === opening) drop();
    });
    handle = opening;
    return opening;
  };
  const start = async (stores: readonly string[], mode: IDBTransactionMode) =>
    (await open()).transaction([...stores], mode, { durability: 'strict' });
  return {
    begin: async (stores, mode) => {
      try {
        return await start(stores, mode);
      } catch (error) {
        if (!isConnectionLost(error)) throw storageErrorOf(error);
        drop();
        return start(stores, mode);
      }
    },
    drop,
    close: () => {
      const closing = handle;
      drop();
      void closing?.then(
        (database) => database.close(),
        () => undefined,
      );
    },
  };
}
