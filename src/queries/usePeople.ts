import type { MaybeRefOrGetter } from 'vue';
import {
  disownPinUse,
  listPeople,
  listPinUses,
  markLeft,
  ownPinUse,
  setOwnPin,
} from '@shared/contracts/people.contract';
import { keys } from './keys';
import { officeApi } from './officeApi';
import { useOfficeMutation, useOfficeQuery } from './useOfficeQuery';

/** Everybody of the shop, also those who left. */
export function usePeople() {
  return useOfficeQuery({
    key: keys.people,
    read: async (signal) => (await officeApi.call(listPeople, {}, signal)).people,
  });
}

/** Marks somebody as gone. */
export function useMarkLeft() {
  return useOfficeMutation(
    ({ id, reason }: { id: string; reason: string }) => officeApi.call(markLeft, { params: { id }, body: { reason } }),
    [keys.people],
  );
}

/** Sets one's own PIN. */
export function useSetPin() {
  return useOfficeMutation(
    (body: { password: string; pin: string }) => officeApi.call(setOwnPin, { body }),
    [keys.people],
  );
}

/** Uses of one's own PIN in the last 30 days (P3). */
export function usePinUses(enabled: MaybeRefOrGetter<boolean> = true) {
  return useOfficeQuery({
    key: keys.pinUses,
    read: async (signal) => (await officeApi.call(listPinUses, {}, signal)).uses,
    enabled,
    refetchEvery: 60_000,
  });
}

/** Says of one use: mine, or not mine. */
export function useAnswerPinUse() {
  return useOfficeMutation(
    ({ id, mine }: { id: string; mine: boolean }) =>
      officeApi.call(mine ? ownPinUse : disownPinUse, { params: { id } }),
    [keys.pinUses, keys.walks],
  );
}
