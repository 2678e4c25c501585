import { and, desc, eq, lte, sql } from 'drizzle-orm';
import type { ShopSettings } from '@shared/contracts/settings.contract';
import { shopCounters, shopPolicies, shops } from '@db/schema/shops';
import type { ShopTx } from '../../tenancy/withShop';

/** A shop as stored. */
export type ShopRecord = typeof shops.$inferSelect;

/** The shop of the transaction, or null when there is none of that id. */
export const findShop = async (tx: ShopTx): Promise<ShopRecord | null> => {
  const rows = await tx.db.select().from(shops).where(eq(shops.id, tx.shop));
  return rows[0] ?? null;
};

/** The catalogue cursor as committed so far (and moved by this transaction). */
export const catalogueCursor = async (tx: ShopTx): Promise<number> => {
  const rows = await tx.db
    .select({ value: shopCounters.value })
    .from(shopCounters)
    .where(and(eq(shopCounters.shopId, tx.shop), eq(shopCounters.name, 'catalogue')));
  return rows[0]?.value ?? 0;
};

/** Moves a counter of the shop by one, under its row lock, and gives the new value. */
export const nextCount = async (tx: ShopTx, counter: string): Promise<number> => {
  const result = await tx.db.execute<{ value: string }>(sql`select next_count(${tx.shop}, ${counter}) as value`);
  return Number(result.rows[0]?.value);
};

/** The shop's settings at a catalogue cursor; null before its first. */
export const settingsAt = async (tx: ShopTx, cursor: number): Promise<ShopSettings | null> => {
  const rows = await tx.db
    .select({ settings: shopPolicies.settings })
    .from(shopPolicies)
    .where(and(eq(shopPolicies.shopId, tx.shop), lte(shopPolicies.since, cursor)))
    .orderBy(desc(shopPolicies.since))
    .limit(1);
  return rows[0]?.settings ?? null;
};

/** True when the shop ever was a shop of one (P2). */
export const wasEverShopOfOne = async (tx: ShopTx): Promise<boolean> => {
  const rows = await tx.db
    .select({ since: shopPolicies.since })
    .from(shopPolicies)
    .where(and(eq(shopPolicies.shopId, tx.shop), sql`${shopPolicies.settings}->>'shopOfOne' = 'true'`))
    .limit(1);
  return rows.length > 0;
};
