import type {
  DeviationNoted,
  DeviationSettled,
  FastenerFitted,
  FastenerLoosened,
  FastenerRemoved,
  HandsChanged,
  HoldCleared,
  HoldSet,
  NoteAdded,
  PartCorrected,
  PartTaken,
  PhotoAdded,
  ReadingElsewhere,
  ReadingReceived,
  ReadingRejected,
  ReadingTaken,
  ReadingVoided,
  StageDone,
  StepCorrected,
  StepDone,
  ThreadRepaired,
  TurnBegun,
  WaitSkipped,
  WalkOpened,
  WalkPaused,
  WalkReleased,
  WalkResumed,
  WalkSentBack,
  WalkSigned,
  WalkStopped,
  WalkTakenOver,
  WalkVoided,
  WrenchReported,
  WrenchTaken,
} from './eventData';

export type * from './eventData';

/** Data by event name: the closed list (decision 3). */
export interface WalkEventData {
  'walk.opened': WalkOpened;
  'walk.paused': WalkPaused;
  'walk.resumed': WalkResumed;
  'walk.signed': WalkSigned;
  'walk.released': WalkReleased;
  'walk.takenOver': WalkTakenOver;
  'walk.countersigned': WalkSigned;
  'walk.sentBack': WalkSentBack;
  'walk.voided': WalkVoided;
  'walk.stopped': WalkStopped;
  'hands.changed': HandsChanged;
  'step.done': StepDone;
  'step.corrected': StepCorrected;
  'part.taken': PartTaken;
  'part.corrected': PartCorrected;
  'wrench.taken': WrenchTaken;
  'wrench.reported': WrenchReported;
  'turn.begun': TurnBegun;
  'stage.done': StageDone;
  'reading.received': ReadingReceived;
  'reading.rejected': ReadingRejected;
  'reading.taken': ReadingTaken;
  'reading.voided': ReadingVoided;
  'reading.elsewhere': ReadingElsewhere;
  'deviation.noted': DeviationNoted;
  'deviation.settled': DeviationSettled;
  'hold.set': HoldSet;
  'hold.cleared': HoldCleared;
  'fastener.loosened': FastenerLoosened;
  'fastener.removed': FastenerRemoved;
  'fastener.fitted': FastenerFitted;
  'thread.repaired': ThreadRepaired;
  'wait.skipped': WaitSkipped;
  'note.added': NoteAdded;
  'photo.added': PhotoAdded;
}

/** Name of a walk event. */
export type WalkEventType = keyof WalkEventData;

/** Name and data of an event: what `decide` makes of a command. */
export type EventBody = { [T in WalkEventType]: { type: T; data: WalkEventData[T] } }[WalkEventType];

/** Where, when and by whom: the part of the envelope that rules look at. */
export interface EventContext {
  seq: number;
  branch: number;
  /** Device time (ISO 8601 UTC), and milliseconds since `boot` began: order never depends on `at`. */
  at: string;
  mono: number;
  boot: string;
  /** Person. */
  by: string;
  /** Tablet id, or `office` for events the shop writes (decision 4). */
  tablet: string;
  /** Catalogue cursor known to the tablet. */
  known: number;
}

/** One event of a walk as the reducer sees it: an envelope without the links of the chain. */
export type WalkEvent = EventBody & EventContext;

/** Every event name, for parsers and exhaustive tests. */
export const WALK_EVENT_TYPES = [
  'walk.opened',
  'walk.paused',
  'walk.resumed',
  'walk.signed',
  'walk.released',
  'walk.takenOver',
  'walk.countersigned',
  'walk.sentBack',
  'walk.voided',
  'walk.stopped',
  'hands.changed',
  'step.done',
  'step.corrected',
  'part.taken',
  'part.corrected',
  'wrench.taken',
  'wrench.reported',
  'turn.begun',
  'stage.done',
  'reading.received',
  'reading.rejected',
  'reading.taken',
  'reading.voided',
  'reading.elsewhere',
  'deviation.noted',
  'deviation.settled',
  'hold.set',
  'hold.cleared',
  'fastener.loosened',
  'fastener.removed',
  'fastener.fitted',
  'thread.repaired',
  'wait.skipped',
  'note.added',
  'photo.added',
] as const satisfies readonly WalkEventType[];
