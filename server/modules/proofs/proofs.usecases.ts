import type { ProofRow, ProofWhole } from '@shared/contracts/proofs.contract';
import type { Deps } from '../../deps';
import type { OfficeCaller } from '../../http/callers';
import { notFound } from '../../http/errors';
import { shopPrefix } from '../../tenancy/shopToken';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { searchShop } from '../jobs/jobs.repository';
import { findShop, nextCount } from '../shops/shops.repository';
import { lockWalk } from '../sync/chain.repository';
import { chainTo } from '../sync/foldChain';
import { standingWalk, type StandingWalk } from '../sync/refreshWalk';
import { walkUnknown } from '../sync/sync.errors';
import { issueBlocks } from './issueBlocks';
import { jobAndJoint } from './issueFacts.repository';
import type { PrintableProof } from './proofPdf';
import { makeProof, type ProofHead, type ProofSource } from './proofs.document';
import { notInForce, proofBlocked, proofUnknown, recordBroken } from './proofs.errors';
import { publicUrlOf, toProofRow, toProofWhole } from './proofs.mapping';
import * as store from './proofs.repository';
import type { ProofRecord } from './proofs.repository';
import { storedHashes } from './storedHashes';
import { brokenEvent } from './verifyStored';

/** Proofs found by VIN, serial, job, claim, number or customer; the newest where nothing is asked. */
export const listProofs = async (deps: Deps, tx: ShopTx, query: { q: string; limit: number }): Promise<ProofRow[]> => {
  const ids = query.q === '' ? undefined : await searchShop(tx, 'proofs', query.q, query.limit);
  if (ids?.length === 0) return [];
  const rows = await store.findProofs(tx, { ...(ids && { ids }), limit: query.limit });
  return rows.map((row) => toProofRow(row, deps.config.publicUrl));
};

const demandProof = async (tx: ShopTx, id: string): Promise<ProofRecord> => {
  const proof = await store.findProof(tx, id);
  if (!proof) throw proofUnknown();
  return proof;
};

/** A proof with its signed document. Throws 404 `proof.unknown`. */
export const getProof = async (deps: Deps, tx: ShopTx, id: string): Promise<ProofWhole> =>
  toProofWhole(await demandProof(tx, id), deps.config.publicUrl);

/** A proof with everything its page is made from. Throws 404 `proof.unknown`. */
export const printableProof = async (deps: Deps, tx: ShopTx, id: string): Promise<PrintableProof> => {
  const row = await demandProof(tx, id);
  const { signingKeys: keys } = await deps.keyring(tx);
  return { row, keys, storedHashes: await storedHashes(tx, row) };
};

const sourceOf = async (deps: Deps, tx: ShopTx, standing: StandingWalk): Promise<ProofSource> => {
  const { row, branches } = standing;
  const rows = await chainTo(tx, row.id, branches, { branch: row.branch, seq: row.nextSeq - 1 });
  const broken = await brokenEvent(deps, tx, row.id, rows);
  if (broken) throw recordBroken(broken.seq, broken.code);
  const found = await jobAndJoint(tx, row.jobId, row.jointId);
  if (!found) throw walkUnknown();
  return { standing, rows, ...found };
};

const yearIn = (timeZone: string, at: Date): string =>
  new Intl.DateTimeFormat('en-US', { timeZone, year: 'numeric' }).format(at);

/** The next number of the shop and year, or the number of the walk's earlier issues. */
const numberFor = async (tx: ShopTx, at: Date, before: ProofRecord | undefined) => {
  if (before) return { number: before.number, issue: before.issue + 1 };
  const shop = await findShop(tx);
  if (!shop) throw notFound('shop.unknown', 'There is no such shop.');
  const year = yearIn(shop.timeZone, at);
  const count = await nextCount(tx, `proofs-${year}`);
  return { number: `${shop.prefix}-${year}-${String(count).padStart(5, '0')}`, issue: 1 };
};

/** Nothing new to say: the same record, the same job, no note. Then the proof in force is the answer (a second tap). */
const saysTheSame = (before: ProofRecord | undefined, { standing, job }: ProofSource, note: string): boolean =>
  before?.state === 'issued' &&
  note === '' &&
  before.headHash === standing.row.headHash &&
  before.jobNumber === job.number &&
  before.vin === job.vin &&
  before.claim === job.claim &&
  before.engineSerial === job.engineSerial &&
  before.customer === job.customer;

const write = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  source: ProofSource,
  head: ProofHead,
  publicToken: string,
): Promise<ProofWhole> => {
  const { sealed, fingerprint } = await makeProof(deps, tx, head, source);
  const { standing, job } = source;
  const row = {
    id: deps.ids.uuid(),
    number: head.number,
    issue: head.issue,
    state: 'issued' as const,
    walkId: standing.row.id,
    branch: standing.row.branch,
    headHash: standing.row.headHash,
    issuedAt: head.issuedAt,
    issuedBy: caller.person.id,
    jws: sealed,
    fingerprint,
    publicToken,
    jobNumber: job.number,
    customer: job.customer,
    engineSerial: job.engineSerial,
    vin: job.vin,
    claim: job.claim,
    procedureCode: standing.row.procedureCode,
  };
  await store.insertProof(tx, row);
  await writeAudit(deps, tx, { person: caller.person.id, action: 'proof.issued', subject: head.number });
  return toProofWhole(await demandProof(tx, row.id), deps.config.publicUrl);
};

/** Issues the proof of a finished walk, or a new issue of it that takes the place of the last. */
export const issueProof = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: { walk: string; note: string; language: 'en' | 'es' },
): Promise<ProofWhole> => {
  await lockWalk(tx, request.walk);
  const standing = await standingWalk(deps, tx, request.walk);
  if (!standing) throw walkUnknown();
  const blocks = issueBlocks(standing);
  if (blocks.length > 0) throw proofBlocked(blocks);
  const source = await sourceOf(deps, tx, standing);
  const [before] = await store.proofsOfWalk(tx, request.walk);
  const { publicUrl } = deps.config;
  if (before && saysTheSame(before, source, request.note)) return toProofWhole(before, publicUrl);
  const issuedAt = deps.clock.now();
  const token = `${shopPrefix(tx.shop)}${deps.ids.token(16)}`;
  const { note, language } = request;
  const number = await numberFor(tx, issuedAt, before);
  const head = { ...number, issuedAt, publicUrl: publicUrlOf(publicUrl, token), note, language };
  const issued = await write(deps, tx, caller, source, head, token);
  if (before?.state === 'issued' || before?.state === 'inDoubt')
    await store.markProof(tx, before.id, { state: 'superseded' });
  return issued;
};

/** Revokes a proof: its old QR code tells so from then on (D3). */
export const revokeProof = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  id: string,
  reason: string,
): Promise<ProofRow> => {
  const proof = await demandProof(tx, id);
  if (proof.state !== 'issued' && proof.state !== 'inDoubt') throw notInForce(proof.state);
  await store.markProof(tx, id, { state: 'revoked', revokedAt: deps.clock.now(), revokedReason: reason });
  await writeAudit(deps, tx, {
    person: caller.person.id,
    action: 'proof.revoked',
    subject: proof.number,
    details: { reason },
  });
  return toProofRow(await demandProof(tx, id), deps.config.publicUrl);
};
