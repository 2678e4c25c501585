import { sql } from 'drizzle-orm';
import type { DatabaseClient } from '../../tenancy/client';

/** Throws when the database does not answer. */
export const demandDatabase = async (client: DatabaseClient): Promise<void> => {
  await client.db.execute(sql`select 1`);
};
