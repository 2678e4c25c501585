import { z } from 'zod';
import type { WrenchSnapshot } from '../crib/wrench';
import { isUuid } from '../kernel/ids';
import type { Unit } from '../quantity/unit';

/*
 * Pieces of the events' data. Nothing here trims or changes what it reads: the canonical text was signed as it is.
 */

const isStorable = (text: string): boolean => !/\p{Surrogate}/u.test(text) && !text.includes('\u0000');

/** Text of a person, perhaps empty: whether it may be empty is for the walk's rules. */
export const said = (most = 1_000) => z.string().max(most).refine(isStorable);
/** Person, job, joint, wrench, tablet or order. */
export const rowId = z.string().refine(isUuid);
/** Id inside a procedure document: hole, pass, stage, step, part. */
export const key = z.string().regex(/^[A-Za-z0-9][A-Za-z0-9_-]{0,31}$/);
/** Lower-case hex SHA-256: of a file, a curve, a sealed PIN, a document. */
export const digest = z.string().regex(/^[0-9a-f]{64}$/);
/** Sequence number of another event of the same chain. */
export const seq = z.number().int().min(0).max(1_000_000);
/** Decimal as typed or sent, with up to six decimals. */
export const decimal = z.string().regex(/^-?\d{1,9}(\.\d{1,6})?$/);
/** Number of something counted at the stand. */
export const count = z.number().int().min(-9_999).max(9_999);
/** Id of a deviation: the event that caused it, and which of several. */
export const deviationId = z.string().regex(/^\d{1,7}(\.\d{1,3})?$/);

const torqueUnit = z.enum(['N.m', 'lbf.ft', 'lbf.in', 'kgf.m']);
const unit = z.enum(['N.m', 'lbf.ft', 'lbf.in', 'kgf.m', 'deg', 'mm', 'in'] satisfies Unit[]);
/** A value with its unit (J1). */
export const measured = z.strictObject({ value: decimal, unit });
/** Target and limits. */
export const limits = z.strictObject({ target: decimal, low: decimal, high: decimal, unit });

/** Where in the walk. */
export const slotFields = { pass: key, hole: key, stage: key, round: z.number().int().min(1).max(99) };

/** Outcome of a judgement. */
export const verdict = z.enum(['in', 'lookAgain', 'under', 'over']);

/** How a reading was learnt. */
export const source = z.enum(['streamed', 'keyed', 'typed', 'clicked', 'gauged', 'marked', 'paper', 'simulated']);

const day = z.string().regex(/^\d{4}-\d{2}-\d{2}(T\d{2}:\d{2}:\d{2}(\.\d{3})?Z)?$/);
const positive = z.string().regex(/^\d{1,9}(\.\d{1,6})?$/);

/** A wrench as frozen into `wrench.taken`. */
export const wrenchSnapshot: z.ZodType<WrenchSnapshot> = z.strictObject({
  id: rowId,
  tag: said(40),
  serial: said(60),
  kind: z.enum(['setting', 'dial', 'torque', 'torqueAngle', 'angleGauge', 'multiplier']),
  drive: said(20),
  range: z.strictObject({ low: positive, high: positive, unit: torqueUnit }).nullable(),
  scaleStep: positive.optional(),
  unit: torqueUnit,
  resolution: z.strictObject({ torque: positive.nullable(), angle: positive.nullable() }),
  accuracy: z.strictObject({ cw: positive.nullable(), ccw: positive.nullable() }),
  turnAccuracy: positive.nullable(),
  due: z.strictObject({ date: day.nullable(), cycles: z.number().int().min(0).max(10_000_000).nullable() }),
  cycles: z.number().int().min(0).max(10_000_000),
  state: z.enum(['inService', 'quarantined', 'away', 'retired']),
  certificate: said(60).nullable(),
  effectiveLength: measured.optional(),
  adapterOk: z.boolean().optional(),
});
