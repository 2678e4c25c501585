import { describe, expect, it } from 'vitest';
import { settingsFrom } from './useStandSettings';

const fresh = { theme: 'system', hand: 'right', torqueUnit: 'asWritten', locale: 'en' };

describe('settingsFrom', () => {
  it('begins with the language of the browser', () => {
    expect(settingsFrom(null, 'es-MX')).toEqual({ ...fresh, locale: 'es' });
    expect(settingsFrom(null, 'fr')).toEqual(fresh);
  });
  it('keeps what is known and drops what is not', () => {
    const kept = JSON.stringify({ theme: 'dim', hand: 'both', torqueUnit: 'lbf.ft', locale: 'es', more: 1 });
    expect(settingsFrom(kept, 'en')).toEqual({ theme: 'dim', hand: 'right', torqueUnit: 'lbf.ft', locale: 'es' });
  });
  it.each(['{"theme":', '7', 'null', '[]'])('starts afresh from %s', (text) => {
    expect(settingsFrom(text, 'en')).toEqual(fresh);
  });
});
