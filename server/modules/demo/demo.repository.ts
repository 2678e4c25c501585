import { and, asc, eq, gt } from 'drizzle-orm';
import { DEMO_ACCOUNTS, DEMO_SHOP, type DemoAccount } from '@db/demoAccounts';
import { walks } from '@db/schema/walks';
import type { ShopTx } from '../../tenancy/withShop';
import { peopleSince } from '../people/people.repository';

/** The shop that the demo's doors open. */
export const demoShop = DEMO_SHOP;

/** The demo's people who are still there. */
export const demoAccounts = async (tx: ShopTx): Promise<DemoAccount[]> => {
  const present = new Set((await peopleSince(tx, 0)).filter(({ state }) => state === 'active').map(({ id }) => id));
  return DEMO_ACCOUNTS.filter(({ id }) => present.has(id));
};

/** A head half walked, or null: the one that was opened first. */
export const halfWalked = async (tx: ShopTx): Promise<string | null> => {
  const rows = await tx.db
    .select({ id: walks.id })
    .from(walks)
    .where(and(eq(walks.shopId, tx.shop), eq(walks.state, 'walking'), gt(walks.readingsDone, 0)))
    .orderBy(asc(walks.openedAt))
    .limit(1);
  return rows[0]?.id ?? null;
};
