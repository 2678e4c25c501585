import type { VueWrapper } from '@vue/test-utils';
import { afterEach, describe, expect, it } from 'vitest';
import { memoryWalk, type MemoryWalk } from '@/composables/testing/memoryWalk';
import { openTestWalk, testJoint } from '@/composables/testing/testJoint';
import { mountInWalk, settled } from './testing/mountInWalk';
import WalkScreens from './WalkScreens.vue';

let screen: VueWrapper | null = null;
let clock = 10_000;

afterEach(() => {
  screen?.unmount();
  screen = null;
  document.body.innerHTML = '';
});

function open(): MemoryWalk {
  const walk = memoryWalk(testJoint);
  openTestWalk(walk);
  screen = mountInWalk(walk, WalkScreens);
  return walk;
}
const find = (id: string) => screen!.find(`[data-testid="${id}"]`);
const say = (id: string): string => find(id).text();

/** Presses keys `gap` ms apart on the clock of the events. */
async function press(keys: string[], gap: number): Promise<void> {
  for (const key of keys) {
    clock += gap;
    const event = new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true });
    Object.defineProperty(event, 'timeStamp', { value: clock });
    window.dispatchEvent(event);
  }
  await settled();
}
const byHand = (text: string) => press(Array.from(text), 120);
const byWrench = (text: string) => press([...Array.from(text), 'Enter'], 8);
const types = (walk: MemoryWalk): string[] => walk.events.map(({ type }) => type);

describe('the screen of a pull', () => {
  it('begins empty and says what it waits for', () => {
    open();
    expect(say('reading-value')).toBe('');
    expect(say('record')).toBe('Type the torque you read');
    expect(say('instruction')).toContain('Pull bolt 1');
  });

  it('says what it will record, and records it on Enter', async () => {
    const walk = open();
    await byHand('30.5');
    expect(say('record')).toBe('Record 30.5 N·mthen bolt 2');
    await press(['Enter'], 900);
    expect(walk.events.at(-1)).toMatchObject({
      type: 'reading.taken',
      data: { hole: 'h1', source: 'typed', value: { value: '30.5', unit: 'N.m' }, verdict: 'in' },
    });
    expect(say('instruction')).toContain('Pull bolt 2');
    expect(say('reading-value')).toBe('');
  });

  it('records nothing by a tap on another head, and says which bolt is asked for', async () => {
    const walk = open();
    await find('hole-h3').trigger('click');
    expect(say('refusal')).toContain('Bolt 1 is asked for');
    expect(types(walk)).not.toContain('reading.taken');
    await find('different').trigger('click');
    await byHand('31.5');
    await press(['Enter'], 900);
    expect(walk.events.at(-1)).toMatchObject({ type: 'reading.taken', data: { hole: 'h3', insteadOf: 'h1' } });
  });

  it('asks about a slip before it records', async () => {
    const walk = open();
    await byHand('305');
    await press(['Enter'], 900);
    expect(say('question')).toContain('305 N·m: is a point missing?');
    expect(types(walk)).not.toContain('reading.taken');
  });

  it('asks for a point where a comma or a letter was typed', async () => {
    open();
    await byHand('30,5');
    expect(say('record')).toBe('Use a point, not a comma: 30.5');
    await press(['Backspace', 'Backspace', 'Backspace', 'Backspace'], 120);
    await byHand('3O');
    expect(say('record')).toBe('“O” is a letter: 30?');
  });
});

describe('a wrench acting as keyboard', () => {
  it('is kept at once, and recorded only by a second key', async () => {
    const walk = open();
    clock += 2000;
    await byWrench('30.2');
    expect(types(walk).at(-1)).toBe('reading.received');
    expect(say('record')).toContain('Record 30.2 N·m');
    await press(['Enter'], 300);
    expect(types(walk)).not.toContain('reading.taken');
    await press(['Enter'], 900);
    expect(walk.events.at(-1)).toMatchObject({
      type: 'reading.taken',
      data: { source: 'keyed', received: 2, value: { value: '30.2', unit: 'N.m' } },
    });
  });

  it('stands there again after a restart', async () => {
    const walk = open();
    clock += 2000;
    await byWrench('30.2');
    screen?.unmount();
    screen = mountInWalk(walk, WalkScreens);
    await settled();
    expect(say('reading-value')).toBe('30.2');
  });

  it('does not settle a deviation with its figures', async () => {
    const walk = open();
    await byHand('35');
    await press(['Enter'], 900);
    await settled();
    expect(say('instruction')).toContain('Bolt 1 is 3 N·m past its window');
    await byWrench('1');
    expect(types(walk).at(-1)).toBe('reading.taken');
  });
});

describe('typing errors (R10)', () => {
  it('are voided with a reason, and typed again without a pull', async () => {
    const walk = open();
    await byHand('29.5');
    await press(['Enter'], 900);
    await find('correct').trigger('click');
    await new Promise((resolve) => setTimeout(resolve, 400));
    await find('choice-reason-1').trigger('click');
    await settled();
    expect(walk.events.at(-1)).toMatchObject({ type: 'reading.voided', data: { reason: 'I mistyped it' } });
    expect(say('instruction')).toContain('Do not pull.');
    await byHand('30.5');
    await press(['Enter'], 900);
    expect(walk.events.at(-1)).toMatchObject({ type: 'reading.taken', data: { hole: 'h1', retype: true } });
  });
});
