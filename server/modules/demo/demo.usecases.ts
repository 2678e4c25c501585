import type { EnrolledTablet } from '@shared/contracts/tablets.contract';
import type { PublicJwk } from '@shared/record/crypto';
import { jwkThumbprint } from '@shared/record/jwkThumbprint';
import type { Deps } from '../../deps';
import { notFound } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { findShop } from '../shops/shops.repository';
import { toEnrolledTablet } from '../tablets/tablets.mapping';
import { findTabletByKid, listTabletRows } from '../tablets/tablets.repository';
import { admitTablet } from '../tablets/tablets.usecases';
import { makeTabletToken } from '../tablets/tabletTokens';
import { demoAccounts, halfWalked } from './demo.repository';

export { demoShop } from './demo.repository';

/** What the two doors show. */
export const showDoors = async (tx: ShopTx) => {
  const shop = await findShop(tx);
  if (!shop) throw notFound('demo.empty', 'The demo has not been filled yet.');
  return {
    shop: { id: shop.id, name: shop.name },
    accounts: await demoAccounts(tx),
    walk: await halfWalked(tx),
  };
};

/** Enrols this browser at a tap; the same browser again gets back the tablet it is. */
export const enrolDemoTablet = async (deps: Deps, tx: ShopTx, publicJwk: PublicJwk): Promise<EnrolledTablet> => {
  const kid = await jwkThumbprint(publicJwk, deps.crypto);
  const known = await findTabletByKid(tx, kid);
  const shop = await findShop(tx);
  if (!shop) throw notFound('demo.empty', 'The demo has not been filled yet.');
  if (known?.state === 'active') {
    const { id, name } = known;
    return toEnrolledTablet({ id, name }, shop, await deps.keyring(tx), makeTabletToken(deps, tx.shop, id));
  }
  const count = (await listTabletRows(tx)).length;
  return admitTablet(deps, tx, `Stand ${count + 1}`, { publicJwk, kid });
};
