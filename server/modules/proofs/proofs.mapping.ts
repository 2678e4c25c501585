import type { ProofRow, ProofWhole } from '@shared/contracts/proofs.contract';
import type { ProofRecord } from './proofs.repository';

/** Where anybody with the token sees a proof. */
export const publicUrlOf = (publicUrl: string, token: string): string => `${publicUrl}/p/${token}`;

/** A stored proof's line. */
export const toProofRow = (row: ProofRecord, publicUrl: string): ProofRow => ({
  id: row.id,
  number: row.number,
  issue: row.issue,
  state: row.state,
  walk: row.walkId,
  issuedAt: row.issuedAt.toISOString(),
  issuedBy: row.issuedBy,
  jobNumber: row.jobNumber,
  engineSerial: row.engineSerial,
  vin: row.vin,
  claim: row.claim,
  customer: row.customer,
  procedure: row.procedureCode,
  fingerprint: row.fingerprint,
  publicUrl: publicUrlOf(publicUrl, row.publicToken),
  revokedReason: row.revokedReason,
});

/** A stored proof with its signed document. */
export const toProofWhole = (row: ProofRecord, publicUrl: string): ProofWhole => ({
  ...toProofRow(row, publicUrl),
  jws: row.jws,
});
