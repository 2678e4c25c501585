import type { Order } from '@shared/contracts/confirmation.contract';
import { canonicalJson } from '@shared/record/canonicalJson';
import type { PublicJwk, RecordCrypto } from '@shared/record/crypto';
import { verifyDetached } from '@shared/record/signature';
import type { Role } from '@shared/people/roles';
import type { Choice } from '@shared/walk/events';
import type { LogRefusal, WalkAct } from './walkAct';
import type { WalkLog } from './walkLog';

/** What became of an order that this tablet has not obeyed. */
export interface PendingOrder {
  order: Order;
  why: LogRefusal | { code: 'order.badSignature' | 'order.notHere' };
}

/**
 * The event by which an order is obeyed (decision 4), or null for one that is not obeyed in the chain by itself: a branch
 * that is chosen is fetched with the walk.
 */
export function actOfOrder(order: Order): WalkAct | null {
  const { id, reason, deviation, choice, pass } = order;
  switch (order.kind) {
    case 'stop':
      return { type: 'walk.stopped', data: { order: id, why: 'stop', reason } };
    case 'withdraw':
      return { type: 'walk.stopped', data: { order: id, why: 'withdrawn', reason } };
    case 'goOn':
      return { type: 'walk.stopped', data: { order: id, why: 'goOn', reason } };
    case 'void':
      return { type: 'walk.voided', data: { reason, order: id } };
    case 'release':
      return { type: 'walk.released', data: { to: 'shop', order: id } };
    case 'decide':
      if (deviation === null || choice === null) return null;
      return { type: 'deviation.settled', data: { deviation, choice: choice as Choice, reason, order: id } };
    case 'skipWait':
      return pass === null ? null : { type: 'wait.skipped', data: { pass, reason, order: id } };
    case 'branch':
      return null;
  }
}

/** Whether the shop signed this order, word for word. */
export async function isSigned(
  order: Order,
  keys: ReadonlyMap<string, PublicJwk>,
  record: RecordCrypto,
): Promise<boolean> {
  const { jws, state: _state, ...said } = order;
  return (await verifyDetached(canonicalJson(said), jws, keys, record)).ok;
}

/** What obeying needs. */
export interface ObeyDeps {
  keys: ReadonlyMap<string, PublicJwk>;
  record: RecordCrypto;
  rolesOf: (person: string) => readonly Role[];
  /** Orders that the walk's chain already names. */
  obeyed: ReadonlySet<string>;
}

/**
 * Obeys the open orders of a walk, oldest first, each by one event. Those that cannot be obeyed now stay, with the reason;
 * they are tried again at the next instruction.
 */
export async function obeyOrders<S, V>(
  log: WalkLog<S, V>,
  orders: readonly Order[],
  deps: ObeyDeps,
): Promise<PendingOrder[]> {
  const open = orders
    .filter((order) => order.walk === log.walk && order.state === 'open' && !deps.obeyed.has(order.id))
    .sort((a, b) => (a.at < b.at ? -1 : 1));
  const pending: PendingOrder[] = [];
  for (const order of open) {
    const act = actOfOrder(order);
    if (!act) pending.push({ order, why: { code: 'order.notHere' } });
    else if (!(await isSigned(order, deps.keys, deps.record)))
      pending.push({ order, why: { code: 'order.badSignature' } });
    else {
      const done = await log.append({ act, by: order.by, roles: deps.rolesOf(order.by) });
      if (!done.ok) pending.push({ order, why: done.error });
    }
  }
  return pending;
}
