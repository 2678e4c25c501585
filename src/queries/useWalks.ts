import { toValue, type MaybeRefOrGetter } from 'vue';
import type { SentBodyOf } from '@shared/contracts/defineEndpoint';
import type { WalkStateName } from '@shared/contracts/walkRow.contract';
import {
  chooseBranch,
  countersign,
  getWalk,
  listWalks,
  placeOrder,
  sendBack,
  settleQuarantine,
  voidWalk,
} from '@shared/contracts/walks.contract';
import { keys } from './keys';
import { officeApi } from './officeApi';
import { useOfficeMutation, useOfficeQuery } from './useOfficeQuery';

/** What walks are asked by. `waiting`: those that the person signed in may countersign (P1). */
export interface WalksWanted {
  state?: WalkStateName;
  waiting?: 'me';
  q?: string;
}

/** Walks, last changed first. */
export function useWalks(wanted: MaybeRefOrGetter<WalksWanted>, enabled: MaybeRefOrGetter<boolean> = true) {
  return useOfficeQuery({
    key: () => [...keys.walks, 'list', toValue(wanted)],
    read: async (signal) =>
      (await officeApi.call(listWalks, { query: { ...toValue(wanted), limit: 200 } }, signal)).walks,
    enabled,
    keep: true,
    refetchEvery: 30_000,
  });
}

/** One walk whole, on the branch that stands unless another is asked for. */
export function useWalk(id: MaybeRefOrGetter<string>, branch: MaybeRefOrGetter<number | null> = null) {
  return useOfficeQuery({
    key: () => [...keys.walks, 'one', toValue(id), toValue(branch)],
    read: (signal) => {
      const wanted = toValue(branch);
      const query = wanted === null ? {} : { branch: wanted };
      return officeApi.call(getWalk, { params: { id: toValue(id) }, query }, signal);
    },
    still: true,
  });
}

/** What every decision about a walk may have changed. */
const touched = [keys.walks, keys.jobs, keys.proofs, keys.pinUses];

/** Decisions about one walk; each needs the PIN of whoever is signed in, but for marking refused events as looked at. */
export function useWalkDecisions(id: MaybeRefOrGetter<string>) {
  const params = () => ({ id: toValue(id) });
  return {
    countersign: useOfficeMutation(
      (body: SentBodyOf<typeof countersign>) => officeApi.call(countersign, { params: params(), body }),
      touched,
    ),
    sendBack: useOfficeMutation(
      (body: SentBodyOf<typeof sendBack>) => officeApi.call(sendBack, { params: params(), body }),
      touched,
    ),
    voidWalk: useOfficeMutation(
      (body: SentBodyOf<typeof voidWalk>) => officeApi.call(voidWalk, { params: params(), body }),
      touched,
    ),
    order: useOfficeMutation(
      (body: SentBodyOf<typeof placeOrder>) => officeApi.call(placeOrder, { params: params(), body }),
      touched,
    ),
    chooseBranch: useOfficeMutation(
      (body: SentBodyOf<typeof chooseBranch>) => officeApi.call(chooseBranch, { params: params(), body }),
      touched,
    ),
    settleQuarantine: useOfficeMutation(
      (body: SentBodyOf<typeof settleQuarantine>) => officeApi.call(settleQuarantine, { params: params(), body }),
      touched,
    ),
  };
}
