import { groupBy } from '../../kernel/groupBy';
import { compareQuantities, type Quantity } from '../../quantity/quantity';
import type { Step } from '../../procedure/procedure';
import type { StepDone } from '../../walk/events';
import { stepDone, stepsOfHole } from '../../walk/route';
import type { WalkState } from '../../walk/state';
import { phrase, type Phrase, type PhraseParam } from '../phrase';
import type { ProofPart } from '../sheet';
import { holesOf, type SheetSource } from './source';

/** New fasteners of a single-use type that went in: the first fitting, and every one drawn after it (R3, R6). */
function fittedOf(state: WalkState, type: string): number | null {
  const fastener = state.procedure.fasteners.find((candidate) => candidate.id === type);
  if (!fastener) return null;
  const first = state.procedure.holes.filter((hole) => hole.fastener === type).length;
  const drawn = state.drawn[type] ?? 0;
  return fastener.reuse.kind === 'singleUse' && state.opened?.purpose === 'finalAssembly' ? first + drawn : drawn;
}

/** Parts with part number and batch (W2, D2), one line a batch. */
export function sheetParts({ state }: SheetSource): ProofPart[] {
  const { fasteners, parts } = state.procedure;
  const lines = groupBy(state.parts, ({ part, partNumber, batch }) => JSON.stringify([part, partNumber, batch]));
  return [...lines.values()].flatMap((taken) => {
    const [first] = taken;
    if (!first) return [];
    const { part, partNumber, batch } = first;
    const name = [...fasteners, ...parts].find((candidate) => candidate.id === part)?.name ?? part;
    const count = taken.reduce((sum, one) => sum + one.count, 0);
    return [{ part, name, partNumber, batch, count, fitted: fittedOf(state, part) }];
  });
}

function rangeOf(values: readonly Quantity[]): PhraseParam[] {
  const sorted = [...values].sort(compareQuantities);
  const [low, high] = [sorted[0], sorted.at(-1)];
  if (!low || !high) return [];
  if (compareQuantities(low, high) === 0) return [{ quantity: low }];
  return [{ phrase: phrase('step.range', { low: { quantity: low }, high: { quantity: high } }) }];
}

function stepPhrase(state: WalkState, step: Step): Phrase[] {
  const records: StepDone[] = Object.values(state.steps).filter((record) => record.step === step.id);
  if (records.length === 0) return [];
  const values = records.flatMap(({ value }) => (value ? [value] : []));
  const text =
    values.length > 0
      ? phrase('step.value', { step: step.text, values: { list: rangeOf(values), join: 'comma' } })
      : phrase('step.done', { step: step.text });
  if (step.place.at !== 'beforeHole') return [text];
  const holes = holesOf(state).filter((hole) => stepsOfHole(state, hole).includes(step));
  const done = holes.filter((hole) => stepDone(state, step, hole)).length;
  return [phrase('step.count', { step: { phrase: text }, done, total: holes.length })];
}

/** The steps of the procedure as they were answered: counted where they are one of holes, measured values as a range. */
export function sheetPreparation({ state }: SheetSource): Phrase[] {
  return state.procedure.steps.flatMap((step) => stepPhrase(state, step));
}
