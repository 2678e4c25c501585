import { decimalToRational, toNumber } from '../../quantity/rational';
import { unitKind } from '../../quantity/unit';
import { slotKey, slotsOfHole } from '../../walk/slots';
import type { SlotOutcome, WalkState } from '../../walk/state';
import type { ProofHead } from '../sheet';
import { holesOf, type SheetSource } from './source';

const outcomesOf = (state: WalkState, hole: string): (SlotOutcome | undefined)[] =>
  slotsOfHole(state, hole).map((slot) => state.holes[hole]?.slots[slotKey(slot)]);

/** By every stage of this hole, not by the joint's last pass alone: other groups may end earlier. */
function outcomeOf(outcomes: readonly (SlotOutcome | undefined)[]): ProofHead['outcome'] {
  if (outcomes.some((outcome) => outcome?.status === 'accepted')) return 'accepted';
  const finished = outcomes.length > 0 && outcomes.every((outcome) => outcome?.status === 'done');
  const last = outcomes.at(-1)?.verdict ?? 'in';
  return finished && last === 'in' ? 'in' : 'other';
}

const degrees = (outcome: SlotOutcome | undefined): number[] =>
  outcome?.total && unitKind(outcome.total.unit) === 'angle' ? [toNumber(decimalToRational(outcome.total.value))] : [];

/** The heads as the walk left them: the last turn as that of this pass, the sum of those before it. */
export function sheetHeads({ state }: SheetSource): ProofHead[] {
  return holesOf(state).map((hole) => {
    const outcomes = outcomesOf(state, hole);
    const turns = outcomes.flatMap(degrees);
    const type = state.procedure.holes.find((candidate) => candidate.id === hole)?.fastener;
    const fastener = state.procedure.fasteners.find((candidate) => candidate.id === type);
    return {
      hole,
      outcome: outcomeOf(outcomes),
      passTurn: turns.at(-1) ?? null,
      earlierTurn: turns.slice(0, -1).reduce((sum, turn) => sum + turn, 0),
      ccw: fastener?.hand === 'left',
      fastenerNo: state.holes[hole]?.fastenerNo ?? 1,
    };
  });
}
