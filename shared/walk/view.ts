import type { HoleId, Pass, Stage } from '../procedure/procedure';
import type { Quantity } from '../quantity/quantity';
import type { Verdict } from '../judge/verdict';
import type { Deviation } from './deviation';
import { instructionOf, type Instruction, type Now } from './instruction';
import { mayVoid } from './offers';
import { nextSlots, passDone, slotDone } from './route';
import { labelOf, slotKey, walkPasses } from './slots';
import type { ReadingRecord, WalkState } from './state';

/** One pass as the strip above the map shows it. */
export interface PassView {
  id: string;
  pass: Pass;
  /** Stages with their target in words belong to the screen; this is the first that decides how the pass is named. */
  stage: Stage;
  state: 'done' | 'now' | 'todo';
  done: number;
  total: number;
  /** Every final reading is in its window. */
  allIn: boolean;
  round: number;
  rounds: number | null;
}

/** What stands at one hole for the map. Angles in degrees since the tick, signed by direction where it is drawn. */
export interface HoleView {
  id: HoleId;
  label: string;
  group: string;
  /** Outcome of the pass that the joint stands in. */
  outcome: 'todo' | 'in' | 'over' | 'under' | 'lookAgain' | 'accepted' | 'held' | 'off' | 'out';
  /** The figure that is off, signed difference to the limit, as shown on the flag. */
  off: Deviation | null;
  seated: boolean;
  passTurn: number;
  earlierTurn: number;
  fastenerNo: number;
  /** Taken out of the joint's order in this pass: its place in the real order (`4th`). */
  outOfOrder: boolean;
  /** Passes done of those the joint has reached, where a new fastener catches up. */
  behind: { done: number; total: number } | null;
  direction: 'cw' | 'ccw';
  interrupted: boolean;
}

/** The last reading, for "Bolt 6: 90° saved" and *Correct bolt 6*. */
export interface LastReading {
  seq: number;
  hole: HoleId;
  value: Quantity;
  total: Quantity;
  verdict: Verdict;
  correctable: boolean;
}

/** Everything the screens of a walk show. */
export interface WalkView {
  instruction: Instruction;
  passes: PassView[];
  passNow: number | null;
  holes: Record<HoleId, HoleView>;
  progress: { done: number; toGo: number };
  next: HoleId | null;
  dots: HoleId[];
  last: LastReading | null;
  deviations: Deviation[];
  openDeviations: number;
  /** *Not finished: do not run* (W12). */
  doNotRun: boolean;
  signed: boolean;
  countersigned: boolean;
}

function passView(state: WalkState, pass: Pass, now: string | null): PassView {
  const round = state.rounds[pass.id] ?? 1;
  const slots = pass.order.flatMap((hole) =>
    pass.stages.map((stage) => ({ pass: pass.id, hole, stage: stage.id, round })),
  );
  const outcomes = slots.map((slot) => state.holes[slot.hole]?.slots[slotKey(slot)]);
  const [stage] = pass.stages.filter(({ kind }) => kind === 'turn').concat(pass.stages);
  if (!stage) throw new Error(`pass ${pass.id} has no stage`);
  return {
    id: pass.id,
    pass,
    stage,
    state: pass.id === now ? 'now' : passDone(state, pass) ? 'done' : 'todo',
    done: slots.filter((slot) => slotDone(state, slot)).length,
    total: slots.length,
    allIn: outcomes.every((outcome) => outcome?.status === 'done' && (outcome.verdict ?? 'in') === 'in'),
    round,
    rounds: pass.repeat ? pass.repeat.mostRounds : null,
  };
}

const standing = (state: WalkState, hole: HoleId): ReadingRecord[] =>
  state.readings.filter(
    (record) =>
      record.countsFor?.hole === hole &&
      record.status !== 'voided' &&
      state.holes[hole]?.slots[slotKey(record.countsFor)]?.seq === record.seq,
  );

function turnOf(records: ReadingRecord[]): number {
  return records
    .filter(({ data }) => data.total.unit === 'deg')
    .reduce((sum, { data }) => sum + Number(data.total.value), 0);
}

function outcomeOf(state: WalkState, hole: HoleId, pass: Pass | undefined, off: Deviation | null): HoleView['outcome'] {
  if (!state.holes[hole]?.present) return 'out';
  if (off?.status === 'held') return 'held';
  if (off) {
    if (off.kind === 'over' || off.kind === 'endTorqueOver') return 'over';
    if (off.kind === 'under' || off.kind === 'endTorqueUnder') return 'under';
    return off.kind === 'lookAgain' || off.kind === 'endTorqueLookAgain' || off.kind === 'torqueAfterTurn'
      ? 'lookAgain'
      : 'off';
  }
  if (!pass) return 'todo';
  const round = state.rounds[pass.id] ?? 1;
  const outcomes = pass.stages.map(
    (stage) => state.holes[hole]?.slots[slotKey({ pass: pass.id, stage: stage.id, round })],
  );
  if (outcomes.some((outcome) => outcome?.status === 'accepted')) return 'accepted';
  if (outcomes.length === 0 || outcomes.some((outcome) => outcome?.status !== 'done')) return 'todo';
  return 'in';
}

