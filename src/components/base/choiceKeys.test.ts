import { describe, expect, it } from 'vitest';
import { createChoiceKeys } from './choiceKeys';

const atDesk = () => {
  let time = 0;
  const keys = createChoiceKeys(() => time);
  return { keys, wait: (ms: number): void => void (time += ms) };
};

describe('createChoiceKeys', () => {
  it('lets a person choose: digit, a breath, Enter', () => {
    const { keys, wait } = atDesk();
    wait(1500);
    expect(keys.digit(2, 3)).toEqual({ kind: 'select', index: 1 });
    wait(700);
    expect(keys.enter()).toBe(true);
  });

  it('ignores what is still running in when the choice opens', () => {
    const { keys, wait } = atDesk();
    wait(699);
    expect(keys.digit(1, 3)).toEqual({ kind: 'nothing' });
    expect(keys.enter()).toBe(false);
  });

  it('never lets the burst of a keyed wrench choose, whatever figure it sends', () => {
    for (const burst of ['1', '2', '11', '104', '91', '3.5', '60.2']) {
      const { keys, wait } = atDesk();
      wait(5000);
      for (const sign of burst.replace('.', '')) {
        keys.digit(Number(sign), 9);
        wait(15);
      }
      expect(keys.enter(), burst).toBe(false);
    }
  });

  it('clears on a second digit that comes too fast', () => {
    const { keys, wait } = atDesk();
    wait(1000);
    keys.digit(1, 3);
    wait(40);
    expect(keys.digit(2, 3)).toEqual({ kind: 'clear' });
  });

  it('counts Enter only 700 ms after a tap or another Enter', () => {
    const { keys, wait } = atDesk();
    wait(1000);
    keys.tapped();
    wait(300);
    expect(keys.enter()).toBe(false);
    wait(699);
    expect(keys.enter()).toBe(false);
    wait(700);
    expect(keys.enter()).toBe(true);
  });

  it('takes no number that has no choice', () => {
    const { keys, wait } = atDesk();
    wait(1000);
    expect(keys.digit(0, 3)).toEqual({ kind: 'nothing' });
    wait(1000);
    expect(keys.digit(4, 3)).toEqual({ kind: 'nothing' });
  });

  it('locks again when other choices are shown', () => {
    const { keys, wait } = atDesk();
    wait(2000);
    keys.reopen();
    wait(500);
    expect(keys.digit(1, 3)).toEqual({ kind: 'nothing' });
  });
});
