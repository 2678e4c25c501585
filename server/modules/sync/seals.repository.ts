import { and, asc, eq, gt, inArray } from 'drizzle-orm';
import { confirmations, pinUses } from '@db/schema/confirmations';
import type { ShopTx } from '../../tenancy/withShop';

/** A confirmation as stored. */
export type ConfirmationRecord = typeof confirmations.$inferSelect;

/** Confirmations of a walk, each place's last one last. */
export const confirmationsOfWalk = (tx: ShopTx, walk: string): Promise<ConfirmationRecord[]> =>
  tx.db
    .select()
    .from(confirmations)
    .where(and(eq(confirmations.shopId, tx.shop), eq(confirmations.walkId, walk)))
    .orderBy(asc(confirmations.branch), asc(confirmations.seq), asc(confirmations.nth));

/** Confirmations of events by hash. */
export const confirmationsOfHashes = async (
  tx: ShopTx,
  walk: string,
  hashes: string[],
): Promise<ConfirmationRecord[]> =>
  hashes.length === 0
    ? []
    : tx.db
        .select()
        .from(confirmations)
        .where(
          and(eq(confirmations.shopId, tx.shop), eq(confirmations.walkId, walk), inArray(confirmations.hash, hashes)),
        )
        .orderBy(asc(confirmations.branch), asc(confirmations.seq), asc(confirmations.nth));

/** Confirmations made after a cursor. */
export const confirmationsSince = (tx: ShopTx, since: number): Promise<ConfirmationRecord[]> =>
  tx.db
    .select()
    .from(confirmations)
    .where(and(eq(confirmations.shopId, tx.shop), gt(confirmations.changed, since)))
    .orderBy(asc(confirmations.changed));

/** Stores a confirmation. */
export const insertConfirmation = async (
  tx: ShopTx,
  row: Omit<ConfirmationRecord, 'shopId' | 'changed'>,
): Promise<void> => {
  await tx.db.insert(confirmations).values({ shopId: tx.shop, ...row });
};

/** A use of a PIN as stored. */
export type PinUseRecord = typeof pinUses.$inferSelect;

/** Lists a use of a PIN to its owner (P3). */
export const insertPinUse = async (
  tx: ShopTx,
  use: Omit<PinUseRecord, 'shopId' | 'answer' | 'answeredAt'>,
): Promise<void> => {
  await tx.db.insert(pinUses).values({ shopId: tx.shop, ...use });
};
