import { audit } from '@db/schema/audit';
import type { Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';

/** One line of the audit trail; `action` is a dotted name, `subject` what it was done to. */
export interface AuditLine {
  person: string | null;
  tablet?: string;
  action: string;
  subject?: string;
  details?: Record<string, unknown>;
}

/** Writes a line of the audit trail in the transaction of what it tells about. */
export const writeAudit = async (deps: Pick<Deps, 'ids' | 'clock'>, tx: ShopTx, line: AuditLine): Promise<void> => {
  await tx.db.insert(audit).values({
    shopId: tx.shop,
    id: deps.ids.uuid(),
    at: deps.clock.now(),
    personId: line.person,
    tablet: line.tablet ?? '',
    action: line.action,
    subject: line.subject ?? '',
    details: line.details ?? {},
  });
};
