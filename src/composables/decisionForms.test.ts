import { describe, expect, it } from 'vitest';
import { sendBack } from '@shared/contracts/walks.contract';
import {
  actionsFor,
  decisionViolations,
  moveItem,
  sendBackViolations,
  withHole,
  type SendBackItem,
} from './decisionForms';

describe('a decision', () => {
  it('needs a reason and six digits', () => {
    expect(decisionViolations({ reason: ' ', pin: '' })).toEqual({
      reason: { code: 'required' },
      pin: { code: 'required' },
    });
    expect(decisionViolations({ reason: 'wrong job', pin: '12a456' })).toEqual({ pin: { code: 'pin.sixDigits' } });
    expect(decisionViolations({ reason: 'wrong job', pin: '482916' })).toEqual({});
  });
});

describe('a send-back', () => {
  const item: SendBackItem = { hole: 'h5', action: 'replace', note: 'Washer cocked' };

  it('needs something to send back and a note at each', () => {
    expect(sendBackViolations({ items: [], pin: '482916' })).toEqual({ items: { code: 'required' } });
    expect(sendBackViolations({ items: [item, { ...item, note: '' }], pin: '482916' })).toEqual({
      'items.1.note': { code: 'required' },
    });
  });

  it('restarts or replaces at a hole, never the joint in one (R11)', () => {
    expect(actionsFor(null)).not.toContain('replace');
    expect(moveItem(item, null)).toMatchObject({ hole: null, action: 'look', note: 'Washer cocked' });
    expect(moveItem(item, 'h6').action).toBe('replace');
  });

  it('holds each hole once', () => {
    expect(withHole([item], 'h5')).toEqual([item]);
    expect(withHole([item], null).at(-1)).toMatchObject({ hole: null, action: 'look' });
  });

  it('is what the contract takes', () => {
    const body = {
      head: 'a'.repeat(64),
      pin: '482916',
      items: [item, { hole: null, action: 'answer', note: 'Which gasket?' }],
    };
    expect(sendBack.body.safeParse(body).success).toBe(true);
  });
});
