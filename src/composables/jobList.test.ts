import { describe, expect, it } from 'vitest';
import type { JobWhole } from '@shared/contracts/jobs.contract';
import { countStandings, jobLine, sortJobs } from './jobList';

type State = JobWhole['walks'][number]['state'];

const aJob = (number: string, states: (State | null)[], more: Partial<JobWhole> = {}): JobWhole => ({
  id: number,
  number,
  customer: 'C',
  engineFamily: '',
  engineModel: '',
  engineSerial: '',
  vin: '',
  claim: '',
  odometer: null,
  hours: null,
  state: 'open',
  createdAt: '2026-05-01T08:00:00Z',
  changedAt: '2026-05-01T08:00:00Z',
  joints: states.map((_state, i) => ({
    id: `${number}/${i}`,
    job: number,
    procedure: `P${i}`,
    purpose: 'finalAssembly' as const,
    bank: '',
    castingNumber: '',
    retired: false,
  })),
  walks: states.flatMap((state, i) =>
    state === null
      ? []
      : [
          {
            id: `w${number}/${i}`,
            job: number,
            joint: `${number}/${i}`,
            purpose: 'finalAssembly' as const,
            procedure: { code: `P${i}`, revision: 1, hash: '0'.repeat(64) },
            state,
            writer: 'office',
            branch: 0,
            next: 1,
            head: '0'.repeat(64),
            pulls: 'a',
            records: 'a',
            openedAt: '2026-05-01T08:00:00Z',
            changedAt: '2026-05-02T08:00:00Z',
            readingsDone: 0,
            readingsDue: 4,
            openDeviations: 0,
            forked: false,
            parallel: [],
            quarantined: 0,
            refusedSeals: 0,
            missingBlobs: 0,
          },
        ],
  ),
  ...more,
});
const numbers = (jobs: JobWhole[], sort: string, standing = 'any') =>
  sortJobs(jobs.map(jobLine), sort, standing).map(({ job }) => job.number);

describe('the job list', () => {
  it('puts the most urgent joint of each job first, and the jobs by it', () => {
    const jobs = [
      aJob('1', ['finished']),
      aJob('2', [null, 'walking']),
      aJob('3', ['finished', 'sentBack']),
      aJob('4', []),
    ];
    expect(numbers(jobs, 'urgent')).toEqual(['3', '2', '4', '1']);
    expect(jobLine(jobs[2] as JobWhole).joints.map(({ procedure }) => procedure)).toEqual(['P1', 'P0']);
  });

  it('may run only when there is a joint and all are finished', () => {
    expect(jobLine(aJob('1', [])).doNotRun).toBe(true);
    expect(jobLine(aJob('1', ['finished', null])).doNotRun).toBe(true);
    expect(jobLine(aJob('1', ['finished', 'finished'])).doNotRun).toBe(false);
  });

  it('sorts numbers as people count, both ways', () => {
    const jobs = [aJob('24-10', []), aJob('24-9', [])];
    expect(numbers(jobs, 'number')).toEqual(['24-9', '24-10']);
    expect(numbers(jobs, '-number')).toEqual(['24-10', '24-9']);
  });

  it('shows the jobs that have a joint of the standing asked for', () => {
    const jobs = [aJob('1', ['finished', 'signed']), aJob('2', ['walking'])];
    expect(numbers(jobs, 'urgent', 'signed')).toEqual(['1']);
    expect(countStandings(jobs.map(jobLine))).toEqual({ finished: 1, signed: 1, walking: 1 });
  });

  it('leaves retired joints out', () => {
    const job = aJob('1', ['walking']);
    expect(jobLine({ ...job, joints: job.joints.map((joint) => ({ ...joint, retired: true })) }).joints).toEqual([]);
  });
});
