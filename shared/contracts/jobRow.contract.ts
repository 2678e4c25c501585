import { z } from 'zod';
import { checkVin, normalizeVin, vinBlocks } from '../vehicle/vin';
import { id, moment, optionalText, purpose, text } from './common.contract';

/** Figures of the vehicle or machine at the time of the job; decimal strings. */
const decimal = z.string().regex(/^\d{1,9}(\.\d{1,3})?$/);

/**
 * A VIN as typed, or empty. Kept in capitals without blanks and hyphens. Refused as `vin.length`, `vin.letterIOQ` (with
 * `at`, `character` and the digit that is `meant`) or `vin.character`; the check digit only warns (D3) and is not
 * looked at here.
 */
export const vin = z
  .string()
  .max(60)
  .transform(normalizeVin)
  .superRefine((value, context) => {
    if (value === '') return;
    const problem = checkVin(value).problems.find(vinBlocks);
    if (!problem) return;
    const { code, ...params } = problem;
    context.addIssue({ code: 'custom', message: `vin.${code}`, params });
  });

/** What is written down when a job is opened; every text field but the number may be left empty. */
export const jobFields = z.object({
  number: text(40),
  customer: optionalText(120).default(''),
  engineFamily: optionalText(80).default(''),
  engineModel: optionalText(80).default(''),
  engineSerial: optionalText(60).default(''),
  vin: vin.default(''),
  claim: optionalText(60).default(''),
  odometer: z
    .object({ value: decimal, unit: z.enum(['km', 'mi']) })
    .nullable()
    .default(null),
  hours: decimal.nullable().default(null),
});
/** What is written down when a job is opened. */
export type JobFields = z.output<typeof jobFields>;

/** A joint of a job: which procedure, which place on the engine. */
export const jointFields = z.object({
  procedure: text(40),
  purpose: purpose.default('finalAssembly'),
  bank: optionalText(40).default(''),
  castingNumber: optionalText(60).default(''),
});
/** A joint of a job. */
export type JointFields = z.output<typeof jointFields>;

/** A joint as stored. */
export const jointRow = jointFields.extend({ id, job: id, retired: z.boolean() });
/** A joint as stored. */
export type JointRow = z.output<typeof jointRow>;

/** A job as stored. */
export const jobRow = jobFields.extend({
  id,
  state: z.enum(['open', 'closed']),
  createdAt: moment,
  changedAt: moment,
});
/** A job as stored. */
export type JobRow = z.output<typeof jobRow>;
