/** What went wrong in the tablet's own storage; translated as `errors.<code>`. */
export type StorageErrorCode =
  | 'storage.full'
  | 'storage.lost'
  | 'storage.blocked'
  | 'storage.newerVersion'
  | 'storage.broken'
  | 'storage.doubled'
  | 'storage.cleared'
  | 'storage.headMoved';

/** Storage that did not do what was asked. Nothing counts as saved when this is thrown (fault 13, 19). */
export class StorageError extends Error {
  constructor(
    readonly code: StorageErrorCode,
    cause?: unknown,
  ) {
    super(code, { cause });
    this.name = 'StorageError';
  }
}

const nameOf = (error: unknown): string => (error instanceof Error || error instanceof DOMException ? error.name : '');

/** Browsers close a connection by themselves; the one call that met it says so in these ways. */
export function isConnectionLost(error: unknown): boolean {
  if (error instanceof StorageError) return error.code === 'storage.lost';
  if (nameOf(error) === 'InvalidStateError') return true;
  return error instanceof Error && /connection.*(lost|clos)/i.test(error.message);
}

const CODES: Record<string, StorageErrorCode> = {
  QuotaExceededError: 'storage.full',
  VersionError: 'storage.newerVersion',
  ConstraintError: 'storage.doubled',
};

/** The same failure with a code a person can be told. */
export function storageErrorOf(error: unknown): StorageError {
  if (error instanceof StorageError) return error;
  if (isConnectionLost(error)) return new StorageError('storage.lost', error);
  return new StorageError(CODES[nameOf(error)] ?? 'storage.broken', error);
}
