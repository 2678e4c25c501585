import { sql } from 'drizzle-orm';
import { pgPolicy } from 'drizzle-orm/pg-core';

/**
 * A shop sees and writes its own rows only (P5, decision 12). Without the setting, or with it empty (what a reused
 * connection holds after a transaction), the comparison is null and no row is there.
 */
const isOwn = (column: string) => sql.raw(`${column} = nullif(current_setting('app.shop_id', true), '')::uuid`);

/** The policy of every table that has a `shop_id`. */
export const shopIsolation = () => pgPolicy('shop_isolation', { using: isOwn('shop_id'), withCheck: isOwn('shop_id') });

/** The policy of `shops` itself. */
export const ownShop = () => pgPolicy('shop_isolation', { using: isOwn('id'), withCheck: isOwn('id') });
