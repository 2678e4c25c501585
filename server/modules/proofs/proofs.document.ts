import { buildProof, type ProofFacts } from '@shared/proof/buildProof';
import type { ProofRoles, ProofTablet } from '@shared/proof/proofDocument';
import { sealProof } from '@shared/proof/sealProof';
import { sha256Hex, type Deps } from '../../deps';
import { notFound } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import type { StoredRow } from '../sync/chain.repository';
import { toConfirmation } from '../sync/confirmSeal';
import { confirmationsOfWalk } from '../sync/seals.repository';
import type { StandingWalk } from '../sync/refreshWalk';
import { listTabletRows } from '../tablets/tablets.repository';
import { namesOf, roleHistories } from '../people/people.repository';
import { findShop } from '../shops/shops.repository';
import type { JobRecord, JointRecord } from '../jobs/jobs.repository';
import { approvalOf } from './issueFacts.repository';
import { proofBlocked } from './proofs.errors';

/** What is decided about a proof before its document is made. */
export interface ProofHead {
  number: string;
  issue: number;
  issuedAt: Date;
  publicUrl: string;
  note: string;
  language: 'en' | 'es';
}

/** A walk with everything that stands beside its events. */
export interface ProofSource {
  standing: StandingWalk;
  rows: readonly StoredRow[];
  job: JobRecord;
  joint: JointRecord;
}

const tabletsOf = async (tx: ShopTx): Promise<ProofTablet[]> =>
  (await listTabletRows(tx)).map(({ id, name, kid, publicJwk }) => ({ id, name, kid, jwk: publicJwk }));

const rolesOf = async (tx: ShopTx, people: string[]): Promise<ProofRoles[]> =>
  [...(await roleHistories(tx, people))].flatMap(([person, lines]) =>
    lines.map(({ since, roles }) => ({ person, since, roles })),
  );

const jobOf = ({ job, joint }: ProofSource): ProofFacts['job'] => ({
  number: job.number,
  engine: { family: job.engineFamily, model: job.engineModel, serial: job.engineSerial },
  odometer: job.odometer,
  hours: job.hours,
  bank: joint.bank,
  castingNumber: joint.castingNumber,
});

const recordOf = async (tx: ShopTx, { standing, rows }: ProofSource): Promise<ProofFacts['record']> => {
  const hashes = new Set(rows.map(({ hash }) => hash));
  const said = (await confirmationsOfWalk(tx, standing.row.id)).filter(({ hash }) => hashes.has(hash));
  return {
    events: rows.map(({ text, hash, sig }) => ({ text, hash, sig })),
    received: rows.map(({ receivedAt }) => receivedAt.toISOString()),
    tablets: await tabletsOf(tx),
    roles: await rolesOf(tx, Object.keys(await namesOf(tx))),
    confirmations: said.map(toConfirmation),
  };
};

const factsOf = async (tx: ShopTx, head: ProofHead, source: ProofSource): Promise<ProofFacts> => {
  const shop = await findShop(tx);
  if (!shop) throw notFound('shop.unknown', 'There is no such shop.');
  const { state, row } = source.standing;
  const approvedAt = await approvalOf(tx, row.procedureCode, row.revision);
  const { customer, claim, vin } = source.job;
  return {
    ...head,
    issuedAt: head.issuedAt.toISOString(),
    timeZone: shop.timeZone,
    shop: { id: shop.id, name: shop.name, address: shop.address },
    job: jobOf(source),
    procedure: { revision: row.revision, approvedAt, document: state.procedure },
    record: await recordOf(tx, source),
    side: { names: await namesOf(tx), customer, claim, vin },
  };
};

/** Makes and signs the document of a proof, once (decision 16). Throws 409 `proof.blocked` where the record forbids it. */
export const makeProof = async (
  deps: Deps,
  tx: ShopTx,
  head: ProofHead,
  source: ProofSource,
): Promise<{ sealed: string; fingerprint: string }> => {
  const tools = { crypto: deps.crypto, salt: () => deps.ids.token(16) };
  const built = await buildProof(await factsOf(tx, head, source), tools);
  if (!built.ok) {
    const { code, ...details } = built.error;
    throw proofBlocked([{ code: `proof.${code}`, details }]);
  }
  const { signer } = await deps.keyring(tx);
  const sealed = await sealProof(built.value.document, built.value.disclosures, signer);
  const payload = sealed.split('.')[1] ?? '';
  return { sealed, fingerprint: sha256Hex(Buffer.from(payload, 'base64url')) };
};
