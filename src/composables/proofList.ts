import type { ProofRow } from '@shared/contracts/proofs.contract';
import type { OfficeWalk } from '@shared/contracts/walks.contract';

/** A line of the list of proofs: one that was issued, or a finished walk that waits for its first. */
export interface ProofLine {
  kind: 'proof' | 'ready';
  /** Of the proof, or of the walk where none was issued yet. */
  id: string;
  number: string;
  issue: number;
  state: ProofRow['state'] | null;
  job: string;
  customer: string;
  claim: string;
  serial: string;
  vin: string;
  procedure: string;
  at: string;
}

const ofProof = (proof: ProofRow): ProofLine => ({
  kind: 'proof',
  id: proof.id,
  number: proof.number,
  issue: proof.issue,
  state: proof.state,
  job: proof.jobNumber,
  customer: proof.customer,
  claim: proof.claim,
  serial: proof.engineSerial,
  vin: proof.vin,
  procedure: proof.procedure,
  at: proof.issuedAt,
});

const ofWalk = (walk: OfficeWalk): ProofLine => ({
  kind: 'ready',
  id: walk.id,
  number: '',
  issue: 0,
  state: null,
  job: walk.jobNumber,
  customer: walk.customer,
  claim: '',
  serial: walk.engineSerial,
  vin: '',
  procedure: walk.procedureTitle,
  at: walk.changedAt,
});

const newestFirst = (a: ProofLine, b: ProofLine): number => (a.at < b.at ? 1 : a.at > b.at ? -1 : 0);

/** Only a final assembly or a recheck has a proof (W1), and only where nothing is open about the record. */
const isReady = (walk: OfficeWalk): boolean =>
  (walk.purpose === 'finalAssembly' || walk.purpose === 'recheck') &&
  walk.proof === null &&
  !walk.forked &&
  walk.quarantined + walk.refusedSeals + walk.missingBlobs === 0;

/** What waits to be issued first, then the proofs, each newest first. */
export function proofLines(proofs: readonly ProofRow[], finished: readonly OfficeWalk[]): ProofLine[] {
  const ready = finished.filter(isReady).map(ofWalk).sort(newestFirst);
  return [...ready, ...proofs.map(ofProof).sort(newestFirst)];
}
