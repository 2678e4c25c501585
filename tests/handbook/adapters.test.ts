import { describe, expect, it } from 'vitest';
import { adapterRatio, torqueAtFastener, torqueAtWrench } from '@shared/crib/adapter';
import type { TorqueUnit } from '@shared/quantity/unit';
import { provenance, workedExample } from './reference';

interface Inputs {
  T_applied: number;
  unit: TorqueUnit;
  L: number;
  A: number;
  angle_deg: number;
}
type Expected = Partial<Record<'T_set' | 'T_set_exact' | 'T_set_printed', number>>;

const examples = ['01', '03', '05', '06', '07', '09'].map((number) =>
  workedExample<Inputs, Expected>(`REF-ADP-${number}`),
);

describe('T·L/(L + E·cos θ) (K1)', () => {
  it.each(examples.map((row) => [provenance(row), row] as const))('%s', (_source, { inputs, expected }) => {
    const ratio = adapterRatio({
      length: { value: String(inputs.L), unit: 'in' },
      extension: { value: String(inputs.A), unit: 'in' },
      angleDeg: inputs.angle_deg,
    });
    const applied = { value: String(inputs.T_applied), unit: inputs.unit };
    const set = torqueAtWrench(applied, ratio, 4);
    expect(Math.abs(Number(set.value) - (expected.T_set ?? expected.T_set_exact ?? Number.NaN))).toBeLessThan(1e-3);
    if (expected.T_set_printed !== undefined) {
      expect(torqueAtWrench(applied, ratio, 0).value).toBe(String(expected.T_set_printed));
    }
    expect(Number(torqueAtFastener(set, ratio, 2).value)).toBe(inputs.T_applied);
  });
});
