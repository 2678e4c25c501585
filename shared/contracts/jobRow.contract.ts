import { z } from 'zod';
import { id, moment, optionalText, purpose, text } from './common.contract';

/** Figures of the vehicle or machine at the time of the job; decimal strings. */
const decimal = z.string().regex(/^\d{1,9}(\.\d{1,3})?$/);

/**
 * A VIN as typed, upper-cased; 17 letters and digits without I, O, Q (refused as `vin.letters` with
 * `details.positions`), or empty. The check digit only warns (D3): it is not looked at here.
 */
export const vin = z
  .string()
  .trim()
  .toUpperCase()
  .refine((value) => value === '' || value.length === 17, { error: 'vin.length' })
  .refine((value) => !/[IOQ]/.test(value), { error: 'vin.letters' })
  .refine((value) => /^[A-Z0-9]*$/.test(value), { error: 'vin.characters' });

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
