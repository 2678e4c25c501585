import { computed, type WritableComputedRef } from 'vue';
import { useRoute, useRouter, type LocationQueryRaw } from 'vue-router';
import { filtersFromQuery, queryFromFilters, type Filters } from './urlFilters';

/** Filters that live in the address: a link or a reload shows the same list. */
export function useUrlFilters<F extends Filters>(
  defaults: F,
  allowed: { [K in keyof F]?: readonly string[] } = {},
): { filters: WritableComputedRef<F>; set: (some: Partial<F>) => void; isSet: WritableComputedRef<boolean> } {
  const route = useRoute();
  const router = useRouter();
  const read = (): F => filtersFromQuery(route.query, defaults, allowed);
  // What was set and is not in the address yet: two changes in one tick must not lose the first.
  let pending: F | null = null;

  function write(next: F): void {
    pending = next;
    const query = queryFromFilters(next, defaults, route.query) as LocationQueryRaw;
    void router.replace({ query, hash: route.hash }).finally(() => {
      if (pending === next) pending = null;
    });
  }
  const filters = computed({ get: read, set: write });
  return {
    filters,
    set: (some) => write({ ...(pending ?? read()), ...some }),
    isSet: computed({
      get: () => Object.entries(read()).some(([name, value]) => value !== defaults[name]),
      set: (wanted) => {
        if (!wanted) write({ ...defaults });
      },
    }),
  };
}
