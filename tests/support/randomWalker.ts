import type { HoleId } from '@shared/procedure/procedure';
import type { Quantity } from '@shared/quantity/quantity';
import type { ReadingEntry, ReportedKind } from '@shared/walk/events';
import { instructionOf, workInstruction, type Instruction, type PullInstruction } from '@shared/walk/instruction';
import { nextDraft, readingDraft, readingFor, type Draft, type Random, type WalkBook } from './walker';
import { testIds } from './walkBook';

/*
 * A technician who means well and has a bad day: values on either side of the window, other holes than asked, every
 * choice that is offered, interruptions, reports. What he tries may be refused; what is recorded has to be sound.
 */

const FACTORS = [0.4, 0.85, 0.93, 0.99, 1.01, 1.07, 1.15, 1.6, 2.2];
const REPORTS: readonly ReportedKind[] = [
  'differentUnknown',
  'strippedThread',
  'brokenFastener',
  'doesNotRunIn',
  'noPartLeft',
  'clickedTwice',
  'wrenchDropped',
  'other',
];

const scaled = ({ value, unit }: Quantity, factor: number): Quantity => ({
  value: String(Math.max(1, Math.round(Number(value) * factor))),
  unit,
});

const anyHole = (book: WalkBook, random: Random): HoleId => random.pick(book.setting.procedure.holes).id;

function badDay(book: WalkBook, entry: ReadingEntry, pull: PullInstruction, random: Random): ReadingEntry {
  const isTurn = pull.stage.kind === 'turn';
  const off = random.chance(0.3) ? { value: scaled(entry.value, random.pick(FACTORS)) } : {};
  const askedEnd = pull.endTorque.use !== 'unused' && entry.endTorque;
  const endTorque = askedEnd && random.chance(0.2) ? { endTorque: scaled(askedEnd, random.pick(FACTORS)) } : {};
  const shows = isTurn && pull.mode === 'fresh' && random.chance(0.2) ? { shows: 'total' as const } : {};
  const other = anyHole(book, random);
  const different = pull.mode === 'fresh' && other !== entry.hole && random.chance(0.15);
  const elsewhere = different ? { hole: other, insteadOf: entry.hole } : {};
  const instead = book.state.retype?.insteadOf;
  const retyped = pull.mode === 'retype' && instead ? { insteadOf: instead } : {};
  return { ...entry, ...off, ...endTorque, ...shows, ...elsewhere, ...retyped };
}

function randomPull(book: WalkBook, pull: PullInstruction, random: Random): Draft {
  const wrench = pull.wrench === null ? undefined : book.state.wrenches[pull.wrench];
  const source = random.chance(0.7) ? 'typed' : 'keyed';
  const entry = readingFor(pull, wrench, source, random);
  return readingDraft(book, badDay(book, entry, pull, random), pull);
}

function randomSettling(
  book: WalkBook,
  { deviation, offers }: Extract<Instruction, { kind: 'settle' }>,
  random: Random,
): Draft {
  const by = book.state.hands.records;
  if (offers.mayVoid && deviation.reading !== null && random.chance(0.25))
    return { type: 'reading.voided', by, data: { reading: deviation.reading, reason: 'typed wrong' } };
  const choice = random.pick(offers.offered);
  if (choice === 'hold' && random.chance(0.5))
    return { type: 'hold.set', by, data: { deviation: deviation.id, note: 'nobody here' } };
  const accepts = choice === 'accept';
  return {
    type: 'deviation.settled',
    by: accepts ? testIds.supervisor : by,
    data: { deviation: deviation.id, choice, reason: 'looked at it', ...(accepts ? { seal: '' } : {}) },
  };
}

function randomResume(
  book: WalkBook,
  look: Extract<Instruction, { kind: 'lookAtWork' }>,
  random: Random,
): Draft | null {
  const by = book.state.hands.records;
  const { slot, ways } = look;
  const at = slot && { pass: slot.pass, hole: slot.hole, stage: slot.stage };
  if (!at || ways.length === 0 || random.chance(0.5)) return null;
  const begun = random.pick(['begun', 'cannotTell'] as const);
  return { type: 'walk.resumed', by, data: { cause: 'killed', begun, way: random.pick(ways), at } };
}

function randomHeld(book: WalkBook, held: Extract<Instruction, { kind: 'held' }>, random: Random): Draft | null {
  const deviation = random.pick(held.deviations);
  if (random.chance(0.2))
    return { type: 'hold.cleared', by: book.state.hands.records, data: { deviation: deviation.id } };
  if (random.chance(0.6)) return null;
  const choice = random.pick(['restart', 'replace', 'restartJoint'] as const);
  return {
    type: 'deviation.settled',
    by: book.state.hands.records,
    data: { deviation: deviation.id, choice, reason: 'put right after all' },
  };
}

type Extra = (book: WalkBook, random: Random) => Draft | null;

