import { computed, type ComputedRef } from 'vue';
import { doors } from '@shared/contracts/demo.contract';
import { me, signIn, signOut, type OfficeMe } from '@shared/contracts/officeAuth.contract';
import { rightsOf, type Right } from '@shared/people/roles';
import { keys } from './keys';
import { OfficeFailure, officeApi, useCsrf } from './officeApi';
import { officeCache } from './officeCache';
import { useOfficeMutation, useOfficeQuery } from './useOfficeQuery';

const asNobody = (error: unknown): null => {
  if (error instanceof OfficeFailure && error.status === 401) return null;
  throw error;
};

async function readMe(signal: AbortSignal): Promise<OfficeMe | null> {
  const found = await officeApi.call(me, {}, signal).catch(asNobody);
  if (found) useCsrf(found.csrf);
  return found;
}

/** Who is signed in: `null` when nobody is, `undefined` while that is not known. */
export function useMe() {
  return useOfficeQuery({ key: keys.me, read: readMe });
}

/** The person signed in, inside pages that are shown only to such. */
export function useSignedIn(): { me: ComputedRef<OfficeMe | null>; can: (right: Right) => boolean } {
  const { data } = useMe();
  const found = computed(() => data.value ?? null);
  const rights = computed(() => rightsOf(found.value?.person.roles ?? []));
  return { me: found, can: (right) => rights.value.has(right) };
}

/** Forgets all that somebody read. What says who is signed in stays: pages watch it. */
function forget(): void {
  const kept: readonly unknown[] = [keys.me[0], keys.doors[0]];
  officeCache.removeQueries({ predicate: ({ queryKey }) => !kept.includes(queryKey[0]) });
}

/** Signing in forgets what somebody else had read. */
export function useSignIn() {
  return useOfficeMutation(async (body: { email: string; password: string; shop?: string }) => {
    const found = await officeApi.call(signIn, { body });
    forget();
    useCsrf(found.csrf);
    officeCache.setQueryData(keys.me, found);
    return found;
  }, []);
}

/** Signing out empties the cache, whether the server could be told or not. */
export function useSignOut() {
  return useOfficeMutation(async () => {
    await officeApi.call(signOut, {}).catch(asNobody);
    officeCache.setQueryData(keys.me, null);
    forget();
  }, []);
}

/** The demo's accounts; `null` outside the demo, where that address does not exist. */
export function useDoors() {
  return useOfficeQuery({
    key: keys.doors,
    read: (signal) =>
      officeApi.call(doors, {}, signal).catch((error: unknown) => {
        if (error instanceof OfficeFailure && error.status === 404) return null;
        throw error;
      }),
  });
}
