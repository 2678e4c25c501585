import type { Stage } from '@shared/procedure/procedure';
import { WALK_EVENT_TYPES, type ReadingEntry, type WalkEventType } from '@shared/walk/events';
import { testIds } from './walkBook';
import type { Draft, Random, WalkBook } from './walker';

/*
 * Commands made without a look at the instruction: well-shaped, and mostly nonsense. What the rules let through has to
 * leave a record as sound as any.
 */

const PEOPLE = [testIds.technician, testIds.technician, testIds.technician, testIds.colleague, testIds.supervisor];
const SEAL = 'b7'.repeat(32);

interface Maker {
  book: WalkBook;
  random: Random;
}

const anySeq = ({ book, random }: Maker): number => random.whole(0, Math.max(0, book.state.seq));
const maybe = <T>({ random }: Maker, make: () => T, share = 0.3): T | undefined =>
  random.chance(share) ? make() : undefined;

/** Members that were left out are not there at all: an event's text has no undefined. */
const present = <T extends object>(data: T): T =>
  Object.fromEntries(Object.entries(data).filter(([, value]) => value !== undefined)) as T;

const anyHole = ({ book, random }: Maker): string =>
  random.chance(0.03) ? 'h99' : random.pick(book.setting.procedure.holes).id;

const anyPerson = ({ random }: Maker): string => random.pick(PEOPLE);

function anyPlace(maker: Maker): { pass: string; hole: string; stage: Stage; round: number } {
  const { book, random } = maker;
  const pass = random.pick(book.setting.procedure.passes);
  return { pass: pass.id, hole: anyHole(maker), stage: random.pick(pass.stages), round: random.pick([1, 1, 1, 2, 3]) };
}

const anySlot = (maker: Maker) => {
  const place = anyPlace(maker);
  return { ...place, stage: place.stage.id };
};

function anyWrench(maker: Maker): string {
  const here = Object.keys(maker.book.state.wrenches);
  return here.length > 0 && maker.random.chance(0.9) ? maker.random.pick(here) : testIds.job;
}

const anyDeviation = ({ book, random }: Maker): string =>
  book.state.deviations.length > 0 ? random.pick(book.state.deviations).id : '0';

const anyFigure = (stage: Stage, { random }: Maker): ReadingEntry['value'] => {
  const sign = random.chance(0.04) ? '-' : '';
  const isTurn = random.chance(0.97) === (stage.kind === 'turn');
  const value = `${sign}${random.whole(0, 120)}${random.chance(0.3) ? '.5' : ''}`;
  return isTurn ? { value, unit: 'deg' } : { value, unit: random.pick(['N.m', 'N.m', 'lbf.ft', 'kgf.m'] as const) };
};

function anyReading(maker: Maker): ReadingEntry {
  const { random, book } = maker;
  const { stage, ...place } = anyPlace(maker);
  const source = random.pick(['typed', 'typed', 'keyed', 'clicked', 'gauged', 'marked', 'paper', 'simulated'] as const);
  return present<ReadingEntry>({
    ...place,
    stage: stage.id,
    source,
    wrench: source === 'marked' ? null : anyWrench(maker),
    value: anyFigure(stage, maker),
    shows: maybe(maker, () => random.pick(['thisPull', 'total'] as const), stage.kind === 'turn' ? 0.9 : 0.05),
    endTorque: maybe(maker, () => ({ value: String(random.whole(40, 140)), unit: 'N.m' as const })),
    pulls: random.pick([1, 1, 1, 2, 0]),
    click: maybe(maker, () => random.pick(['moving', 'still', 'twice'] as const)),
    moved: maybe(maker, () => random.chance(0.5), 0.5),
    retype: maybe(maker, () => true, book.state.retype ? 0.8 : 0.05),
    insteadOf: maybe(maker, () => anyHole(maker), 0.4),
    changedFrom: maybe(maker, () => '99', 0.1),
    received: maybe(maker, () => anySeq(maker), 0.05),
  });
}

type Makers = { [T in WalkEventType]: (maker: Maker) => Extract<Draft, { type: T }>['data'] | null };

const signature = (maker: Maker) =>
  present({
    meaning: maker.random.pick([
      'tightenedAsRecorded',
      'recordedAsTold',
      'checkedRecord',
      'checkedRecordAndJoint',
    ] as const),
    seal: SEAL,
    renews: maybe(maker, () => anySeq(maker), 0.2),
  });

const anyStep = (maker: Maker) => {
  const step = maker.book.setting.procedure.steps[0];
  const picked = step ? maker.random.pick(maker.book.setting.procedure.steps) : undefined;
  return {
    step: picked?.id ?? 'none',
    hole: picked?.place.at === 'beforeHole' ? anyHole(maker) : null,
    answer: maker.random.pick(['yes', 'no'] as const),
  };
};

