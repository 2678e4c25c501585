import { suits, type SuitabilityReason, type WrenchNeed } from '../crib/suitability';
import { addMinutes, msBetween } from '../kernel/time';
import type { HoleId, Pass, Stage, Step } from '../procedure/procedure';
import { subtractQuantities, type Quantity } from '../quantity/quantity';
import type { Unit } from '../quantity/unit';
import { targetOf, type Window } from '../quantity/window';
import { judgeSetting } from '../judge/verdict';
import type { Deviation } from './deviation';
import type { PauseCause, ResumeWay, SlotRef } from './events';
import { jointLeft, replacementDue } from './jointRework';
import { offersFor, type Offers } from './offers';
import {
  missingParts,
  route,
  stepDone,
  stepsBeforeJoint,
  stepsOfHole,
  stockOf,
  type MissingPart,
  type RouteItem,
} from './route';
import {
  directionOf,
  fastenerOf,
  holeById,
  isSpent,
  isStriped,
  makesUsed,
  sameSlot,
  slotKey,
  takesReading,
  walkPasses,
  windowOf,
} from './slots';
import type { Rework, TakenWrench, WalkState } from './state';
import { withUse } from './effects/change';

/** How the figure of the coming reading is to be taken. */
export type PullMode = 'fresh' | 'pullAgain' | 'retype' | 'finishByTotal' | 'finishByStripe';

/** One pull: everything the walk screen says about it (W4, W5). */
export interface PullInstruction {
  kind: 'pull';
  slot: SlotRef;
  pass: Pass;
  stage: Stage;
  window: Window | null;
  direction: 'cw' | 'ccw';
  mode: PullMode;
  /** Wrench in hand; null where the mark is read by eye. */
  wrench: string | null;
  /** What the fastener has already of this stage. */
  standing: Quantity | null;
  /** What is left of the window, where a turn was begun. */
  remaining: Window | null;
  endTorque: { use: 'required' | 'wanted' | 'unused'; window: Window | null };
  monitor: { low: string; high: string; unit: Unit } | null;
}

/** The one thing to do now (W4). */
export type Instruction =
  | { kind: 'open' }
  | { kind: 'voided' }
  | { kind: 'stopped'; order: string; reason: string }
  | { kind: 'paused'; cause: PauseCause }
  | { kind: 'lookAtWork'; slot: SlotRef | null; ways: ResumeWay[]; forced: boolean }
  | { kind: 'settle'; deviation: Deviation; offers: Offers }
  | { kind: 'loosen'; hole: HoleId; round: number; rounds: number; how: 'quarter' | 'free'; rework: Rework }
  | { kind: 'remove'; hole: HoleId; rework: Rework }
  | { kind: 'repair'; hole: HoleId }
  | { kind: 'fit'; hole: HoleId; part: 'new' | 'either'; stock: number; rework: Rework }
  | { kind: 'parts'; missing: MissingPart[] }
  | { kind: 'step'; step: Step; hole: HoleId | null; again: boolean }
  | { kind: 'takeWrench'; slot: SlotRef; stage: Stage; need: WrenchNeed; why: 'none' | 'setting' }
  | PullInstruction
  | { kind: 'perform'; slot: SlotRef; pass: Pass; stage: Stage; direction: 'cw' | 'ccw' }
  | { kind: 'wait'; pass: Pass; until: string }
  | { kind: 'held'; deviations: Deviation[] }
  | { kind: 'sign'; who: string[] }
  | { kind: 'countersign' }
  | { kind: 'release' }
  | { kind: 'withShop'; complete: boolean };

/** When the question is asked: device time, and the running boot of the tablet. */
export interface Now {
  at: string;
  mono: number;
  boot: string;
}

/** What a wrench must be able to do for this slot (K2). */
export function needOf(state: WalkState, slot: SlotRef, stage: Stage): WrenchNeed {
  const drive = fastenerOf(state.procedure, slot.hole).drive;
  const group = holeById(state.procedure, slot.hole)?.group ?? '';
  const monitor = stage.kind === 'turn' ? stage.monitor?.[group] : undefined;
  const kind = stage.kind === 'runDown' ? 'loosen' : stage.kind;
  return {
    kind,
    window: windowOf(state.procedure, stage, slot.hole),
    direction: directionOf(state.procedure, stage, slot.hole),
    policy: state.opened?.policy.judgement ?? 'simple',
    ...(drive === undefined ? {} : { drive }),
    ...(monitor ? { endTorqueHigh: { value: monitor.high, unit: monitor.unit } } : {}),
  };
}

