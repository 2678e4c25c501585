import { z } from 'zod';
import { hasRight } from '@shared/people/roles';
import type { Deps } from '../../deps';
import type { TabletCaller } from '../../http/callers';
import type { AppError } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { findPerson } from '../people/people.repository';
import { pinError, sealElsewhere, sealUnreadable } from '../pins/pins.errors';
import { checkPin, openSeal } from '../pins/pins.usecases';
import { insertChoice, latestChoice, updateWalk } from '../walks/walks.repository';
import { headsOf } from './branches';
import { lockWalk } from './chain.repository';
import { nextPlace, writeOfficeEvent } from './officeEvent';
import { refreshWalk, standingWalk, type StandingWalk } from './refreshWalk';
import { insertPinUse } from './seals.repository';
import { heldElsewhere, rightMissing, sealMissing, walkUnknown } from './sync.errors';

/** Who wants to write a walk on this tablet from now on. */
export interface TakeOver {
  walk: string;
  forced: boolean;
  person: string;
  jwe?: string | undefined;
}

/** What the tablet goes on from. */
export interface TakenOver {
  branch: number;
  next: number;
  hash: string;
}

const sealed = z.looseObject({ pin: z.string(), person: z.string(), walk: z.string(), meaning: z.literal('takeOver') });

const supervisorRefusal = async (
  deps: Deps,
  tx: ShopTx,
  tablet: TabletCaller,
  request: TakeOver,
): Promise<AppError | null> => {
  if (!request.jwe) throw sealMissing();
  const opened = await openSeal(deps, tx, request.jwe, sealed);
  if (!opened) throw sealUnreadable();
  if (opened.person !== request.person || opened.walk !== request.walk) throw sealElsewhere();
  const refusal = await checkPin(deps, tx, { person: request.person, pin: opened.pin, place: tablet.id });
  return refusal ? pinError(refusal) : null;
};

const answer = ({ row }: StandingWalk): TakenOver => ({ branch: row.branch, next: row.nextSeq, hash: row.headHash });

const takeReleased = async (deps: Deps, tx: ShopTx, tablet: TabletCaller, standing: StandingWalk, by: string) => {
  const { state } = standing;
  const handedOver = state.writer === 'tablet' && state.paused === 'handedOver';
  if (state.writer !== 'shop' && !handedOver) throw heldElsewhere(state.tablet);
  const body = { type: 'walk.takenOver' as const, data: { tablet: tablet.id, forced: false } };
  return answer(await writeOfficeEvent(deps, tx, { standing, by, body }));
};

/** A lost tablet's walk goes on in a branch of its own; what the lost one sends later is the fork (decision 4). */
const takeByForce = async (deps: Deps, tx: ShopTx, tablet: TabletCaller, standing: StandingWalk, by: string) => {
  const { row, branches } = standing;
  const branch = Math.max(...branches.map((one) => one.branch)) + 1;
  const { seq, prev } = nextPlace(standing);
  const from = { branch, fromBranch: row.branch, fromSeq: seq - 1, fromHash: prev, how: 'takeOver' as const };
  const body = { type: 'walk.takenOver' as const, data: { tablet: tablet.id, forced: true } };
  await writeOfficeEvent(deps, tx, { standing, by, body, target: { kind: 'open', branch: from } });
  const nth = ((await latestChoice(tx, row.id))?.nth ?? -1) + 1;
  const at = deps.clock.now();
  await insertChoice(tx, {
    walkId: row.id,
    nth,
    branch,
    heads: headsOf(branches),
    byPerson: by,
    reason: 'takenOver',
    at,
  });
  const use = { id: deps.ids.uuid(), personId: by, walkId: row.id, branch, seq, meaning: 'takeOver' };
  await insertPinUse(tx, { ...use, at, tablet: tablet.id });
  await updateWalk(tx, row.id, { branch });
  return answer(await refreshedAt(deps, tx, row.id));
};

const refreshedAt = async (deps: Deps, tx: ShopTx, walk: string): Promise<StandingWalk> => {
  const refreshed = await refreshWalk(deps, tx, walk, deps.clock.now());
  if (!refreshed) throw walkUnknown();
  return refreshed;
};

/** Makes a tablet the writer of a walk (W11): released or handed over by anybody who may walk, else by a supervisor's PIN. */
export const takeOverWalk = async (
  deps: Deps,
  tx: ShopTx,
  tablet: TabletCaller,
  request: TakeOver,
): Promise<TakenOver | AppError> => {
  const person = await findPerson(tx, request.person);
  const right = request.forced ? 'voidWalk' : 'walk';
  if (!person || person.state === 'left' || !hasRight(person.roles, right)) throw rightMissing(right);
  await lockWalk(tx, request.walk);
  if (request.forced) {
    const refusal = await supervisorRefusal(deps, tx, tablet, request);
    if (refusal) return refusal;
  }
  const standing = await standingWalk(deps, tx, request.walk);
  if (!standing) throw walkUnknown();
  const take = request.forced ? takeByForce : takeReleased;
  await writeAudit(deps, tx, {
    person: request.person,
    tablet: tablet.id,
    action: request.forced ? 'walk.takenOverByForce' : 'walk.takenOver',
    subject: request.walk,
  });
  return take(deps, tx, tablet, standing, request.person);
};
