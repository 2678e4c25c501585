/** Brings a database to the present tables, and fills an empty one with the demo. Imports only `node:`. */
import { createDatabase, databaseExists, databaseUrl, runSql } from '../../db/clusterSql.mjs';
import { runTypeScript } from './children.mjs';

/** @typedef {import('../../db/clusterSql.mjs').ClusterSettings} ClusterSettings */

/**
 * Creates the database when it is missing and migrates it.
 * @param {ClusterSettings} settings @param {string} name
 */
export const migrateDatabase = async (settings, name) => {
  if (!databaseExists(settings, name)) createDatabase(settings, name);
  await runTypeScript('db/migrate.ts', environmentOf(settings, name));
};

/** @param {ClusterSettings} settings @param {string} name */
export const isEmptyDatabase = (settings, name) =>
  runSql(settings, 'select count(*) from shops;', { database: name }) === '0';

/**
 * Fills a migrated database with the demo.
 * @param {ClusterSettings} settings @param {string} name @param {Record<string, string>} [environment]
 */
export const seedDatabase = async (settings, name, environment = {}) => {
  await runTypeScript('db/seed/main.ts', { ...environmentOf(settings, name), DEMO: '1', ...environment });
};

/** What programs read to reach a database. @param {ClusterSettings} settings @param {string} name */
export const environmentOf = (settings, name) => ({
  DATABASE_URL: databaseUrl(settings, 'app', name),
  OWNER_DATABASE_URL: databaseUrl(settings, 'owner', name),
});
