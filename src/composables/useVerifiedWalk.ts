import { shallowRef, watch, type Ref } from 'vue';
import type { OfficeWalkWhole } from '@shared/contracts/walks.contract';
import { webRecordCrypto } from '@/offline/webCrypto';
import { verifyWalk, type WalkVerdict } from './verifyWalk';

/** The record's own word, checked in this browser whenever it is read; null while that takes. */
export function useVerifiedWalk(whole: () => OfficeWalkWhole): Readonly<Ref<WalkVerdict | null>> {
  const verdict = shallowRef<WalkVerdict | null>(null);
  watch(
    whole,
    async (now) => {
      verdict.value = null;
      // Outside a secure context (plain http in a shop's network) the browser has no Web Crypto.
      const found = await verifyWalk(now, window.isSecureContext ? webRecordCrypto() : null);
      if (whole() === now) verdict.value = found;
    },
    { immediate: true },
  );
  return verdict;
}
