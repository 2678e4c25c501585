import { randomUUID } from 'node:crypto';
import { CompactEncrypt, importJWK } from 'jose';
import { enrolmentProofText, type EnrolledTablet } from '@shared/contracts/tablets.contract';
import { canonicalJson } from '@shared/record/canonicalJson';
import type { SignedEvent } from '@shared/record/envelope';
import { signDetached } from '@shared/record/signature';
import type { Role } from '@shared/people/roles';
import { openLog, walkOn, type SealFor, type WalkLog } from '../../../db/seed/walker/walkLog';
import type { WalkPlan } from '../../../db/seed/walker/walkOn';
import type { WalkSetting } from '../../../db/seed/walker/walkBook';
import { sha256Hex } from '../../../server/deps';
import { makeTestSigner, testCrypto, type TestSigner } from '../../support/testSigner';
import { anybody, callerWith, signedIn, type Caller, type Reply } from './calls';
import { START, type TestServer } from './testServer';
import type { TestPerson, TestShop } from './testShop';

/** An enrolled tablet of a test. */
export interface TestTablet extends Caller {
  shop: TestShop;
  key: TestSigner;
  enrolled: EnrolledTablet;
  /** Catalogue cursor when it was enrolled. */
  known: number;
  /** Seals a PIN as the tablet would. */
  seal(payload: Record<string, unknown>): Promise<string>;
}

/** Makes an enrolment code as the shop's admin. */
export const enrolmentCode = async (server: TestServer, shop: TestShop): Promise<string> => {
  const admin = await signedIn(server, shop.people.admin);
  const reply = await admin.send('POST', '/api/tablets/enrolment-codes', {});
  return String((reply.body as unknown as { code: string }).code);
};

/** Enrols with a code. */
export const enrolWith = async (
  server: TestServer,
  code: string,
  key: TestSigner,
  name = 'Stand 2',
): Promise<Reply> => {
  const proof = await signDetached(enrolmentProofText(code, key.signer.kid), key.signer);
  return anybody(server).send('POST', '/api/tablets/enrol', { code, name, publicJwk: key.publicJwk, proof });
};

/** Enrols a tablet into a shop. */
export const enrolledTablet = async (server: TestServer, shop: TestShop): Promise<TestTablet> => {
  const key = await makeTestSigner();
  const reply = await enrolWith(server, await enrolmentCode(server, shop), key);
  if (reply.status !== 201) throw new Error(`enrolment: ${reply.status} ${JSON.stringify(reply.body)}`);
  const enrolled = reply.body as unknown as EnrolledTablet;
  const seal = async (payload: Record<string, unknown>): Promise<string> => {
    const { kid, ...jwk } = enrolled.sealingKey;
    return new CompactEncrypt(new TextEncoder().encode(canonicalJson(payload)))
      .setProtectedHeader({ alg: 'ECDH-ES', enc: 'A256GCM', kid })
      .encrypt(await importJWK(jwk, 'ECDH-ES'));
  };
  const caller = callerWith(server, { authorization: `Bearer ${enrolled.token}` });
  const catalogue = await caller.get('/api/tablet/catalogue');
  const { cursor: known } = catalogue.body as unknown as { cursor: number };
  return { ...caller, shop, key, enrolled, known, seal };
};

/** A walk on a tablet, with the seals that travel beside its events. */
export interface TabletWalk {
  id: string;
  tablet: TestTablet;
  log: WalkLog;
  /** Sealed PINs by their hash, as the events name them. */
  seals: Map<string, string>;
  /** The batch of some of its events (default: all) as a body. */
  batch(from?: number, to?: number): { branch: number; events: SignedEvent[]; seals: { hash: string; jwe: string }[] };
  /** Sends some of its events. */
  send(from?: number, to?: number): Promise<Reply>;
}

const settingFor = (tablet: TestTablet, more: Partial<WalkSetting>): WalkSetting => {
  const { shop } = tablet;
  const { technician, colleague, supervisor } = shop.people;
  const roles = Object.fromEntries(Object.values(shop.people).map((one) => [one.id, one.roles])) as Record<
    string,
    Role[]
  >;
  return {
    job: shop.job,
    joint: shop.joint,
    procedure: shop.procedure.document,
    revision: shop.procedure.revision,
    hash: shop.procedure.hash,
    tablet: tablet.enrolled.tablet.id,
    boot: 'boot-1',
    known: tablet.known,
    startMs: START - 3_600_000 * 3,
    people: roles,
    pulls: technician.id,
    records: colleague.id,
    supervisor: supervisor.id,
    wrenches: shop.wrenches,
    ...more,
  };
};

const pinOf = (shop: TestShop, id: string): TestPerson | undefined =>
  Object.values(shop.people).find((person) => person.id === id);

/** A walk whose events this tablet signs; PINs are right unless `pin` says another. */
export const tabletWalk = (
  tablet: TestTablet,
  more: Partial<WalkSetting> & { pin?: string; id?: string } = {},
): TabletWalk => {
  const { pin: wrongPin, id = randomUUID(), ...setting } = more;
  const seals = new Map<string, string>();
  const seal = async ({ walk, seq, prev, person, meaning }: SealFor): Promise<string> => {
    const pin = wrongPin ?? pinOf(tablet.shop, person)?.pin ?? '';
    const jwe = await tablet.seal({ pin, person, walk, seq, prev, meaning, pinVersion: 1 });
    const hash = sha256Hex(jwe);
    seals.set(hash, jwe);
    return hash;
  };
  const log = openLog(settingFor(tablet, setting), {
    shop: tablet.shop.id,
    walk: id,
    tablet: tablet.key.signer,
    crypto: testCrypto,
    seal,
  });
  const batch = (from = 0, to = log.signed.length) => {
    const events = log.signed.slice(from, to);
    const carried = events.flatMap(({ text, hash }) =>
      [...seals].filter(([sealHash]) => text.includes(sealHash)).map(([, jwe]) => ({ hash, jwe })),
    );
    return { branch: 0, events, seals: carried };
  };
  const send = (from?: number, to?: number) => tablet.send('POST', `/api/tablet/walks/${id}/events`, batch(from, to));
  return { id, tablet, log, seals, batch, send };
};

/** A walk taken as far as a plan goes. */
export const walked = async (
  tablet: TestTablet,
  plan: WalkPlan = {},
  more: Parameters<typeof tabletWalk>[1] = {},
): Promise<TabletWalk> => {
  const walk = tabletWalk(tablet, more);
  await walkOn(walk.log, plan);
  return walk;
};
