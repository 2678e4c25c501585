import { toValue, type MaybeRefOrGetter } from 'vue';
import type { BodyOf, SentBodyOf } from '@shared/contracts/defineEndpoint';
import { addJoint, createJob, getJob, listJobs, updateJob } from '@shared/contracts/jobs.contract';
import { keys } from './keys';
import { officeApi } from './officeApi';
import { useOfficeMutation, useOfficeQuery } from './useOfficeQuery';

/** What jobs are asked by at the server. */
export interface JobsWanted {
  q: string;
  state: 'open' | 'closed' | 'all';
}

/** Jobs with their joints and walks. Read again every half minute: tablets send while one looks. */
export function useJobs(wanted: MaybeRefOrGetter<JobsWanted>) {
  return useOfficeQuery({
    key: () => [...keys.jobs, 'list', toValue(wanted)],
    read: async (signal) =>
      (await officeApi.call(listJobs, { query: { ...toValue(wanted), limit: 200 } }, signal)).jobs,
    keep: true,
    refetchEvery: 30_000,
  });
}

/** One job. */
export function useJob(id: MaybeRefOrGetter<string>) {
  return useOfficeQuery({
    key: () => [...keys.jobs, 'one', toValue(id)],
    read: (signal) => officeApi.call(getJob, { params: { id: toValue(id) } }, signal),
  });
}

/** Opens a job. */
export function useCreateJob() {
  return useOfficeMutation((body: SentBodyOf<typeof createJob>) => officeApi.call(createJob, { body }), [keys.jobs]);
}

/** Changes, closes or opens a job again. */
export function useUpdateJob() {
  return useOfficeMutation(
    ({ id, body }: { id: string; body: SentBodyOf<typeof updateJob> }) =>
      officeApi.call(updateJob, { params: { id }, body }),
    [keys.jobs],
  );
}

/** Adds a joint. */
export function useAddJoint() {
  return useOfficeMutation(
    ({ id, body }: { id: string; body: BodyOf<typeof addJoint> }) => officeApi.call(addJoint, { params: { id }, body }),
    [keys.jobs],
  );
}
