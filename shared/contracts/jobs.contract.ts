import { z } from 'zod';
import { idParams } from './common.contract';
import { defineEndpoint } from './defineEndpoint';
import { jobFields, jobRow, jointFields, jointRow } from './jobRow.contract';
import { walkRow } from './walkRow.contract';

/** A job with its joints and their walks. */
export const jobWhole = jobRow.extend({ joints: z.array(jointRow), walks: z.array(walkRow) });
/** A job with its joints and their walks. */
export type JobWhole = z.output<typeof jobWhole>;

/** Jobs, newest first. `q` looks in number, customer, engine, serial, VIN and claim. */
export const listJobs = defineEndpoint({
  method: 'GET',
  path: '/api/jobs',
  auth: 'office',
  right: 'see',
  query: z.object({
    q: z.string().trim().max(100).default(''),
    state: z.enum(['open', 'closed', 'all']).default('open'),
    limit: z.coerce.number().int().min(1).max(200).default(100),
  }),
  responses: { 200: z.object({ jobs: z.array(jobWhole) }) },
});
/** Opens a job, with its first joints when given. Errors: `job.numberTaken` 409, `procedure.unknown` 400. */
export const createJob = defineEndpoint({
  method: 'POST',
  path: '/api/jobs',
  auth: 'office',
  right: 'keepJobs',
  body: jobFields.extend({ joints: z.array(jointFields).max(60).default([]) }),
  responses: { 201: jobWhole },
});
/** A job. Errors: `job.unknown` 404. */
export const getJob = defineEndpoint({
  method: 'GET',
  path: '/api/jobs/:id',
  auth: 'office',
  right: 'see',
  params: idParams,
  responses: { 200: jobWhole },
});
/**
 * Changes fields (those left out stay) or closes and reopens. `claim` asks for the right *claim fields* only. Errors:
 * `job.unknown` 404, `job.numberTaken` 409, `job.walksOpen` 409 when a joint is not finished.
 */
export const updateJob = defineEndpoint({
  method: 'PATCH',
  path: '/api/jobs/:id',
  auth: 'office',
  params: idParams,
  body: z.object({
    number: jobFields.shape.number.optional(),
    customer: jobFields.shape.customer.removeDefault().optional(),
    engineFamily: jobFields.shape.engineFamily.removeDefault().optional(),
    engineModel: jobFields.shape.engineModel.removeDefault().optional(),
    engineSerial: jobFields.shape.engineSerial.removeDefault().optional(),
    vin: jobFields.shape.vin.removeDefault().optional(),
    claim: jobFields.shape.claim.removeDefault().optional(),
    odometer: jobFields.shape.odometer.removeDefault().optional(),
    hours: jobFields.shape.hours.removeDefault().optional(),
    state: z.enum(['open', 'closed']).optional(),
  }),
  responses: { 200: jobWhole },
});
/** Adds a joint to an open job. Errors: `job.unknown` 404, `job.closed` 409, `procedure.unknown` 400. */
export const addJoint = defineEndpoint({
  method: 'POST',
  path: '/api/jobs/:id/joints',
  auth: 'office',
  right: 'keepJobs',
  params: idParams,
  body: jointFields,
  responses: { 201: jointRow },
});
