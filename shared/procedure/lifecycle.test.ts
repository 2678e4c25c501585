import { describe, expect, it } from 'vitest';
import {
  mayBegin,
  mayEdit,
  moveRevision,
  movesOpen,
  stopsWalks,
  type RevisionMove,
  type RevisionState,
} from './lifecycle';

const states: RevisionState[] = ['draft', 'inReview', 'approved', 'retired', 'withdrawn'];
const writer = { by: 'w', roles: ['supervisor'] as const, writtenBy: 'w' };
const other = { ...writer, by: 'o' };

describe('moveRevision (A3)', () => {
  it('goes draft, in review, approved by another, retired, withdrawn', () => {
    expect(moveRevision('draft', 'submit', writer)).toEqual({ ok: true, value: 'inReview' });
    expect(moveRevision('inReview', 'approve', other)).toEqual({ ok: true, value: 'approved' });
    expect(moveRevision('approved', 'retire', writer)).toEqual({ ok: true, value: 'retired' });
    expect(moveRevision('retired', 'withdraw', other)).toEqual({ ok: true, value: 'withdrawn' });
  });

  it('is approved or refused by nobody who wrote it, and taken back by nobody else', () => {
    expect(moveRevision('inReview', 'approve', writer)).toEqual({ ok: false, error: { code: 'ownProcedure' } });
    expect(moveRevision('inReview', 'refuse', writer)).toEqual({ ok: false, error: { code: 'ownProcedure' } });
    expect(moveRevision('inReview', 'takeBack', other)).toEqual({ ok: false, error: { code: 'notYourProcedure' } });
    expect(moveRevision('inReview', 'refuse', other)).toEqual({ ok: true, value: 'draft' });
  });

  it.each([[['technician']], [['clerk', 'keeper', 'admin']], [[]]] as const)('asks for the right: %j', (roles) => {
    for (const state of states) expect(movesOpen(state, { ...other, roles })).toEqual([]);
    expect(moveRevision('draft', 'submit', { ...writer, roles })).toEqual({ ok: false, error: { code: 'noRight' } });
  });

  it('opens just these moves', () => {
    const open = Object.fromEntries(states.map((state) => [state, movesOpen(state, other)]));
    expect(open).toEqual({
      draft: ['submit'],
      inReview: ['refuse', 'approve'],
      approved: ['retire', 'withdraw'],
      retired: ['withdraw'],
      withdrawn: [],
    } satisfies Record<RevisionState, RevisionMove[]>);
  });

  it('never lets an approved one be edited or sent to review again', () => {
    expect(states.filter(mayEdit)).toEqual(['draft']);
    expect(moveRevision('approved', 'submit', writer)).toEqual({ ok: false, error: { code: 'wrongState' } });
    expect(states.filter(mayBegin)).toEqual(['approved']);
    expect(states.filter(stopsWalks)).toEqual(['withdrawn']);
  });
});
