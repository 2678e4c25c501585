import { fileURLToPath, pathToFileURL } from 'node:url';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate as applyMigrations } from 'drizzle-orm/node-postgres/migrator';
import pg from 'pg';

/** Any number of our own: two servers that start together migrate one after the other. */
const MIGRATION_LOCK = 4_180_417;

/**
 * Brings a database up to date, as its owner. The migrator itself takes no lock, so one is held on the only connection
 * of the pool: released with it, also when the process dies.
 */
export const migrate = async (
  ownerUrl: string,
  migrationsFolder: string = fileURLToPath(new URL('./migrations', import.meta.url)),
): Promise<void> => {
  const pool = new pg.Pool({ connectionString: ownerUrl, max: 1 });
  try {
    await pool.query('select pg_advisory_lock($1)', [MIGRATION_LOCK]);
    await applyMigrations(drizzle(pool), { migrationsFolder });
  } finally {
    await pool.end();
  }
};

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const ownerUrl = process.env['OWNER_DATABASE_URL'];
  if (!ownerUrl) throw new Error('OWNER_DATABASE_URL is not set: migrations run as the owner of the tables.');
  await migrate(ownerUrl);
}
