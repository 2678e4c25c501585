import { and, asc, eq, gt, inArray } from 'drizzle-orm';
import { isUuid } from '@shared/kernel/ids';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import { wrenches, wrenchHistory } from '@db/schema/wrenches';
import type { ShopTx } from '../../tenancy/withShop';

/** A wrench as stored. */
export type WrenchRecord = typeof wrenches.$inferSelect;

/** Every wrench whose row changed after a cursor (0: every one), by tag. */
export const wrenchesSince = (tx: ShopTx, since: number): Promise<WrenchRecord[]> =>
  tx.db
    .select()
    .from(wrenches)
    .where(and(eq(wrenches.shopId, tx.shop), gt(wrenches.changed, since)))
    .orderBy(asc(wrenches.tag));

/** The histories of these wrenches, oldest line first; a wrench that is none of the shop's is missing. */
export const wrenchHistories = async (
  tx: ShopTx,
  ids: string[],
): Promise<Map<string, { since: number; snapshot: WrenchSnapshot }[]>> => {
  const known = ids.filter(isUuid);
  const histories = new Map<string, { since: number; snapshot: WrenchSnapshot }[]>();
  if (known.length === 0) return histories;
  const rows = await tx.db
    .select()
    .from(wrenchHistory)
    .where(and(eq(wrenchHistory.shopId, tx.shop), inArray(wrenchHistory.wrenchId, known)))
    .orderBy(asc(wrenchHistory.since));
  for (const { wrenchId, since, snapshot } of rows) {
    histories.set(wrenchId, [...(histories.get(wrenchId) ?? []), { since, snapshot }]);
  }
  return histories;
};
