import { pino } from 'pino';
import { folderBlobStore } from './blobs/folderBlobStore';
import type { Config } from './config';
import { systemClock, systemIds, type Deps } from './deps';
import { FailureMemory } from './http/rateLimit';
import { keyringCache } from './keys/keyring';
import { nodeRecordCrypto } from './keys/nodeRecordCrypto';
import { pdfOfProof } from './modules/proofs/proofPdf';
import { FoldCache } from './modules/sync/foldCache';
import { openClient } from './tenancy/client';

/** The real world of the server. */
export const makeDeps = (config: Config): Deps => {
  const log = pino({ level: config.logLevel });
  const clock = systemClock();
  return {
    config,
    log,
    clock,
    client: openClient(config.databaseUrl, (error) => log.warn({ err: error }, 'a database connection was lost')),
    blobs: folderBlobStore(config.blobDir),
    keyring: keyringCache(config),
    crypto: nodeRecordCrypto(),
    failures: new FailureMemory(),
    folds: new FoldCache(),
    proofPdf: pdfOfProof,
    ids: systemIds(clock.now),
  };
};
