import { and, desc, eq } from 'drizzle-orm';
import { ledger } from '@db/schema/proofs';
import type { ShopTx } from '../../tenancy/withShop';

/** A line of the shop's ledger as stored. */
export type LedgerRecord = typeof ledger.$inferSelect;

/** The line about this head of a walk, or null. */
export const findLine = async (tx: ShopTx, walk: string, headHash: string): Promise<LedgerRecord | null> => {
  const rows = await tx.db
    .select()
    .from(ledger)
    .where(and(eq(ledger.shopId, tx.shop), eq(ledger.walkId, walk), eq(ledger.headHash, headHash)));
  return rows[0] ?? null;
};

/** The last line, or null. Read it only after `next_count` has locked the ledger's counter. */
export const lastLine = async (tx: ShopTx): Promise<LedgerRecord | null> => {
  const rows = await tx.db.select().from(ledger).where(eq(ledger.shopId, tx.shop)).orderBy(desc(ledger.seq)).limit(1);
  return rows[0] ?? null;
};

/** Appends a line. */
export const insertLine = async (tx: ShopTx, line: Omit<LedgerRecord, 'shopId'>): Promise<void> => {
  await tx.db.insert(ledger).values({ shopId: tx.shop, ...line });
};
