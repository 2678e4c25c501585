/**
 * A refusal that is answered to the caller: `code` is translated as `errors.<code>`, `details` fill its message. Thrown,
 * it rolls the transaction back; returned from a handler, what was written (a counted failure) is committed first.
 */
export class AppError extends Error {
  readonly status: number;
  readonly code: string;
  readonly details: Record<string, unknown> | undefined;

  constructor(status: number, code: string, message: string, details?: Record<string, unknown>) {
    super(message);
    this.name = 'AppError';
    this.status = status;
    this.code = code;
    this.details = details;
  }
}

/** 400: the request itself is wrong. */
export const badRequest = (code: string, message: string, details?: Record<string, unknown>): AppError =>
  new AppError(400, code, message, details);
/** 401: nobody is signed in, or not any more. */
export const unauthorised = (code: string, message: string): AppError => new AppError(401, code, message);
/** 403: the caller may not. */
export const forbidden = (code: string, message: string, details?: Record<string, unknown>): AppError =>
  new AppError(403, code, message, details);
/** 404: there is no such thing, or not in this shop: the two look the same (P5). */
export const notFound = (code: string, message: string): AppError => new AppError(404, code, message);
/** 409: it cannot be done as things stand. */
export const conflict = (code: string, message: string, details?: Record<string, unknown>): AppError =>
  new AppError(409, code, message, details);
/** 410: it was there and has run out. */
export const gone = (code: string, message: string): AppError => new AppError(410, code, message);
/** 429: not yet; `details.seconds` says when. */
export const waitFirst = (code: string, message: string, seconds: number): AppError =>
  new AppError(429, code, message, { seconds });