const makers: Makers = {
  'walk.opened': () => null,
  'walk.paused': ({ random }) => ({ cause: random.pick(['asked', 'handedOver', 'noPartLeft', 'battery'] as const) }),
  'walk.resumed': (maker) => {
    const { stage, pass, hole } = anySlot(maker);
    return {
      cause: 'asked',
      begun: maker.random.pick(['notBegun', 'begun', 'cannotTell'] as const),
      way: maker.random.pick(['asInstructed', 'ownTotal', 'stripe', 'restart', 'replace', 'restartJoint'] as const),
      at: maker.random.chance(0.3) ? null : { pass, hole, stage },
    };
  },
  'walk.signed': signature,
  'walk.countersigned': signature,
  'walk.sentBack': (maker) => ({
    items: [
      {
        hole: anyHole(maker),
        action: maker.random.pick(['answer', 'look', 'restart', 'replace', 'restartJoint'] as const),
        note: 'look again',
      },
    ],
    seal: SEAL,
  }),
  'walk.released': () => ({ to: 'shop' }),
  'walk.takenOver': ({ random }) => ({ tablet: testIds.tablet, forced: random.chance(0.5) }),
  'walk.voided': () => null,
  'walk.stopped': ({ random }) => ({
    order: testIds.job,
    why: random.pick(['goOn', 'goOn', 'goOn', 'stop'] as const),
    reason: 'ordered',
  }),
  'hands.changed': (maker) => ({ pulls: anyPerson(maker), records: anyPerson(maker) }),
  'step.done': anyStep,
  'step.corrected': (maker) => ({ corrects: anySeq(maker), reason: 'mistaken', answer: anyStep(maker).answer }),
  'part.taken': ({ book, random }) => ({
    part: random.pick([...book.setting.procedure.parts, ...book.setting.procedure.fasteners]).id,
    partNumber: 'TB-10',
    batch: '7',
    count: random.whole(0, 4),
  }),
  'part.corrected': (maker) => ({
    corrects: anySeq(maker),
    reason: 'miscounted',
    partNumber: 'TB-10',
    batch: '8',
    count: maker.random.whole(0, 4),
  }),
  'wrench.taken': ({ book, random }) => ({
    wrench: random.pick(book.setting.wrenches),
    how: 'picked',
    confirmed: { unit: true, peakHold: true, direction: true, zero: true, dueDate: random.chance(0.9) },
    turnShows: random.pick(['thisPull', 'total', null] as const),
    setting: { value: String(random.whole(10, 70)), unit: 'N.m' },
  }),
  'wrench.reported': (maker) => ({
    wrench: anyWrench(maker),
    what: maker.random.pick(['dropped', 'overloaded', 'reachedLimit'] as const),
  }),
  'turn.begun': anySlot,
  'stage.done': (maker) => ({ ...anySlot(maker), result: maker.random.pick(['asMarked', 'moved'] as const) }),
  'reading.received': (maker) => ({
    wrench: anyWrench(maker),
    source: 'keyed',
    value: { value: '30', unit: 'N.m' },
  }),
  'reading.rejected': (maker) => ({
    received: maker.book.state.received?.seq ?? anySeq(maker),
    reason: 'not mine',
  }),
  'reading.taken': anyReading,
  'reading.voided': (maker) => ({
    reading: maker.book.state.readings.at(-1)?.seq ?? anySeq(maker),
    reason: 'typed wrong',
  }),
  'reading.elsewhere': () => null,
  'deviation.noted': (maker) => ({
    kind: maker.random.pick(['differentUnknown', 'strippedThread', 'brokenFastener', 'doesNotRunIn'] as const),
    hole: anyHole(maker),
    note: 'reported',
  }),
  'deviation.settled': (maker) => {
    const choice = maker.random.pick([
      'pullAgain',
      'goOn',
      'restart',
      'replace',
      'restartJoint',
      'accept',
      'hold',
      'asItIs',
      'repeatStep',
    ] as const);
    return present({
      deviation: anyDeviation(maker),
      choice,
      reason: 'decided',
      seal: choice === 'accept' ? SEAL : undefined,
      renews: maybe(maker, () => anySeq(maker), 0.1),
    });
  },
  'hold.set': (maker) => ({ deviation: anyDeviation(maker), note: 'nobody here' }),
  'hold.cleared': (maker) => ({ deviation: anyDeviation(maker) }),
  'fastener.loosened': (maker) => ({ hole: anyHole(maker), round: maker.random.whole(1, 2) }),
  'fastener.removed': (maker) => ({
    hole: anyHole(maker),
    looked: { thread: true, washer: true, hole: maker.random.chance(0.9) },
  }),
  'fastener.fitted': (maker) => ({
    hole: anyHole(maker),
    part: maker.random.pick(['same', 'new'] as const),
    ranIn: maker.random.chance(0.9),
  }),
  'thread.repaired': (maker) => ({ hole: anyHole(maker), how: 'insert', photo: '0c'.repeat(32) }),
  'wait.skipped': ({ book, random }) => ({
    pass: random.pick(book.setting.procedure.passes).id,
    reason: 'cold enough',
    seal: SEAL,
  }),
  'note.added': () => ({ text: 'a note', hole: null }),
  'photo.added': () => ({ blob: '0b'.repeat(32), hole: null, caption: 'the joint' }),
};

/** Any command at all, by anybody, sometimes by the office; null for the few that end or fork a walk. */
export function anyDraft(book: WalkBook, random: Random): Draft | null {
  const type = random.chance(0.3) ? 'reading.taken' : random.pick(WALK_EVENT_TYPES);
  const maker = { book, random };
  const data = makers[type](maker);
  if (data === null) return null;
  const office = type === 'walk.takenOver' || type === 'walk.sentBack' || random.chance(0.03);
  return { type, data, by: anyPerson(maker), ...(office ? { office: true } : {}) } as Draft;
}
