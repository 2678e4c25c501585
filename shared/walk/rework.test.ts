import { describe, expect, it } from 'vitest';
import { aHead, aWalk, Walk } from '../../tests/support/aWalk';

describe('R1 turn and torque', () => {
  it('adds what was pulled again to what stands', () => {
    const walk = aWalk().to('p3', 'h1').pulls('80', { torque: '70' });
    expect(walk.offered).toEqual(['pullAgain', 'replace', 'accept', 'hold']);
    walk.settles('pullAgain');
    expect(walk.instruction).toMatchObject({ mode: 'pullAgain', remaining: { target: '10', low: '5', high: '15' } });
    expect(walk.tries('reading.taken', walk.entry('10', { shows: 'total' }))?.code).toBe('thisPullOnly');
    walk.pulls('10');
    expect(walk.total('p3', 'h1')).toBe('90');
    expect(walk.where).toBe('p3/h2');
  });

  it('does not offer to pull again when the torque is over', () => {
    const walk = aWalk().to('p3', 'h1').pulls('80', { torque: '120' });
    expect(walk.offered).toEqual(['replace', 'restartJoint', 'accept', 'hold']);
  });

  it('stops on a turn in its window with the torque out', () => {
    const walk = aWalk().to('p3', 'h1').pulls('90', { torque: '50' });
    expect(walk.kinds('open')).toEqual(['endTorqueUnder']);
    expect(walk.offered).not.toContain('pullAgain');
  });

  it('pulls an under torque again to its target', () => {
    const walk = aWalk().pulls('15').settles('pullAgain').pulls('20');
    expect(walk.total('p1', 'h1')).toBe('20');
    expect(walk.where).toBe('p1/h2');
  });
});

describe('R2, R3 restart and replace', () => {
  const replaced = (): Walk => aWalk().parts('bolt', 1).to('p3', 'h2').pulls('104').settles('replace');

  it('offers only replacement once the bolt is used, and never turning back', () => {
    const walk = aWalk().to('p3', 'h2').pulls('104');
    expect(walk.offered).toEqual(['replace', 'accept', 'hold']);
    expect(walk.tries('deviation.settled', { deviation: '99', choice: 'replace', reason: '' })?.code).toBe(
      'unknownDeviation',
    );
    expect(
      walk.tries('deviation.settled', { deviation: walk.state.deviations[0]?.id, choice: 'restart', reason: '' })?.code,
    ).toBe('choiceNotOffered');
  });

  it('walks the new bolt through its preparation and every pass before the joint goes on', () => {
    const walk = replaced();
    expect(walk.instruction).toMatchObject({ kind: 'loosen', hole: 'h2' });
    walk.does('fastener.loosened', { hole: 'h2', round: 1 });
    walk.does('fastener.removed', { hole: 'h2', looked: { thread: true, washer: true, hole: true } });
    expect(walk.instruction).toMatchObject({ kind: 'step', hole: 'h2', again: true });
    walk.stepsDone();
    expect(walk.tries('fastener.fitted', { hole: 'h2', part: 'same', ranIn: true })?.code).toBe('newPartNeeded');
    walk.does('fastener.fitted', { hole: 'h2', part: 'new', ranIn: true });
    const seen: string[] = [];
    for (let turn = 0; turn < 4; turn++) {
      seen.push(walk.where);
      walk.pulls(walk.instruction.kind === 'pull' ? (walk.instruction.window?.target ?? '') : '');
    }
    expect(seen).toEqual(['p1/h2', 'p2/h2', 'p3/h2', 'p3/h3']);
    expect(walk.state.holes.h2).toMatchObject({ attempt: 2, fastenerNo: 2, catchUpTo: null });
  });

  it('lets the settling be changed until the bolt is loosened, and keeps both', () => {
    const walk = replaced().as('sup', 'supervisor');
    const deviation = walk.state.deviations[0]?.id;
    walk.does('deviation.settled', { deviation: deviation ?? '', choice: 'accept', reason: 'looked at it', seal: 'x' });
    expect(walk.state.deviations[0]?.settlings.map(({ choice }) => choice)).toEqual(['replace', 'accept']);
    expect(walk.state.reworks).toEqual([]);
    expect(walk.as('tech').where).toBe('p3/h3');
  });

  it('keeps the settling once the bolt is loose', () => {
    const walk = replaced().does('fastener.loosened', { hole: 'h2', round: 1 }).as('sup', 'supervisor');
    const refused = walk.tries('deviation.settled', {
      deviation: walk.state.deviations[0]?.id,
      choice: 'accept',
      reason: 'r',
      seal: 'x',
    });
    expect(refused?.code).toBe('loosenedAlready');
  });

  it('asks for a part when none is left (R7)', () => {
    const walk = aWalk().to('p3', 'h2').pulls('104').settles('replace');
    walk
      .does('fastener.loosened', { hole: 'h2', round: 1 })
      .does('fastener.removed', { hole: 'h2', looked: { thread: true, washer: true, hole: true } })
      .stepsDone();
    expect(walk.instruction).toMatchObject({ kind: 'parts', missing: [{ part: 'bolt', need: 1, have: 0 }] });
    walk.does('deviation.noted', { kind: 'noPartLeft', hole: 'h2', note: '' }).settles('awaitPart');
    expect(
      walk.tries('walk.resumed', { cause: 'noPartLeft', begun: 'notBegun', way: 'asInstructed', at: null })?.code,
    ).toBe('noPartLeft');
    walk.parts('bolt', 1);
    expect(walk.instruction).toMatchObject({ kind: 'fit', part: 'new' });
  });
});

