import type { PublicJwk, RecordCrypto } from '../../record/crypto';
import { OFFICE } from '../../record/envelope';
import { jwkThumbprint } from '../../record/jwkThumbprint';
import type { ProofRecord } from '../proofDocument';
import type { ProofProblem } from './problem';

/** Keys by thumbprint, and which of them may sign as which tablet. */
export interface ProofKeys {
  shop: Map<string, PublicJwk>;
  all: Map<string, PublicJwk>;
  kidsOf: Map<string, Set<string>>;
}

/** The shop's published keys by their own thumbprint: a `kid` that only says so is not believed. */
export async function keysByThumbprint(
  keys: readonly PublicJwk[],
  crypto: Pick<RecordCrypto, 'sha256'>,
): Promise<Map<string, PublicJwk>> {
  const found = new Map<string, PublicJwk>();
  for (const { kty, crv, x, y } of keys) found.set(await jwkThumbprint({ kty, crv, x, y }, crypto), { kty, crv, x, y });
  return found;
}

/** Everybody who may have signed an event of this record; a tablet whose key is not the one it names is a problem. */
export async function proofKeys(
  record: Pick<ProofRecord, 'tablets'>,
  shop: Map<string, PublicJwk>,
  crypto: Pick<RecordCrypto, 'sha256'>,
): Promise<{ keys: ProofKeys; problems: ProofProblem[] }> {
  const all = new Map(shop);
  const kidsOf = new Map([[OFFICE, new Set(shop.keys())]]);
  const problems: ProofProblem[] = [];
  for (const tablet of record.tablets) {
    const { kty, crv, x, y } = tablet.jwk;
    const kid = await jwkThumbprint({ kty, crv, x, y }, crypto);
    if (kid !== tablet.kid) problems.push({ code: 'tabletKey', tablet: tablet.name });
    all.set(kid, { kty, crv, x, y });
    kidsOf.set(tablet.id, new Set([...(kidsOf.get(tablet.id) ?? []), kid]));
  }
  return { keys: { shop, all, kidsOf }, problems };
}
