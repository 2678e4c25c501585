import { and, desc, eq, gt, sql } from 'drizzle-orm';
import { pinUses } from '@db/schema/confirmations';
import { jobs } from '@db/schema/jobs';
import { tablets } from '@db/schema/tablets';
import { walks } from '@db/schema/walks';
import type { ShopTx } from '../../tenancy/withShop';

const columns = { use: pinUses, jobNumber: jobs.number, tabletName: tablets.name };

const from = (tx: ShopTx) =>
  tx.db
    .select(columns)
    .from(pinUses)
    .innerJoin(walks, and(eq(walks.shopId, pinUses.shopId), eq(walks.id, pinUses.walkId)))
    .innerJoin(jobs, and(eq(jobs.shopId, walks.shopId), eq(jobs.id, walks.jobId)))
    .leftJoin(tablets, and(eq(tablets.shopId, pinUses.shopId), sql`${tablets.id}::text = ${pinUses.tablet}`));

/** Somebody's PIN uses since a moment, newest first. */
export const pinUsesOf = (tx: ShopTx, person: string, since: Date) =>
  from(tx)
    .where(and(eq(pinUses.shopId, tx.shop), eq(pinUses.personId, person), gt(pinUses.at, since)))
    .orderBy(desc(pinUses.at));

/** One of somebody's own PIN uses, or null: somebody else's is as if it were not there. */
export const findPinUse = async (tx: ShopTx, person: string, id: string) => {
  const rows = await from(tx).where(and(eq(pinUses.shopId, tx.shop), eq(pinUses.personId, person), eq(pinUses.id, id)));
  return rows[0] ?? null;
};

/** Keeps what the owner said. */
export const answerPinUse = async (tx: ShopTx, id: string, answer: 'mine' | 'notMine', at: Date): Promise<void> => {
  await tx.db
    .update(pinUses)
    .set({ answer, answeredAt: at })
    .where(and(eq(pinUses.shopId, tx.shop), eq(pinUses.id, id)));
};