/** A "no" to a wrench at the stand: what it cannot do, or what happened to it in this walk. */
export type WrenchObjection =
  SuitabilityReason | { code: 'dropped' | 'overloaded' | 'reachedLimit'; params: Record<string, string> };

/** Why a wrench at the stand may not be used for this slot; empty = it may. K6: begun before a lapse, it finishes the pass. */
export function wrenchObjections(
  state: WalkState,
  taken: TakenWrench,
  slot: SlotRef,
  stage: Stage,
  at: string,
): WrenchObjection[] {
  if (taken.out) return [{ code: taken.out, params: {} }];
  if (taken.limitAt.includes(`${slotKey(slot)}@${slot.hole}`)) return [{ code: 'reachedLimit', params: {} }];
  if (taken.override) return [];
  const { reasons } = suits(taken.wrench, needOf(state, slot, stage), at);
  const begun = state.readings.some(
    (record) => record.data.pass === slot.pass && record.data.wrench === taken.wrench.id,
  );
  return begun ? reasons.filter((reason) => reason.code !== 'lapsed') : reasons;
}

/** W7: a setting wrench is set to this stage's target, within one step of its scale. */
export function settingFits(taken: TakenWrench, window: Window | null): boolean {
  if (taken.wrench.kind !== 'setting') return true;
  if (!taken.setting) return false;
  return window === null || judgeSetting(taken.setting, targetOf(window), taken.wrench.scaleStep ?? '0') === 'in';
}

function wrenchFor(
  state: WalkState,
  slot: SlotRef,
  stage: Stage,
  now: Now,
): { id: string } | { why: 'none' | 'setting' } {
  const window = windowOf(state.procedure, stage, slot.hole);
  const suiting = Object.values(state.wrenches).filter(
    (taken) => wrenchObjections(state, taken, slot, stage, now.at).length === 0,
  );
  const ready = suiting.filter((taken) => settingFits(taken, window));
  const first = ready.find((taken) => taken.wrench.id === state.wrenchNow) ?? ready.sort((a, b) => b.seq - a.seq)[0];
  if (first) return { id: first.wrench.id };
  return { why: suiting.length > 0 ? 'setting' : 'none' };
}

/** What is left of a window once `standing` was turned. Limits already passed are shown as 0. */
export function remainingWindow(window: Window, standing: Quantity | null): Window | null {
  if (!standing) return null;
  const left = (value: string): string => {
    const rest = subtractQuantities({ value, unit: window.unit }, standing).value;
    return rest.startsWith('-') ? '0' : rest;
  };
  return { target: left(window.target), low: left(window.low), high: left(window.high), unit: window.unit };
}

function modeOf(state: WalkState, slot: SlotRef): PullMode {
  if (state.retype && sameSlot(state.retype.slot, slot)) return 'retype';
  const resume = state.resumes.find((begun) => sameSlot(begun.slot, slot));
  if (resume) {
    if (resume.way === 'ownTotal') return 'finishByTotal';
    if (resume.way === 'stripe') return 'finishByStripe';
  }
  return state.holes[slot.hole]?.slots[slotKey(slot)]?.status === 'partial' ? 'pullAgain' : 'fresh';
}

function pullOf(state: WalkState, slot: SlotRef, pass: Pass, stage: Stage, now: Now): Instruction {
  const mode = modeOf(state, slot);
  const window = windowOf(state.procedure, stage, slot.hole);
  const found = mode === 'finishByStripe' ? { id: null } : wrenchFor(state, slot, stage, now);
  if ('why' in found) return { kind: 'takeWrench', slot, stage, need: needOf(state, slot, stage), why: found.why };
  const group = holeById(state.procedure, slot.hole)?.group ?? '';
  const before = state.retype && mode === 'retype' ? state.retype.before : state.holes[slot.hole]?.slots[slotKey(slot)];
  const standing = before?.status === 'partial' || mode === 'retype' ? (before?.total ?? null) : null;
  const turn = stage.kind === 'turn' ? stage : null;
  const goesOn = mode === 'pullAgain' || mode === 'finishByTotal';
  return {
    kind: 'pull',
    slot,
    pass,
    stage,
    window,
    direction: directionOf(state.procedure, stage, slot.hole),
    mode,
    wrench: found.id,
    standing,
    remaining: turn && window && goesOn ? remainingWindow(window, standing) : null,
    endTorque: { use: turn?.endTorque.use ?? 'unused', window: turn?.endTorque.windows?.[group] ?? null },
    monitor: turn?.monitor?.[group] ?? null,
  };
}

