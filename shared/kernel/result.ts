/**
 * What an operation that can be refused gives back: a value, or a plain refusal. Refusals travel and are stored, so an
 * error is data (`{ code, … }`), never an `Error`; throwing is kept for broken invariants.
 */
export type Result<T, E> = { ok: true; value: T } | { ok: false; error: E };

/** Wraps a value as a success. */
export function ok<T>(value: T): { ok: true; value: T } {
  return { ok: true, value };
}

/** Wraps a refusal. */
export function err<E>(error: E): { ok: false; error: E } {
  return { ok: false, error };
}
