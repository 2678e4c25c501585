import { canonicalJson } from '@shared/record/canonicalJson';
import { commandOf } from '@shared/walk/commands';
import { decide } from '@shared/walk/decide';
import { evolve } from '@shared/walk/evolve';
import type { WalkEvent } from '@shared/walk/events';
import type { WalkState } from '@shared/walk/state';
import { misshapenField } from './eventShapes';
import { orderOf, personsOf, type Facts } from './sync.facts';

/** Why an event is kept but not appended. */
export interface EventRefusal {
  code: string;
  details?: Record<string, unknown>;
}

/** An event that may stand: the state after it, and what the server noticed about it. */
export type EventVerdict = { ok: true; state: WalkState; flags: string[] } | { ok: false; refusal: EventRefusal };

const refuse = (code: string, details?: Record<string, unknown>): EventRefusal =>
  details === undefined ? { code } : { code, details };

/** Fault 16: who had left when the tablet last heard of the shop may write nothing more; before that it counts, marked. */
const personRefusal = (event: WalkEvent, facts: Facts): EventRefusal | null => {
  for (const person of personsOf(event)) {
    const then = facts.rolesAt(person, event.known);
    if (!then) return refuse('event.personUnknown', { person });
    if (then.state === 'left' && person === event.by) return refuse('event.personLeft', { person });
  }
  return null;
};

const orderKinds: Partial<Record<WalkEvent['type'], string[]>> = {
  'walk.stopped': ['stop', 'goOn', 'withdraw'],
  'walk.voided': ['void'],
  'walk.released': ['release'],
  'deviation.settled': ['decide'],
  'wait.skipped': ['skipWait'],
};

/** An event that names an order must obey that order: its kind, what it decides, and whoever placed it. */
const orderRefusal = (event: WalkEvent, walk: string, facts: Facts): EventRefusal | null => {
  const id = orderOf(event);
  if (id === null) return null;
  const order = facts.order(id);
  if (!order || order.walkId !== walk) return refuse('event.orderUnknown', { order: id });
  const asOrdered =
    orderKinds[event.type]?.includes(order.kind) === true &&
    (event.type !== 'deviation.settled' ||
      (event.data.deviation === order.deviation && event.data.choice === order.choice)) &&
    (event.type !== 'wait.skipped' || event.data.pass === order.pass);
  if (!asOrdered) return refuse('event.notAsOrdered', { order: id });
  const supervised = event.type === 'deviation.settled' || event.type === 'wait.skipped';
  return supervised && event.by !== order.byPerson ? refuse('event.notAsOrdered', { order: id }) : null;
};

const openingRefusal = (event: WalkEvent, facts: Facts): EventRefusal | null => {
  if (event.type !== 'walk.opened') return null;
  const { opening } = facts;
  if (!opening?.joint) return refuse('event.jointUnknown', { job: event.data.job, joint: event.data.joint });
  if (!opening.revision || opening.revision.state === 'draft') return refuse('event.procedureUnknown');
  if (opening.joint.procedureCode !== event.data.procedure.code) return refuse('event.procedureNotOfJoint');
  // Only impossible claims are refused (decision 1); what merely differs is flagged.
  return event.data.policy.shopOfOne && !opening.everShopOfOne ? refuse('event.neverShopOfOne') : null;
};

const wrenchRefusal = (event: WalkEvent, facts: Facts): EventRefusal | null =>
  event.type === 'wrench.taken' && facts.wrenchAt(event.data.wrench.id, event.known) === undefined
    ? refuse('event.wrenchUnknown', { wrench: event.data.wrench.tag })
    : null;

const differs = (a: unknown, b: unknown): boolean => canonicalJson(a) !== canonicalJson(b);

function openingFlags(event: WalkEvent, facts: Facts): string[] {
  if (event.type !== 'walk.opened' || !facts.opening) return [];
  const { joint, revision, settings } = facts.opening;
  const { policy, earlier } = event.data;
  const flags: string[] = [];
  const same =
    settings?.judgement === policy.judgement &&
    settings.countersign === policy.countersign &&
    settings.shopOfOne === policy.shopOfOne;
  if (!same) flags.push('policyDiffers');
  if (revision && revision.state !== 'approved') flags.push('procedureNotCurrent');
  if (joint && joint.earlier.readingsTaken !== earlier.readingsTaken) flags.push('earlierDiffers');
  return flags;
}

const AHEAD_MS = 5 * 60_000;
const JUMP_MS = 60_000;

/** Fault 10: order never depends on the clock, but a jump is told on the record. */
function clockFlags(event: WalkEvent, before: WalkState, now: number): string[] {
  const flags: string[] = [];
  const at = Date.parse(event.at);
  if (at - now > AHEAD_MS) flags.push('clockAhead');
  if (before.boot === event.boot && before.at !== '') {
    const drift = at - Date.parse(before.at) - (event.mono - before.mono);
    if (Math.abs(drift) > JUMP_MS) flags.push('clockJumped');
  }
  return flags;
}

function flagsOf(event: WalkEvent, before: WalkState, facts: Facts, now: number): string[] {
  const flags = [...openingFlags(event, facts), ...clockFlags(event, before, now)];
  if (facts.hasLeft(event.by)) flags.push('personLeftSince');
  if (event.known > facts.cursor) flags.push('cursorAhead');
  if (event.type === 'wrench.taken') {
    const then = facts.wrenchAt(event.data.wrench.id, event.known);
    if (!then || differs(then, event.data.wrench)) flags.push('wrenchDiffers');
  }
  return flags;
}

/**
 * Decides an event again: the same rules on the state before it must make the same event (decision 1). Whatever is wrong
 * with it comes back as a refusal, never as an exception: what a person entered is kept and shown.
 */
export const judgeEvent = (
  state: WalkState,
  event: WalkEvent,
  walk: string,
  facts: Facts,
  now: number,
): EventVerdict => {
  const field = misshapenField(event.type, event.data);
  if (field) return { ok: false, refusal: refuse('event.malformed', { field }) };
  const refusal =
    personRefusal(event, facts) ??
    openingRefusal(event, facts) ??
    wrenchRefusal(event, facts) ??
    orderRefusal(event, walk, facts);
  if (refusal) return { ok: false, refusal };
  return decideAgain(state, event, facts, now);
};

const decideAgain = (state: WalkState, event: WalkEvent, facts: Facts, now: number): EventVerdict => {
  const roles = facts.rolesAt(event.by, event.known)?.roles ?? [];
  try {
    const decided = decide(state, commandOf(event, roles));
    if (!decided.ok) return { ok: false, refusal: refuse(decided.error.code, decided.error.params) };
    if (differs(decided.value.data, event.data)) return { ok: false, refusal: refuse('event.notAsDecided') };
    return { ok: true, state: evolve(state, event), flags: flagsOf(event, state, facts, now) };
  } catch (error) {
    // The rules throw only on what should not be possible; from the wire anything is, and it must not stop the shop.
    return { ok: false, refusal: refuse('event.unreadable', { why: error instanceof Error ? error.message : '' }) };
  }
};
