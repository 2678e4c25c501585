import {
  challengeText,
  enrolmentProofText,
  type EnrolledTablet,
  type TabletRow,
} from '@shared/contracts/tablets.contract';
import type { PublicJwk } from '@shared/record/crypto';
import { jwkThumbprint } from '@shared/record/jwkThumbprint';
import { verifyDetached } from '@shared/record/signature';
import { sha256Hex, type Deps } from '../../deps';
import type { OfficeCaller, TabletCaller } from '../../http/callers';
import { notFound } from '../../http/errors';
import { shopPrefix } from '../../tenancy/shopToken';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { findShop } from '../shops/shops.repository';
import * as refuse from './tablets.errors';
import { toEnrolledTablet, toTabletRow } from './tablets.mapping';
import * as store from './tablets.repository';
import { challengeState, makeTabletToken } from './tabletTokens';

const CODE_MINUTES = 60;

const codeHash = (code: string): string => sha256Hex(code.trim());

/** Makes a one-time enrolment code; only its hash is kept. */
export const createEnrolmentCode = async (deps: Deps, tx: ShopTx, caller: OfficeCaller, note: string) => {
  const now = deps.clock.now();
  const code = `${shopPrefix(tx.shop)}${deps.ids.token(9)}`;
  const expiresAt = new Date(now.getTime() + CODE_MINUTES * 60_000);
  const createdBy = caller.person.id;
  await store.insertCode(tx, {
    id: deps.ids.uuid(),
    codeHash: codeHash(code),
    note,
    createdBy,
    createdAt: now,
    expiresAt,
  });
  await writeAudit(deps, tx, { person: createdBy, action: 'tablet.codeMade', subject: note });
  return { code, expiresAt: expiresAt.toISOString() };
};

/** Stores a tablet whose key was proved, and gives it what it needs to begin. */
export const admitTablet = async (
  deps: Deps,
  tx: ShopTx,
  name: string,
  key: { publicJwk: PublicJwk; kid: string },
): Promise<EnrolledTablet> => {
  if (await store.findTabletByKid(tx, key.kid)) throw refuse.keyTaken();
  const shop = await findShop(tx);
  if (!shop) throw notFound('shop.unknown', 'There is no such shop.');
  const id = deps.ids.uuid();
  const { kty, crv, x, y } = key.publicJwk;
  const publicJwk = { kty, crv, x, y };
  await store.insertTablet(tx, { id, name, kid: key.kid, publicJwk, enrolledAt: deps.clock.now() });
  await writeAudit(deps, tx, { person: null, tablet: id, action: 'tablet.enrolled', subject: name });
  return toEnrolledTablet({ id, name }, shop, await deps.keyring(tx), makeTabletToken(deps, tx.shop, id));
};

/** Enrols a tablet by a one-time code and a proof that it holds the private key. */
export const enrolTablet = async (
  deps: Deps,
  tx: ShopTx,
  request: { code: string; name: string; publicJwk: PublicJwk; proof: string },
): Promise<EnrolledTablet> => {
  const kid = await jwkThumbprint(request.publicJwk, deps.crypto);
  const text = enrolmentProofText(request.code, kid);
  const proved = await verifyDetached(text, request.proof, new Map([[kid, request.publicJwk]]), deps.crypto);
  if (!proved.ok) throw refuse.badProof();
  const code = await store.lockCode(tx, codeHash(request.code));
  if (!code) throw refuse.unknownCode();
  if (code.usedAt) throw refuse.codeUsed();
  const now = deps.clock.now();
  if (code.expiresAt < now) throw refuse.codeExpired();
  const enrolled = await admitTablet(deps, tx, request.name, { publicJwk: request.publicJwk, kid });
  await store.useCode(tx, code.id, enrolled.tablet.id, now);
  return enrolled;
};

/** A bearer for a signed challenge. */
export const tokenForChallenge = async (
  deps: Deps,
  tx: ShopTx,
  request: { tablet: string; challenge: string; signature: string },
): Promise<{ token: string; expiresAt: string }> => {
  const tablet = await tabletCaller(tx, request.tablet);
  const state = challengeState(deps, request.challenge, tx.shop, tablet.id);
  if (state === 'expired') throw refuse.challengeExpired();
  if (state === 'foreign') throw refuse.badSignature();
  const keys = new Map([[tablet.kid, tablet.publicJwk]]);
  const signed = await verifyDetached(challengeText(request.challenge), request.signature, keys, deps.crypto);
  if (!signed.ok) throw refuse.badSignature();
  await store.markSeen(tx, tablet.id, deps.clock.now());
  return makeTabletToken(deps, tx.shop, tablet.id);
};

/** The tablet of a request. Throws 404 `tablet.unknown`, 403 `tablet.revoked`. */
export const tabletCaller = async (tx: ShopTx, id: string): Promise<TabletCaller> => {
  const tablet = await store.findTablet(tx, id);
  if (!tablet) throw refuse.unknownTablet();
  if (tablet.state === 'revoked') throw refuse.tabletRevoked();
  return { shop: tx.shop, id, name: tablet.name, kid: tablet.kid, publicJwk: tablet.publicJwk };
};

/** Every tablet of the shop. */
export const listTablets = async (tx: ShopTx): Promise<TabletRow[]> =>
  (await store.listTabletRows(tx)).map(toTabletRow);

/** Revokes a tablet's key. */
export const revokeTablet = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  id: string,
  reason: string,
): Promise<TabletRow> => {
  const tablet = await store.findTablet(tx, id);
  if (!tablet) throw refuse.unknownTablet();
  if (tablet.state === 'revoked') throw refuse.alreadyRevoked();
  const now = deps.clock.now();
  await store.markRevoked(tx, id, now, reason);
  await writeAudit(deps, tx, { person: caller.person.id, tablet: id, action: 'tablet.revoked', subject: reason });
  return toTabletRow({ ...tablet, state: 'revoked', revokedAt: now, revokedReason: reason });
};

/** Keeps what a tablet says about what waits on it (I6). */
export const keepReport = async (
  deps: Deps,
  tx: ShopTx,
  tablet: TabletCaller,
  report: { waiting: number; refused: number; stored: number; lost: string[]; version: string },
): Promise<void> => {
  await store.saveReport(tx, tablet.id, { at: deps.clock.now().toISOString(), ...report });
};
