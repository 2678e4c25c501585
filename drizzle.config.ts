import { defineConfig } from 'drizzle-kit';

/** Migrations are generated from the tables and committed; `db/migrate.ts` applies them, never drizzle-kit. */
export default defineConfig({
  dialect: 'postgresql',
  schema: './db/schema/*.ts',
  out: './db/migrations',
});
