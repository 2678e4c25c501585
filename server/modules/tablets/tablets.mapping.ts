import type { EnrolledTablet, TabletRow } from '@shared/contracts/tablets.contract';
import type { ShopKeyring } from '../../keys/keyring';
import type { ShopRecord } from '../shops/shops.repository';
import type { TabletRecord } from './tablets.repository';

/** A stored tablet as the admin sees it. */
export const toTabletRow = (row: TabletRecord): TabletRow => ({
  id: row.id,
  name: row.name,
  state: row.state,
  kid: row.kid,
  enrolledAt: row.enrolledAt.toISOString(),
  seenAt: row.seenAt?.toISOString() ?? null,
  revokedAt: row.revokedAt?.toISOString() ?? null,
  report: row.report
    ? { at: row.report.at, waiting: row.report.waiting, refused: row.report.refused, stored: row.report.stored }
    : null,
});

/** What a tablet learns when it is enrolled. */
export const toEnrolledTablet = (
  tablet: { id: string; name: string },
  shop: ShopRecord,
  keys: ShopKeyring,
  bearer: { token: string; expiresAt: string },
): EnrolledTablet => ({
  tablet,
  shop: { id: shop.id, name: shop.name },
  signingKeys: keys.signingKeys,
  sealingKey: keys.sealingKey,
  ...bearer,
});
