import type { RequestHandler } from 'express';
import { rateLimit } from 'express-rate-limit';
import { growingWait } from './growingWait';
import { waitFirst } from './errors';

const MOST_KEPT = 10_000;

interface Failures {
  count: number;
  until: number;
}

/**
 * Failures by a key that no row stands for: an unknown e-mail address, an unknown code. Kept in memory and bounded; what
 * is known to the database is counted there.
 */
export class FailureMemory {
  private readonly kept = new Map<string, Failures>();

  /** Seconds still to wait; 0 when free. */
  secondsLeft(key: string, now: number): number {
    return Math.max(0, Math.ceil(((this.kept.get(key)?.until ?? 0) - now) / 1000));
  }

  /** Counts a failure. */
  fail(key: string, now: number): void {
    const count = (this.kept.get(key)?.count ?? 0) + 1;
    this.kept.delete(key);
    if (this.kept.size >= MOST_KEPT) {
      const oldest = this.kept.keys().next();
      if (!oldest.done) this.kept.delete(oldest.value);
    }
    this.kept.set(key, { count, until: now + growingWait(count) * 1000 });
  }

  /** Forgets a key after a success. */
  clear(key: string): void {
    this.kept.delete(key);
  }
}

/**
 * A flood guard: so many requests a minute from one address, then 429 with `details.seconds`. High enough for a shop of
 * tablets behind one router that come back in the same second.
 */
export const floodGuard = (mostAMinute: number): RequestHandler =>
  rateLimit({
    windowMs: 60_000,
    limit: mostAMinute,
    standardHeaders: false,
    legacyHeaders: false,
    handler: (_request, _response, next) => {
      next(waitFirst('rate.tooMany', 'Too many requests from this address.', 60));
    },
  });
