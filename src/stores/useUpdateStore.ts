import { defineStore } from 'pinia';
import { computed, shallowRef } from 'vue';

/** A new version of the program and whether this is a moment for it (decision 11, fault 14). */
export const useUpdateStore = defineStore('update', () => {
  /** A new version is loaded and waits. */
  const waiting = shallowRef(false);
  /** Walks open on this tablet: no reload under anybody's hands. */
  const openWalks = shallowRef(0);
  /** Show the offer. */
  const offered = computed(() => waiting.value && openWalks.value === 0);
  return { waiting, openWalks, offered };
});
