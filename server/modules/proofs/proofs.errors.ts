import type { AppError } from '../../http/errors';
import { conflict, notFound } from '../../http/errors';
import type { IssueBlock } from './issueBlocks';

export const proofUnknown = (): AppError => notFound('proof.unknown', 'There is no such proof.');
export const proofBlocked = (blocks: readonly IssueBlock[]): AppError =>
  conflict('proof.blocked', 'A proof cannot be issued yet.', { blocks });
export const recordBroken = (seq: number, code: string): AppError =>
  conflict('walk.broken', 'The stored record does not verify: nothing is issued on it.', { seq, why: code });
export const notInForce = (state: string): AppError =>
  conflict('proof.notInForce', 'This proof is not in force any more.', { state });
