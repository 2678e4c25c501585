import { createHash } from 'node:crypto';
import { buildProof, type ProofFacts } from '@shared/proof/buildProof';
import type { ProofConfirmation, ProofDocument } from '@shared/proof/proofDocument';
import { sealProof } from '@shared/proof/sealProof';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import { canonicalJson } from '@shared/record/canonicalJson';
import type { PublicJwk } from '@shared/record/crypto';
import { signDetached } from '@shared/record/signature';
import type { WalkEvent } from '@shared/walk/events';
import { makeTestSigner, testCrypto, type TestSigner } from './testSigner';
import { testIds, testSetting } from './walkBook';
import { demoProcedures, openLog, walkOn, type WalkLog, type WalkPlan } from './walker';
import type { WalkSetting } from '../../db/seed/walker/walkBook';

/** A finished walk with the keys that signed it, and the proof the shop made of it. */
export interface ProofKit {
  log: WalkLog;
  shop: TestSigner;
  tablet: TestSigner;
  facts: ProofFacts;
  document: ProofDocument;
  sealed: string;
  shopKeys: PublicJwk[];
}

/** What a kit may be made of besides the procedure. */
export interface KitWishes {
  plan?: WalkPlan;
  setting?: Partial<WalkSetting>;
  facts?: Partial<ProofFacts>;
  /** Done on the log after the plan, before the proof is made. */
  after?: (log: WalkLog) => Promise<void>;
}

const NAMES = {
  [testIds.technician]: 'Ilse Marchetti-Vane',
  [testIds.colleague]: 'Bram Oyelaran',
  [testIds.supervisor]: 'Tobias Renquist',
};

const hex = (text: string): string => createHash('sha256').update(text).digest('hex');

const meaningOf = (event: WalkEvent): string | null => {
  if (event.type === 'walk.signed' || event.type === 'walk.countersigned') return event.data.meaning;
  if (event.type === 'wrench.taken') return event.data.override ? 'override' : null;
  if (!('seal' in event.data) || event.data.seal === undefined) return null;
  return event.type === 'walk.sentBack' ? 'sendBack' : event.type === 'wait.skipped' ? 'skipWait' : 'accept';
};

/** The shop's word on each sealed PIN of the log: accepted an hour after. */
async function confirm(log: WalkLog, shop: TestSigner): Promise<ProofConfirmation[]> {
  const confirmations: ProofConfirmation[] = [];
  for (const event of log.book.events) {
    const meaning = meaningOf(event);
    if (meaning === null) continue;
    const { seq, branch, by: person } = event;
    const at = new Date(Date.parse(event.at) + 3_600_000).toISOString();
    const said = { walk: log.hand.walk, branch, seq, hash: log.signed[seq]?.hash ?? '', person, meaning };
    const whole = { ...said, result: 'accepted' as const, reason: null, at };
    confirmations.push({ ...whole, jws: await signDetached(canonicalJson(whole), shop.signer) });
  }
  return confirmations;
}

const factsOf = (log: WalkLog, kit: { tablet: TestSigner }, confirmations: ProofConfirmation[]): ProofFacts => ({
  number: 'BL-2026-00417',
  issue: 1,
  issuedAt: '2026-06-14T07:12:00.000Z',
  language: 'en',
  timeZone: 'Europe/Berlin',
  publicUrl: 'https://proof.brindle-lane.example/p/0190aTestToken_f4Xq9Zk2Lm7Rw1Vb8Nc3',
  note: '',
  shop: { id: testIds.shop, name: 'Brindle Lane Engine Works', address: 'Unit 6, Saltmeadow Yard' },
  job: {
    number: '24-0613',
    engine: { family: 'Ossery D6', model: '3.8', serial: 'OD6-118204' },
    odometer: { value: '84210', unit: 'km' },
    hours: null,
    bank: '',
    castingNumber: '',
  },
  procedure: { revision: 1, approvedAt: '2026-05-02T08:00:00.000Z', document: log.book.setting.procedure },
  record: {
    events: [...log.signed],
    received: log.book.events.map(({ at }) => new Date(Date.parse(at) + 3_500_000).toISOString()),
    tablets: [{ id: testIds.tablet, name: 'Stand 2', kid: kit.tablet.signer.kid, jwk: kit.tablet.publicJwk }],
    roles: Object.entries(log.book.setting.people).map(([person, roles]) => ({ person, since: 0, roles: [...roles] })),
    confirmations,
  },
  side: { names: NAMES, customer: 'Harbour Freight Lines', claim: 'WR-88120', vin: 'ZZ9KD63X5TB004417' },
});

/** Salts that are the same in every run, so that a test can compare bytes. */
const countingSalt = (): (() => string) => {
  let count = 0;
  return () =>
    Buffer.from(hex(`salt ${(count += 1)}`), 'hex')
      .toString('base64url')
      .slice(0, 22);
};

/** Walks a procedure to its end by the real rules, signed with real keys, and has the shop make a proof of it. */
export async function makeProofKit(procedure: ProcedureDocument, wishes: KitWishes = {}): Promise<ProofKit> {
  const [shop, tablet] = [await makeTestSigner(), await makeTestSigner()];
  const { shop: shopId, walk } = testIds;
  const log = openLog(testSetting(procedure, wishes.setting), {
    shop: shopId,
    walk,
    tablet: tablet.signer,
    office: shop.signer,
    crypto: testCrypto,
    seal: (what) => Promise.resolve(hex(canonicalJson({ ...what, pin: 'sealed' }))),
  });
  await walkOn(log, wishes.plan);
  await wishes.after?.(log);
  const facts = { ...factsOf(log, { tablet }, await confirm(log, shop)), ...wishes.facts };
  const built = await buildProof(facts, { crypto: testCrypto, salt: countingSalt() });
  if (!built.ok) throw new Error(`no proof is made: ${JSON.stringify(built.error)}`);
  const { document, disclosures } = built.value;
  const sealed = await sealProof(document, disclosures, shop.signer);
  return { log, shop, tablet, facts, document, sealed, shopKeys: [shop.publicJwk] };
}

/** A procedure of the demo by its code. */
export function procedureOf(code: string): ProcedureDocument {
  const found = demoProcedures.find((one) => one.code === code);
  if (!found) throw new Error(`the demo has no procedure ${code}`);
  return found;
}

/** The head of the sketch: bolt 5 over by nine degrees in its first turn, replaced, and one reading typed wrong. */
export const sketchPlan: WalkPlan = {
  source: (pull) => (pull.stage.kind === 'turn' ? 'keyed' : 'typed'),
  slips: [
    { at: { pass: 'p3', hole: 'h5' }, kind: 'value', value: '104' },
    { at: { pass: 'p2', hole: 'h9' }, kind: 'typedWrong', value: '16.3', reason: 'digits swapped' },
  ],
};
