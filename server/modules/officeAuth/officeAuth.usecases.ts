import type { OfficeMe } from '@shared/contracts/officeAuth.contract';
import { sha256Hex, type Deps } from '../../deps';
import type { OfficeCaller } from '../../http/callers';
import { SESSION_DAYS } from '../../http/cookies';
import type { AppError } from '../../http/errors';
import { notFound } from '../../http/errors';
import { growingWait } from '../../http/growingWait';
import { secretFits } from '../../keys/passwords';
import { shopPrefix } from '../../tenancy/shopToken';
import { withShop, type ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { findPerson, type PersonRecord } from '../people/people.repository';
import { findShop } from '../shops/shops.repository';
import * as refuse from './officeAuth.errors';
import * as store from './officeAuth.repository';

/** A session that was just begun. */
export interface SignedIn {
  token: string;
  me: OfficeMe;
}

const meOf = async (tx: ShopTx, caller: OfficeCaller): Promise<OfficeMe> => {
  const shop = await findShop(tx);
  if (!shop) throw notFound('shop.unknown', 'There is no such shop.');
  const { id, name, timeZone, settings } = shop;
  return { person: caller.person, shop: { id, name, timeZone, settings }, csrf: caller.session.csrf };
};

/**
 * Compares a password and counts failures in a row, in a transaction of the shop. Returns the refusal instead of throwing
 * it, so that the count is committed.
 */
export const checkPassword = async (
  deps: Deps,
  tx: ShopTx,
  person: PersonRecord,
  password: string,
): Promise<AppError | null> => {
  const now = deps.clock.now();
  const failures = await store.lockSignInFailures(tx, person.id);
  const wait = Math.ceil((failures.waitUntil.getTime() - now.getTime()) / 1000);
  if (wait > 0) return refuse.signInWait(wait);
  if (!(await secretFits(person.passwordHash, password))) {
    const count = failures.count + 1;
    await store.saveSignInFailures(tx, person.id, count, new Date(now.getTime() + growingWait(count) * 1000));
    await writeAudit(deps, tx, { person: person.id, action: 'office.signInRefused' });
    return refuse.signInRefused();
  }
  if (failures.count > 0) await store.saveSignInFailures(tx, person.id, 0, new Date(0));
  return null;
};

const beginSession = async (deps: Deps, tx: ShopTx, person: PersonRecord): Promise<SignedIn> => {
  const now = deps.clock.now();
  const token = `${shopPrefix(tx.shop)}${deps.ids.token(32)}`;
  const session = { id: deps.ids.uuid(), csrf: deps.ids.token(18) };
  const expiresAt = new Date(now.getTime() + SESSION_DAYS * 24 * 3_600_000);
  const tokenHash = sha256Hex(token);
  await store.insertSession(tx, { ...session, tokenHash, personId: person.id, createdAt: now, expiresAt });
  await writeAudit(deps, tx, { person: person.id, action: 'office.signedIn' });
  return { token, me: await meOf(tx, { shop: tx.shop, person: callerPerson(person), session }) };
};

const callerPerson = ({ id, name, email, roles }: PersonRecord): OfficeCaller['person'] => ({
  id,
  name,
  email: email ?? '',
  roles,
});

interface Attempt {
  shop: string;
  shopName: string;
  person: PersonRecord | null;
  refusal: AppError | null;
}

const attempt = (deps: Deps, known: { shop: string; person: string }, password: string): Promise<Attempt> =>
  withShop(deps.client, known.shop, async (tx) => {
    const person = await findPerson(tx, known.person);
    const shop = await findShop(tx);
    const refusal = person ? await checkPassword(deps, tx, person, password) : refuse.signInRefused();
    return { shop: known.shop, shopName: shop?.name ?? '', person, refusal };
  });

/** Nobody of that address: takes as long as a wrong password and counts in memory. */
const refuseUnknown = async (deps: Deps, email: string, password: string): Promise<AppError> => {
  const key = `sign-in ${sha256Hex(email.toLowerCase())}`;
  const now = deps.clock.now().getTime();
  const seconds = deps.failures.secondsLeft(key, now);
  if (seconds > 0) return refuse.signInWait(seconds);
  await secretFits(null, password);
  deps.failures.fail(key, now);
  return refuse.signInRefused();
};

/**
 * Signs in. An address may belong to several shops: with the password fitting one of them that one is meant, with more
 * the caller has to say which.
 */
export const signIn = async (
  deps: Deps,
  request: { email: string; password: string; shop?: string | undefined },
): Promise<SignedIn | AppError> => {
  const known = await store.shopsForEmail(deps.client, request.email);
  const meant = known.filter((one) => request.shop === undefined || one.shop === request.shop);
  if (meant.length === 0) return refuseUnknown(deps, request.email, request.password);
  const attempts: Attempt[] = [];
  for (const one of meant) attempts.push(await attempt(deps, one, request.password));
  const good = attempts.filter((one) => one.refusal === null);
  if (good.length > 1) return refuse.whichShop(good.map((one) => ({ id: one.shop, name: one.shopName })));
  const [only] = good;
  if (!only?.person) return attempts.find((one) => one.refusal)?.refusal ?? refuse.signInRefused();
  const person = only.person;
  return withShop(deps.client, only.shop, (tx) => beginSession(deps, tx, person));
};

/** The caller behind a session's token. Throws 401 `session.missing` or `session.expired`. */
export const sessionCaller = async (deps: Deps, tx: ShopTx, token: string): Promise<OfficeCaller> => {
  const found = await store.findSession(tx, sha256Hex(token));
  if (!found) throw refuse.sessionMissing();
  const { session, person } = found;
  if (session.expiresAt < deps.clock.now() || person.state === 'left') throw refuse.sessionExpired();
  return { shop: tx.shop, person: callerPerson(person), session: { id: session.id, csrf: session.csrf } };
};

/** Ends the caller's session. */
export const signOut = (deps: Deps, tx: ShopTx, caller: OfficeCaller): Promise<void> =>
  store.endSession(tx, caller.session.id, deps.clock.now());

/** Who is signed in. */
export const whoAmI = (tx: ShopTx, caller: OfficeCaller): Promise<OfficeMe> => meOf(tx, caller);
