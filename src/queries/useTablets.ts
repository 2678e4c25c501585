import type { MaybeRefOrGetter } from 'vue';
import { createEnrolmentCode, listTablets, revokeTablet } from '@shared/contracts/tablets.contract';
import { keys } from './keys';
import { officeApi } from './officeApi';
import { useOfficeMutation, useOfficeQuery } from './useOfficeQuery';

/** Every tablet of the shop, revoked ones too. */
export function useTablets(enabled: MaybeRefOrGetter<boolean> = true) {
  return useOfficeQuery({
    key: keys.tablets,
    read: async (signal) => (await officeApi.call(listTablets, {}, signal)).tablets,
    enabled,
    refetchEvery: 30_000,
  });
}

/** A one-time code by which a tablet enrols; shown once. */
export function useEnrolmentCode() {
  return useOfficeMutation((note: string) => officeApi.call(createEnrolmentCode, { body: { note } }), []);
}

/** Revokes a tablet's key. */
export function useRevokeTablet() {
  return useOfficeMutation(
    ({ id, reason }: { id: string; reason: string }) =>
      officeApi.call(revokeTablet, { params: { id }, body: { reason } }),
    [keys.tablets],
  );
}