/** New fasteners and gaskets a joint restart still needs before anything is fitted (R6). */
function restartParts(state: WalkState, holes: HoleId[]): MissingPart[] {
  const wanted = holes.filter((hole) => newPartNeeded(state, hole)).map((hole) => fastenerOf(state.procedure, hole));
  const short = [...new Set(wanted)].flatMap((type) => {
    const stock = stockOf(state, type.id);
    const need = wanted.filter((other) => other === type).length;
    return stock < need ? [{ part: type.id, name: type.name, need, have: Math.max(stock, 0) }] : [];
  });
  const gaskets = missingParts(state).filter((part) => state.procedure.parts.some((need) => need.id === part.part));
  return [...gaskets, ...short];
}

function jointReworkInstruction(state: WalkState, rework: Extract<Rework, { kind: 'joint' }>): Instruction {
  const left = jointLeft(state, rework);
  const hole = left[0] ?? '';
  if (rework.phase === 'loosen') {
    return {
      kind: 'loosen',
      hole,
      round: rework.round,
      rounds: 2,
      how: rework.round === 1 ? 'quarter' : 'free',
      rework,
    };
  }
  if (rework.phase === 'remove') return { kind: 'remove', hole, rework };
  const broken = state.toRepair[0];
  if (broken !== undefined) return { kind: 'repair', hole: broken };
  const missing = restartParts(state, left);
  if (missing.length > 0) return { kind: 'parts', missing };
  const step = stepsBeforeJoint(state).find((candidate) => !stepDone(state, candidate, null));
  return step ? { kind: 'step', step, hole: null, again: true } : fitInstruction(state, hole, rework);
}

/** A used single-use fastener never goes back in (R3); before final assembly old ones may (W1). */
export function newPartNeeded(state: WalkState, hole: HoleId): boolean {
  return replacementDue(state, hole) || isSpent(state, hole);
}

function fitInstruction(state: WalkState, hole: HoleId, rework: Rework): Instruction {
  const step = stepsOfHole(state, hole).find((candidate) => !stepDone(state, candidate, hole));
  if (step) return { kind: 'step', step, hole, again: true };
  const part = newPartNeeded(state, hole) ? 'new' : 'either';
  const type = fastenerOf(state.procedure, hole);
  const stock = stockOf(state, type.id);
  if (part === 'new' && stock < 1)
    return { kind: 'parts', missing: [{ part: type.id, name: type.name, need: 1, have: 0 }] };
  return { kind: 'fit', hole, part, stock, rework };
}

function reworkInstruction(state: WalkState, rework: Rework): Instruction {
  if (rework.kind === 'joint') return jointReworkInstruction(state, rework);
  if (rework.phase === 'loosen') {
    const how = rework.way === 'quarter' ? 'quarter' : 'free';
    return { kind: 'loosen', hole: rework.hole, round: 1, rounds: 1, how, rework };
  }
  if (rework.phase === 'remove') return { kind: 'remove', hole: rework.hole, rework };
  if (state.toRepair.includes(rework.hole)) return { kind: 'repair', hole: rework.hole };
  return fitInstruction(state, rework.hole, rework);
}

/** When a settling wait is over, on the device's clock; running time counts where the boot is the same (fault 10). */
export function waitUntil(state: WalkState, pass: Pass, now: Now): string | null {
  const ended = state.passTimes[pass.id]?.ended;
  if (!ended || !pass.waitMinutes) return null;
  const passed = ended.boot === now.boot ? now.mono - ended.mono : msBetween(ended.at, now.at);
  const left = pass.waitMinutes * 60_000 - passed;
  return left > 0 ? addMinutes(now.at, left / 60_000) : null;
}

function itemInstruction(state: WalkState, item: RouteItem, now: Now): Instruction | null {
  switch (item.kind) {
    case 'parts':
      return { kind: 'parts', missing: item.missing };
    case 'step':
      return { kind: 'step', step: item.step, hole: item.hole, again: false };
    case 'held':
      return { kind: 'held', deviations: state.deviations.filter((deviation) => deviation.status === 'held') };
    case 'wait': {
      const until = waitUntil(state, item.pass, now);
      return until === null ? null : { kind: 'wait', pass: item.pass, until };
    }
    case 'slot': {
      const { slot, pass, stage } = item;
      if (takesReading(stage)) return pullOf(state, slot, pass, stage, now);
      return { kind: 'perform', slot, pass, stage, direction: directionOf(state.procedure, stage, slot.hole) };
    }
  }
}

