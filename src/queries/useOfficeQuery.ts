import { keepPreviousData, useMutation, useQuery } from '@tanstack/vue-query';
import type { QueryKey, UseMutationReturnType, UseQueryReturnType } from '@tanstack/vue-query';
import { computed, toValue, type MaybeRefOrGetter } from 'vue';
import { officeCache } from './officeCache';

/** One read of the server. The key holds everything the read hangs on; `enabled` keeps it back. */
export interface OfficeRead<T> {
  key: MaybeRefOrGetter<QueryKey>;
  read: (signal: AbortSignal) => Promise<T>;
  enabled?: MaybeRefOrGetter<boolean>;
  /** Shows the last answer while another filter is being read. */
  keep?: boolean;
  refetchEvery?: number;
  /** Changes only when asked to: what somebody signs must not change under their eyes. */
  still?: boolean;
}

/** Reads into the office's own cache. */
export function useOfficeQuery<T>(read: OfficeRead<T>): UseQueryReturnType<T, Error> {
  return useQuery<T, Error, T, QueryKey>(
    {
      queryKey: computed(() => toValue(read.key)),
      queryFn: ({ signal }) => read.read(signal),
      enabled: computed(() => toValue(read.enabled) ?? true),
      ...(read.keep ? { placeholderData: keepPreviousData } : {}),
      ...(read.still ? { staleTime: Infinity, refetchOnMount: 'always' as const } : {}),
      ...(read.refetchEvery ? { refetchInterval: read.refetchEvery } : {}),
    },
    officeCache,
  );
}

/** A write; what it touched is read again before it counts as done. */
export function useOfficeMutation<T, V>(
  write: (value: V) => Promise<T>,
  touches: readonly QueryKey[],
): UseMutationReturnType<T, Error, V, unknown> {
  return useMutation<T, Error, V>(
    {
      mutationFn: write,
      onSuccess: async () => {
        await Promise.all(touches.map((queryKey) => officeCache.invalidateQueries({ queryKey })));
      },
    },
    officeCache,
  );
}
