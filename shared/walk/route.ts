import type { HoleId, Pass, PartNeed, Stage, Step } from '../procedure/procedure';
import type { SlotRef } from './events';
import { isStriped, slotKey, walkPasses } from './slots';
import type { WalkState } from './state';

/** One thing of the walk that is still to do, in route order. */
export type RouteItem =
  | { kind: 'parts'; missing: MissingPart[] }
  | { kind: 'step'; step: Step; hole: HoleId | null }
  | { kind: 'wait'; pass: Pass; next: Pass }
  | { kind: 'held'; pass: Pass }
  | { kind: 'slot'; slot: SlotRef; pass: Pass; stage: Stage };

/** A part of which fewer are at the stand than the walk needs (W2). */
export interface MissingPart {
  part: string;
  name: string;
  need: number;
  have: number;
}

/** Key of a step record: the step, and the hole where it is one of holes. */
export const stepKey = (step: string, hole: HoleId | null): string => (hole === null ? step : `${step}@${hole}`);

const needsNewParts = (state: WalkState): boolean => state.opened?.purpose === 'finalAssembly';

const counted = (state: WalkState, part: string): number =>
  state.parts.filter((taken) => taken.part === part).reduce((sum, taken) => sum + taken.count, 0);

const partNeed = (state: WalkState, part: PartNeed): number =>
  part.count * (1 + (part.renewedOnRestart ? state.restarts : 0));

/** New fasteners of this type on the stand that are not yet in a hole. May be negative before the first count. */
export function stockOf(state: WalkState, fastener: string): number {
  const type = state.procedure.fasteners.find((candidate) => candidate.id === fastener);
  const first =
    type?.reuse.kind === 'singleUse' ? state.procedure.holes.filter((hole) => hole.fastener === fastener).length : 0;
  return counted(state, fastener) - first - (state.drawn[fastener] ?? 0);
}

/** Parts that are short: gaskets and every single-use fastener (W2, R6). Only final assembly asks for new ones. */
export function missingParts(state: WalkState): MissingPart[] {
  if (!needsNewParts(state)) return [];
  const { procedure } = state;
  const gaskets = procedure.parts.map((part) => ({
    part: part.id,
    name: part.name,
    need: partNeed(state, part),
    have: counted(state, part.id),
  }));
  const fasteners = procedure.fasteners
    .filter((type) => type.reuse.kind === 'singleUse')
    .map((type) => {
      const have = counted(state, type.id);
      return { part: type.id, name: type.name, need: have - stockOf(state, type.id), have };
    });
  return [...gaskets, ...fasteners].filter((part) => part.have < part.need);
}

/** A fastener that was put in since the stripes were painted has none: they are painted again (W9). */
const allStriped = (state: WalkState): boolean => Object.keys(state.holes).every((hole) => isStriped(state, hole));

/** Whether a step has been done and answered as it should. */
export function stepDone(state: WalkState, step: Step, hole: HoleId | null): boolean {
  const record = state.steps[stepKey(step.id, hole)];
  if (step.paintsStripes && !allStriped(state)) return false;
  return record !== undefined && record.answer === 'yes' && record.inLimits !== false;
}

function stepsAt(state: WalkState, at: Step['place']['at'], pass?: string): Step[] {
  return state.procedure.steps.filter(
    ({ place }) => place.at === at && (!('pass' in place) || pass === undefined || place.pass === pass),
  );
}

/** Steps before anything is fitted or tightened. */
export const stepsBeforeJoint = (state: WalkState): Step[] => stepsAt(state, 'beforeJoint');

/** The per-hole steps that apply to a hole (by its group). */
export function stepsOfHole(state: WalkState, hole: HoleId): Step[] {
  const group = state.procedure.holes.find((candidate) => candidate.id === hole)?.group ?? '';
  return stepsAt(state, 'beforeHole').filter(
    ({ place }) => place.at === 'beforeHole' && (!place.groups || place.groups.includes(group)),
  );
}

/** Whether a slot needs nothing more. Held counts: the hole takes no further stage (R9). */
export function slotDone(state: WalkState, slot: SlotRef): boolean {
  const hole = state.holes[slot.hole];
  const outcome = hole?.slots[slotKey(slot)];
  return outcome !== undefined && outcome.status !== 'open' && outcome.status !== 'partial';
}