describe('R3 limited reuse', () => {
  const head = aHead();
  const limited = aHead({ fasteners: [{ ...head.fasteners[0]!, reuse: { kind: 'limited', most: 2 } }] });

  it('lets a fastener be restarted until it was used as often as it may be', () => {
    const walk = new Walk(limited).opened().prepared(0).to('p3', 'h1').pulls('104');
    expect(walk.offered).toContain('restart');
    walk.settles('restart').until((now) => now.kind === 'pull');
    walk.to('p3', 'h1').pulls('104');
    expect(walk.state.holes.h1?.uses).toBe(2);
    expect(walk.offered).toEqual(['replace', 'accept', 'hold']);
  });
});

describe('R4 over, yet below the next torque target', () => {
  it('goes on, noted', () => {
    const walk = aWalk().pulls('25');
    expect(walk.offered[0]).toBe('goOn');
    walk.settles('goOn');
    expect(walk.where).toBe('p1/h2');
  });

  it('is not for the last torque before a turn', () => {
    expect(aWalk().to('p2', 'h1').pulls('45').offered).toEqual(['restart', 'replace', 'accept', 'hold']);
  });

  it('is not where the procedure is strict', () => {
    const head = aHead();
    const [first, ...rest] = head.passes;
    const strict = { ...first!, stages: first!.stages.map((stage) => ({ ...stage, strict: true })) };
    expect(aWalk({ ...head, passes: [strict as (typeof rest)[number], ...rest] }).pulls('25').offered).not.toContain(
      'goOn',
    );
  });
});

describe('R5 I tightened a different one', () => {
  it('gives the other hole its reading, out of order, and asks for the skipped one next', () => {
    const walk = aWalk().to('p2', 'h2');
    walk.does('reading.taken', { ...walk.entry('40'), hole: 'h4', insteadOf: 'h2' });
    expect(walk.where).toBe('p2/h2');
    walk.pulls('40').pulls('40');
    expect(walk.where).toBe('p3/h1');
    expect(walk.kinds('noted')).toEqual(['outOfOrder']);
    expect(walk.state.holes.h4?.slots['p2/s/1']).toMatchObject({ status: 'done', outOfOrder: true });
  });

  it('adds turns at a hole that had one: 90 + 90 = 180, over', () => {
    const walk = aWalk().to('p3', 'h2');
    walk.does('reading.taken', { ...walk.entry('90'), hole: 'h1', insteadOf: 'h2' });
    expect(walk.total('p3', 'h1')).toBe('180');
    expect(walk.kinds('open')).toEqual(['over']);
  });

  it('lets the higher of two torques stand', () => {
    const walk = aWalk().to('p2', 'h2');
    walk.does('reading.taken', { ...walk.entry('39'), hole: 'h1', insteadOf: 'h2' });
    expect(walk.total('p2', 'h1')).toBe('40');
    expect(walk.kinds('open')).toEqual([]);
  });

  it('asks to restart a hole whose earlier stage is missing', () => {
    const walk = aWalk().pulls('20').pulls('20').pulls('15').settles('pullAgain');
    walk.pulls('20').pulls('20');
    const late = aWalk().parts('bolt', 1).to('p2', 'h2').pulls('60').settles('restart');
    late
      .does('fastener.loosened', { hole: 'h2', round: 1 })
      .does('fastener.removed', { hole: 'h2', looked: { thread: true, washer: true, hole: true } })
      .stepsDone();
    late.does('fastener.fitted', { hole: 'h2', part: 'same', ranIn: true });
    expect(late.where).toBe('p1/h2');
    // catching up at 20 N·m, he pulls bolt 3, which stands at 20 already and waits for 40: nothing is gained, the higher stands
    late.does('reading.taken', { ...late.entry('20'), hole: 'h3', insteadOf: 'h2' });
    expect(late.total('p1', 'h3')).toBe('20');
    expect(late.where).toBe('p1/h2');
  });

  it('does not know what it showed: restart or replace', () => {
    const walk = aWalk().to('p2', 'h2').does('deviation.noted', { kind: 'differentUnknown', hole: 'h4', note: '' });
    expect(walk.offered).toEqual(['restart', 'replace']);
  });

  it('calls a torque pulled on a turned bolt a case for looking (R8)', () => {
    const walk = aWalk().parts('bolt', 1).to('p3', 'h2').pulls('104').settles('replace');
    walk
      .does('fastener.loosened', { hole: 'h2', round: 1 })
      .does('fastener.removed', { hole: 'h2', looked: { thread: true, washer: true, hole: true } })
      .stepsDone();
    walk.does('fastener.fitted', { hole: 'h2', part: 'new', ranIn: true });
    walk.does('reading.taken', { ...walk.entry('20'), hole: 'h1', insteadOf: 'h2' });
    expect(walk.kinds('open')).toEqual(['torqueAfterTurn']);
    expect(walk.offered).toEqual(['asItIs', 'replace']);
  });
});

