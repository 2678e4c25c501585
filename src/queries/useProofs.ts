import { toValue, type MaybeRefOrGetter } from 'vue';
import { getProof, issueProof, listProofs, proofPdf, revokeProof } from '@shared/contracts/proofs.contract';
import { keys } from './keys';
import { officeApi } from './officeApi';
import { useOfficeMutation, useOfficeQuery } from './useOfficeQuery';

/** Proofs by serial, VIN, job, claim, number or customer; the newest where nothing is asked. */
export function useProofs(q: MaybeRefOrGetter<string>) {
  return useOfficeQuery({
    key: () => [...keys.proofs, 'list', toValue(q)],
    read: async (signal) => (await officeApi.call(listProofs, { query: { q: toValue(q), limit: 200 } }, signal)).proofs,
    keep: true,
  });
}

/** One proof with its signed document. */
export function useProof(id: MaybeRefOrGetter<string>) {
  return useOfficeQuery({
    key: () => [...keys.proofs, 'one', toValue(id)],
    read: (signal) => officeApi.call(getProof, { params: { id: toValue(id) } }, signal),
  });
}

/** Issues the proof of a finished walk, or issues it anew. */
export function useIssueProof() {
  return useOfficeMutation(
    ({ walk, ...body }: { walk: string; note: string; language: 'en' | 'es' }) =>
      officeApi.call(issueProof, { params: { id: walk }, body }),
    [keys.proofs, keys.walks, keys.jobs],
  );
}

/** Revokes a proof: the public page says so from then on. */
export function useRevokeProof() {
  return useOfficeMutation(
    ({ id, reason }: { id: string; reason: string }) =>
      officeApi.call(revokeProof, { params: { id }, body: { reason } }),
    [keys.proofs, keys.walks],
  );
}

/** The page as it is printed; made from the stored document, so it is the same every time. */
export function useProofPdf() {
  return useOfficeMutation(
    ({ id, ...query }: { id: string; size: 'letter' | 'a4'; language: 'en' | 'es' }) =>
      officeApi.file(proofPdf, { params: { id }, query }),
    [],
  );
}
