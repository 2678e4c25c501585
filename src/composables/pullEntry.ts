import type { HoleId } from '@shared/procedure/procedure';
import type { Quantity } from '@shared/quantity/quantity';
import type { TorqueUnit, Unit } from '@shared/quantity/unit';
import type { Window } from '@shared/quantity/window';
import type { Verdict } from '@shared/judge/verdict';
import type { ReadingEntry, Shows, Source } from '@shared/walk/events';
import type { PullInstruction } from '@shared/walk/instruction';
import { judgeReading, type Judged } from '@shared/walk/judgeReading';
import { placeReading } from '@shared/walk/placement';
import { windowOf } from '@shared/walk/slots';
import type { TakenWrench, WalkState } from '@shared/walk/state';
import type { EntryField, FieldId } from './readingEntry';

/** A pull as it is entered: the instruction, the hole that was really tightened (R5), the wrench in hand. */
export interface PullFrame {
  state: WalkState;
  instruction: PullInstruction;
  /** *I tightened a different one*; null: the hole that was asked for. */
  other: HoleId | null;
  taken: TakenWrench | null;
}

/** The figures of one reading, as they stand when it is recorded. */
export interface PullFigures {
  value: string;
  endTorque?: string;
  pulls?: string;
  unit?: Unit;
}

/** The hole that was tightened. */
export const holeOf = (frame: PullFrame): HoleId => frame.other ?? frame.instruction.slot.hole;

const isTurn = ({ instruction }: PullFrame): boolean => instruction.stage.kind === 'turn';

/** Unit of the figure: degrees, or what the wrench in hand shows. */
export function unitOf(frame: PullFrame): Unit {
  if (isTurn(frame)) return 'deg';
  return frame.taken?.wrench.unit ?? frame.instruction.window?.unit ?? 'N.m';
}

/** Unit of the end torque: what the wrench shows. */
export const endUnitOf = ({ taken }: PullFrame): TorqueUnit => taken?.wrench.unit ?? 'N.m';

/** The window that the figure itself has to meet: what is left of it where a turn goes on (R1). */
export function windowToMeet(frame: PullFrame): Window | null {
  const { instruction, state, other } = frame;
  if (other !== null) return windowOf(state.procedure, instruction.stage, other);
  return instruction.remaining ?? instruction.window;
}

/** *This pull* or *total since zero*: what the mode demands, else as the wrench was taken (W5, R1, W9). */
export function showsOf({ state, instruction, taken }: PullFrame): Shows {
  if (instruction.mode === 'pullAgain') return 'thisPull';
  if (instruction.mode === 'finishByTotal' || instruction.mode === 'finishByStripe') return 'total';
  const voided = state.retype && state.readings.find((record) => record.seq === state.retype?.voided);
  return (instruction.mode === 'retype' ? voided?.data.shows : undefined) ?? taken?.turnShows ?? 'thisPull';
}

/** How the figure was learnt, as the wrench allows it. */
export function sourceOf({ instruction, taken }: PullFrame, entered: 'typed' | 'keyed'): Source {
  if (instruction.mode === 'finishByStripe') return 'marked';
  if (taken?.wrench.kind === 'angleGauge') return 'gauged';
  return entered;
}

const digitsOf = (high: string): number => high.replace(/\..*$/, '').length;

/** The figures that are asked for (W5): the value; for a turn whose end torque is used also that, and the pulls. */
export function fieldsOf(frame: PullFrame, shown: (window: Window, unit: Unit) => Window): EntryField[] {
  const { instruction } = frame;
  const window = windowToMeet(frame);
  const end = instruction.endTorque;
  const value: EntryField = {
    id: 'value',
    need: 'required',
    highDigits: window ? digitsOf(shown(window, unitOf(frame)).high) : null,
    allowNegative: instruction.direction === 'ccw',
  };
  if (!isTurn(frame) || end.use === 'unused' || instruction.mode === 'finishByStripe') return [value];
  return [
    value,
    {
      id: 'endTorque',
      need: end.use,
      highDigits: end.window ? digitsOf(shown(end.window, endUnitOf(frame)).high) : null,
    },
    { id: 'pulls', need: 'required', highDigits: null },
  ];
}

/** What is sent: everything but slip, click and movement, which are asked for last. */
export function entryOf(frame: PullFrame, figures: PullFigures, entered: 'typed' | 'keyed'): ReadingEntry {
  const { instruction, taken, other, state } = frame;
  const { pass, stage, round } = instruction.slot;
  const insteadOf = other === null ? (state.retype?.insteadOf ?? null) : instruction.slot.hole;
  const end = figures.endTorque ? { value: figures.endTorque, unit: endUnitOf(frame) } : null;
  return {
    pass,
    stage,
    round,
    hole: holeOf(frame),
    source: sourceOf(frame, entered),
    wrench: instruction.mode === 'finishByStripe' ? null : (taken?.wrench.id ?? null),
    value: { value: figures.value, unit: figures.unit ?? unitOf(frame) },
    ...(isTurn(frame) ? { shows: showsOf(frame) } : {}),
    ...(end ? { endTorque: end } : {}),
    pulls: Number(figures.pulls || '1'),
    ...(instruction.mode === 'retype' ? { retype: true } : {}),
    ...(insteadOf === null ? {} : { insteadOf }),
  };
}

/** What the rules will make of it, by the very functions that decide: shown before it is recorded (W5). */
export function preview(frame: PullFrame, figures: PullFigures, entered: 'typed' | 'keyed' = 'typed'): Judged {
  const entry = entryOf(frame, figures, entered);
  const instructed = { ...frame.instruction.slot, hole: entry.insteadOf ?? entry.hole };
  return judgeReading(frame.state, entry, placeReading(frame.state, entry, instructed));
}

/** The verdict on one field. The pulls have none. */
export function fieldVerdict(frame: PullFrame, field: FieldId, value: string): Verdict | null {
  if (field === 'pulls') return null;
  if (field === 'endTorque') return preview(frame, { value: '1', endTorque: value }).endVerdict ?? null;
  return frame.instruction.window === null && frame.other === null ? null : preview(frame, { value }).verdict;
}

/** What the hole before showed on the same wrench, for the question whether it was reset (W6). */
export function readingBefore(frame: PullFrame): Quantity | null {
  const last = frame.state.readings.filter(({ status }) => status === 'stands').at(-1);
  if (!last || last.data.hole === holeOf(frame) || last.data.wrench !== (frame.taken?.wrench.id ?? null)) return null;
  return last.data.source === 'typed' || last.data.source === 'keyed' ? last.data.value : null;
}

/** Whether the target differs from that of the reading before: then the box is filled until the first digit. */
export function targetBefore(frame: PullFrame): Window | null {
  const last = frame.state.readings.filter(({ status }) => status !== 'elsewhere').at(-1);
  const { window, slot, mode } = frame.instruction;
  if (!last?.data.window || !window || mode !== 'fresh' || last.data.hole === slot.hole) return null;
  const before = last.data.window;
  return before.target === window.target && before.unit === window.unit ? null : before;
}
