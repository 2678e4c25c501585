import { createHash, randomUUID } from 'node:crypto';
import { exportJWK, generateKeyPair } from 'jose';
import { jobJoints, jobs } from '@db/schema/jobs';
import { people, pins } from '@db/schema/people';
import { procedureRevisions, procedures } from '@db/schema/procedures';
import { shops } from '@db/schema/shops';
import { wrenches } from '@db/schema/wrenches';
import { defaultShopSettings, type ShopSettings } from '@shared/contracts/settings.contract';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { Role } from '@shared/people/roles';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import { canonicalJson } from '@shared/record/canonicalJson';
import type { PublicJwk } from '@shared/record/crypto';
import { jwkThumbprint } from '@shared/record/jwkThumbprint';
import { headD6 } from '../../../db/seed/procedures/headD6';
import { brindleWrenches } from '../../../db/seed/wrenches';
import type { Deps } from '../../../server/deps';
import { hashSecret } from '../../../server/keys/passwords';
import { insertShopKey } from '../../../server/modules/shopKeys/shopKeys.repository';
import { withShop, type ShopTx } from '../../../server/tenancy/withShop';
import { START } from './testServer';

/** Somebody of a test's shop. */
export interface TestPerson {
  id: string;
  name: string;
  email: string;
  password: string;
  pin: string;
  roles: Role[];
}

/** A shop with one of everything. */
export interface TestShop {
  id: string;
  people: Record<'technician' | 'colleague' | 'supervisor' | 'clerk' | 'keeper' | 'admin', TestPerson>;
  procedure: { id: string; document: ProcedureDocument; hash: string; revision: number };
  wrenches: WrenchSnapshot[];
  job: string;
  jobNumber: string;
  joint: string;
}

const PASSWORD = 'a password of the tests';
const PIN = '481526';

/** SHA-256 (hex) of a document's canonical JSON, as `walk.opened` names it. */
export const documentHash = (document: ProcedureDocument): string =>
  createHash('sha256').update(canonicalJson(document)).digest('hex');

const makeKey = async (tx: ShopTx, deps: Deps, purpose: 'signing' | 'sealing') => {
  const pair = await (purpose === 'signing'
    ? generateKeyPair('ES256', { extractable: true })
    : generateKeyPair('ECDH-ES', { crv: 'P-256', extractable: true }));
  const { x = '', y = '' } = await exportJWK(pair.publicKey);
  const publicJwk: PublicJwk = { kty: 'EC', crv: 'P-256', x, y };
  const kid = await jwkThumbprint(publicJwk, deps.crypto);
  await insertShopKey(tx, deps.config, { kid, purpose, publicJwk, privateJwk: await exportJWK(pair.privateKey) });
};

let secrets: Promise<{ passwordHash: string; pinHash: string }> | undefined;
const hashed = () =>
  (secrets ??= Promise.all([hashSecret(PASSWORD), hashSecret(PIN)]).then(([passwordHash, pinHash]) => ({
    passwordHash,
    pinHash,
  })));

const makePerson = async (tx: ShopTx, name: string, roles: Role[]): Promise<TestPerson> => {
  const { passwordHash, pinHash } = await hashed();
  const id = randomUUID();
  const email = `${name}@${tx.shop.slice(0, 8)}.example`;
  await tx.db.insert(people).values({ shopId: tx.shop, id, name, email, passwordHash, roles, pinVersion: 1 });
  await tx.db.insert(pins).values({ shopId: tx.shop, personId: id, version: 1, hash: pinHash });
  return { id, name, email, password: PASSWORD, pin: PIN, roles };
};

const makePeople = async (tx: ShopTx): Promise<TestShop['people']> => ({
  technician: await makePerson(tx, 'technician', ['technician']),
  colleague: await makePerson(tx, 'colleague', ['technician']),
  supervisor: await makePerson(tx, 'supervisor', ['supervisor']),
  clerk: await makePerson(tx, 'clerk', ['clerk']),
  keeper: await makePerson(tx, 'keeper', ['keeper']),
  admin: await makePerson(tx, 'admin', ['admin']),
});

/** Writes a procedure with one approved revision. */
export const makeProcedure = async (
  tx: ShopTx,
  document: ProcedureDocument,
  by: string,
): Promise<TestShop['procedure']> => {
  const id = randomUUID();
  const hash = documentHash(document);
  const { code, title, engine, component } = document;
  const approved = { state: 'approved' as const, writtenBy: by, approvedBy: by, approvedAt: new Date(START) };
  await tx.db.insert(procedures).values({ shopId: tx.shop, id, code, title, engine, component });
  await tx.db
    .insert(procedureRevisions)
    .values({ shopId: tx.shop, procedureId: id, revision: 4, hash, document, ...approved });
  return { id, document, hash, revision: 4 };
};

/** Opens a job with one joint of a procedure. */
export const makeJob = async (tx: ShopTx, procedureCode: string, number: string) => {
  const [id, joint] = [randomUUID(), randomUUID()];
  await tx.db.insert(jobs).values({
    shopId: tx.shop,
    id,
    number,
    customer: 'Quarry Road Haulage',
    engineFamily: 'Ossery',
    engineModel: 'D6 3.8',
    engineSerial: `OD6-${number}`,
    vin: 'ZZ9KD63X5TB004417',
    claim: 'WR-88120',
  });
  await tx.db.insert(jobJoints).values({ shopId: tx.shop, id: joint, jobId: id, procedureCode });
  return { id, joint };
};

/** Makes a shop with keys, six people, a procedure, a crib, a job. */
export const makeTestShop = (
  deps: Deps,
  { settings = {}, document = headD6 }: { settings?: Partial<ShopSettings>; document?: ProcedureDocument } = {},
): Promise<TestShop> => {
  const id = randomUUID();
  return withShop(deps.client, id, async (tx) => {
    const name = `Shop ${id.slice(0, 4)}`;
    const whole = { ...defaultShopSettings, ...settings };
    await tx.db.insert(shops).values({ id, name, prefix: 'BL', timeZone: 'Europe/London', settings: whole });
    await makeKey(tx, deps, 'signing');
    await makeKey(tx, deps, 'sealing');
    const people = await makePeople(tx);
    const procedure = await makeProcedure(tx, document, people.supervisor.id);
    const crib = brindleWrenches(START, () => randomUUID());
    for (const snapshot of crib) {
      const { id: wrench, tag, state } = snapshot;
      await tx.db.insert(wrenches).values({ shopId: tx.shop, id: wrench, tag, snapshot, state });
    }
    const jobNumber = `24-${id.slice(0, 4)}`;
    const { id: job, joint } = await makeJob(tx, document.code, jobNumber);
    return { id, people, procedure, wrenches: crib, job, jobNumber, joint };
  });
};
