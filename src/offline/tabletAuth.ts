import type { demoTablet } from '@shared/contracts/demo.contract';
import type { challenge, enrol, EnrolledTablet, token } from '@shared/contracts/tablets.contract';
import { err, ok, type Result } from '@shared/kernel/result';
import type { RecordCrypto } from '@shared/record/crypto';
import { signDetached } from '@shared/record/signature';
import type { Answer } from '@/api/answer';
import type { TabletClient } from '@/api/tabletClient';
import { makeDeviceKey, signerOf } from './deviceKey';
import type { Settings } from './settings';
import type { DeviceKey, TabletIdentity } from './settingValues';
import { isoOf, type TabletClock } from './tabletClock';

/** Text of `enrolmentProofText` in the contract (a test holds them together; the contract would bring its schemas). */
export const enrolmentProof = (code: string, kid: string): string => `boltwalk-enrol:${code}:${kid}`;
/** Text of `challengeText` in the contract. */
export const tokenProof = (value: string): string => `boltwalk-token:${value}`;

/** Why the server gave nothing: its own code, or one of the ways of not being there. */
export interface ServerFailure {
  code: string;
  params?: Record<string, unknown>;
}

/** A failed answer as something a person can be told. */
export function failureOf(answer: Exclude<Answer<unknown>, { kind: 'done' }>): ServerFailure {
  if (answer.kind === 'refused') return { code: answer.refusal.code, params: answer.refusal.details };
  if (answer.kind === 'busy') return { code: answer.code, ...(answer.details ? { params: answer.details } : {}) };
  return { code: answer.kind === 'notOurs' ? 'server.notOurs' : 'server.unreachable' };
}

/** What enrolment and tokens need. */
export interface TabletAuthDeps {
  client: TabletClient;
  settings: Settings;
  record: RecordCrypto;
  clock: TabletClock;
}

/** A bearer token and the tablet's time at which it ends. */
export interface Bearer {
  token: string;
  endsAt: number;
}

/** The device key, made on first use and saved before it is shown to anybody. */
export async function deviceKeyOf({
  settings,
  record,
}: Pick<TabletAuthDeps, 'settings' | 'record'>): Promise<DeviceKey> {
  const kept = await settings.get('deviceKey');
  if (kept) return kept;
  const made = await makeDeviceKey(record);
  // Two tabs may both have made one: the first to be saved is the tablet's.
  return settings.update('deviceKey', (old) => old ?? made);
}

/**
 * The server says for how long a token lasts in its own time; a tablet whose clock is wrong must still renew in time,
 * so its length is taken and counted from here.
 */
const bearerOf = (answer: { token: string; expiresAt: string }, clock: TabletClock, serverNow?: number): Bearer => {
  const stated = Date.parse(answer.expiresAt) - (serverNow ?? clock.now());
  const length = stated > 0 && stated <= TOKEN_MS ? stated : TOKEN_MS;
  return { token: answer.token, endsAt: clock.now() + length };
};
const TOKEN_MS = 15 * 60_000;

async function keepIdentity(deps: TabletAuthDeps, answer: EnrolledTablet): Promise<TabletIdentity> {
  const { tablet, shop, signingKeys, sealingKey } = answer;
  const identity: TabletIdentity = { tablet, shop, signingKeys, sealingKey, enrolledAt: isoOf(deps.clock.now()) };
  await deps.settings.set('tablet', identity);
  return identity;
}

/** A new key in place of the old one: one that the server knows already can enrol nothing. */
async function freshDeviceKey({ settings, record }: TabletAuthDeps): Promise<DeviceKey> {
  const made = await makeDeviceKey(record);
  await settings.set('deviceKey', made);
  return made;
}

/** A tablet that was enrolled before (and revoked, or moved to another shop) begins with a key of its own. */
const keyToEnrol = async (deps: TabletAuthDeps): Promise<DeviceKey> =>
  (await deps.settings.get('tablet')) ? freshDeviceKey(deps) : deviceKeyOf(deps);

async function askToEnrol(deps: TabletAuthDeps, key: DeviceKey, { code, name }: { code: string; name: string }) {
  const proof = await signDetached(enrolmentProof(code, key.kid), signerOf(key));
  return deps.client.call<typeof enrol>({
    method: 'POST',
    path: '/api/tablets/enrol',
    body: { code, name, publicJwk: key.publicJwk, proof },
  });
}

/**
 * Enrols this tablet by a one-time code, proving that it holds the private key. Refusals keep the server's code
 * (`enrolment.codeUsed` …). Where the answer to an earlier enrolment got lost the server knows this key and refuses it:
 * then a new key is made, for a new code.
 */
export async function enrolTablet(
  deps: TabletAuthDeps,
  wanted: { code: string; name: string },
): Promise<Result<{ identity: TabletIdentity; bearer: Bearer }, ServerFailure>> {
  let answer = await askToEnrol(deps, await keyToEnrol(deps), wanted);
  if (answer.kind === 'refused' && answer.refusal.code === 'enrolment.keyTaken') {
    answer = await askToEnrol(deps, await freshDeviceKey(deps), wanted);
  }
  if (answer.kind !== 'done') return err(failureOf(answer));
  return ok({ identity: await keepIdentity(deps, answer.value), bearer: bearerOf(answer.value, deps.clock) });
}

/** Opens the demo's door: this browser becomes a tablet of the demo shop; the same browser again is the same tablet. */
export async function enrolDemoTablet(
  deps: TabletAuthDeps,
): Promise<Result<{ identity: TabletIdentity; bearer: Bearer }, ServerFailure>> {
  const ask = ({ publicJwk }: DeviceKey) =>
    deps.client.call<typeof demoTablet>({ method: 'POST', path: '/api/demo/tablet', body: { publicJwk } });
  let answer = await ask(await deviceKeyOf(deps));
  if (answer.kind === 'refused' && answer.refusal.code === 'enrolment.keyTaken') {
    answer = await ask(await freshDeviceKey(deps));
  }
  if (answer.kind !== 'done') return err(failureOf(answer));
  return ok({ identity: await keepIdentity(deps, answer.value), bearer: bearerOf(answer.value, deps.clock) });
}

/** A bearer for a signed challenge: the tablet's own doing, whoever is signed in (decision 9, fault 24). */
export async function tokenFor(deps: TabletAuthDeps, identity: TabletIdentity): Promise<Answer<Bearer>> {
  const who = { shop: identity.shop.id, tablet: identity.tablet.id };
  const asked = await deps.client.call<typeof challenge>({ method: 'POST', path: '/api/tablets/challenge', body: who });
  if (asked.kind !== 'done') return asked;
  const key = await deviceKeyOf(deps);
  const signature = await signDetached(tokenProof(asked.value.challenge), signerOf(key));
  const body = { ...who, challenge: asked.value.challenge, signature };
  const given = await deps.client.call<typeof token>({ method: 'POST', path: '/api/tablets/token', body });
  if (given.kind !== 'done') return given;
  if (typeof given.value.token !== 'string') return { kind: 'notOurs', status: given.status };
  return { kind: 'done', status: given.status, value: bearerOf(given.value, deps.clock) };
}
