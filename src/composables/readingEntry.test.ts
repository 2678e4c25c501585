import { describe, expect, it } from 'vitest';
import { judge } from '@shared/judge/verdict';
import { burstBefore } from './keyBurst';
import {
  emptyEntry,
  isComplete,
  readingEntry,
  shownVerdict,
  type EntryContext,
  type EntryEffect,
  type EntryEvent,
  type EntryState,
} from './readingEntry';

const window = { target: '90', low: '85', high: '95', unit: 'deg' } as const;
const turn: EntryContext = {
  fields: [{ id: 'value', need: 'required', highDigits: 2 }],
  verdict: (_field, value) => judge({ value: { value, unit: 'deg' }, window, policy: 'simple' }),
};
const whole: EntryContext = {
  fields: [
    { id: 'value', need: 'required', highDigits: 2 },
    { id: 'endTorque', need: 'wanted', highDigits: null },
    { id: 'pulls', need: 'required', highDigits: null },
  ],
  verdict: (field, value) => (field === 'value' ? turn.verdict(field, value) : null),
};

interface Run {
  state: EntryState;
  effects: EntryEffect[];
  at: number;
}

const start = (context: EntryContext): Run => ({ state: emptyEntry(context.fields), effects: [], at: 1000 });

function send(run: Run, context: EntryContext, event: EntryEvent): Run {
  const step = readingEntry(run.state, event, context);
  return { ...run, state: step.state, effects: step.effect ? [...run.effects, step.effect] : run.effects };
}

/** Types `text`, then Enter for every `⏎`, with `gap` ms between the keys. */
function type(run: Run, context: EntryContext, text: string, gap: number): Run {
  let next = run;
  for (const key of text) {
    next = { ...next, at: next.at + gap };
    const event: EntryEvent = key === '⏎' ? { type: 'enter', at: next.at } : { type: 'key', key, at: next.at };
    next = send(next, context, event);
  }
  return next;
}
const byHand = (run: Run, context: EntryContext, text: string) => type(run, context, text, 120);
const byWrench = (run: Run, context: EntryContext, text: string) =>
  type({ ...run, at: run.at + 900 }, context, text, 8);

describe('burstBefore', () => {
  const keys = (text: string, gap: number, from = 0) => Array.from(text, (key, i) => ({ key, at: from + i * gap }));

  it('knows a device by its speed', () => {
    expect(burstBefore(keys('91.5', 8), 32)).toBe('91.5');
    expect(burstBefore(keys('91.5', 90), 360)).toBeNull();
    expect(burstBefore([], 10)).toBeNull();
  });
  it('never takes taps for a burst', () => {
    expect(
      burstBefore(
        keys('91', 5).map((key) => ({ ...key, tap: true })),
        12,
      ),
    ).toBeNull();
  });
  it('takes two quick fingers at the end of a figure for a person', () => {
    expect(
      burstBefore(
        [
          { key: '9', at: 0 },
          { key: '1', at: 140 },
        ],
        165,
      ),
    ).toBeNull();
    expect(burstBefore([{ key: '9', at: 0 }], 30)).toBeNull();
  });
  it('lets a burst stand alone where figures were typed long before it', () => {
    expect(burstBefore([...keys('9', 1, 0), ...keys('88', 8, 2000)], 2016)).toBe('88');
  });
});

describe('typing a figure', () => {
  it('judges with as many whole digits as the upper limit, and not before', () => {
    const nine = byHand(start(turn), turn, '9');
    expect(shownVerdict(nine.state, turn, 'value')).toBeNull();
    expect(shownVerdict(byHand(nine, turn, '1').state, turn, 'value')).toBe('in');
    expect(shownVerdict(byHand(start(turn), turn, '104').state, turn, 'value')).toBe('over');
  });
  it('does not count leading zeros as digits', () => {
    expect(shownVerdict(byHand(start(turn), turn, '09').state, turn, 'value')).toBeNull();
  });
  it('judges a short figure after a rest', () => {
    const rested = send(byHand(start(turn), turn, '9'), turn, { type: 'rest' });
    expect(shownVerdict(rested.state, turn, 'value')).toBe('under');
  });
  it('records in the window with one Enter', () => {
    expect(byHand(start(turn), turn, '91⏎').effects).toEqual([{ kind: 'record' }]);
  });
  it('shows what is off before Enter can record it', () => {
    const shown = byHand(start(turn), turn, '9⏎');
    expect(shown.effects).toEqual([]);
    expect(shownVerdict(shown.state, turn, 'value')).toBe('under');
    expect(byHand(shown, turn, '⏎').effects).toEqual([{ kind: 'record' }]);
  });
  it('does nothing on Enter while empty', () => {
    expect(byHand(start(turn), turn, '⏎⏎').effects).toEqual([]);
  });
  it.each(['1O.5', '10,5', '9..1', 'paragraph of'])('does not record %s', (text) => {
    const run = byHand(start(turn), turn, `${text}⏎⏎`);
    expect(run.effects).toEqual([]);
    expect(isComplete(run.state, turn)).toBe(false);
    expect(run.state.texts.value).toBe(text);
  });
  it('stops at the longest text and refuses it', () => {
    const run = type(start(turn), turn, '9'.repeat(60), 1);
    expect(run.state.texts.value).toHaveLength(13);
    expect(isComplete(run.state, turn)).toBe(false);
    expect(type(run, turn, '⏎', 1).effects).toEqual([]);
  });
});

