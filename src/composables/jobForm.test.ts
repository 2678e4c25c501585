import { describe, expect, it } from 'vitest';
import { createJob } from '@shared/contracts/jobs.contract';
import { emptyJob, emptyJoint, isJobDraft, jobViolations, newJobBody, vinWarning, type JobDraft } from './jobForm';

const aJob = (more: Partial<JobDraft> = {}): JobDraft => ({ ...emptyJob('km'), number: '24-0613', ...more });

describe('the job form', () => {
  it('wants a number and nothing else', () => {
    expect(jobViolations(emptyJob('km'))).toEqual({ number: { code: 'required' } });
    expect(jobViolations(aJob())).toEqual({});
  });

  it('says which letter no VIN holds, where it stands and what is meant', () => {
    // 1M8GDM9AXKP042788 (REF-VIN-02, from memory), its zero typed as a letter.
    expect(jobViolations(aJob({ vin: '1M8GDM9AXKPO42788' })).vin).toEqual({
      code: 'vin.letter',
      params: { at: 12, character: 'O', meant: '0' },
    });
  });

  it('counts a short VIN and lets an empty one pass', () => {
    expect(jobViolations(aJob({ vin: '1M8G' })).vin).toEqual({ code: 'vin.length', params: { n: 4 } });
    expect(jobViolations(aJob({ vin: '  ' }))).toEqual({});
  });

  it('warns of a check digit and does not stop there (D3)', () => {
    const job = aJob({ vin: '1M8GDM9A1KP042788' });
    expect(vinWarning(job.vin)).toEqual({ found: '1', expected: 'X' });
    expect(jobViolations(job)).toEqual({});
    expect(vinWarning('1M8GDM9AXKP042788')).toBeNull();
  });

  it('turns a decimal comma and letters down in odometer and hours', () => {
    expect(jobViolations(aJob({ odometer: '84,210', hours: '1O.5' }))).toEqual({
      odometer: { code: 'decimal' },
      hours: { code: 'decimal' },
    });
    expect(jobViolations(aJob({ odometer: ' 84210 ', hours: '10.5' }))).toEqual({});
  });

  it('passes over a joint row nobody has begun, and asks for the procedure of one that was', () => {
    const joints = [emptyJoint(), { ...emptyJoint(), bank: 'left' }];
    expect(jobViolations(aJob({ joints }))).toEqual({ 'joints.1.procedure': { code: 'required' } });
    expect(newJobBody(aJob({ joints: [emptyJoint()] })).joints).toEqual([]);
  });

  it('sends what the contract takes', () => {
    const joints = [{ ...emptyJoint(), procedure: 'HEAD-D6', bank: 'left' }];
    const body = createJob.body.parse(newJobBody(aJob({ vin: '1m8gdm9a-xkp042788', odometer: '84210', joints })));
    expect(body).toMatchObject({
      number: '24-0613',
      vin: '1M8GDM9AXKP042788',
      odometer: { value: '84210', unit: 'km' },
      hours: null,
      joints: [{ procedure: 'HEAD-D6', purpose: 'finalAssembly', bank: 'left', castingNumber: '' }],
    });
  });

  it('knows a draft of its own shape', () => {
    expect(isJobDraft(aJob())).toBe(true);
    expect(isJobDraft({ number: '1' })).toBe(false);
    expect(isJobDraft({ ...aJob(), hours: 4 })).toBe(false);
  });
});