describe('R6 restart joint', () => {
  it('loosens in two rounds, counts gasket and used bolts, and begins at pass 1', () => {
    const walk = aWalk().to('p3', 'h2').does('deviation.noted', { kind: 'strippedThread', hole: 'h3', note: '' });
    expect(walk.offered).toEqual(['restartJoint']);
    walk.settles('restartJoint');
    const seen: string[] = [];
    walk.until((now) => {
      seen.push(now.kind);
      return now.kind === 'repair';
    });
    expect(seen.filter((kind) => kind === 'loosen')).toHaveLength(8);
    expect(walk.tries('thread.repaired', { hole: 'h3', how: 'insert', photo: '' })?.code).toBe('photoMissing');
    walk.does('thread.repaired', { hole: 'h3', how: 'insert', photo: 'hash' });
    expect(walk.instruction).toMatchObject({
      kind: 'parts',
      missing: [
        { part: 'gasket', need: 2, have: 1 },
        { part: 'bolt', need: 1, have: 0 },
      ],
    });
    walk.until((now) => now.kind === 'pull');
    expect(walk.where).toBe('p1/h1');
    expect(walk.state.holes.h1).toMatchObject({ fastenerNo: 2, used: false, slots: {} });
    expect(walk.state.holes.h4).toMatchObject({ fastenerNo: 1 });
  });

  it('opens a joint that an earlier walk has touched with a joint restart (W1)', () => {
    const walk = new Walk().opened('finalAssembly', { earlier: { readingsTaken: true, usedHoles: ['h1'] } });
    expect(walk.instruction).toMatchObject({ kind: 'loosen', hole: 'h4', round: 1, rounds: 2 });
  });

  it('is all that is offered where the cited page says joint', () => {
    const head = aHead();
    const passes = head.passes.map((pass) => ({ ...pass, rework: { allows: 'joint', cite: 'manualSilent' } as const }));
    expect(
      aWalk({ ...head, passes })
        .to('p3', 'h2')
        .pulls('104').offered,
    ).toEqual(['restartJoint', 'accept', 'hold']);
  });
});

describe('R9 accept and hold', () => {
  const held = (): Walk => aWalk().to('p3', 'h2').pulls('104').settles('hold', 'nobody here');

  it('is only for a supervisor who took no reading here, with PIN and reason (P1)', () => {
    const walk = aWalk().to('p3', 'h2').pulls('104');
    const data = { deviation: walk.state.deviations[0]?.id, choice: 'accept', reason: 'r', seal: 's' };
    expect(walk.tries('deviation.settled', data)?.code).toBe('noRight');
    expect(walk.as('tech', 'technician', 'supervisor').tries('deviation.settled', data)?.code).toBe('ownReadings');
    expect(walk.as('sup', 'supervisor').tries('deviation.settled', { ...data, seal: undefined })?.code).toBe(
      'sealMissing',
    );
    expect(walk.tries('deviation.settled', { ...data, reason: ' ' })?.code).toBe('reasonMissing');
    expect(walk.tries('deviation.settled', data)).toBeNull();
  });

  it('finishes the pass and does not begin the next', () => {
    const head = aHead();
    const turns = aHead({ passes: [...head.passes, { ...head.passes[2]!, id: 'p4', name: 'p4' }] });
    const walk = aWalk(turns).to('p3', 'h2').pulls('104').settles('hold', 'nobody here');
    expect(walk.where).toBe('p3/h3');
    walk.pulls('90').pulls('90');
    expect(walk.instruction).toMatchObject({ kind: 'held' });
    walk.as('sup', 'supervisor').settles('accept', 'looked at it', { seal: 's' }).as('tech');
    expect(walk.where).toBe('p4/h1');
  });

  it('keeps the joint from being signed', () => {
    expect(held().pulls('90').pulls('90').instruction.kind).toBe('held');
  });
});

