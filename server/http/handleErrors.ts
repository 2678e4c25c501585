import type { ErrorRequestHandler, RequestHandler } from 'express';
import type { ErrorAnswer } from '@shared/contracts/common.contract';
import type { Deps } from '../deps';
import { AppError, notFound } from './errors';

/** No such address under /api: said as such, never answered with the page. */
export const unknownRoute: RequestHandler = () => {
  throw notFound('route.unknown', 'There is no such address.');
};

interface DatabaseError {
  code?: unknown;
  cause?: unknown;
}

/** Lost connections, a server that stops or is full, and a transaction that stood in another's way: all come again. */
const LOST = new Set([
  ...['ECONNREFUSED', 'ECONNRESET', 'EPIPE', 'ETIMEDOUT'],
  ...['57P01', '57P02', '57P03', '53300', '08006', '40P01', '40001'],
]);
/** The driver gives some of its own failures no code, only a sentence. */
const LOST_SENTENCE = /^(Connection terminated|timeout exceeded when trying to connect|Client has encountered)/;

const chain = (error: unknown): DatabaseError[] => {
  const found: DatabaseError[] = [];
  for (let at = error; typeof at === 'object' && at !== null && found.length < 5; at = (at as DatabaseError).cause) {
    found.push(at);
  }
  return found;
};

/** True when the database is away or was lost in the middle: the caller comes again, nothing was acknowledged (fault 5). */
const isDatabaseAway = (error: unknown): boolean =>
  chain(error).some(
    (one) =>
      (typeof one.code === 'string' && LOST.has(one.code)) || (one instanceof Error && LOST_SENTENCE.test(one.message)),
  );

const answerFor = (error: unknown): AppError | null => {
  if (error instanceof AppError) return error;
  // Express itself: a path that cannot be decoded.
  if (error instanceof URIError) return new AppError(400, 'request.badPath', 'The address cannot be read.');
  if (chain(error).some(({ code }) => code === 'BW001')) {
    return new AppError(409, 'ownReadings', 'Whoever took readings in a walk does not countersign it.');
  }
  return isDatabaseAway(error) ? new AppError(503, 'server.database', 'The database does not answer just now.') : null;
};

/** Turns whatever was thrown into an answer. Only what nobody foresaw is a 500, and it goes into the log whole. */
export const handleErrors =
  (deps: Pick<Deps, 'log'>): ErrorRequestHandler =>
  (error: unknown, request, response, next) => {
    if (response.headersSent) {
      next(error);
      return;
    }
    const known = answerFor(error);
    if (!known || known.status >= 500) deps.log.error({ err: error, method: request.method, path: request.path });
    const refusal = known ?? new AppError(500, 'server.failed', 'Something went wrong in the server.');
    const seconds = refusal.details?.['seconds'];
    if (typeof seconds === 'number') response.setHeader('Retry-After', String(seconds));
    const { code, message, details } = refusal;
    const answer: ErrorAnswer = { error: { code, message, ...(details && { details }) } };
    response.status(refusal.status).json(answer);
  };
