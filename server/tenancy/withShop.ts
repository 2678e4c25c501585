import { sql } from 'drizzle-orm';
import type { NodePgDatabase } from 'drizzle-orm/node-postgres';
import type { DatabaseClient } from './client';

/** A transaction inside one shop: what every repository works with. */
export interface ShopTx {
  readonly shop: string;
  readonly db: Parameters<Parameters<NodePgDatabase['transaction']>[0]>[0];
}

/**
 * Runs work in one transaction of one shop; commits when it ends, rolls back when it throws. The only place that sets
 * app.shop_id: as a bound parameter, inside the transaction, and gone with it (decision 12).
 */
export const withShop = <T>(client: DatabaseClient, shop: string, work: (tx: ShopTx) => Promise<T>): Promise<T> =>
  client.db.transaction(async (db) => {
    await db.execute(sql`select set_config('app.shop_id', ${shop}, true)`);
    return work({ shop, db });
  });
