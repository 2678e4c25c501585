import type { Order } from '@shared/contracts/confirmation.contract';
import { canonicalJson } from '@shared/record/canonicalJson';
import { signDetached } from '@shared/record/signature';
import type { Deps } from '../../deps';
import type { OfficeCaller } from '../../http/callers';
import type { AppError } from '../../http/errors';
import { badRequest, conflict } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { nextPlace } from '../sync/officeEvent';
import { refreshWalk, type StandingWalk } from '../sync/refreshWalk';
import { insertPinUse } from '../sync/seals.repository';
import { demandOtherHands, demandRight, lockedWalk, ownPinRefusal } from './countersign.usecases';
import { toOrder } from './orders.mapping';
import { insertOrder } from './orders.repository';

/** What the office wants a tablet to do at its next instruction. */
export interface OrderRequest {
  walk: string;
  pin: string;
  kind: Order['kind'];
  deviation: string | null;
  choice: string | null;
  pass: string | null;
  branch: number | null;
  reason: string;
}

const rightFor = (kind: Order['kind']) =>
  kind === 'void' ? 'voidWalk' : kind === 'skipWait' ? 'skipWait' : ('accept' as const);

const notOffered = (why: string): AppError => conflict('order.notOffered', 'This cannot be ordered now.', { why });

/** An order that no tablet could obey is refused here rather than waiting for ever. */
const demandPossible = (request: OrderRequest, { state }: StandingWalk): void => {
  if (state.voided) throw notOffered('voided');
  if (state.writer === 'shop') throw notOffered('withTheShop');
  if (request.kind === 'goOn' && !state.stopped) throw notOffered('notStopped');
  if (request.kind === 'skipWait' && !state.procedure.passes.some(({ id }) => id === request.pass)) {
    throw badRequest('order.incomplete', 'Say after which pass the wait is skipped.', { field: 'pass' });
  }
  if (request.kind !== 'decide') return;
  const deviation = state.deviations.find(({ id }) => id === request.deviation);
  if (!deviation || !request.choice) {
    throw badRequest('order.incomplete', 'Say which deviation is decided, and how.', { field: 'deviation' });
  }
  if (deviation.status !== 'open' && deviation.status !== 'held') throw notOffered('settled');
};

const write = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: OrderRequest,
  standing: StandingWalk,
): Promise<Order> => {
  const at = deps.clock.now();
  const { walk, kind, deviation, choice, pass, branch, reason } = request;
  const by = caller.person.id;
  const facts = { id: deps.ids.uuid(), walk, kind, deviation, choice, pass, branch, reason, by };
  const { signer } = await deps.keyring(tx);
  const jws = await signDetached(canonicalJson({ ...facts, at: at.toISOString() }), signer);
  const { by: byPerson, walk: walkId, ...rest } = facts;
  const row = { ...rest, walkId, byPerson, at, jws, state: 'open' as const };
  await insertOrder(tx, row);
  const seq = nextPlace(standing).seq - 1;
  const use = { id: deps.ids.uuid(), personId: by, walkId, branch: standing.row.branch, seq };
  await insertPinUse(tx, { ...use, meaning: `order.${kind}`, at, tablet: 'office' });
  return toOrder({ ...row, shopId: tx.shop, changed: 0 });
};

/** Places an order with the PIN of whoever places it (decision 4). */
export const placeOrder = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: OrderRequest,
): Promise<Order | AppError> => {
  demandRight(caller, rightFor(request.kind));
  const standing = await lockedWalk(deps, tx, request.walk);
  if (request.kind === 'decide' || request.kind === 'skipWait' || request.kind === 'void') {
    demandOtherHands(caller, standing);
  }
  demandPossible(request, standing);
  const refusal = await ownPinRefusal(deps, tx, caller, request.pin);
  if (refusal) return refusal;
  const order = await write(deps, tx, caller, request, standing);
  await writeAudit(deps, tx, {
    person: caller.person.id,
    action: `order.${request.kind}`,
    subject: request.walk,
    details: { order: order.id, reason: request.reason },
  });
  await refreshWalk(deps, tx, request.walk, deps.clock.now());
  return order;
};
