import { computed, type ComputedRef, type Ref } from 'vue';

/** What a page knows of something it reads. */
export interface ReadState<T> {
  data: T | undefined;
  error: unknown;
  isFetching: boolean;
}

/** A query as one value, to hand on to what shows it. */
export const readState = <T>(query: {
  data: Readonly<Ref<T | undefined>>;
  error: Readonly<Ref<unknown>>;
  isFetching: Readonly<Ref<boolean>>;
}): ComputedRef<ReadState<T>> =>
  computed(() => ({ data: query.data.value, error: query.error.value, isFetching: query.isFetching.value }));
