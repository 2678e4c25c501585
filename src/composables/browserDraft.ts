import type { DraftKeeper } from './useForm';

const PREFIX = 'boltwalk-draft:';

const isDraft = (value: unknown): value is { values: object } =>
  typeof value === 'object' && value !== null && 'values' in value && typeof value.values === 'object';

/**
 * A draft in this browser. A store that is full or closed loses the draft and nothing else, so it is not an error to
 * show. `fits` turns away what an older form left behind.
 */
export function browserDraft<T extends object>(
  name: string,
  fits: (values: object) => values is T,
  storage: Storage = window.localStorage,
): DraftKeeper<T> {
  const key = PREFIX + name;
  const quietly = <A>(work: () => A): A | null => {
    try {
      return work();
    } catch {
      return null;
    }
  };
  return {
    read: () =>
      quietly(() => {
        const found: unknown = JSON.parse(storage.getItem(key) ?? 'null');
        return isDraft(found) && found.values !== null && fits(found.values) ? found.values : null;
      }),
    keep: (values) => void quietly(() => storage.setItem(key, JSON.stringify({ values }))),
    drop: () => void quietly(() => storage.removeItem(key)),
  };
}

/** Forgets every draft: somebody else may sit here next. */
export function dropDrafts(storage: Storage = window.localStorage): void {
  for (const key of Object.keys(storage)) if (key.startsWith(PREFIX)) storage.removeItem(key);
}
