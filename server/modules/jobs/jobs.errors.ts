import { badRequest, conflict, notFound } from '../../http/errors';

export const jobUnknown = () => notFound('job.unknown', 'There is no such job.');
export const numberTaken = (number: string) =>
  conflict('job.numberTaken', 'Another job has this number already.', { number });
export const jobClosed = () => conflict('job.closed', 'This job is closed.');
export const walksOpen = (walks: number) =>
  conflict('job.walksOpen', 'A joint of this job is not finished: it cannot be closed.', { walks });
export const procedureUnknown = (code: string) =>
  badRequest('procedure.unknown', 'There is no such procedure.', { procedure: code });
