import { defineStore } from 'pinia';
import { computed, shallowRef } from 'vue';
import type { Role } from '@shared/people/roles';

/** Who stands at this tablet. */
export interface SignedIn {
  id: string;
  name: string;
  roles: readonly Role[];
}

/** The person signed in at the stand. It outlives a reload and a kill: nobody signs in again inside a pass (W9). */
export const useSessionStore = defineStore('session', () => {
  const person = shallowRef<SignedIn | null>(null);
  const signedIn = computed(() => person.value !== null);
  return { person, signedIn };
});
