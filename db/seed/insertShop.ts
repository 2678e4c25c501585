import { createHash, generateKeyPairSync } from 'node:crypto';
import { hash } from '@node-rs/argon2';
import { sql } from 'drizzle-orm';
import type { NodePgDatabase } from 'drizzle-orm/node-postgres';
import { calculateJwkThumbprint } from 'jose';
import { defaultShopSettings } from '@shared/contracts/settings.contract';
import { canonicalJson } from '@shared/record/canonicalJson';
import type { PublicJwk } from '@shared/record/crypto';
import { jobJoints, jobs } from '../schema/jobs';
import { people, pins } from '../schema/people';
import { procedureRevisions, procedures } from '../schema/procedures';
import { shopKeys } from '../schema/shopKeys';
import { shops } from '../schema/shops';
import { wrenches } from '../schema/wrenches';
import { sealPrivateJwk } from '../shopKeySeal';
import { seedId } from './ids';
import { demoProcedures } from './procedures';
import type { SeedShop } from './shops';

type Tx = Parameters<Parameters<NodePgDatabase['transaction']>[0]>[0];

const DAY_MS = 86_400_000;
// The demo's secrets are shown on its first page: a light hash keeps seeding quick and protects nothing that is secret.
const LIGHT = { memoryCost: 4_096, timeCost: 2, parallelism: 1 };

/** SHA-256 (hex) of a document's canonical JSON: what binds a walk to its revision. */
export const documentHash = (document: object): string =>
  createHash('sha256').update(canonicalJson(document)).digest('hex');

async function insertPeople(tx: Tx, shop: SeedShop): Promise<void> {
  for (const one of shop.people) {
    const passwordHash = await hash(one.password, LIGHT);
    const { id, name, email, roles } = one;
    await tx.insert(people).values({ shopId: shop.id, id, name, email, passwordHash, roles, pinVersion: 1 });
    await tx.insert(pins).values({ shopId: shop.id, personId: id, version: 1, hash: await hash(one.pin, LIGHT) });
  }
}

async function insertKey(tx: Tx, shop: SeedShop, secret: string, purpose: 'signing' | 'sealing'): Promise<void> {
  const pair = generateKeyPairSync('ec', { namedCurve: 'P-256' });
  const publicJwk = pair.publicKey.export({ format: 'jwk' }) as unknown as PublicJwk;
  const kid = await calculateJwkThumbprint({ ...publicJwk });
  const privateSealed = sealPrivateJwk(pair.privateKey.export({ format: 'jwk' }), secret, shop.id, kid);
  await tx.insert(shopKeys).values({ shopId: shop.id, kid, purpose, publicJwk, privateSealed });
}

async function insertProcedures(tx: Tx, shop: SeedShop, todayMs: number): Promise<void> {
  const author = shop.people.find(({ roles }) => roles.includes('supervisor')) ?? shop.people[0];
  const approver = shop.people.findLast(({ roles }) => roles.includes('supervisor')) ?? author;
  for (const document of demoProcedures) {
    const { code, title, engine, component } = document;
    const id = seedId(`${shop.id} ${code}`);
    await tx.insert(procedures).values({ shopId: shop.id, id, code, title, engine, component });
    await tx.insert(procedureRevisions).values({
      shopId: shop.id,
      procedureId: id,
      revision: 1,
      hash: documentHash(document),
      document,
      state: 'approved',
      writtenBy: author?.id ?? id,
      writtenAt: new Date(todayMs - 60 * DAY_MS),
      approvedBy: approver?.id ?? null,
      approvedAt: new Date(todayMs - 58 * DAY_MS),
    });
  }
}

async function insertJobs(tx: Tx, shop: SeedShop, todayMs: number): Promise<void> {
  for (const job of shop.jobs) {
    const createdAt = new Date(todayMs - job.daysAgo * DAY_MS - 3 * 3_600_000);
    await tx.insert(jobs).values({
      shopId: shop.id,
      id: job.id,
      number: job.number,
      customer: job.customer,
      engineFamily: job.family,
      engineModel: job.model,
      engineSerial: job.serial,
      vin: job.vin,
      claim: job.claim,
      ...(job.odometer ? { odometer: job.odometer } : {}),
      ...(job.hours === null ? {} : { hours: job.hours }),
      createdAt,
      changedAt: createdAt,
    });
    for (const { id, procedure, bank, castingNumber, purpose } of job.joints) {
      await tx
        .insert(jobJoints)
        .values({ shopId: shop.id, id, jobId: job.id, procedureCode: procedure, bank, castingNumber, purpose });
    }
  }
}

/** Inserts a shop with people, keys, crib, procedures and jobs, as the tables' owner; walks come later, by the server. */
export async function insertShop(db: NodePgDatabase, shop: SeedShop, secret: string, todayMs: number): Promise<void> {
  await db.transaction(async (tx) => {
    await tx.execute(sql`select set_config('app.shop_id', ${shop.id}, true)`);
    const { id, name, address, prefix, timeZone } = shop;
    await tx.insert(shops).values({ id, name, address, prefix, timeZone, settings: defaultShopSettings });
    await insertKey(tx, shop, secret, 'signing');
    await insertKey(tx, shop, secret, 'sealing');
    await insertPeople(tx, shop);
    for (const snapshot of shop.wrenches) {
      const { id: wrenchId, tag, state } = snapshot;
      await tx.insert(wrenches).values({ shopId: id, id: wrenchId, tag, snapshot, state });
    }
    await insertProcedures(tx, shop, todayMs);
    await insertJobs(tx, shop, todayMs);
  });
}
