import { describe, expect, it } from 'vitest';
import { checkVin, vinBlocks } from '@shared/vehicle/vin';
import { vinCheckDigit } from '@shared/vehicle/vinCheckDigit';
import { provenance, referenceFile, type ReferenceRow } from './reference';

interface VinFile {
  transliteration: Record<string, number>;
  weights: number[];
  not_allowed: string[];
  source: string;
  status: 'read' | 'memory';
  examples: (ReferenceRow & { vin: string; check: string; valid: boolean })[];
}
const file = referenceFile<VinFile>('vin');

describe('VIN check digit (D3)', () => {
  it.each(file.examples.map((row) => [provenance(row), row] as const))('%s', (_source, row) => {
    expect(vinCheckDigit(row.vin)).toBe(row.check);
    expect(checkVin(row.vin).problems.some((problem) => problem.code === 'checkDigit')).toBe(!row.valid);
    expect(checkVin(row.vin).problems.some(vinBlocks)).toBe(false);
  });

  it(`weights and letter values, one by one (${file.status}): ${file.source}`, () => {
    file.weights.forEach((weight, position) => {
      for (const [character, value] of Object.entries(file.transliteration)) {
        const vin = '0'.repeat(position) + character + '0'.repeat(16 - position);
        const rest = (weight * value) % 11;
        expect(vinCheckDigit(vin)).toBe(rest === 10 ? 'X' : String(rest));
      }
    });
  });

  it('REF-VIN-12 (read): I, O and Q never appear, linkfang.org/wiki/Vehicle_identification_number', () => {
    for (const letter of file.not_allowed) {
      expect(vinCheckDigit(letter.repeat(17))).toBeNull();
      expect(checkVin(letter.repeat(17)).problems.filter((problem) => problem.code === 'letterIOQ')).toHaveLength(17);
    }
  });
});
