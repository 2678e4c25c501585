import type { JobWhole } from '@shared/contracts/jobs.contract';
import { jointStanding, urgencyOf, type JointStanding, type JointStandingName } from './jointStanding';

/** A job of the list: its joints with their standings, the most urgent first. */
export interface JobLine {
  job: JobWhole;
  joints: { id: string; procedure: string; bank: string; standing: JointStanding }[];
  /** May run: there is a joint, and all are finished. */
  doNotRun: boolean;
}

/** What a job list is sorted by; with a minus the other way round. */
export const JOB_SORTS = ['urgent', 'number', '-number', 'customer', '-customer', 'changed', '-changed'] as const;

/** A job with the standings of its joints; retired joints are left out. */
export function jobLine(job: JobWhole): JobLine {
  const joints = job.joints
    .filter(({ retired }) => !retired)
    .map((joint) => {
      const { id, procedure, bank } = joint;
      return { id, procedure, bank, standing: jointStanding(joint, job.walks) };
    })
    .sort((a, b) => urgencyOf(a.standing.name) - urgencyOf(b.standing.name));
  return { job, joints, doNotRun: joints.length === 0 || joints.some(({ standing }) => standing.doNotRun) };
}

const urgency = ({ joints }: JobLine): number => {
  const [first] = joints;
  // A job without a joint is only a number yet: after everything that somebody has begun.
  return first ? urgencyOf(first.standing.name) : urgencyOf('neverOpened') + 0.5;
};
const changedAt = ({ job }: JobLine): string =>
  job.walks.reduce((last, { changedAt: at }) => (at > last ? at : last), job.changedAt);
const byText = (a: string, b: string): number => a.localeCompare(b, undefined, { numeric: true });

const ORDERS: Readonly<Record<string, (a: JobLine, b: JobLine) => number>> = {
  urgent: (a, b) => urgency(a) - urgency(b) || (changedAt(a) < changedAt(b) ? 1 : -1),
  number: (a, b) => byText(a.job.number, b.job.number),
  customer: (a, b) => byText(a.job.customer, b.job.customer) || byText(a.job.number, b.job.number),
  changed: (a, b) => (changedAt(a) < changedAt(b) ? -1 : changedAt(a) > changedAt(b) ? 1 : 0),
};

/** The lines in the order that was asked for, those that have a joint of this standing, if one is asked for. */
export function sortJobs(lines: readonly JobLine[], sort: string, standing: string): JobLine[] {
  const order = ORDERS[sort.replace('-', '')] ?? ORDERS.urgent;
  const shown = lines.filter(
    ({ joints }) => standing === 'any' || joints.some((joint) => joint.standing.name === standing),
  );
  const sorted = order ? [...shown].sort(order) : shown;
  return sort.startsWith('-') ? sorted.reverse() : sorted;
}

/** How many joints stand where, for the line under the heading. */
export function countStandings(lines: readonly JobLine[]): Partial<Record<JointStandingName, number>> {
  const counts: Partial<Record<JointStandingName, number>> = {};
  for (const { joints } of lines)
    for (const { standing } of joints) counts[standing.name] = (counts[standing.name] ?? 0) + 1;
  return counts;
}

/** When anything of the job last changed. */
export const jobChangedAt = changedAt;
