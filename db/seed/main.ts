import { drizzle } from 'drizzle-orm/node-postgres';
import pg from 'pg';
import { DEMO_SECRET } from '../shopKeySeal';
import { startDemoServer } from './demoServer';
import { enrolDemoTablet } from './demoTablet';
import { sendDemoWalks } from './demoWalks';
import { insertShop } from './insertShop';
import { brindleLane, secondShop } from './shops';

const ownerUrl = process.env['OWNER_DATABASE_URL'];
if (!ownerUrl) throw new Error('OWNER_DATABASE_URL is not set: the demo is filled in by the owner of the tables.');
const secret = process.env['APP_SECRET'] ?? DEMO_SECRET;

/** Fills an empty database with the demo: two shops, and walks that went through the server as real ones do. */
async function seed(url: string): Promise<void> {
  const nowMs = Date.now();
  const brindle = brindleLane(nowMs);
  const pool = new pg.Pool({ connectionString: url, max: 1 });
  try {
    const db = drizzle(pool);
    for (const shop of [brindle, secondShop(nowMs)]) await insertShop(db, shop, secret, nowMs);
  } finally {
    await pool.end();
  }
  const server = await startDemoServer(secret);
  try {
    await sendDemoWalks(server.url, brindle, await enrolDemoTablet(server.url), nowMs);
  } finally {
    await server.stop();
  }
}

await seed(ownerUrl);
