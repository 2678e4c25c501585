import { listWrenches } from '@shared/contracts/wrenches.contract';
import { keys } from './keys';
import { officeApi } from './officeApi';
import { useOfficeQuery } from './useOfficeQuery';

/** Every wrench of the crib, retired ones too. */
export function useWrenches() {
  return useOfficeQuery({
    key: keys.wrenches,
    read: async (signal) => (await officeApi.call(listWrenches, {}, signal)).wrenches,
  });
}
