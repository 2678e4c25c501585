import type { Router } from 'express';
import * as contract from '@shared/contracts/jobs.contract';
import type { Deps } from '../../deps';
import { officeRoute } from '../../http/route';
import * as jobs from './jobs.usecases';

/** Adds the addresses of jobs and their joints. */
export const jobRoutes = (router: Router, deps: Deps): void => {
  officeRoute(router, deps, contract.listJobs, async ({ tx, query }) => ({ jobs: await jobs.listJobs(tx, query) }));
  officeRoute(router, deps, contract.createJob, ({ tx, caller, body }) => jobs.createJob(deps, tx, caller, body));
  officeRoute(router, deps, contract.getJob, ({ tx, params }) => jobs.getJob(tx, params.id));
  officeRoute(router, deps, contract.updateJob, ({ tx, caller, params, body }) =>
    jobs.updateJob(deps, tx, caller, params.id, body),
  );
  officeRoute(router, deps, contract.addJoint, ({ tx, caller, params, body }) =>
    jobs.addJoint(deps, tx, caller, params.id, body),
  );
};
