import { createPrivateKey, sign, type KeyObject } from 'node:crypto';
import type { PublicJwk, Signer } from '@shared/record/crypto';
import type { Config } from '../config';
import { AppError } from '../http/errors';
import { loadShopKeys, type ShopKey } from '../modules/shopKeys/shopKeys.repository';
import type { ShopTx } from '../tenancy/withShop';

/** A shop's keys, opened and ready. */
export interface ShopKeyring {
  signer: Signer;
  /** Every key that ever signed for the shop, for verifying. */
  signingKeys: (PublicJwk & { kid: string })[];
  sealingKey: PublicJwk & { kid: string };
  /** Private sealing keys by `kid`, retired ones too: a seal may have waited on a tablet. */
  sealOpeners: ReadonlyMap<string, KeyObject>;
}

const privateKey = (key: ShopKey): KeyObject => {
  if (!key.privateJwk) {
    throw new AppError(
      503,
      'server.keys',
      'The keys of this shop cannot be opened: APP_SECRET is another than before.',
    );
  }
  return createPrivateKey({ key: key.privateJwk, format: 'jwk' });
};

const signerOf = (key: ShopKey): Signer => {
  const opened = privateKey(key);
  return {
    kid: key.kid,
    sign: (input) => Promise.resolve(new Uint8Array(sign('sha256', input, { key: opened, dsaEncoding: 'ieee-p1363' }))),
  };
};

const named = (key: ShopKey): PublicJwk & { kid: string } => ({ ...key.publicJwk, kid: key.kid });

const open = (keys: ShopKey[]): ShopKeyring => {
  const signing = keys.filter((key) => key.purpose === 'signing');
  const sealing = keys.filter((key) => key.purpose === 'sealing');
  const activeSigning = signing.find((key) => key.state === 'active');
  const activeSealing = sealing.find((key) => key.state === 'active');
  if (!activeSigning || !activeSealing) throw new AppError(503, 'server.keys', 'This shop has no keys.');
  return {
    signer: signerOf(activeSigning),
    signingKeys: signing.map(named),
    sealingKey: named(activeSealing),
    sealOpeners: new Map(sealing.map((key) => [key.kid, privateKey(key)])),
  };
};

const MOST_SHOPS_KEPT = 500;

/** Opens each shop's keys once and keeps them in memory. */
export const keyringCache = (config: Config) => {
  const kept = new Map<string, ShopKeyring>();
  return async (tx: ShopTx): Promise<ShopKeyring> => {
    const known = kept.get(tx.shop);
    if (known) return known;
    const opened = open(await loadShopKeys(tx, config));
    if (kept.size >= MOST_SHOPS_KEPT) kept.clear();
    kept.set(tx.shop, opened);
    return opened;
  };
};

/** Gives the opened keys of a transaction's shop. */
export type Keyring = ReturnType<typeof keyringCache>;
