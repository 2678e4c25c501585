import { FDBDatabase, FDBObjectStore, IDBFactory as FakeFactory, IDBKeyRange } from './fakeIndexedDb';

/** How the counted operation goes wrong. */
export type Failure =
  /** The tab dies before the operation: what was not committed is gone, nothing answers any more. */
  | 'killBefore'
  /** The tab dies right after it: a committed transaction stays, but nobody hears of it. */
  | 'killAfter'
  /** The request reports success and the transaction aborts for want of space (fault 13). */
  | 'quota'
  /** The browser drops the connection (fault 19). */
  | 'lost';

/** An IndexedDB in memory that fails its N-th operation, and can be started anew as after a crash. */
export interface FailingIndexedDb {
  factory: IDBFactory;
  /** Operations counted so far: requests, transactions begun and transactions completed. */
  readonly count: number;
  /** Resolves once the program has died. */
  readonly death: Promise<void>;
  /** Fails the operation of this number (from 1, counted from now). */
  failAt(number: number, failure: Failure): void;
  /** As when the program is started again on the same disk. */
  restart(): void;
}

interface Control {
  count: number;
  failNumber: number;
  failure: Failure;
  /** Everything begun before a death stays dead. */
  life: number;
  dead: boolean;
  mourn: () => void;
}

function die(control: Control): void {
  control.dead = true;
  control.mourn();
}

const never = (): never => {
  throw new DOMException('The tab is gone', 'UnknownError');
};

const isHit = (control: Control): boolean => {
  control.count += 1;
  return control.count === control.failNumber;
};

type Abortable = IDBTransaction & { _abort(name: string): void; _state: string };

function breakTransaction(transaction: Abortable, name: string): void {
  if (transaction._state === 'finished' || transaction._state === 'committing') return;
  transaction._abort(name);
}

function watchRequests(transaction: Abortable, control: Control): void {
  const life = control.life;
  const open = transaction.objectStore.bind(transaction);
  transaction.objectStore = (name: string) => {
    const store = open(name);
    for (const method of ['add', 'put', 'get', 'getAll', 'getAllKeys', 'delete', 'openCursor'] as const) {
      const real = Reflect.get(FDBObjectStore.prototype, method) as (...args: unknown[]) => IDBRequest;
      Object.defineProperty(store, method, {
        configurable: true,
        value: (...args: unknown[]) => {
          if (control.dead || life !== control.life) return never();
          if (!isHit(control)) return real.apply(store, args);
          return failRequest(transaction, control, () => real.apply(store, args));
        },
      });
    }
    return store;
  };
}

function failRequest(transaction: Abortable, control: Control, run: () => IDBRequest): IDBRequest {
  if (control.failure === 'killBefore' || control.failure === 'killAfter') {
    if (control.failure === 'killAfter') run();
    die(control);
    breakTransaction(transaction, 'AbortError');
    return never();
  }
  if (control.failure === 'lost') {
    breakTransaction(transaction, 'UnknownError');
    throw new DOMException('Connection to Indexed Database server lost. Refresh the page to try again', 'UnknownError');
  }
  const request = run();
  request.addEventListener('success', () => breakTransaction(transaction, 'QuotaExceededError'));
  return request;
}

/** `complete` is an operation of its own: a tab may die after the disk has it and before anybody knows. */
function watchCompletion(transaction: Abortable, control: Control): void {
  const life = control.life;
  let listener: ((event: Event) => void) | null = null;
  Object.defineProperty(transaction, 'oncomplete', {
    configurable: true,
    get: () => listener,
    set: (next: typeof listener) => (listener = next),
  });
  transaction.addEventListener('complete', (event) => {
    if (control.dead || life !== control.life) return;
    if (isHit(control) && (control.failure === 'killBefore' || control.failure === 'killAfter')) {
      die(control);
      return;
    }
    listener?.(event);
  });
}

function watchDatabase(database: IDBDatabase, control: Control): void {
  const life = control.life;
  const begin = FDBDatabase.prototype.transaction.bind(database);
  Object.defineProperty(database, 'transaction', {
    configurable: true,
    value: (...args: Parameters<IDBDatabase['transaction']>) => {
      if (control.dead || life !== control.life) return never();
      if (isHit(control)) {
        if (control.failure === 'lost')
          throw new DOMException('The database connection is closing.', 'InvalidStateError');
        if (control.failure !== 'quota') {
          die(control);
          return never();
        }
      }
      const transaction = begin(...args) as Abortable;
      watchRequests(transaction, control);
      watchCompletion(transaction, control);
      return transaction;
    },
  });
}

/** A fresh disk whose operations can be made to fail. */
export function failingIndexedDb(): FailingIndexedDb {
  globalThis.IDBKeyRange = IDBKeyRange;
  let death = Promise.resolve();
  const live = (): (() => void) => {
    let mourn = (): void => undefined;
    death = new Promise<void>((resolve) => (mourn = resolve));
    return mourn;
  };
  const control: Control = { count: 0, failNumber: 0, failure: 'killBefore', life: 0, dead: false, mourn: live() };
  const disk = new FakeFactory();
  const factory = {
    open: (name: string, version?: number) => {
      if (control.dead) return never();
      const request = disk.open(name, version);
      request.addEventListener('success', () => watchDatabase(request.result, control));
      return request;
    },
  } as IDBFactory;
  return {
    factory,
    get count() {
      return control.count;
    },
    get death() {
      return death;
    },
    failAt: (number, failure) => Object.assign(control, { count: 0, failNumber: number, failure }),
    restart: () => Object.assign(control, { failNumber: 0, dead: false, life: control.life + 1, mourn: live() }),
  };
}
