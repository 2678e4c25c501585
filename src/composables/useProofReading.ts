import { shallowRef, watch, type Ref } from 'vue';
import { webRecordCrypto } from '@/offline/webCrypto';
import { proofReading, type ProofReading } from './proofReading';

/** The stored document, opened; undefined while that takes, null where it cannot be read. */
export function useProofReading(jws: () => string | undefined): Readonly<Ref<ProofReading | null | undefined>> {
  const reading = shallowRef<ProofReading | null | undefined>(undefined);
  watch(
    jws,
    async (now) => {
      reading.value = undefined;
      if (now === undefined) return;
      const found = await proofReading(now, window.isSecureContext ? webRecordCrypto() : null);
      if (jws() === now) reading.value = found;
    },
    { immediate: true },
  );
  return reading;
}
