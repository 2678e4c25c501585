import { and, eq, isNull, lte, sql } from 'drizzle-orm';
import { outbox } from '@db/schema/outbox';
import type { Deps } from '../../deps';
import type { DatabaseClient } from '../../tenancy/client';
import type { ShopTx } from '../../tenancy/withShop';

/** Leaves work to be done after the commit, in the transaction of its cause (decision 15). */
export const leaveWork = async (
  deps: Pick<Deps, 'ids' | 'clock'>,
  tx: ShopTx,
  kind: string,
  payload: Record<string, unknown>,
): Promise<void> => {
  const now = deps.clock.now();
  await tx.db
    .insert(outbox)
    .values({ shopId: tx.shop, id: deps.ids.uuid(), kind, payload, createdAt: now, nextAt: now });
};

/** A piece of work as it is taken up. */
export interface Work {
  id: string;
  kind: string;
  payload: Record<string, unknown>;
  attempts: number;
}

/** The shops in which something waits. */
export const shopsWithWork = async (client: DatabaseClient, now: Date): Promise<string[]> => {
  const result = await client.db.execute<{ shop_id: string }>(
    sql`select shop_id from shops_with_outbox(${now.toISOString()}::timestamptz)`,
  );
  return result.rows.map((row) => row.shop_id);
};

/** Takes the oldest work that nobody else holds, until the transaction ends. */
export const takeWork = async (tx: ShopTx, now: Date): Promise<Work | null> => {
  const rows = await tx.db
    .select({ id: outbox.id, kind: outbox.kind, payload: outbox.payload, attempts: outbox.attempts })
    .from(outbox)
    .where(and(eq(outbox.shopId, tx.shop), isNull(outbox.doneAt), lte(outbox.nextAt, now)))
    .orderBy(outbox.nextAt)
    .limit(1)
    .for('update', { skipLocked: true });
  return rows[0] ?? null;
};

/** Marks work as done. */
export const markDone = async (tx: ShopTx, id: string, at: Date): Promise<void> => {
  await tx.db
    .update(outbox)
    .set({ doneAt: at, error: null })
    .where(and(eq(outbox.shopId, tx.shop), eq(outbox.id, id)));
};

/** Keeps why work failed and when it is tried again. */
export const markFailed = async (tx: ShopTx, id: string, nextAt: Date, error: string): Promise<void> => {
  await tx.db
    .update(outbox)
    .set({ attempts: sql`${outbox.attempts} + 1`, nextAt, error })
    .where(and(eq(outbox.shopId, tx.shop), eq(outbox.id, id)));
};
