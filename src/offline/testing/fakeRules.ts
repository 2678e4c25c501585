import { err, ok } from '@shared/kernel/result';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { WalkRules } from '../walkRules';

/** A walk in small: opened once, then notes; a note `refuse me` is refused. */
export interface NoteWalk {
  opened: boolean;
  notes: string[];
  seq: number;
  signed: string[];
}

/** Rules for tests of the log itself: the log must not care what the rules are about. */
export const noteRules: WalkRules<NoteWalk, { last: string | null; at: string }> = {
  initial: () => ({ opened: false, notes: [], seq: -1, signed: [] }),
  decide: (state, { type, data }) => {
    if (!state.opened && type !== 'walk.opened') return err({ code: 'notOpened' });
    if (state.opened && type === 'walk.opened') return err({ code: 'alreadyOpened' });
    if (type === 'note.added' && data.text === 'refuse me') return err({ code: 'reasonMissing' });
    if (type === 'walk.signed' && !data.seal) return err({ code: 'sealMissing' });
    return ok({ type, data } as never);
  },
  evolve: (state, event) => ({
    opened: state.opened || event.type === 'walk.opened',
    notes: event.type === 'note.added' ? [...state.notes, event.data.text] : state.notes,
    signed: event.type === 'walk.signed' ? [...state.signed, event.data.seal] : state.signed,
    seq: event.seq,
  }),
  view: (state, now) => ({ last: state.notes.at(-1) ?? null, at: now.at }),
};

/** A document of which these rules look at nothing. */
export const emptyDocument = { schema: 1, code: 'P-TEST' } as unknown as ProcedureDocument;
