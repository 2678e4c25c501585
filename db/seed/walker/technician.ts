import { suits } from '@shared/crib/suitability';
import { targetOf } from '@shared/quantity/window';
import type { Choice, Source } from '@shared/walk/events';
import { needOf, workInstruction, type Instruction, type PullInstruction } from '@shared/walk/instruction';
import type { Deviation } from '@shared/walk/deviation';
import { fastenerOf } from '@shared/walk/slots';
import type { Offers } from '@shared/walk/offers';
import type { Random } from './random';
import { readingFor } from './reading';
import type { Draft, WalkBook } from './walkBook';

/** How an ideal technician behaves where he has a choice. */
export interface Manner {
  random: Random;
  /** How figures of measuring wrenches reach the tablet. */
  source: (pull: PullInstruction) => Source;
  settle: (deviation: Deviation, offers: Offers) => Choice | undefined;
}

/** What is chosen where nobody says otherwise: the mildest that is offered, a supervisor's word last. */
const MILDEST: readonly Choice[] = [
  'goOn',
  'pullAgain',
  'looked',
  'answered',
  'repeatStep',
  'replace',
  'restart',
  'quarterTurnBack',
  'restartJoint',
  'awaitPart',
  'otherFastener',
  'asItIs',
  'accept',
];

type Of<K extends Instruction['kind']> = Extract<Instruction, { kind: K }>;

function opening({ setting }: WalkBook): Draft {
  const { job, joint, procedure, revision, hash, pulls, records } = setting;
  return {
    type: 'walk.opened',
    by: records,
    data: {
      job,
      joint,
      purpose: setting.purpose ?? 'finalAssembly',
      procedure: { code: procedure.code, revision, hash },
      pulls,
      records,
      policy: setting.policy ?? { judgement: 'simple', countersign: 'required', shopOfOne: false },
      rules: 1,
      earlier: setting.earlier ?? { readingsTaken: false, usedHoles: [] },
    },
  };
}

/** A part comes, for the hole that stands open for want of one (R7); null where it is not said which. */
function partArrives(book: WalkBook, random: Random): Draft | null {
  const { state, setting } = book;
  const hole = state.deviations.filter(({ kind }) => kind === 'noPartLeft').at(-1)?.hole;
  if (hole === undefined || hole === null) return null;
  const type = fastenerOf(setting.procedure, hole);
  return partsFor({ kind: 'parts', missing: [{ part: type.id, name: type.name, need: 1, have: 0 }] }, book, random);
}

/** Looked at the work: nothing was begun (W9). */
function resuming(book: WalkBook, cause: 'killed' | 'paused'): Draft {
  const work = workInstruction(book.state, book.now());
  const at = work.kind === 'pull' || work.kind === 'perform' || work.kind === 'takeWrench' ? work.slot : null;
  const hole = book.state.mustLook[0] ?? at?.hole;
  return {
    type: 'walk.resumed',
    by: book.state.hands.records,
    after: 20,
    data: {
      cause: cause === 'paused' && book.state.paused ? book.state.paused : 'killed',
      begun: 'notBegun',
      way: 'asInstructed',
      at: at && hole !== undefined ? { pass: at.pass, hole, stage: at.stage } : null,
    },
  };
}

function settling(book: WalkBook, { deviation, offers }: Of<'settle'>, manner: Manner): Draft {
  const choice = manner.settle(deviation, offers) ?? MILDEST.find((wished) => offers.offered.includes(wished));
  if (!choice) throw new Error(`nothing is offered for ${deviation.kind} at ${deviation.hole ?? 'the joint'}`);
  return choice === 'accept'
    ? accepting(book, deviation)
    : {
        type: 'deviation.settled',
        by: book.state.hands.records,
        after: 25,
        data: { deviation: deviation.id, choice, reason: `${choice}: looked at it` },
      };
}

/** A supervisor takes it upon himself, with reason and PIN (R9). */
const accepting = (book: WalkBook, deviation: Deviation): Draft => ({
  type: 'deviation.settled',
  by: book.setting.supervisor,
  after: 90,
  data: { deviation: deviation.id, choice: 'accept', reason: 'Looked at the joint and the record', seal: '' },
});

function partsFor({ missing }: Of<'parts'>, book: WalkBook, random: Random): Draft {
  const part = missing[0];
  if (!part) throw new Error('parts are asked for and none is missing');
  return {
    type: 'part.taken',
    by: book.state.hands.records,
    after: 15,
    data: {
      part: part.part,
      partNumber: part.name.match(/[A-Z0-9]+-[A-Z0-9]+/)?.[0] ?? part.part,
      batch: `${random.whole(1000, 9999)}-${random.pick(['A', 'F', 'K', 'R'])}`,
      count: part.need - part.have,
    },
  };
}

function takingWrench(book: WalkBook, { slot, stage }: Of<'takeWrench'>): Draft {
  const { state, setting } = book;
  const need = needOf(state, slot, stage);
  const isOut = (id: string): boolean =>
    state.wrenches[id]?.out != null || (state.wrenches[id]?.limitAt.length ?? 0) > 0;
  const suiting = setting.wrenches.filter(
    (candidate) => !isOut(candidate.id) && suits(candidate, need, book.now().at).suits,
  );
  // One that shows the manual's own unit spares a conversion in the head.
  const wrench = suiting.find((candidate) => candidate.unit === need.window?.unit) ?? suiting[0];
  if (!wrench) throw new Error(`no wrench suits ${slot.pass}/${slot.stage} of ${setting.procedure.code}`);
  return {
    type: 'wrench.taken',
    by: state.hands.records,
    after: 40,
    data: {
      wrench,
      how: 'scanned',
      confirmed: { unit: true, peakHold: true, direction: true, zero: true, dueDate: true },
      turnShows: wrench.turnAccuracy === null ? null : 'thisPull',
      ...(wrench.kind === 'setting' && need.window ? { setting: targetOf(need.window) } : {}),
    },
  };
}

