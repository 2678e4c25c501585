import type { HoleId, ProcedureDocument } from '../procedure/procedure';
import type { Quantity } from '../quantity/quantity';
import type { Verdict } from '../judge/verdict';
import type { Deviation } from './deviation';
import type {
  Meaning,
  NoteAdded,
  PartTaken,
  PauseCause,
  PhotoAdded,
  ReadingReceived,
  ReadingTaken,
  ResumeWay,
  SlotRef,
  StepDone,
  WalkOpened,
  WrenchTaken,
} from './events';

/** What stands at one hole and stage. `open`: a deviation waits; `partial`: pull again or go on from here. */
export interface SlotOutcome {
  status: 'done' | 'accepted' | 'held' | 'open' | 'partial';
  /** Sequence number of the reading (or `stage.done`) that stands. */
  seq: number;
  total: Quantity | null;
  /** Pulls that made up the total (J3). */
  pulls?: number;
  verdict: Verdict | null;
  moved?: boolean;
  outOfOrder?: boolean;
}

/** One hole and the fastener in it. `slots` belong to the fastener's current attempt; earlier ones stay in `readings`. */
export interface HoleState {
  attempt: number;
  /** 1 for the first fastener in this hole, 2 after one replacement … */
  fastenerNo: number;
  /** Counts as used (R3): in this attempt or an earlier one. */
  used: boolean;
  /** How often this fastener was used: once in each attempt that came to its used stage (limited reuse, R3). */
  uses: number;
  /** Whether this attempt has counted. */
  counted: boolean;
  /** False while the fastener is out of the hole. */
  present: boolean;
  slots: Record<string, SlotOutcome>;
  /** Slot up to which a single hole's rework catches up; null = walks with the others (R5). */
  catchUpTo: string | null;
}

/** A reading and whether it stands. */
export interface ReadingRecord {
  seq: number;
  at: string;
  mono: number;
  boot: string;
  by: string;
  pulledBy: string;
  attempt: number;
  fastenerNo: number;
  data: ReadingTaken;
  /** Slot it counts for; null where it counts for none (R5: an earlier stage missing, torque after a turn). */
  countsFor: SlotRef | null;
  /** What stood at that slot before: comes back when the reading is voided (R10). */
  before: SlotOutcome | null;
  /** Where the hole's catch-up was to end before it: comes back likewise. */
  catchUpTo: string | null;
  status: 'stands' | 'superseded' | 'voided' | 'elsewhere';
  voidReason?: string;
}

/** Rework under way, in the order in which it was decided. */
export type Rework =
  | {
      kind: 'hole';
      way: 'restart' | 'replace' | 'quarter';
      hole: HoleId;
      deviation: string;
      phase: 'loosen' | 'remove' | 'fit';
    }
  | {
      kind: 'joint';
      deviation: string | null;
      phase: 'loosen' | 'remove' | 'fit';
      round: number;
      /** Holes done in this phase and round. */
      done: HoleId[];
    };

/** A wrench at the stand. */
export interface TakenWrench extends WrenchTaken {
  seq: number;
  out: 'dropped' | 'overloaded' | null;
  /** Slots (keys) at which it reached its limit. */
  limitAt: string[];
}

/** A signature that covers the chain up to `seq - 1`; void once work follows it. */
export interface Signature {
  by: string;
  at: string;
  seq: number;
  meaning: Meaning;
  seal: string;
  role: 'signer' | 'countersigner';
  stands: boolean;
  renews?: number;
}

/** When a pass was under way, for waits and limits (W8). `mono` counts only within the same `boot`. */
export interface PassTimes {
  begun: { at: string; mono: number; boot: string } | null;
  ended: { at: string; mono: number; boot: string } | null;
}

/** Everything that the chain says. Made by `evolve` alone. */
export interface WalkState {
  procedure: ProcedureDocument;
  procedureHash: string;
  opened: (WalkOpened & { at: string; by: string }) | null;
  /** Sequence number of the last event; −1 before the first. */
  seq: number;
  boot: string;
  at: string;
  mono: number;
  tablet: string;
  writer: 'tablet' | 'shop';
  hands: { pulls: string; records: string };
  /** Everybody who pulled or recorded while a reading was taken (P1). */
  everHands: string[];
  paused: PauseCause | null;
  stopped: { order: string; reason: string } | null;
  voided: { reason: string; seq: number } | null;
  steps: Record<string, StepDone & { seq: number }>;
  /** Attempt of each hole's fastener when stripes were last painted: a new fastener has none yet (W9). */
  striped: Record<HoleId, number>;
  parts: (PartTaken & { seq: number })[];
  /** New fasteners drawn per fastener type beyond those of the first fitting. */
  drawn: Record<string, number>;
  /** How often the whole joint was restarted: parts are counted again. */
  restarts: number;
  wrenches: Record<string, TakenWrench>;
  wrenchNow: string | null;
  holes: Record<HoleId, HoleState>;
  /** Rounds opened per repeated pass. */
  rounds: Record<string, number>;
  /** Repeated passes that ended: none moved, or the largest number of rounds was reached. */
  roundsEnded: string[];
  passTimes: Record<string, PassTimes>;
  waitsSkipped: string[];
  readings: ReadingRecord[];
  deviations: Deviation[];
  reworks: Rework[];
  /** Threads that wait for a repair (R7). */
  toRepair: HoleId[];
  /** Do not pull: type again (R10). */
  retype: { slot: SlotRef; insteadOf: HoleId | null; voided: number; before: SlotOutcome | null } | null;
  /** How stages that were begun and interrupted go on: one at a hole, several after a forced takeover (W9, W11). */
  resumes: { slot: SlotRef; way: ResumeWay }[];
  /** Holes to look at after a forced takeover (W11). */
  mustLook: HoleId[];
  begun: SlotRef | null;
  received: (ReadingReceived & { seq: number }) | null;
  signatures: Signature[];
  notes: (NoteAdded & { seq: number; by: string; at: string })[];
  photos: (PhotoAdded & { seq: number; by: string })[];
  loosened: { hole: HoleId; round: number; seq: number; at: string }[];
}

const freshHole = (): HoleState => ({
  attempt: 1,
  fastenerNo: 1,
  used: false,
  uses: 0,
  counted: false,
  present: true,
  slots: {},
  catchUpTo: null,
});

const nothingYet: Omit<WalkState, 'procedure' | 'procedureHash' | 'holes'> = {
  opened: null,
  seq: -1,
  boot: '',
  at: '',
  mono: 0,
  tablet: '',
  writer: 'tablet',
  hands: { pulls: '', records: '' },
  everHands: [],
  paused: null,
  stopped: null,
  voided: null,
  steps: {},
  striped: {},
  parts: [],
  drawn: {},
  restarts: 0,
  wrenches: {},
  wrenchNow: null,
  rounds: {},
  roundsEnded: [],
  passTimes: {},
  waitsSkipped: [],
  readings: [],
  deviations: [],
  reworks: [],
  toRepair: [],
  retype: null,
  resumes: [],
  mustLook: [],
  begun: null,
  received: null,
  signatures: [],
  notes: [],
  photos: [],
  loosened: [],
};

/** The state before the first event of a walk of this revision. `hash`: SHA-256 of the document's canonical JSON. */
export function initialWalk(procedure: ProcedureDocument, hash: string): WalkState {
  const holes = Object.fromEntries(procedure.holes.map((hole) => [hole.id, freshHole()]));
  return { ...nothingYet, procedure, procedureHash: hash, holes };
}
