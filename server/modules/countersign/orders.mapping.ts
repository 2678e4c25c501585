import type { Order } from '@shared/contracts/confirmation.contract';
import type { OrderRecord } from './orders.repository';

/** A stored order as it travels. */
export const toOrder = (row: OrderRecord): Order => ({
  id: row.id,
  walk: row.walkId,
  kind: row.kind,
  deviation: row.deviation,
  choice: row.choice,
  pass: row.pass,
  branch: row.branch,
  reason: row.reason,
  by: row.byPerson,
  at: row.at.toISOString(),
  jws: row.jws,
  state: row.state,
});
