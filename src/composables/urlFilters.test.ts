import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { filtersFromQuery, queryFromFilters } from './urlFilters';

const defaults = { q: '', state: 'open', sort: 'urgent' };
const allowed = { state: ['open', 'closed', 'all'], sort: ['urgent', 'number'] };

describe('filters in the address', () => {
  it('take their defaults where the address says nothing', () => {
    expect(filtersFromQuery({}, defaults, allowed)).toEqual(defaults);
  });

  it('are read from the address, the first of several', () => {
    expect(filtersFromQuery({ q: 'OD6', state: ['closed', 'open'] }, defaults, allowed)).toEqual({
      q: 'OD6',
      state: 'closed',
      sort: 'urgent',
    });
  });

  it('fall back where the address holds what nobody offers', () => {
    expect(filtersFromQuery({ state: 'broken', sort: null }, defaults, allowed)).toEqual(defaults);
  });

  it('are written only where they differ, and leave the rest of the address alone', () => {
    expect(queryFromFilters({ q: 'x y', state: 'open', sort: 'number' }, defaults, { from: 'mail', q: 'old' })).toEqual(
      {
        from: 'mail',
        q: 'x y',
        sort: 'number',
      },
    );
  });

  it('come back as they were', () => {
    fc.assert(
      fc.property(fc.record({ q: fc.string(), state: fc.constantFrom('open', 'closed', 'all') }), (some) => {
        const filters = { ...defaults, ...some };
        expect(filtersFromQuery(queryFromFilters(filters, defaults), defaults, allowed)).toEqual(filters);
      }),
    );
  });
});
