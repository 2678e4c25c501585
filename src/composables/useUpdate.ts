import { computed, type ComputedRef } from 'vue';
import { useUpdateStore } from '@/stores/useUpdateStore';
import { programUpdate } from './programUpdate';

/** The offer of a new version: shown only while no walk is open (decision 11, fault 14). */
export function useUpdate(): { offered: ComputedRef<boolean>; accept: () => void } {
  const store = useUpdateStore();
  return {
    offered: computed(() => store.offered),
    accept: () => {
      if (store.offered) programUpdate.start();
    },
  };
}
