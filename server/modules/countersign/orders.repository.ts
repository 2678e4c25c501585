import { and, asc, eq, gt, inArray } from 'drizzle-orm';
import { isUuid } from '@shared/kernel/ids';
import { orders } from '@db/schema/orders';
import type { ShopTx } from '../../tenancy/withShop';

/** An order as stored. */
export type OrderRecord = typeof orders.$inferSelect;

/** Orders by id. */
export const ordersByIds = async (tx: ShopTx, ids: string[]): Promise<Map<string, OrderRecord>> => {
  const known = ids.filter(isUuid);
  if (known.length === 0) return new Map();
  const rows = await tx.db
    .select()
    .from(orders)
    .where(and(eq(orders.shopId, tx.shop), inArray(orders.id, known)));
  return new Map(rows.map((row) => [row.id, row]));
};

/** Orders whose row changed after a cursor. */
export const ordersSince = (tx: ShopTx, since: number): Promise<OrderRecord[]> =>
  tx.db
    .select()
    .from(orders)
    .where(and(eq(orders.shopId, tx.shop), gt(orders.changed, since)))
    .orderBy(asc(orders.at));

/** Every order about a walk. */
export const ordersOfWalk = (tx: ShopTx, walk: string): Promise<OrderRecord[]> =>
  tx.db
    .select()
    .from(orders)
    .where(and(eq(orders.shopId, tx.shop), eq(orders.walkId, walk)))
    .orderBy(asc(orders.at));

/** Stores an order. */
export const insertOrder = async (tx: ShopTx, order: Omit<OrderRecord, 'shopId' | 'changed'>): Promise<void> => {
  await tx.db.insert(orders).values({ shopId: tx.shop, ...order });
};

/** Orders a tablet has obeyed. */
export const markObeyed = async (tx: ShopTx, ids: string[]): Promise<void> => {
  const known = ids.filter(isUuid);
  if (known.length === 0) return;
  await tx.db
    .update(orders)
    .set({ state: 'obeyed' })
    .where(and(eq(orders.shopId, tx.shop), inArray(orders.id, known), eq(orders.state, 'open')));
};
