import { describe, expect, it } from 'vitest';
import { demoProcedures, walkPlain, type WalkBook } from '../../tests/support/walker';
import { testBook } from '../../tests/support/walkBook';
import { WALK_EVENT_TYPES, type WalkEventType } from '../walk/events';
import { parseWalkEventData, walkEventSchemas } from './walkEvents';

const ID = '01900000-0000-7000-8000-0000000000b0';
const SHA = 'ab'.repeat(32);

const walked = (): WalkBook => {
  const [head] = demoProcedures;
  if (!head) throw new Error('no procedure');
  const book = testBook(head);
  walkPlain(book, { slips: [{ kind: 'value', at: { pass: 'p3', hole: 'h5' }, value: '104' }] });
  return book;
};

const dataOf = (book: WalkBook, type: WalkEventType): Record<string, unknown> => {
  const found = book.events.find((event) => event.type === type);
  if (!found) throw new Error(`no ${type}`);
  return structuredClone(found.data) as unknown as Record<string, unknown>;
};

describe('parseWalkEventData', () => {
  const book = walked();

  it('has a schema for every event name and no other', () => {
    expect(Object.keys(walkEventSchemas).sort()).toEqual([...WALK_EVENT_TYPES].sort());
  });

  it('gives back the very data it was given', () => {
    for (const { type, data } of book.events) {
      const parsed = parseWalkEventData(type, data);
      expect(parsed.ok && parsed.value).toBe(data);
    }
  });

  it('refuses an unknown member in every event and names it', () => {
    for (const { type, data } of book.events) {
      expect(parseWalkEventData(type, { ...data, more: 1 })).toEqual({
        ok: false,
        error: { code: 'badShape', path: 'more' },
      });
    }
  });

  it('misses every member that has to be there', () => {
    const optional = new Set(['shows', 'endTorque', 'received', 'moved', 'click', 'endVerdict']);
    for (const { type, data } of book.events) {
      for (const member of Object.keys(data).filter((name) => !optional.has(name))) {
        const { [member]: _gone, ...rest } = data as unknown as Record<string, unknown>;
        expect(parseWalkEventData(type, rest), `${type} without ${member}`).toMatchObject({
          error: { code: 'badShape', path: member },
        });
      }
    }
  });

  it.each<[WalkEventType, string, unknown]>([
    ['reading.taken', 'value', { value: '1O.5', unit: 'N.m' }],
    ['reading.taken', 'value', { value: '10,5', unit: 'N.m' }],
    ['reading.taken', 'value', { value: '1e3', unit: 'N.m' }],
    ['reading.taken', 'value', { value: '1'.repeat(41), unit: 'N.m' }],
    ['reading.taken', 'value', { value: '30', unit: 'Nm' }],
    ['reading.taken', 'hole', 'h1/x'],
    ['reading.taken', 'hole', ''],
    ['reading.taken', 'round', 0],
    ['reading.taken', 'pulls', 1.5],
    ['reading.taken', 'wrench', 'W-03'],
    ['reading.taken', 'verdict', 'fine'],
    ['walk.opened', 'purpose', 'repair'],
    ['walk.opened', 'rules', 2],
    ['walk.opened', 'job', ID.toUpperCase()],
    ['walk.signed', 'seal', SHA.toUpperCase()],
    ['deviation.settled', 'reason', 'x'.repeat(1001)],
    ['deviation.settled', 'reason', 'a\u0000'],
    ['deviation.settled', 'reason', '\ud800'],
    ['deviation.settled', 'deviation', '12x'],
    ['part.taken', 'count', 10_000],
  ])('refuses in %s as %s: %j', (type, member, value) => {
    const parsed = parseWalkEventData(type, { ...dataOf(book, type), [member]: value });
    expect(parsed).toMatchObject({ ok: false, error: { code: 'badShape' } });
    expect(!parsed.ok && parsed.error.path.split('.')[0]).toBe(member);
  });

  it('names a member deep inside', () => {
    const data = dataOf(book, 'wrench.taken');
    const wrench = { ...(data['wrench'] as object), range: { low: '8', high: '12O', unit: 'N.m' } };
    expect(parseWalkEventData('wrench.taken', { ...data, wrench })).toEqual({
      ok: false,
      error: { code: 'badShape', path: 'wrench.range.high' },
    });
  });

  it.each([null, undefined, 'x', [], 7])('refuses %j', (data) => {
    expect(parseWalkEventData('note.added', data)).toMatchObject({ ok: false, error: { code: 'badShape' } });
  });
});