/** Who still has to sign: everybody who pulled or recorded (W12). */
export const signersLeft = (state: WalkState): string[] =>
  state.everHands.filter(
    (person) => !state.signatures.some((sign) => sign.stands && sign.role === 'signer' && sign.by === person),
  );

const countersigned = (state: WalkState): boolean =>
  state.signatures.some((sign) => sign.stands && sign.role === 'countersigner');

function closingInstruction(state: WalkState): Instruction {
  const held = state.deviations.filter((deviation) => deviation.status === 'held');
  if (held.length > 0) return { kind: 'held', deviations: held };
  const who = signersLeft(state);
  if (who.length > 0) return { kind: 'sign', who };
  const needed = state.opened?.policy.countersign === 'required';
  return needed && !countersigned(state) ? { kind: 'countersign' } : { kind: 'release' };
}

/** The work itself: open deviations, then rework, then the route. Ignores who holds the tablet and whether it slept. */
export function workInstruction(state: WalkState, now: Now): Instruction {
  const open = state.deviations.find((deviation) => deviation.status === 'open');
  if (open) return { kind: 'settle', deviation: open, offers: offersFor(state, open) };
  // A figure is typed again while it can still be read, before anything else is touched (R10).
  if (state.retype) {
    const { slot } = state.retype;
    const pass = walkPasses(state).find((candidate) => candidate.id === slot.pass);
    const stage = pass?.stages.find((candidate) => candidate.id === slot.stage);
    if (pass && stage) return pullOf(state, slot, pass, stage, now);
  }
  const rework = state.reworks[0];
  if (rework) return reworkInstruction(state, rework);
  for (const item of route(state)) {
    const instruction = itemInstruction(state, item, now);
    if (instruction) return instruction;
  }
  return closingInstruction(state);
}

/** Ways to go on after an interruption when the stage was begun (W9). */
export function resumeWays(state: WalkState, slot: SlotRef, stage: Stage): ResumeWay[] {
  const jointOnly = walkPasses(state).find((pass) => pass.id === slot.pass)?.rework.allows === 'joint';
  // A turn that may have begun uses the fastener (R3): what is asked is whether it would then be spent.
  const counts = stage.kind === 'turn' && makesUsed(state, slot);
  const spent = isSpent(counts ? withUse(state, slot.hole) : state, slot.hole);
  const renewing: ResumeWay[] = jointOnly ? ['restartJoint'] : spent ? ['replace'] : ['restart', 'replace'];
  if (stage.kind !== 'turn') return ['asInstructed', ...renewing];
  // After a forced takeover nobody knows which pull the wrench's own total belongs to (W11).
  const told: ResumeWay[] = state.mustLook.includes(slot.hole) ? [] : ['ownTotal'];
  return [...told, ...(isStriped(state, slot.hole) ? (['stripe'] as const) : []), ...renewing];
}

function lookInstruction(state: WalkState, now: Now): Instruction {
  const forcedHole = state.mustLook[0];
  const work = workInstruction(state, now);
  const stage = work.kind === 'pull' || work.kind === 'perform' || work.kind === 'takeWrench' ? work : null;
  const slot = stage ? { ...stage.slot, hole: forcedHole ?? stage.slot.hole } : null;
  const ways = slot && stage ? resumeWays(state, slot, stage.stage) : [];
  return { kind: 'lookAtWork', slot, ways, forced: forcedHole !== undefined };
}

/** Whether the tablet was killed or restarted since the last event of an unfinished walk (W9). */
export const wasInterrupted = (state: WalkState, boot: string): boolean =>
  state.opened !== null &&
  state.paused === null &&
  boot !== state.boot &&
  // Whoever signs has looked at the work: nothing is under way any more.
  !state.signatures.some((signature) => signature.stands);

/** The one thing to do now (W4), and what stands in its way. */
export function instructionOf(state: WalkState, now: Now): Instruction {
  if (!state.opened) return { kind: 'open' };
  if (state.voided) return { kind: 'voided' };
  if (state.writer === 'shop') {
    const complete = countersigned(state) || state.opened.policy.countersign === 'notRequired';
    return { kind: 'withShop', complete: complete && signersLeft(state).length === 0 };
  }
  if (state.stopped) return { kind: 'stopped', ...state.stopped };
  if (state.paused) return { kind: 'paused', cause: state.paused };
  if (state.mustLook.length > 0 || wasInterrupted(state, now.boot)) return lookInstruction(state, now);
  return workInstruction(state, now);
}
