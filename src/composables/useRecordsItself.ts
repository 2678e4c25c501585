import { computed, shallowRef, type WritableComputedRef } from 'vue';

const on = shallowRef<ReadonlySet<string>>(new Set());

/**
 * *Record by itself* for one walk: a value in its window that the wrench types is recorded by its own Enter. Off for
 * every walk until it is switched on, and off again after the tablet was started anew.
 */
export function useRecordsItself(walk: string): WritableComputedRef<boolean> {
  return computed({
    get: () => on.value.has(walk),
    set: (wish) => {
      const next = new Set(on.value);
      if (wish) next.add(walk);
      else next.delete(walk);
      on.value = next;
    },
  });
}