/** A hole with a held deviation takes no further stage (R9). */
export const holeHeld = (state: WalkState, hole: HoleId): boolean =>
  state.deviations.some((deviation) => deviation.status === 'held' && deviation.hole === hole);

function* preparation(state: WalkState): Generator<RouteItem> {
  const missing = missingParts(state);
  if (missing.length > 0) yield { kind: 'parts', missing };
  for (const step of stepsBeforeJoint(state))
    if (!stepDone(state, step, null)) yield { kind: 'step', step, hole: null };
  for (const hole of firstOrder(state)) {
    for (const step of stepsOfHole(state, hole)) if (!stepDone(state, step, hole)) yield { kind: 'step', step, hole };
  }
}

const firstOrder = (state: WalkState): HoleId[] => [...new Set(walkPasses(state).flatMap((pass) => pass.order))];

function* roundsOf(state: WalkState, pass: Pass): Generator<RouteItem> {
  const rounds = pass.repeat ? (state.rounds[pass.id] ?? 1) : 1;
  for (let round = 1; round <= rounds; round++) {
    for (const hole of pass.order) {
      if (holeHeld(state, hole)) continue;
      for (const stage of pass.stages) {
        const slot = { pass: pass.id, hole, stage: stage.id, round };
        if (!slotDone(state, slot)) yield { kind: 'slot', slot, pass, stage };
      }
    }
  }
}

const passHasHeld = (state: WalkState, pass: Pass): boolean =>
  state.deviations.some((deviation) => deviation.status === 'held' && deviation.slot?.pass === pass.id);

/** Whether every slot of a pass is done (held ones count) and its rounds have ended. */
export function passDone(state: WalkState, pass: Pass): boolean {
  if (!roundsOf(state, pass).next().done) return false;
  return !pass.repeat || state.roundsEnded.includes(pass.id);
}

function* passItems(state: WalkState, pass: Pass, next: Pass | undefined): Generator<RouteItem> {
  if (!passDone(state, pass)) {
    for (const step of stepsAt(state, 'beforePass', pass.id)) {
      if (!stepDone(state, step, null)) yield { kind: 'step', step, hole: null };
    }
    yield* roundsOf(state, pass);
  }
  if (passHasHeld(state, pass)) yield { kind: 'held', pass };
  for (const step of stepsAt(state, 'afterPass', pass.id)) {
    if (!stepDone(state, step, null)) yield { kind: 'step', step, hole: null };
  }
  if (next && pass.waitMinutes && !state.waitsSkipped.includes(pass.id) && !passBegun(state, next)) {
    yield { kind: 'wait', pass, next };
  }
}

const passBegun = (state: WalkState, pass: Pass): boolean => Boolean(state.passTimes[pass.id]?.begun);

/**
 * What is still to do, in order. The first item is what comes next. A reworked fastener needs no list of its own: its
 * slots and steps were cleared, so it comes first by itself and goes through every earlier stage in order (R2).
 */
export function* route(state: WalkState): Generator<RouteItem> {
  const assembly = state.opened?.purpose !== 'recheck' && state.opened?.purpose !== 'stripDown';
  if (assembly) yield* preparation(state);
  const passes = walkPasses(state);
  for (const [index, pass] of passes.entries()) yield* passItems(state, pass, passes[index + 1]);
  if (assembly) {
    for (const step of stepsAt(state, 'afterJoint'))
      if (!stepDone(state, step, null)) yield { kind: 'step', step, hole: null };
  }
}

/** The next slots in order, for "then bolt 8" and the dots on the map; at most `most`. */
export function nextSlots(state: WalkState, most: number): SlotRef[] {
  const slots: SlotRef[] = [];
  for (const item of route(state)) {
    if (item.kind === 'slot') slots.push(item.slot);
    if (slots.length >= most) break;
  }
  return slots;
}

/** The first slot a hole has not taken yet in its own order, or null. */
export function nextSlotOfHole(state: WalkState, hole: HoleId, slots: SlotRef[]): SlotRef | null {
  return slots.find((slot) => state.holes[hole]?.slots[slotKey(slot)] === undefined) ?? null;
}
