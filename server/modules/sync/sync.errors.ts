import { AppError, badRequest, conflict, notFound } from '../../http/errors';

/** A batch that is wrong in itself: nothing of it is stored, `index` says which event. */
export const badBatch = (code: string, message: string, index: number, more: Record<string, unknown> = {}): AppError =>
  badRequest(`batch.${code}`, message, { index, ...more });

/** The server lacks what stands before the batch: send again from `expectedSeq`. */
export const hole = (branch: number, expectedSeq: number): AppError =>
  conflict('batch.hole', `Events are missing before these: send from ${expectedSeq}.`, { branch, expectedSeq });

export const walkUnknown = (): AppError => notFound('walk.unknown', 'There is no such walk.');
export const heldElsewhere = (writer: string): AppError =>
  conflict('walk.heldElsewhere', 'Another tablet is writing this walk.', { writer });
export const ruleRefused = (refusal: { code: string; params?: Record<string, unknown> | undefined }): AppError =>
  conflict(refusal.code, 'The rules of the walk refuse this.', refusal.params);
export const headMoved = (head: string): AppError =>
  conflict('walk.headMoved', 'The record has changed since you looked: look again.', { head });
export const notReleased = (): AppError =>
  conflict('walk.notReleased', 'A tablet is still writing this walk: place an order instead.');
export const rightMissing = (right: string): AppError =>
  new AppError(403, 'right.missing', 'The roles of this person do not allow this.', { right });
export const sealMissing = (): AppError => badRequest('seal.missing', 'A sealed PIN is needed for this.');
