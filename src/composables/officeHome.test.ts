import { describe, expect, it } from 'vitest';
import { ROLES } from '@shared/people/roles';
import { homeOf, placesFor } from './officeHome';

describe('the rail', () => {
  it('shows a technician neither countersigning nor proofs', () => {
    expect(placesFor(['technician']).map(({ name }) => name)).toEqual(['jobs', 'procedures', 'crib', 'shop']);
  });
  it('adds up roles', () => {
    expect(placesFor(['keeper', 'supervisor']).map(({ name }) => name)).toContain('countersign');
    expect(placesFor([])).toEqual([]);
  });
});

describe('home', () => {
  it('is a place that the role sees', () => {
    for (const role of ROLES) expect(placesFor([role]).map(({ name }) => name)).toContain(homeOf([role]));
  });
  it('of several roles is where somebody waits', () => {
    expect(homeOf(['admin', 'technician', 'supervisor'])).toBe('countersign');
    expect(homeOf(['admin', 'clerk'])).toBe('proofs');
  });
});
