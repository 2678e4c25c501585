import type { PublicProof } from '@shared/contracts/proofs.contract';
import { withholdSide } from '@shared/proof/sealProof';
import { SHOWN_OUTSIDE } from '@shared/proof/sideSheet';
import type { PublicJwk } from '@shared/record/crypto';
import type { Deps } from '../../deps';
import { notFound } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { proofUnknown } from '../proofs/proofs.errors';
import { publicUrlOf } from '../proofs/proofs.mapping';
import { findProofByToken, issuesOf, type ProofRecord } from '../proofs/proofs.repository';
import { storedHashes } from '../proofs/storedHashes';
import { findShop } from '../shops/shops.repository';

const successorOf = async (deps: Deps, tx: ShopTx, proof: ProofRecord): Promise<PublicProof['supersededBy']> => {
  if (proof.state !== 'superseded') return null;
  const [newest] = await issuesOf(tx, proof.number);
  if (!newest || newest.id === proof.id) return null;
  const { number, issue, publicToken } = newest;
  return { number, issue, publicUrl: publicUrlOf(deps.config.publicUrl, publicToken) };
};

/** What anybody with the QR code sees: today's truth about a proof, names and customer withheld (D2, D3). */
export const publicProofByToken = async (deps: Deps, tx: ShopTx, token: string): Promise<PublicProof> => {
  const proof = await findProofByToken(tx, token);
  const shop = await findShop(tx);
  if (!proof || !shop) throw proofUnknown();
  return {
    number: proof.number,
    issue: proof.issue,
    state: proof.state,
    shop: { id: shop.id, name: shop.name },
    issuedAt: proof.issuedAt.toISOString(),
    reason: proof.revokedReason,
    supersededBy: await successorOf(deps, tx, proof),
    jws: withholdSide(proof.jws, SHOWN_OUTSIDE),
    keys: (await deps.keyring(tx)).signingKeys,
    stored: await storedHashes(tx, proof),
  };
};

/** The shop's signing keys, past ones too. Throws 404 `shop.unknown`. */
export const publicKeysOf = async (deps: Deps, tx: ShopTx): Promise<{ keys: (PublicJwk & { kid: string })[] }> => {
  if (!(await findShop(tx))) throw notFound('shop.unknown', 'There is no such shop.');
  return { keys: (await deps.keyring(tx)).signingKeys };
};