function stepFor({ step, hole }: Of<'step'>, book: WalkBook): Draft {
  const window = step.window;
  return {
    type: 'step.done',
    by: book.state.hands.records,
    after: hole === null ? 30 : 3,
    data: {
      step: step.id,
      hole,
      answer: 'yes',
      ...(step.kind === 'measure' && window ? { value: targetOf(window) } : {}),
      ...(step.kind === 'photograph' ? { photo: '0f'.repeat(32) } : {}),
    },
  };
}

function handwork(instruction: Of<'loosen'> | Of<'remove'> | Of<'fit'> | Of<'repair'>, book: WalkBook): Draft {
  const { hole } = instruction;
  const by = book.state.hands.records;
  switch (instruction.kind) {
    case 'loosen':
      return { type: 'fastener.loosened', by, after: 25, data: { hole, round: instruction.round } };
    case 'remove':
      return {
        type: 'fastener.removed',
        by,
        after: 30,
        data: { hole, looked: { thread: true, washer: true, hole: true } },
      };
    case 'repair':
      return {
        type: 'thread.repaired',
        by,
        after: 1800,
        data: { hole, how: 'Thread insert fitted', photo: '0e'.repeat(32) },
      };
    case 'fit':
      return {
        type: 'fastener.fitted',
        by,
        after: 30,
        data: { hole, part: instruction.part === 'new' ? 'new' : 'same', ranIn: true },
      };
  }
}

function performing({ slot, stage }: Of<'perform'>, book: WalkBook): Draft {
  const isCheck = stage.kind === 'check';
  return {
    type: 'stage.done',
    by: book.state.hands.records,
    after: 8,
    data: { ...slot, ...(isCheck ? { check: stage.check, result: 'asMarked' as const } : {}) },
  };
}

function signing({ who }: Of<'sign'>, book: WalkBook): Draft {
  const by = who[0] ?? '';
  const meaning = by === book.state.hands.pulls ? 'tightenedAsRecorded' : 'recordedAsTold';
  return { type: 'walk.signed', by, after: 60, data: { meaning, seal: '' } };
}

/** The pull itself; a value the wrench sends is written down before it is taken (R10). */
function pulling(book: WalkBook, pull: PullInstruction, manner: Manner): Draft {
  const wrench = pull.wrench === null ? undefined : book.state.wrenches[pull.wrench];
  const entry = readingFor(pull, wrench, manner.source(pull), manner.random);
  const insteadOf = pull.mode === 'retype' ? (book.state.retype?.insteadOf ?? null) : null;
  return readingDraft(book, insteadOf === null ? entry : { ...entry, insteadOf }, pull);
}

/** A reading as a draft, with the time a pull of its kind takes. */
export function readingDraft(
  book: WalkBook,
  entry: Extract<Draft, { type: 'reading.taken' }>['data'],
  pull: PullInstruction,
): Draft {
  const seconds = pull.stage.kind === 'turn' ? 16 : 9;
  return { type: 'reading.taken', by: book.state.hands.records, after: seconds, data: entry };
}

/** What the work itself asks for (W4); null where the instruction is about the walk as a whole. */
function workDraft(book: WalkBook, instruction: Instruction, manner: Manner): Draft | null {
  switch (instruction.kind) {
    case 'settle':
      return settling(book, instruction, manner);
    case 'loosen':
    case 'remove':
    case 'repair':
    case 'fit':
      return handwork(instruction, book);
    case 'parts':
      return partsFor(instruction, book, manner.random);
    case 'step':
      return stepFor(instruction, book);
    case 'takeWrench':
      return takingWrench(book, instruction);
    case 'pull':
      return pulling(book, instruction, manner);
    case 'perform':
      return performing(instruction, book);
    default:
      return null;
  }
}

const countersigning = ({ setting }: WalkBook): Draft => ({
  type: 'walk.countersigned',
  by: setting.supervisor,
  after: 300,
  data: { meaning: 'checkedRecordAndJoint', seal: '' },
});

/**
 * What an ideal technician does at the instruction on the screen, or null where the walk is out of his hands: finished,
 * with the shop, voided or stopped. A wait is sat out: the clock moves on and the next instruction is asked for.
 */
export function nextDraft(book: WalkBook, instruction: Instruction, manner: Manner): Draft | null {
  switch (instruction.kind) {
    case 'open':
      return opening(book);
    case 'paused':
      return (instruction.cause === 'noPartLeft' ? partArrives(book, manner.random) : null) ?? resuming(book, 'paused');
    case 'lookAtWork':
      return resuming(book, 'killed');
    case 'held':
      return instruction.deviations[0] ? accepting(book, instruction.deviations[0]) : null;
    case 'sign':
      return signing(instruction, book);
    case 'countersign':
      return countersigning(book);
    case 'release':
      return { type: 'walk.released', by: book.state.hands.records, after: 5, data: { to: 'shop' } };
    default:
      return workDraft(book, instruction, manner);
  }
}
