import { siblingNotes, type SiblingNote } from '../judge/siblings';
import { groupBy } from '../kernel/groupBy';
import { msBetween } from '../kernel/time';
import { decimalToRational, toNumber } from '../quantity/rational';
import type { Quantity } from '../quantity/quantity';
import type { Deviation } from './deviation';
import type { Source } from './events';
import { torqueReadingUncertainty } from './readingUncertainty';
import { directionOf, holeById, slotKey, stageOf } from './slots';
import type { ReadingRecord, WalkState } from './state';

/** A fact that a countersigner should see before the figures (W12); `params` fill the sentence. */
export interface ReviewFact {
  code: 'fastPass' | 'pickedWrench' | 'clockJumped';
  params: Record<string, string | number>;
}

/** Readings that stand apart from their siblings, with where (J6): a note, never a stop. */
export interface SiblingFinding extends SiblingNote {
  pass: string;
  stage: string;
  group: string;
  what: 'endTorque' | 'value';
}

/** What a countersigner reads first, in this order: what is off, what was changed, facts, siblings (W12, J6). */
export interface Review {
  deviations: Deviation[];
  voided: ReadingRecord[];
  facts: ReviewFact[];
  siblings: SiblingFinding[];
  sources: { source: Source; count: number }[];
  final: { total: number; in: number; accepted: number };
}

const numberOf = (text: string): number => toNumber(decimalToRational(text));

/** The readings that count now: one for each slot that took a figure. */
export function finalReadings(state: WalkState): ReadingRecord[] {
  return state.readings.filter(
    ({ countsFor, seq, status }) =>
      status !== 'voided' && countsFor !== null && state.holes[countsFor.hole]?.slots[slotKey(countsFor)]?.seq === seq,
  );
}

/** Under four seconds a bolt nobody places a wrench, pulls and reads (common practice, no source). */
const FAST_MS_PER_READING = 4_000;

function passFacts(readings: ReadingRecord[]): ReviewFact[] {
  const byPass = groupBy(readings, (record) => record.data.pass);
  return [...byPass].flatMap(([pass, records]) => {
    const first = records[0];
    const last = records.at(-1);
    if (!first || !last || records.length < 4) return [];
    const ms = first.boot === last.boot ? last.mono - first.mono : msBetween(first.at, last.at);
    const fast = ms < FAST_MS_PER_READING * (records.length - 1);
    return fast
      ? [{ code: 'fastPass' as const, params: { pass, count: records.length, seconds: Math.round(ms / 1000) } }]
      : [];
  });
}

function clockFacts(state: WalkState): ReviewFact[] {
  const jumps = state.readings.filter((record, index) => {
    const before = state.readings[index - 1];
    if (!before || before.boot !== record.boot) return false;
    return Math.abs(msBetween(before.at, record.at) - (record.mono - before.mono)) > 60_000;
  });
  return jumps.length > 0 ? [{ code: 'clockJumped', params: { count: jumps.length } }] : [];
}

function uncertaintyOf(state: WalkState, record: ReadingRecord, value: Quantity): number {
  const wrench = record.data.wrench === null ? undefined : state.wrenches[record.data.wrench]?.wrench;
  const stage = stageOf(state, record.data)?.stage;
  if (!wrench || !stage) return 0;
  return torqueReadingUncertainty(value, wrench, directionOf(state.procedure, stage, record.data.hole)) ?? 0;
}

/** J6 compares the end torque of a turn, and the turn of a torque stage where it was measured; clicked readings never. */
function siblingFindings(state: WalkState, readings: ReadingRecord[]): SiblingFinding[] {
  const turns = readings.filter(({ data }) => data.endTorque && data.source !== 'clicked');
  const groups = groupBy(turns, ({ data }) =>
    [data.pass, data.stage, holeById(state.procedure, data.hole)?.group ?? '', data.source, data.endTorque?.unit].join(
      '|',
    ),
  );
  return [...groups].flatMap(([key, records]) => {
    const [pass = '', stage = '', group = ''] = key.split('|');
    const siblings = records.map((record) => {
      const end = record.data.endTorque ?? record.data.total;
      return { hole: record.data.hole, value: numberOf(end.value), uncertainty: uncertaintyOf(state, record, end) };
    });
    return siblingNotes(siblings).map((note) => ({ ...note, pass, stage, group, what: 'endTorque' as const }));
  });
}

const isDeviation = ({ status }: Deviation): boolean => status !== 'withdrawn';

/** Everything a countersigner judges a record by, worked out from the state alone. */
export function reviewOf(state: WalkState): Review {
  const readings = finalReadings(state);
  const counts = groupBy(readings, ({ data }) => data.source);
  const status = ({ countsFor }: ReadingRecord) =>
    countsFor ? state.holes[countsFor.hole]?.slots[slotKey(countsFor)]?.status : undefined;
  const picked = Object.values(state.wrenches).filter((taken) => taken.how === 'picked');
  return {
    deviations: state.deviations.filter(isDeviation),
    voided: state.readings.filter((record) => record.status === 'voided'),
    facts: [
      ...passFacts(state.readings.filter((record) => record.status !== 'voided')),
      ...clockFacts(state),
      ...picked.map(({ wrench }) => ({ code: 'pickedWrench' as const, params: { wrench: wrench.tag } })),
    ],
    siblings: siblingFindings(state, readings),
    sources: [...counts].map(([source, records]) => ({ source, count: records.length })),
    final: {
      total: readings.length,
      in: readings.filter((record) => record.data.verdict === 'in' && status(record) === 'done').length,
      accepted: readings.filter((record) => status(record) === 'accepted').length,
    },
  };
}
