/** How much room the browser gives and how it treats it. Null where a browser does not tell. */
export interface StorageRoom {
  usedBytes: number | null;
  quotaBytes: number | null;
  /** Whether the browser promised not to clear it by itself. */
  persisted: boolean | null;
}

/** What the browser says about storage. */
export async function storageRoom(storage: StorageManager | undefined): Promise<StorageRoom> {
  const unknown: StorageRoom = { usedBytes: null, quotaBytes: null, persisted: null };
  if (!storage) return unknown;
  // Old WebViews have the object without all of its methods.
  const parts = storage as Partial<StorageManager>;
  const estimate = await parts.estimate?.call(storage).catch(() => null);
  const persisted = await parts.persisted?.call(storage).catch(() => null);
  return {
    usedBytes: estimate?.usage ?? null,
    quotaBytes: estimate?.quota ?? null,
    persisted: persisted ?? null,
  };
}

/** Asks the browser not to clear this tablet's storage by itself. False where it will not promise (fault 20). */
export async function askToPersist(storage: StorageManager | undefined): Promise<boolean> {
  const parts = storage as Partial<StorageManager> | undefined;
  return (await parts?.persist?.call(storage).catch(() => false)) ?? false;
}
