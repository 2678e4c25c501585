import type { SentBodyOf } from '@shared/contracts/defineEndpoint';
import { jobFields, jointFields, type JobRow } from '@shared/contracts/jobRow.contract';
import type { createJob } from '@shared/contracts/jobs.contract';
import { checkVin, type VinProblem } from '@shared/vehicle/vin';
import type { Violation, Violations } from './useForm';
import { zodViolations } from './zodViolations';

/** A joint as it stands in the form. */
export interface JointDraft {
  procedure: string | null;
  purpose: 'finalAssembly' | 'trialFit' | 'torquePlate' | 'stripDown' | 'recheck';
  bank: string;
  castingNumber: string;
}

/** A job as it stands in the form: every field the text that was typed. */
export interface JobDraft {
  number: string;
  customer: string;
  engineFamily: string;
  engineModel: string;
  engineSerial: string;
  vin: string;
  claim: string;
  odometer: string;
  distance: 'km' | 'mi';
  hours: string;
  joints: JointDraft[];
}

/** A joint nobody has filled in. */
export const emptyJoint = (): JointDraft => ({
  procedure: null,
  purpose: 'finalAssembly',
  bank: '',
  castingNumber: '',
});

/** A new job, with the unit of distance the shop uses and room for its first joint. */
export const emptyJob = (distance: 'km' | 'mi'): JobDraft => ({
  number: '',
  customer: '',
  engineFamily: '',
  engineModel: '',
  engineSerial: '',
  vin: '',
  claim: '',
  odometer: '',
  distance,
  hours: '',
  joints: [emptyJoint()],
});

/** A stored job in the form, for changing its fields; joints are added one by one elsewhere. */
export const draftOfJob = (job: JobRow, distance: 'km' | 'mi'): JobDraft => ({
  number: job.number,
  customer: job.customer,
  engineFamily: job.engineFamily,
  engineModel: job.engineModel,
  engineSerial: job.engineSerial,
  vin: job.vin,
  claim: job.claim,
  odometer: job.odometer?.value ?? '',
  distance: job.odometer?.unit ?? distance,
  hours: job.hours ?? '',
  joints: [],
});

const isText = (value: unknown): boolean => typeof value === 'string';

/** Whether something kept in the browser is a job of this form's shape. */
export const isJobDraft = (values: object): values is JobDraft => {
  const some = values as Partial<JobDraft>;
  const texts = Object.keys(emptyJob('km')).filter((name) => name !== 'joints');
  return Array.isArray(some.joints) && texts.every((name) => isText((values as Record<string, unknown>)[name]));
};

/** A joint with nothing in it is no joint yet: the row is only offered. */
const isBegun = (joint: JointDraft): boolean =>
  joint.procedure !== null || joint.bank.trim() !== '' || joint.castingNumber.trim() !== '';

/** The fields of a job as they are sent. */
export function jobBody(draft: JobDraft): Omit<SentBodyOf<typeof createJob>, 'joints'> {
  const { joints: _joints, odometer, distance, hours, vin, ...texts } = draft;
  const read = odometer.trim();
  return {
    ...texts,
    vin: checkVin(vin).vin,
    odometer: read === '' ? null : { value: read, unit: distance },
    hours: hours.trim() === '' ? null : hours.trim(),
  };
}

/** A new job as it is sent, its joints too. */
export function newJobBody(draft: JobDraft): SentBodyOf<typeof createJob> {
  const joints = draft.joints.filter(isBegun).map((joint) => ({ ...joint, procedure: joint.procedure ?? '' }));
  return { ...jobBody(draft), joints };
}

/** Letters I, O and Q are wrong at once; that characters are missing only when the field is left. */
function vinViolation(problems: VinProblem[]): Violation | null {
  const letters = problems.filter((problem) => problem.code === 'letterIOQ');
  const [letter] = letters;
  if (letter)
    return { code: 'vin.letter', params: { at: letter.at, character: letter.character, meant: letter.meant } };
  for (const problem of problems) {
    if (problem.code === 'character')
      return { code: 'vin.character', params: { at: problem.at, character: problem.character } };
    if (problem.code === 'length') return { code: 'vin.length', params: { n: problem.length } };
  }
  return null;
}

/** What is wrong with the VIN, or null; an empty one is none and fine. */
export const vinWrong = (text: string): Violation | null =>
  text.trim() === '' ? null : vinViolation(checkVin(text).problems);

/** The check digit that does not fit: a warning, never a stop (D3). */
export function vinWarning(text: string): { found: string; expected: string } | null {
  const problem = checkVin(text).problems.find(({ code }) => code === 'checkDigit');
  return problem?.code === 'checkDigit' ? { found: problem.found, expected: problem.expected } : null;
}

function jointViolations(joints: JointDraft[]): Violations {
  const found: Violations = {};
  joints.forEach((joint, index) => {
    if (!isBegun(joint)) return;
    if (joint.procedure === null) found[`joints.${index}.procedure`] = { code: 'required' };
    const more = zodViolations(jointFields.omit({ procedure: true }), joint);
    for (const [field, violation] of Object.entries(more)) found[`joints.${index}.${field}`] = violation;
  });
  return found;
}

/** Everything that is wrong with a job, by field. */
export function jobViolations(draft: JobDraft): Violations {
  const { 'odometer.value': odometer, vin: _vin, hours, ...fields } = zodViolations(jobFields, jobBody(draft));
  const vin = vinWrong(draft.vin);
  return {
    ...fields,
    ...(vin ? { vin } : {}),
    ...(odometer ? { odometer: { code: 'decimal' } } : {}),
    ...(hours ? { hours: { code: 'decimal' } } : {}),
    ...jointViolations(draft.joints),
  };
}