describe('R10 typing errors', () => {
  it('asks to type again, not to pull, and keeps both values', () => {
    const walk = aWalk().pulls('25');
    walk.does('reading.voided', { reading: walk.state.seq, reason: 'typed 25 for 20' });
    expect(walk.instruction).toMatchObject({ kind: 'pull', mode: 'retype', slot: { hole: 'h1' } });
    expect(walk.tries('reading.taken', { ...walk.entry('20'), retype: undefined })?.code).toBe('retypingOnly');
    walk.pulls('20');
    expect(walk.state.readings.map(({ status, data }) => [status, data.value.value])).toEqual([
      ['voided', '25'],
      ['stands', '20'],
    ]);
    expect(walk.kinds('noted')).toEqual(['voidedOutOfWindow']);
    expect(walk.kinds('open')).toEqual([]);
  });

  it('is over once the next reading was taken', () => {
    const walk = aWalk().pulls('20');
    const first = walk.state.seq;
    walk.pulls('20');
    expect(walk.tries('reading.voided', { reading: first, reason: 'r' })?.code).toBe('notVoidable');
  });

  it('lets only a supervisor void what a wrench sent', () => {
    const walk = aWalk().pulls('25', { source: 'keyed' }).as('sup', 'supervisor');
    const reading = walk.state.seq;
    expect(walk.tries('reading.voided', { reading, reason: 'r' })?.code).toBe('sealMissing');
    walk.does('reading.voided', { reading, reason: 'key bounced', seal: 's' });
    expect(walk.state.readings[0]?.status).toBe('voided');
  });

  it('shows a rejected value first only where it was out of its window', () => {
    const rejected = (value: string): string[] => {
      const walk = aWalk().does('reading.received', { wrench: 'w3', source: 'keyed', value: { value, unit: 'N.m' } });
      return walk.does('reading.rejected', { received: walk.state.seq, reason: 'not this bolt' }).kinds();
    };
    expect(rejected('20')).toEqual([]);
    expect(rejected('25')).toEqual(['rejectedOutOfWindow']);
  });

  it('is for typed readings only', () => {
    const walk = aWalk().pulls('20', { source: 'keyed' });
    expect(walk.tries('reading.voided', { reading: walk.state.seq, reason: 'r' })?.code).toBe('receivedByWrench');
  });

  it('takes a voided turn back from what stands', () => {
    const walk = aWalk().to('p3', 'h1').pulls('80').settles('pullAgain').pulls('1');
    walk.does('reading.voided', { reading: walk.state.seq, reason: 'meant 10' }).pulls('10');
    expect(walk.total('p3', 'h1')).toBe('90');
  });
});

describe('R12 repeat until none turns', () => {
  const head = aHead();
  const repeating = aHead({ passes: [head.passes[0]!, { ...head.passes[1]!, repeat: { mostRounds: 3 } }] });
  const round = (walk: Walk, moved: boolean[]): Walk => {
    for (const one of moved) walk.pulls('40', { moved: one });
    return walk;
  };

  it('ends with the first round in which none moved', () => {
    const walk = aWalk(repeating).to('p2', 'h1');
    round(walk, [true, true, true, true]);
    expect(walk.instruction).toMatchObject({ slot: { round: 2 } });
    round(walk, [false, true, false, false]);
    round(walk, [false, false, false, false]);
    expect(walk.instruction.kind).toBe('sign');
  });

  it('is a deviation after the largest number of rounds', () => {
    const walk = aWalk(repeating).to('p2', 'h1');
    for (let turn = 0; turn < 3; turn++) round(walk, [true, false, false, false]);
    expect(walk.kinds('open')).toEqual(['stillMoving']);
    expect(walk.offered).toEqual(['asItIs', 'restartJoint']);
  });
});
