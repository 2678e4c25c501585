import { and, eq, gt, isNull, lte, sql } from 'drizzle-orm';
import { outbox } from '@db/schema/outbox';
import type { Deps } from '../../deps';
import type { DatabaseClient } from '../../tenancy/client';
import type { ShopTx } from '../../tenancy/withShop';

/** Work waits a little, so that what comes in many small pieces is done once. */
const GATHER_MS = 10_000;

/**
 * Leaves work to be done after the commit, in the transaction of its cause (decision 15). The same work that is not due
 * yet covers this cause as well; work that is due may be under way, and covers it no more.
 */
export const leaveWork = async (
  deps: Pick<Deps, 'ids' | 'clock'>,
  tx: ShopTx,
  kind: string,
  payload: Record<string, unknown>,
): Promise<void> => {
  const now = deps.clock.now();
  const waiting = await tx.db
    .select({ id: outbox.id })
    .from(outbox)
    .where(
      and(
        eq(outbox.shopId, tx.shop),
        eq(outbox.kind, kind),
        isNull(outbox.doneAt),
        gt(outbox.nextAt, now),
        sql`${outbox.payload} = ${JSON.stringify(payload)}::jsonb`,
      ),
    )
    .limit(1);
  if (waiting.length > 0) return;
  const nextAt = new Date(now.getTime() + GATHER_MS);
  await tx.db.insert(outbox).values({ shopId: tx.shop, id: deps.ids.uuid(), kind, payload, createdAt: now, nextAt });
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
