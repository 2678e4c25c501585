import { describe, expect, it } from 'vitest';
import { siblingLimit } from '@shared/judge/siblingLimits';
import { modifiedZ } from '@shared/statistics/modifiedZ';
import { mad, mean, median, stddev } from '@shared/statistics/spread';
import { largestOfHealthy } from '../drill/healthyGroups';
import { provenance, workedExample } from './reference';

const dry = workedExample<{ data_kN: number[] }, { mean: number; sd: number }>('REF-TT-07');
const lubricated = workedExample<{ data_kN: number[] }, { mean: number; sd: number }>('REF-TT-08');
const nist = workedExample<{ data: number[] }, object>('REF-STAT-01');
const nistZ = workedExample<object, { median: number; MAD: number; M_of_245_57: number }>('REF-STAT-02');
const lubricatedZ = workedExample<object, { median: number; MAD: number; M_of_40_5: number }>('REF-STAT-03');

describe('mean and deviation', () => {
  it.each([dry, lubricated].map((row) => [provenance(row), row] as const))('%s', (_source, { inputs, expected }) => {
    expect(mean(inputs.data_kN)).toBeCloseTo(expected.mean, 9);
    expect(stddev(inputs.data_kN)).toBeCloseTo(expected.sd, 3);
  });
});

describe('modified z-score (J6)', () => {
  it(`${provenance(nistZ)}; data: ${provenance(nist)}`, () => {
    expect(median(nist.inputs.data)).toBeCloseTo(nistZ.expected.median, 9);
    expect(mad(nist.inputs.data)).toBeCloseTo(nistZ.expected.MAD, 9);
    expect(modifiedZ(nist.inputs.data)?.at(-1)).toBeCloseTo(nistZ.expected.M_of_245_57, 2);
  });

  it(`${provenance(lubricatedZ)}; data: ${provenance(lubricated)}`, () => {
    expect(median(lubricated.inputs.data_kN)).toBeCloseTo(lubricatedZ.expected.median, 9);
    expect(mad(lubricated.inputs.data_kN)).toBeCloseTo(lubricatedZ.expected.MAD, 9);
    expect(modifiedZ(lubricated.inputs.data_kN)?.at(-1)).toBeCloseTo(lubricatedZ.expected.M_of_40_5, 4);
  });
});

describe('sibling limits (J6)', () => {
  /** "About 8.0 at n = 8, 6.9 at 10, 5.8 at 14, 5.2 at 20, 4.4 at 64" (specification, J6; status: read there). */
  it.each([
    [8, 8.0],
    [10, 6.9],
    [14, 5.8],
    [20, 5.2],
    [64, 4.4],
  ])('for %i about %f, by the specification', (size, about) => {
    expect(Math.abs((siblingLimit(size) ?? Number.NaN) - about)).toBeLessThan(0.15);
  });

  it.each([8, 14, 33])('flags about 1 %% of healthy groups of %i (seeded, other seed than the table)', (size) => {
    const largest = largestOfHealthy(size, 20_000, 77);
    const limit = siblingLimit(size) ?? Number.NaN;
    const share = largest.filter((value) => value > limit).length / largest.length;
    expect(share).toBeGreaterThan(0.0075);
    expect(share).toBeLessThan(0.0125);
  });

  it('the plain limit of 3.5 would flag about every ninth healthy group (specification, J6)', () => {
    const largest = largestOfHealthy(14, 20_000, 78);
    const share = largest.filter((value) => value > 3.5).length / largest.length;
    expect(share).toBeGreaterThan(1 / 12);
    expect(share).toBeLessThan(1 / 7);
  });
});
