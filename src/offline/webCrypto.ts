import { recordCryptoFrom } from '@shared/record/recordCryptoFrom';
import type { RecordCrypto } from '@shared/record/crypto';

/** Hashing and verifying of the record over this browser's Web Crypto. */
export const webRecordCrypto = (): RecordCrypto => recordCryptoFrom(crypto.subtle);
