import { createHash, randomBytes, randomUUID } from 'node:crypto';
import type { Logger } from 'pino';
import { uuidV7 } from '@shared/kernel/ids';
import type { BlobStore } from './blobs/blobStore';
import type { Config } from './config';
import type { Keyring } from './keys/keyring';
import type { RecordCrypto } from '@shared/record/crypto';
import type { FailureMemory } from './http/rateLimit';
import type { ProofPdf } from './modules/proofs/proofPdf';
import type { FoldCache } from './modules/sync/foldCache';
import type { DatabaseClient } from './tenancy/client';

/** Everything of the world that the server uses, handed in so that tests can hand in another. */
export interface Deps {
  config: Config;
  client: DatabaseClient;
  blobs: BlobStore;
  keyring: Keyring;
  crypto: RecordCrypto;
  failures: FailureMemory;
  proofPdf: ProofPdf;
  folds: FoldCache;
  log: Logger;
  /** The server's clock, and milliseconds since `boot` for the events the office writes. */
  clock: { now: () => Date; mono: () => number; boot: string };
  ids: {
    /** A new row's id, growing with time. */
    uuid: () => string;
    /** Random base64url text of so many bytes. */
    token: (bytes: number) => string;
  };
}

/** The real clock. */
export const systemClock = (): Deps['clock'] => ({
  now: () => new Date(),
  mono: () => Math.round(performance.now()),
  boot: randomUUID(),
});

/** Real randomness. */
export const systemIds = (now: () => Date): Deps['ids'] => ({
  uuid: () => uuidV7(now().getTime(), randomBytes(16)),
  token: (bytes) => randomBytes(bytes).toString('base64url'),
});

/** Hex SHA-256 of a text or of bytes. */
export const sha256Hex = (value: string | Uint8Array): string => createHash('sha256').update(value).digest('hex');
