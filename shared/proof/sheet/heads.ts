import { view } from '../../walk/view';
import type { ProofHead } from '../sheet';
import type { SheetSource } from './source';

/** The heads as the walk left them: the same turn and outcome that the map on the stand showed last. */
export function sheetHeads({ state }: SheetSource): ProofHead[] {
  const { holes } = view(state, { at: state.at, mono: state.mono, boot: state.boot });
  return state.procedure.holes.flatMap(({ id }) => {
    const seen = holes[id];
    if (!seen) return [];
    const outcome = seen.outcome === 'in' || seen.outcome === 'accepted' ? seen.outcome : 'other';
    const turned = seen.passTurn > 0 || seen.earlierTurn > 0;
    return [
      {
        hole: id,
        outcome,
        passTurn: turned ? seen.passTurn : null,
        earlierTurn: seen.earlierTurn,
        ccw: seen.direction === 'ccw',
        fastenerNo: seen.fastenerNo,
      },
    ];
  });
}