describe('changing a figure (W5)', () => {
  it('keeps both values where a digit was deleted after an out-of-window verdict', () => {
    const over = byHand(start(turn), turn, '104');
    const back = send(over, turn, { type: 'delete' });
    expect(back.state).toMatchObject({ changedFrom: '104', texts: { value: '10' } });
    const again = byHand(send(send(back, turn, { type: 'delete' }), turn, { type: 'delete' }), turn, '94');
    expect(again.state).toMatchObject({ changedFrom: '104', texts: { value: '94' } });
  });
  it('keeps nothing where the figure was in, not judged yet, or only added to', () => {
    expect(send(byHand(start(turn), turn, '91'), turn, { type: 'delete' }).state.changedFrom).toBeNull();
    expect(send(byHand(start(turn), turn, '1'), turn, { type: 'delete' }).state.changedFrom).toBeNull();
    expect(byHand(start(turn), turn, '104').state.changedFrom).toBeNull();
  });
});

describe('a wrench acting as keyboard', () => {
  it('only shows the value: its Enter records nothing', () => {
    const run = byWrench(start(turn), turn, '91⏎');
    expect(run.effects).toEqual([{ kind: 'keyed', text: '91' }]);
    expect(run.state).toMatchObject({ source: 'keyed', texts: { value: '91' }, changedFrom: null });
  });
  it('may end in two Enters', () => {
    expect(byWrench(start(turn), turn, '91⏎⏎').effects).toEqual([{ kind: 'keyed', text: '91' }]);
  });
  it('is recorded by a second key or a tap, after the lock', () => {
    const sent = byWrench(start(turn), turn, '91⏎');
    expect(send(sent, turn, { type: 'enter', at: sent.at + 650 }).effects).toHaveLength(1);
    expect(send(sent, turn, { type: 'enter', at: sent.at + 750 }).effects.at(-1)).toEqual({ kind: 'record' });
    expect(send(sent, turn, { type: 'record' }).effects.at(-1)).toEqual({ kind: 'record' });
  });
  it('replaces figures that were typed long before', () => {
    const run = byWrench(byHand(start(turn), turn, '8'), turn, '91⏎');
    expect(run.state.texts.value).toBe('91');
  });
  it('is told from a second burst, and neither is lost', () => {
    const twice = byWrench(byWrench(start(turn), turn, '91⏎'), turn, '93⏎');
    expect(twice.effects.at(-1)).toEqual({ kind: 'another', text: '93' });
    expect(twice.state.texts.value).toBe('91');
  });
  it('is not overwritten by hand: turned down first (R10)', () => {
    const sent = byWrench(start(turn), turn, '91⏎');
    const typed = byHand({ ...sent, at: sent.at + 1000 }, turn, '85⏎');
    expect(typed.effects.at(-1)).toEqual({ kind: 'receivedFirst' });
    expect(typed.state.texts.value).toBe('91');
    expect(send(sent, turn, { type: 'delete' }).effects.at(-1)).toEqual({ kind: 'reject' });
  });
  it('comes back after a restart from what the chain holds', () => {
    const run = send(start(turn), turn, { type: 'received', value: '91', at: 0 });
    expect(run.state).toMatchObject({ source: 'keyed', texts: { value: '91' } });
    expect(run.effects).toEqual([]);
  });
  it('records by itself only where that is on, and only in the window', () => {
    const itself = { ...turn, recordsItself: true };
    expect(send(start(turn), itself, { type: 'received', value: '91', at: 0 }).effects).toEqual([{ kind: 'record' }]);
    expect(send(start(turn), itself, { type: 'received', value: '104', at: 0 }).effects).toEqual([]);
  });
  it('does not record what a burst garbled', () => {
    expect(byWrench(start(turn), turn, '9I⏎').effects).toEqual([]);
    expect(byWrench(start(turn), turn, '9'.repeat(60) + '⏎').effects).toEqual([]);
  });
});

describe('degrees, end torque and pulls', () => {
  it('go from one to the next by Enter, and the last Enter records', () => {
    const degrees = byHand(start(whole), whole, '91⏎');
    expect(degrees.state.active).toBe('endTorque');
    const torque = byHand(degrees, whole, '118⏎');
    expect(torque.state.active).toBe('pulls');
    expect(torque.effects).toEqual([]);
    expect(byHand(torque, whole, '2⏎').effects).toEqual([{ kind: 'record' }]);
  });
  it('lets a wanted end torque stay empty', () => {
    expect(byHand(start(whole), whole, '91⏎⏎2⏎').effects).toEqual([{ kind: 'record' }]);
  });
  it('asks for what is missing', () => {
    const run = send(byHand(start(whole), whole, '91'), whole, { type: 'record' });
    expect(run.effects).toEqual([]);
    expect(run.state.active).toBe('pulls');
  });
  it('takes whole pulls only', () => {
    expect(byHand(start(whole), whole, '91⏎⏎1.5⏎').effects).toEqual([]);
  });
  it('takes a burst for one figure and goes on to the next without recording', () => {
    const run = byWrench(start(whole), whole, '91⏎');
    expect(run.effects).toEqual([{ kind: 'keyed', text: '91' }]);
    const back = send(run, whole, { type: 'received', value: '91', at: run.at });
    expect(back.state.active).toBe('endTorque');
    const torque = byWrench(back, whole, '118⏎');
    expect(torque.state).toMatchObject({ active: 'pulls', texts: { value: '91', endTorque: '118' } });
  });
});