function behindOf(state: WalkState, hole: HoleId): HoleView['behind'] {
  if (state.holes[hole]?.catchUpTo == null) return null;
  const upTo = state.holes[hole].catchUpTo.split('/')[0];
  const passes = walkPasses(state).filter((pass) => pass.order.includes(hole));
  const total = passes.findIndex((pass) => pass.id === upTo) + 1;
  const done = passes
    .slice(0, total)
    .filter((pass) =>
      pass.stages.every((stage) => slotDone(state, { pass: pass.id, hole, stage: stage.id, round: 1 })),
    );
  return { done: done.length, total };
}

function holeView(state: WalkState, hole: HoleId, pass: Pass | undefined, interruptedAt: HoleId | null): HoleView {
  const records = standing(state, hole);
  const open = state.deviations.filter(
    (deviation) => deviation.hole === hole && (deviation.status === 'open' || deviation.status === 'held'),
  );
  const off = open[0] ?? null;
  const inPass = records.filter(({ countsFor }) => countsFor?.pass === pass?.id);
  const value = state.procedure.holes.find((candidate) => candidate.id === hole);
  const type = state.procedure.fasteners.find((fastener) => fastener.id === value?.fastener);
  return {
    id: hole,
    label: labelOf(state.procedure, hole),
    group: value?.group ?? '',
    outcome: outcomeOf(state, hole, pass, off),
    off,
    seated: records.length > 0,
    passTurn: turnOf(inPass),
    earlierTurn: turnOf(records) - turnOf(inPass),
    fastenerNo: state.holes[hole]?.fastenerNo ?? 1,
    outOfOrder:
      pass !== undefined &&
      Object.entries(state.holes[hole]?.slots ?? {}).some(
        ([key, outcome]) => key.startsWith(`${pass.id}/`) && outcome.outOfOrder === true,
      ),
    behind: behindOf(state, hole),
    direction: type?.hand === 'left' ? 'ccw' : 'cw',
    interrupted: interruptedAt === hole,
  };
}

/** The pass the joint stands in: that of the first slot to do by a hole that is not catching up, else the last. */
function passOfJoint(state: WalkState): Pass | undefined {
  const passes = walkPasses(state);
  const ahead = passes.find((pass) =>
    pass.order.some(
      (hole) =>
        state.holes[hole]?.catchUpTo == null &&
        pass.stages.some(
          (stage) => !slotDone(state, { pass: pass.id, hole, stage: stage.id, round: state.rounds[pass.id] ?? 1 }),
        ),
    ),
  );
  return ahead ?? passes.at(-1);
}

function lastReading(state: WalkState): LastReading | null {
  const record = state.readings.filter(({ status }) => status === 'stands').at(-1);
  if (!record) return null;
  const { hole, value, total, verdict, source } = record.data;
  const typed = source === 'typed' || source === 'paper';
  return { seq: record.seq, hole, value, total, verdict, correctable: typed && mayVoid(state, record) };
}

const slotOfInstruction = (instruction: Instruction) => ('slot' in instruction ? instruction.slot : null);

/** What a screen needs, from the state alone (W4). Derived, never stored. */
export function view(state: WalkState, now: Now): WalkView {
  const instruction = instructionOf(state, now);
  const slot = slotOfInstruction(instruction);
  const passes = walkPasses(state);
  const passNow = (slot ? passes.find((pass) => pass.id === slot.pass) : undefined) ?? passOfJoint(state);
  const mapPass = passOfJoint(state);
  const passes_ = passes.map((pass) => passView(state, pass, passNow?.id ?? null));
  const current = passes_.find((pass) => pass.id === passNow?.id);
  const ahead = nextSlots(state, 200).filter((next) => next.pass === passNow?.id);
  const order = [...new Set(ahead.map((next) => next.hole))].filter((hole) => hole !== slot?.hole);
  const interruptedAt = instruction.kind === 'lookAtWork' ? (instruction.slot?.hole ?? null) : null;
  const standingSigns = state.signatures.filter((sign) => sign.stands);
  return {
    instruction,
    passes: passes_,
    passNow: passNow ? passes.indexOf(passNow) : null,
    holes: Object.fromEntries(
      state.procedure.holes.map((hole) => [hole.id, holeView(state, hole.id, mapPass, interruptedAt)]),
    ),
    progress: { done: current?.done ?? 0, toGo: (current?.total ?? 0) - (current?.done ?? 0) },
    next: order[0] ?? null,
    dots: order,
    last: lastReading(state),
    deviations: state.deviations,
    openDeviations: state.deviations.filter((deviation) => deviation.status === 'open' || deviation.status === 'held')
      .length,
    doNotRun: !(instruction.kind === 'withShop' && instruction.complete),
    signed: standingSigns.some((sign) => sign.role === 'signer'),
    countersigned: standingSigns.some((sign) => sign.role === 'countersigner'),
  };
}
