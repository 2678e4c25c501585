import { describe, expect, it } from 'vitest';
import { conformanceProbability } from '@shared/judge/conformance';
import { guardBand, judge } from '@shared/judge/verdict';
import { normalCdf } from '@shared/statistics/normalCdf';
import { provenance, workedExample } from './reference';

interface Decision {
  TL: number;
  TU: number;
  y: number;
  u: number;
}
const decisions = ['01', '10', '11', '12', '13', '14', '15', '16'].map((number) =>
  workedExample<Decision, { pc: number; pc_printed?: number }>(`REF-DEC-${number}`),
);

describe('conformance probability (J4)', () => {
  it.each(decisions.map((row) => [provenance(row), row] as const))('%s', (_source, { id, inputs, expected }) => {
    const { TL: low, TU: high, y: value, u: uncertainty } = inputs;
    const probability = conformanceProbability({ value, low, high, uncertainty }) ?? Number.NaN;
    expect(Math.abs(probability - expected.pc)).toBeLessThan(id === 'REF-DEC-01' ? 5e-5 : 1e-6);
    if (expected.pc_printed !== undefined) expect(Number(probability.toFixed(2))).toBe(expected.pc_printed);
  });
});

describe('guard bands (J5)', () => {
  const guarded = workedExample<{ TL: number; TU: number; U: number }, { AL: number; AU: number; worst_risk: number }>(
    'REF-DEC-20',
  );

  it(provenance(guarded), () => {
    // Accepted at the edge of the acceptance interval, a value is outside with this risk.
    expect(1 - normalCdf(2)).toBeCloseTo(guarded.expected.worst_risk, 7);
  });

  const oneSided = workedExample<{ z: number }, { worst_risk: number }>('REF-DEC-21');

  it(`${provenance(oneSided)}; ours is 1.65 u, on the safe side of it`, () => {
    expect(1 - normalCdf(oneSided.inputs.z)).toBeCloseTo(oneSided.expected.worst_risk, 7);
    const ours = guardBand(1);
    expect(ours).toBeGreaterThanOrEqual(oneSided.inputs.z);
    expect(1 - normalCdf(ours)).toBeLessThan(0.05);
  });

  const simple = workedExample<{ TL: number; TU: number }, { false_accept_risk_max: number }>('REF-DEC-22');

  it(provenance(simple), () => {
    const { TL, TU } = simple.inputs;
    const window = { target: '80', low: String(TL), high: String(TU), unit: 'N.m' } as const;
    const value = { value: String(TU), unit: 'N.m' } as const;
    expect(judge({ value, window, policy: 'simple', uncertainty: 0.8 })).toBe('in');
    const probability = conformanceProbability({ value: TU, low: TL, high: TU, uncertainty: 0.8 }) ?? Number.NaN;
    expect(1 - probability).toBeCloseTo(simple.expected.false_accept_risk_max, 6);
  });
});

/** Φ by mpmath (ncdf with 30 digits, cut to what a double holds), a general-purpose library; status: derived. */
const PHI: [number, number][] = [
  [-8, 6.220960574271784e-16],
  [-5, 2.866515718791939e-7],
  [-3, 0.0013498980316300946],
  [-2.5, 0.006209665325776135],
  [-1.96, 0.024997895148220435],
  [-1, 0.15865525393145705],
  [-0.5, 0.3085375387259869],
  [0.1, 0.539827837277029],
  [1, 0.8413447460685429],
  [1.64, 0.9494974165258963],
  [2, 0.9772498680518208],
  [3.5355339059327378, 0.9997965239912775],
  [6, 0.9999999990134123],
];

it.each(PHI)('Φ(%f) by mpmath (derived) to 1e-12, and its lower tail to 1e-12 of itself', (z, expected) => {
  expect(Math.abs(normalCdf(z) - expected)).toBeLessThan(z < 0 ? 1e-12 * expected : 1e-12);
});
