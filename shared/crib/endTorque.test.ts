import { expect, it } from 'vitest';
import type { Quantity } from '../quantity/quantity';
import { predictEndTorque } from './endTorque';

const readings = (count: number): Quantity[] =>
  Array.from({ length: count }, (_, i) => ({ value: String(((i * 7) % count) + 101), unit: 'N.m' }));
const estimate: Quantity = { value: '160', unit: 'N.m' };

it('takes the 95th percentile of at least twenty readings (K2)', () => {
  expect(predictEndTorque(readings(20), estimate)).toEqual({ high: { value: '119', unit: 'N.m' }, from: 'readings' });
  expect(predictEndTorque(readings(100), null)?.high.value).toBe('195');
});

it('orders readings of different units', () => {
  const high: Quantity = { value: '100', unit: 'lbf.ft' };
  expect(predictEndTorque([...readings(18), high, high], null)?.high).toEqual(high);
});

it('falls back to the estimate, or to nothing', () => {
  expect(predictEndTorque(readings(19), estimate)).toEqual({ high: estimate, from: 'estimate' });
  expect(predictEndTorque([], null)).toBeNull();
});
