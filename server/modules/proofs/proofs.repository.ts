import { and, desc, eq, inArray } from 'drizzle-orm';
import { proofs } from '@db/schema/proofs';
import type { ShopTx } from '../../tenancy/withShop';

/** A proof as stored. */
export type ProofRecord = typeof proofs.$inferSelect;

const mine = (tx: ShopTx, id: string) => and(eq(proofs.shopId, tx.shop), eq(proofs.id, id));

/** Proofs, newest first; with ids given only those. */
export const findProofs = (tx: ShopTx, wanted: { ids?: string[]; limit: number }): Promise<ProofRecord[]> =>
  tx.db
    .select()
    .from(proofs)
    .where(and(eq(proofs.shopId, tx.shop), wanted.ids === undefined ? undefined : inArray(proofs.id, wanted.ids)))
    .orderBy(desc(proofs.issuedAt), desc(proofs.issue))
    .limit(wanted.limit);

/** A proof, or null. */
export const findProof = async (tx: ShopTx, id: string): Promise<ProofRecord | null> => {
  const rows = await tx.db.select().from(proofs).where(mine(tx, id));
  return rows[0] ?? null;
};

/** A proof by the token of its QR code, or null. */
export const findProofByToken = async (tx: ShopTx, token: string): Promise<ProofRecord | null> => {
  const rows = await tx.db
    .select()
    .from(proofs)
    .where(and(eq(proofs.shopId, tx.shop), eq(proofs.publicToken, token)));
  return rows[0] ?? null;
};

/** Every issue of a number, newest first. */
export const issuesOf = (tx: ShopTx, number: string): Promise<ProofRecord[]> =>
  tx.db
    .select()
    .from(proofs)
    .where(and(eq(proofs.shopId, tx.shop), eq(proofs.number, number)))
    .orderBy(desc(proofs.issue));

/** The proofs of a walk, newest first. */
export const proofsOfWalk = (tx: ShopTx, walk: string): Promise<ProofRecord[]> =>
  tx.db
    .select()
    .from(proofs)
    .where(and(eq(proofs.shopId, tx.shop), eq(proofs.walkId, walk)))
    .orderBy(desc(proofs.issuedAt), desc(proofs.issue));

/** Stores an issued proof. */
export const insertProof = async (
  tx: ShopTx,
  proof: Omit<ProofRecord, 'shopId' | 'search' | 'revokedAt' | 'revokedReason'>,
): Promise<void> => {
  await tx.db.insert(proofs).values({ shopId: tx.shop, ...proof });
};

/** Says what a proof is worth from now on. */
export const markProof = async (
  tx: ShopTx,
  id: string,
  change: { state: ProofRecord['state']; revokedAt?: Date; revokedReason?: string },
): Promise<void> => {
  await tx.db.update(proofs).set(change).where(mine(tx, id));
};
