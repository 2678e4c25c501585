import { err, ok, type Result } from '../kernel/result';
import { hasRight, type Right, type Role } from '../people/roles';

/** Where a revision stands (A3). An approved one never changes; retired and withdrawn ones stay for the records. */
export type RevisionState = 'draft' | 'inReview' | 'approved' | 'retired' | 'withdrawn';

/**
 * What somebody does with a revision: `submit` it for review, `takeBack` one's own, `refuse` or `approve` somebody
 * else's, `retire` it because another took its place, `withdraw` it for safety.
 */
export type RevisionMove = 'submit' | 'takeBack' | 'refuse' | 'approve' | 'retire' | 'withdraw';

/** Why a move is refused: not from where the revision stands, not the right, one's own work, somebody else's work. */
export interface RevisionRefusal {
  code: 'wrongState' | 'noRight' | 'ownProcedure' | 'notYourProcedure';
}

/** Who moves a revision, and who wrote it. */
export interface RevisionHands {
  by: string;
  roles: readonly Role[];
  writtenBy: string;
}

interface MoveRule {
  from: readonly RevisionState[];
  to: RevisionState;
  right: Right;
  /** Whose work it must be: the writer's own, or not. */
  whose?: 'own' | 'other';
}

const rules: Readonly<Record<RevisionMove, MoveRule>> = {
  submit: { from: ['draft'], to: 'inReview', right: 'writeProcedure' },
  takeBack: { from: ['inReview'], to: 'draft', right: 'writeProcedure', whose: 'own' },
  refuse: { from: ['inReview'], to: 'draft', right: 'approveProcedure', whose: 'other' },
  approve: { from: ['inReview'], to: 'approved', right: 'approveProcedure', whose: 'other' },
  retire: { from: ['approved'], to: 'retired', right: 'approveProcedure' },
  withdraw: { from: ['approved', 'retired'], to: 'withdrawn', right: 'approveProcedure' },
};

/** The state after a move, or why it may not be made (A3: approved by another supervisor than the one who wrote it). */
export function moveRevision(
  state: RevisionState,
  move: RevisionMove,
  { by, roles, writtenBy }: RevisionHands,
): Result<RevisionState, RevisionRefusal> {
  const rule = rules[move];
  if (!hasRight(roles, rule.right)) return err({ code: 'noRight' });
  if (!rule.from.includes(state)) return err({ code: 'wrongState' });
  if (rule.whose === 'other' && by === writtenBy) return err({ code: 'ownProcedure' });
  if (rule.whose === 'own' && by !== writtenBy) return err({ code: 'notYourProcedure' });
  return ok(rule.to);
}

/** Moves that this person may make now, in the order of the list. */
export function movesOpen(state: RevisionState, hands: RevisionHands): RevisionMove[] {
  return (Object.keys(rules) as RevisionMove[]).filter((move) => moveRevision(state, move, hands).ok);
}

/** A new walk may begin on this revision. */
export const mayBegin = (state: RevisionState): boolean => state === 'approved';

/** Walks under way on this revision stop at their next instruction (A3). */
export const stopsWalks = (state: RevisionState): boolean => state === 'withdrawn';

/** The document may still be changed. */
export const mayEdit = (state: RevisionState): boolean => state === 'draft';
