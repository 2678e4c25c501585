import { isUuid } from '../kernel/ids';
import { err, ok, type Result } from '../kernel/result';
import { isIsoTime } from '../kernel/time';
import { canonicalJson, CanonicalJsonError } from './canonicalJson';

/**
 * One event of a walk's chain. `seq` counts from 0 within a branch's line, `prev` is the hash before it, `at` the tablet's
 * clock, `mono` milliseconds since `boot` (so that a clock that jumps is seen), `known` the catalogue cursor the tablet
 * had, `by` a person's id, `tablet` a tablet's id or `office`.
 */
export interface Envelope<T extends string = string, D = unknown> {
  v: 1;
  shop: string;
  walk: string;
  branch: number;
  seq: number;
  prev: string;
  at: string;
  mono: number;
  boot: string;
  known: number;
  by: string;
  tablet: string;
  type: T;
  data: D;
}

/** An event as stored and sent: its canonical text, the hex SHA-256 of that text's UTF-8, a detached JWS over it. */
export interface SignedEvent {
  text: string;
  hash: string;
  sig: string;
}

/** What is wrong with the text of an event; `field` names the first bad, missing or unknown member. */
export type RecordProblem =
  | { code: 'tooLarge' }
  | { code: 'notJson' }
  | { code: 'notCanonical' }
  | { code: 'unknownVersion' }
  | { code: 'badShape'; field: string };

/** `prev` of the first event of a walk: 64 zeros. */
export const ZERO_HASH = '0'.repeat(64);

/** The longest text of one event, in UTF-16 code units: photos and curves travel as blobs, never inside. */
export const LONGEST_EVENT = 65_536;

/** `tablet` of an event that the office appended. */
export const OFFICE = 'office';

const isCount = (value: unknown): boolean => typeof value === 'number' && Number.isSafeInteger(value) && value >= 0;
const isId = (value: unknown): boolean => typeof value === 'string' && isUuid(value);
const isText = (value: unknown, shape: RegExp): boolean => typeof value === 'string' && shape.test(value);

const FIELDS: Readonly<Record<keyof Envelope, (value: unknown) => boolean>> = {
  v: (value) => value === 1,
  shop: isId,
  walk: isId,
  branch: isCount,
  seq: isCount,
  prev: (value) => isText(value, /^[0-9a-f]{64}$/),
  at: (value) => typeof value === 'string' && isIsoTime(value),
  mono: (value) => typeof value === 'number' && Number.isFinite(value) && value >= 0,
  boot: (value) => isText(value, /^[A-Za-z0-9-]{1,64}$/),
  known: isCount,
  by: isId,
  tablet: (value) => value === OFFICE || isId(value),
  type: (value) => isText(value, /^[a-z]+\.[a-zA-Z]+$/),
  data: (value) => typeof value === 'object' && value !== null && !Array.isArray(value),
};

function parseJson(text: string): Result<unknown, RecordProblem> {
  try {
    return ok(JSON.parse(text) as unknown);
  } catch {
    return err({ code: 'notJson' });
  }
}

function isCanonical(value: unknown, text: string): boolean {
  try {
    return canonicalJson(value) === text;
  } catch (error) {
    if (error instanceof CanonicalJsonError) return false;
    throw error;
  }
}

function badField(value: Record<string, unknown>): string | null {
  for (const [field, accepts] of Object.entries(FIELDS)) {
    if (!Object.hasOwn(value, field) || !accepts(value[field])) return field;
  }
  return Object.keys(value).find((field) => !Object.hasOwn(FIELDS, field)) ?? null;
}

/**
 * Reads the text of an event. The shape of `data` is not looked at: that is for the rules of the event's type. Every
 * member must be there and no other, and the text must be its own canonical form, so that one event has one hash.
 */
export function parseEnvelope(text: string): Result<Envelope, RecordProblem> {
  if (text.length > LONGEST_EVENT) return err({ code: 'tooLarge' });
  const parsed = parseJson(text);
  if (!parsed.ok) return parsed;
  const value = parsed.value;
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return err({ code: 'badShape', field: '' });
  if (!isCanonical(value, text)) return err({ code: 'notCanonical' });
  const members = value as Record<string, unknown>;
  if (members.v !== 1)
    return err(Object.hasOwn(members, 'v') ? { code: 'unknownVersion' } : { code: 'badShape', field: 'v' });
  const field = badField(members);
  return field === null ? ok(value as Envelope) : err({ code: 'badShape', field });
}
