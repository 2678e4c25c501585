import { toValue, type MaybeRefOrGetter } from 'vue';
import { getProcedure, listProcedures } from '@shared/contracts/procedures.contract';
import { keys } from './keys';
import { officeApi } from './officeApi';
import { useOfficeQuery } from './useOfficeQuery';

/** Every procedure of the shop. */
export function useProcedures() {
  return useOfficeQuery({
    key: keys.procedures,
    read: async (signal) => (await officeApi.call(listProcedures, {}, signal)).procedures,
  });
}

/** One procedure with the document of one revision; without a number the approved one. */
export function useProcedure(id: MaybeRefOrGetter<string>, revision: MaybeRefOrGetter<number | null>) {
  return useOfficeQuery({
    key: () => [...keys.procedures, toValue(id), toValue(revision)],
    read: (signal) => {
      const wanted = toValue(revision);
      const query = wanted === null ? {} : { revision: wanted };
      return officeApi.call(getProcedure, { params: { id: toValue(id) }, query }, signal);
    },
    keep: true,
  });
}
