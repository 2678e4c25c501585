import { describe, expect, it } from 'vitest';
import { phrase, say, sayRich, type Speaker } from './phrase';
import { formatClock, formatDay, formatSpan, formatTime } from './proofTime';
import { en } from './words/en';
import { es } from './words/es';

const speaker = (language: 'en' | 'es' = 'en', timeZone = 'Europe/Berlin'): Speaker => ({
  language,
  timeZone,
  nameOf: (person) => `name of ${person}`,
});
const placeholders = (text: string): string[] => [...new Set(text.match(/\{\w+\}/g))].sort();

describe('words', () => {
  it('fill the same places in both languages, and are strong in both', () => {
    for (const [key, text] of Object.entries(en)) {
      const spanish = es[key as keyof typeof en];
      expect(placeholders(spanish), key).toEqual(placeholders(text));
      expect(spanish.split('|').length, key).toBe(text.split('|').length);
      expect(spanish.split('**').length, key).toBe(text.split('**').length);
    }
  });

  it('choose the form by the number', () => {
    const passes = (n: number, language: 'en' | 'es') => say(phrase('claim.passes', { n }), speaker(language));
    expect([passes(1, 'en'), passes(4, 'en'), passes(1, 'es'), passes(4, 'es')]).toEqual([
      '1 pass',
      '4 passes',
      '1 pasada',
      '4 pasadas',
    ]);
  });

  it('never take what somebody typed for markup or for a place to fill', () => {
    const said = sayRich(phrase('found.other', { note: '**{person}** | x' }), speaker());
    expect(said).toEqual([{ text: 'reported: “**{person}** | x”', strong: false }]);
  });

  it('join lists and keep a figure with its unit', () => {
    const item = (value: string) => ({ quantity: { value, unit: 'N.m' as const } });
    const said = phrase('step.value', {
      step: 'Depth',
      values: { list: [item('1'), item('2'), item('3')], join: 'and' },
    });
    expect(say(said, speaker())).toBe('Depth: 1\u00a0N·m, 2\u00a0N·m and 3\u00a0N·m');
    expect(say(said, speaker('es'))).toBe('Depth: 1\u00a0N·m, 2\u00a0N·m y 3\u00a0N·m');
  });
});

describe('times in the shop’s zone', () => {
  it('follow summer time and the language', () => {
    expect(formatTime('2026-06-14T07:12:00.000Z', speaker())).toBe('14 Jun 2026, 09:12');
    expect(formatTime('2026-01-14T07:12:00.000Z', speaker('es'))).toBe('14 ene 2026, 08:12');
    expect(formatClock('2026-06-13T22:30:00Z', speaker())).toBe('00:30');
  });

  it('write the day once where it stays the same', () => {
    expect(formatSpan('2026-06-13T11:40:00Z', '2026-06-13T12:26:00Z', speaker())).toBe('13 Jun 2026, 13:40 – 14:26');
    expect(formatSpan('2026-06-13T21:40:00Z', '2026-06-13T22:26:00Z', speaker())).toBe(
      '13 Jun 2026, 23:40 – 14 Jun 2026, 00:26',
    );
  });

  it('keep a calendar day as it is, and say UTC where the zone is unknown', () => {
    expect(formatDay('2026-03-03', speaker('en', 'Pacific/Kiritimati'))).toBe('3 Mar 2026');
    expect(formatTime('2026-06-14T07:12:00Z', speaker('en', 'Nowhere/Else'))).toBe('14 Jun 2026, 07:12 UTC');
    expect(formatTime('yesterday', speaker())).toBe('yesterday');
  });
});
