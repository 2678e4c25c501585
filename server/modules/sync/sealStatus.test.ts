import { describe, expect, it } from 'vitest';
import type { WalkEvent } from '@shared/walk/events';
import type { WalkState } from '@shared/walk/state';
import { sealStatus } from './sealStatus';

const person = '01900000-0000-7000-8000-0000000000e3';

const settled = (seq: number, renews?: number): { event: WalkEvent; hash: string } => ({
  hash: `hash ${seq}`,
  event: {
    type: 'deviation.settled',
    data: {
      deviation: '5',
      choice: 'accept',
      reason: 'looked',
      seal: 's',
      ...(renews === undefined ? {} : { renews }),
    },
    ...{ seq, branch: 0, at: '2026-06-13T12:00:00Z', mono: 0, boot: 'b', by: person, tablet: 't', known: 1 },
  },
});

const signed = (seq: number): { event: WalkEvent; hash: string } => {
  const { event } = settled(seq);
  return {
    hash: `hash ${seq}`,
    event: { ...event, type: 'walk.signed', data: { meaning: 'tightenedAsRecorded', seal: 's' } },
  };
};

const stateWith = (standing: number[]) =>
  ({ signatures: standing.map((seq) => ({ seq, stands: true })) }) as unknown as WalkState;

const said = (seq: number, result: 'accepted' | 'refused', nth = 0) => ({ hash: `hash ${seq}`, result, nth });

describe('how the PINs of a chain stand', () => {
  it('waits for those nobody has answered, and names those refused', () => {
    expect(
      sealStatus(stateWith([]), [settled(5), settled(6), settled(7)], [said(6, 'accepted'), said(7, 'refused')]),
    ).toEqual({
      pending: [5],
      refused: [7],
    });
  });

  it('counts the last word: a PIN may be disowned later', () => {
    expect(sealStatus(stateWith([]), [settled(5)], [said(5, 'accepted'), said(5, 'refused', 1)]).refused).toEqual([5]);
  });

  it('leaves out what another event renews, and looks at that one instead', () => {
    const events = [settled(5), settled(9, 5)];
    expect(sealStatus(stateWith([]), events, [said(5, 'refused'), said(9, 'accepted')])).toEqual({
      pending: [],
      refused: [],
    });
    expect(sealStatus(stateWith([]), events, [said(5, 'refused'), said(9, 'refused')]).refused).toEqual([9]);
  });

  it('does not ask for the PIN of a signature that no longer stands', () => {
    const events = [signed(5), signed(9)];
    expect(sealStatus(stateWith([9]), events, [said(5, 'refused'), said(9, 'accepted')])).toEqual({
      pending: [],
      refused: [],
    });
  });
});
