import type { StandingWalk } from '../sync/refreshWalk';
import { isFinished } from '../sync/walkSummary';

/** Why a proof cannot be issued, translated as `errors.proof.<code>`. */
export interface IssueBlock {
  code: string;
  details?: Record<string, unknown>;
}

const recordBlocks = ({ state }: StandingWalk): IssueBlock[] => {
  const purpose = state.opened?.purpose;
  if (purpose !== 'finalAssembly' && purpose !== 'recheck')
    return [{ code: 'proof.notIssuable', details: { purpose } }];
  if (state.voided) return [{ code: 'proof.voided' }];
  const signed = state.signatures.some((sign) => sign.stands && sign.role === 'signer');
  if (!signed) return [{ code: 'proof.notSigned' }];
  if (isFinished(state)) return [];
  return [{ code: state.writer === 'shop' ? 'proof.notCountersigned' : 'proof.notReleased' }];
};

/** Everything that stands between a walk and its proof (W12, P3, decisions 5 and 6); empty when it may be issued. */
export const issueBlocks = (walk: StandingWalk): IssueBlock[] => {
  const { row, seals } = walk;
  const blocks = recordBlocks(walk);
  if (seals.pending.length > 0) blocks.push({ code: 'proof.confirmationMissing', details: { seqs: seals.pending } });
  if (seals.refused.length > 0) blocks.push({ code: 'proof.confirmationRefused', details: { seqs: seals.refused } });
  if (row.quarantined > 0) blocks.push({ code: 'proof.quarantined', details: { events: row.quarantined } });
  if (row.forked) blocks.push({ code: 'proof.forked' });
  if (row.missingBlobs > 0) blocks.push({ code: 'proof.blobsMissing', details: { files: row.missingBlobs } });
  return blocks;
};