const report: Extra = (book, random) => ({
  type: 'deviation.noted',
  by: book.state.hands.records,
  data: { kind: random.pick(REPORTS), hole: anyHole(book, random), note: 'reported' },
});

const voidLast: Extra = (book) => {
  const last = book.state.readings.at(-1);
  return (
    (last && {
      type: 'reading.voided',
      by: book.state.hands.records,
      data: { reading: last.seq, reason: 'wrong figure' },
    }) ??
    null
  );
};

const changeMind: Extra = (book, random) => {
  const decided = book.state.deviations.filter(({ status }) => status === 'settled' || status === 'held');
  if (decided.length === 0) return null;
  const choice = random.pick(['replace', 'restart', 'restartJoint', 'goOn', 'pullAgain'] as const);
  const { id } = random.pick(decided);
  const by = book.state.hands.records;
  return { type: 'deviation.settled', by, data: { deviation: id, choice, reason: 'on second thoughts' } };
};

const otherHands: Extra = (_book, random) => {
  const pulls = random.pick([testIds.technician, testIds.colleague]);
  const records = random.pick([testIds.technician, testIds.colleague]);
  return { type: 'hands.changed', by: records, data: { pulls, records } };
};

const wrenchTrouble: Extra = (book, random) => {
  const here = Object.keys(book.state.wrenches);
  if (here.length === 0) return null;
  const what = random.pick(['reachedLimit', 'reachedLimit', 'overloaded'] as const);
  return { type: 'wrench.reported', by: book.state.hands.records, data: { wrench: random.pick(here), what } };
};

const badStep: Extra = (book, random) => {
  const instruction = instructionOf(book.state, book.now());
  if (instruction.kind !== 'step') return null;
  const { step, hole } = instruction;
  const answer = random.pick(['no', 'yes'] as const);
  const value = step.window ? { value: { value: '0.9', unit: step.window.unit } } : {};
  const photo = step.kind === 'photograph' ? { photo: '0d'.repeat(32) } : {};
  return { type: 'step.done', by: book.state.hands.records, data: { step: step.id, hole, answer, ...value, ...photo } };
};

const correctStep: Extra = (book, random) => {
  const done = Object.values(book.state.steps);
  if (done.length === 0) return null;
  const { seq, value, photo: _photo } = random.pick(done);
  const answer = random.pick(['no', 'yes'] as const);
  const by = book.state.hands.records;
  return {
    type: 'step.corrected',
    by,
    data: { corrects: seq, reason: 'mistaken', answer, ...(value ? { value } : {}) },
  };
};

const morePart: Extra = (book, random) => ({
  type: 'part.taken',
  by: book.state.hands.records,
  data: { part: random.pick(book.setting.procedure.fasteners).id, partNumber: 'TB-10', batch: '1', count: 1 },
});

const correctPart: Extra = (book, random) => {
  const part = random.pick([...book.state.parts, null]);
  const count = random.whole(1, 6);
  const data = { corrects: part?.seq ?? 0, reason: 'miscounted', partNumber: 'TB-10', batch: '2', count };
  return { type: 'part.corrected', by: book.state.hands.records, data };
};

const pause: Extra = (book, random) => ({
  type: 'walk.paused',
  by: book.state.hands.records,
  data: { cause: random.pick(['asked', 'hidden', 'calledAway', 'handedOver'] as const) },
});

const note: Extra = (book) => ({
  type: 'note.added',
  by: book.state.hands.records,
  data: { text: 'a note', hole: null },
});

const begin: Extra = (book) => {
  const work = workInstruction(book.state, book.now());
  return work.kind === 'pull' ? { type: 'turn.begun', by: book.state.hands.records, data: work.slot } : null;
};

const kill: Extra = (book, random) => {
  book.reboot(`boot-${random.whole(2, 1_000_000)}`);
  return null;
};

const extras: readonly Extra[] = [
  report,
  voidLast,
  voidLast,
  changeMind,
  otherHands,
  wrenchTrouble,
  badStep,
  correctStep,
  morePart,
  correctPart,
  pause,
  note,
  begin,
  kill,
];

/** One thing he does or tries now; null where only time passes. */
export function randomDraft(book: WalkBook, random: Random): Draft | null {
  if (random.chance(0.15)) return random.pick(extras)(book, random);
  const instruction = instructionOf(book.state, book.now());
  const manner = { random, source: () => 'typed' as const, settle: () => undefined };
  const proper = (): Draft | null => nextDraft(book, instruction, manner);
  switch (instruction.kind) {
    case 'pull':
      return randomPull(book, instruction, random);
    case 'settle':
      return randomSettling(book, instruction, random);
    case 'lookAtWork':
      return randomResume(book, instruction, random) ?? proper();
    case 'held':
      return randomHeld(book, instruction, random) ?? proper();
    case 'wait':
      book.pass(60_000);
      return null;
    case 'sign':
    case 'countersign':
    case 'release':
      return random.chance(0.5) ? proper() : null;
    default:
      return proper();
  }
}
