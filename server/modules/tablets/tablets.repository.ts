import { and, asc, eq, isNull } from 'drizzle-orm';
import type { PublicJwk } from '@shared/record/crypto';
import { enrolmentCodes, tablets, type TabletReportRow } from '@db/schema/tablets';
import type { ShopTx } from '../../tenancy/withShop';

/** A tablet as stored. */
export type TabletRecord = typeof tablets.$inferSelect;

const mine = (tx: ShopTx, id: string) => and(eq(tablets.shopId, tx.shop), eq(tablets.id, id));

/** A tablet of the shop, or null. */
export const findTablet = async (tx: ShopTx, id: string): Promise<TabletRecord | null> => {
  const rows = await tx.db.select().from(tablets).where(mine(tx, id));
  return rows[0] ?? null;
};

/** A tablet by the thumbprint of its key, or null. */
export const findTabletByKid = async (tx: ShopTx, kid: string): Promise<TabletRecord | null> => {
  const rows = await tx.db
    .select()
    .from(tablets)
    .where(and(eq(tablets.shopId, tx.shop), eq(tablets.kid, kid)));
  return rows[0] ?? null;
};

/** Every tablet, in the order of enrolment. */
export const listTabletRows = (tx: ShopTx): Promise<TabletRecord[]> =>
  tx.db.select().from(tablets).where(eq(tablets.shopId, tx.shop)).orderBy(asc(tablets.enrolledAt));

/** Stores a new tablet. */
export const insertTablet = async (
  tx: ShopTx,
  tablet: { id: string; name: string; kid: string; publicJwk: PublicJwk; enrolledAt: Date },
): Promise<void> => {
  await tx.db.insert(tablets).values({ shopId: tx.shop, ...tablet });
};

/** Revokes a tablet. */
export const markRevoked = async (tx: ShopTx, id: string, at: Date, reason: string): Promise<void> => {
  await tx.db.update(tablets).set({ state: 'revoked', revokedAt: at, revokedReason: reason }).where(mine(tx, id));
};

/** Notes when a tablet was last heard of. */
export const markSeen = async (tx: ShopTx, id: string, at: Date): Promise<void> => {
  await tx.db.update(tablets).set({ seenAt: at }).where(mine(tx, id));
};

/** Keeps a tablet's report. */
export const saveReport = async (tx: ShopTx, id: string, report: TabletReportRow): Promise<void> => {
  await tx.db
    .update(tablets)
    .set({ report, seenAt: new Date(report.at) })
    .where(mine(tx, id));
};

/** Stores the hash of a new code. */
export const insertCode = async (
  tx: ShopTx,
  code: { id: string; codeHash: string; note: string; createdBy: string | null; createdAt: Date; expiresAt: Date },
): Promise<void> => {
  await tx.db.insert(enrolmentCodes).values({ shopId: tx.shop, ...code });
};

/** A code by its hash, locked until the transaction ends: of two that use it at once, one waits and then sees it used. */
export const lockCode = async (tx: ShopTx, codeHash: string) => {
  const rows = await tx.db
    .select()
    .from(enrolmentCodes)
    .where(and(eq(enrolmentCodes.shopId, tx.shop), eq(enrolmentCodes.codeHash, codeHash)))
    .for('update');
  return rows[0] ?? null;
};

/** Uses a code up. */
export const useCode = async (tx: ShopTx, id: string, tablet: string, at: Date): Promise<void> => {
  await tx.db
    .update(enrolmentCodes)
    .set({ usedAt: at, usedBy: tablet })
    .where(and(eq(enrolmentCodes.shopId, tx.shop), eq(enrolmentCodes.id, id), isNull(enrolmentCodes.usedAt)));
};
