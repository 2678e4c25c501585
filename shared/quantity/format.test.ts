import { expect, it } from 'vitest';
import { formatQuantity, formatWindow } from './format';

it('shows figures as they were given, with the unit by its sign', () => {
  expect(formatQuantity({ value: '30.0', unit: 'N.m' }, 'en')).toBe('30.0 N·m');
  expect(formatQuantity({ value: '90', unit: 'deg' }, 'es')).toBe('90°');
  expect(formatQuantity({ value: '-6', unit: 'deg' }, 'en')).toBe('−6°');
  expect(formatWindow({ low: '85', high: '95', unit: 'deg' }, 'en')).toBe('85 – 95°');
  expect(formatWindow({ low: '20.7', high: '23.6', unit: 'lbf.ft' }, 'es')).toBe('20.7 – 23.6 lbf·ft');
});
