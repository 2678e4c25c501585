import { describe, expect, it } from 'vitest';
import { aHead, aWalk, aWrench, Walk } from '../../tests/support/aWalk';

describe('W4 one instruction at a time', () => {
  it('goes through every pass in its order and ends at the signature', () => {
    const walk = aWalk();
    const visited: string[] = [];
    while (walk.instruction.kind === 'pull') {
      visited.push(walk.where);
      walk.pulls(walk.instruction.window?.target ?? '');
    }
    expect(visited).toEqual(
      ['p1', 'p2', 'p3'].flatMap((pass) => ['h1', 'h2', 'h3', 'h4'].map((hole) => `${pass}/${hole}`)),
    );
    expect(walk.instruction).toMatchObject({ kind: 'sign', who: ['tech'] });
  });

  it('refuses a reading for another hole and changes nothing', () => {
    const walk = aWalk();
    const before = walk.state;
    expect(walk.tries('reading.taken', { ...walk.entry('20'), hole: 'h3' })).toEqual({
      code: 'notTheInstruction',
      params: { hole: '1' },
    });
    expect(walk.state).toBe(before);
  });

  it('refuses a hole that does not exist', () => {
    const walk = aWalk();
    expect(walk.tries('reading.taken', { ...walk.entry('20'), hole: 'h99' })?.code).toBe('unknownHole');
  });

  it('asks for parts, steps and a wrench first (W2, W3)', () => {
    const walk = new Walk().opened();
    expect(walk.instruction).toMatchObject({
      kind: 'parts',
      missing: [
        { part: 'gasket', need: 1 },
        { part: 'bolt', need: 4 },
      ],
    });
    walk.parts('gasket', 1).parts('bolt', 4);
    expect(walk.instruction).toMatchObject({ kind: 'step', hole: 'h1' });
    walk.stepsDone();
    expect(walk.instruction).toMatchObject({ kind: 'takeWrench', why: 'none' });
  });
});

describe('W9 interruption', () => {
  it('refuses everything after a kill until the work was looked at', () => {
    const walk = aWalk().to('p3', 'h2');
    walk.boot = 'boot-2';
    expect(walk.instruction).toMatchObject({
      kind: 'lookAtWork',
      slot: { pass: 'p3', hole: 'h2' },
      ways: ['ownTotal', 'replace'],
    });
    const slot = { pass: 'p3', hole: 'h2', stage: 's' };
    expect(
      walk.tries('reading.taken', {
        ...slot,
        round: 1,
        source: 'typed',
        wrench: 'w3',
        value: { value: '90', unit: 'deg' },
        shows: 'thisPull',
        pulls: 1,
      })?.code,
    ).toBe('interrupted');
    walk.does('walk.resumed', { cause: 'killed', begun: 'notBegun', way: 'asInstructed', at: slot });
    expect(walk.where).toBe('p3/h2');
  });

  it("finishes a begun turn with the wrench's own total, and the bolt counts as used", () => {
    const walk = aWalk().to('p3', 'h1');
    walk.boot = 'boot-2';
    walk.does('walk.resumed', {
      cause: 'killed',
      begun: 'begun',
      way: 'ownTotal',
      at: { pass: 'p3', hole: 'h1', stage: 's' },
    });
    expect(walk.state.holes.h1?.used).toBe(true);
    expect(walk.instruction).toMatchObject({ mode: 'finishByTotal' });
    walk.pulls('91');
    expect(walk.total('p3', 'h1')).toBe('91');
    expect(walk.kinds('noted')).toEqual(['interrupted']);
  });

  it("adds the wrench's own total to what stood before it was zeroed for pulling again", () => {
    const walk = aWalk().to('p3', 'h1').pulls('60').settles('pullAgain');
    walk.boot = 'boot-2';
    walk
      .does('walk.resumed', {
        cause: 'killed',
        begun: 'cannotTell',
        way: 'ownTotal',
        at: { pass: 'p3', hole: 'h1', stage: 's' },
      })
      .pulls('30');
    expect(walk.total('p3', 'h1')).toBe('90');
  });

  it('offers the stripe only where stripes were painted', () => {
    const striped = aHead({
      steps: [{ id: 'paint', place: { at: 'beforePass', pass: 'p3' }, kind: 'do', text: 'Paint', paintsStripes: true }],
    });
    const walk = new Walk(striped).opened().prepared().to('p3', 'h1');
    walk.boot = 'boot-2';
    walk.does('walk.resumed', {
      cause: 'killed',
      begun: 'begun',
      way: 'stripe',
      at: { pass: 'p3', hole: 'h1', stage: 's' },
    });
    walk.pulls('88');
    expect(walk.state.readings.at(-1)?.data).toMatchObject({ source: 'marked', wrench: null, total: { value: '88' } });
  });
});

describe('W9 stripes', () => {
  it('paints a new bolt its stripe before its turn', () => {
    const paint = {
      id: 'paint',
      place: { at: 'afterPass', pass: 'p2' },
      kind: 'do',
      text: 'Paint',
      paintsStripes: true,
    } as const;
    const walk = new Walk(aHead({ steps: [paint] })).opened().prepared().parts('bolt', 1).to('p3', 'h2').pulls('104');
    walk.settles('replace').to('p2', 'h2').pulls('40');
    expect(walk.instruction).toMatchObject({ kind: 'step', step: { id: 'paint' } });
    walk.boot = 'boot-2';
    walk.does('walk.resumed', { cause: 'killed', begun: 'notBegun', way: 'asInstructed', at: null }).stepsDone();
    walk.boot = 'boot-3';
    expect(walk.instruction).toMatchObject({ kind: 'lookAtWork', ways: ['ownTotal', 'stripe', 'replace'] });
  });
});

describe('R5 and W9 together', () => {
  it('still finishes the begun bolt by its own total after another one was tightened', () => {
    const walk = aWalk().to('p3', 'h1');
    walk.boot = 'boot-2';
    walk.does('walk.resumed', {
      cause: 'killed',
      begun: 'begun',
      way: 'ownTotal',
      at: { pass: 'p3', hole: 'h1', stage: 's' },
    });
    walk.does('reading.taken', { ...walk.entry('90'), hole: 'h3', insteadOf: 'h1' });
    expect(walk.instruction).toMatchObject({ kind: 'pull', mode: 'finishByTotal', slot: { hole: 'h1' } });
  });
});

describe('W12 signatures', () => {
  const finished = (): Walk => aWalk().until((now) => now.kind === 'sign');
  const signed = (): Walk => finished().does('walk.signed', { meaning: 'tightenedAsRecorded', seal: 's' });

  it('is signed by who pulled and countersigned by another', () => {
    const walk = signed();
    expect(walk.instruction.kind).toBe('countersign');
    const data = { meaning: 'checkedRecord', seal: 's' } as const;
    expect(walk.as('tech', 'supervisor').tries('walk.countersigned', data)?.code).toBe('ownReadings');
    walk.as('sup', 'supervisor').does('walk.countersigned', data);
    walk.does('walk.released', { to: 'shop' });
    expect(walk.instruction).toEqual({ kind: 'withShop', complete: true });
    expect(walk.tries('note.added', { text: 'late', hole: null })?.code).toBe('withTheShop');
  });

  it('does not sign while anything is open', () => {
    expect(aWalk().pulls('20').tries('walk.signed', { meaning: 'tightenedAsRecorded', seal: 's' })?.code).toBe(
      'workOpen',
    );
  });

  it('sends back per hole without re-opening a stage (R11)', () => {
    const walk = signed().as('sup', 'supervisor');
    walk.does('walk.sentBack', { items: [{ hole: 'h2', action: 'answer', note: 'why 84?' }], seal: 's' }).as('tech');
    expect(walk.offered).toEqual(['answered']);
    expect(
      walk.tries('deviation.settled', { deviation: walk.state.deviations[0]?.id, choice: 'answered', reason: '' })
        ?.code,
    ).toBe('reasonMissing');
    walk.settles('answered', 'the wrench slipped once');
    expect(walk.instruction).toMatchObject({ kind: 'sign' });
  });
});

describe('W7 clicked', () => {
  const click = aWrench({ id: 'w1', tag: 'W-01', kind: 'setting', scaleStep: '1', turnAccuracy: null });
  const clicking = (): Walk =>
    new Walk(aHead({ passes: aHead().passes.slice(0, 2) }))
      .opened()
      .parts('gasket', 1)
      .parts('bolt', 4)
      .stepsDone()
      .took(click, { setting: { value: '20', unit: 'N.m' } });

  it('is in when the setting equals the target and it clicked while moving', () => {
    const walk = clicking().pulls('20', { source: 'clicked', click: 'moving' });
    expect(walk.where).toBe('p1/h2');
  });

  it('takes a click without movement as a deviation, with the quarter turn back', () => {
    const walk = clicking().pulls('20', { source: 'clicked', click: 'still' });
    expect(walk.offered[0]).toBe('quarterTurnBack');
    walk.settles('quarterTurnBack').does('fastener.loosened', { hole: 'h1', round: 1 });
    expect(walk.where).toBe('p1/h1');
  });

  it('asks for the setting again when the target changes', () => {
    const walk = clicking();
    for (let hole = 0; hole < 4; hole++) walk.pulls('20', { source: 'clicked', click: 'moving' });
    expect(walk.instruction).toMatchObject({ kind: 'takeWrench', why: 'setting' });
  });
});

describe('W8 waits', () => {
  const head = aHead();
  const waiting = aHead({
    passes: [{ ...head.passes[0]!, waitMinutes: 10 }, { ...head.passes[1]!, finishWithinMinutes: 20 }, head.passes[2]!],
  });

  it('waits at least so long; only a supervisor skips', () => {
    const walk = aWalk(waiting);
    for (let hole = 0; hole < 4; hole++) walk.pulls('20');
    expect(walk.instruction.kind).toBe('wait');
    expect(walk.tries('wait.skipped', { pass: 'p1', reason: 'r', seal: 's' })?.code).toBe('noRight');
    expect(walk.pass(10).where).toBe('p2/h1');
  });

  it('finds that a pass took too long', () => {
    const walk = aWalk(waiting)
      .pass(0)
      .pulls('20')
      .pulls('20')
      .pulls('20')
      .pulls('20')
      .pass(11)
      .pulls('40')
      .pass(30)
      .pulls('40');
    expect(walk.kinds('open')).toEqual(['finishWithinPassed']);
    expect(walk.offered).toEqual(['restartJoint', 'accept', 'hold']);
  });
});

describe('W1 purposes', () => {
  it('a recheck without check stages reads the witness marks by eye', () => {
    const walk = new Walk().opened('recheck');
    expect(walk.instruction).toMatchObject({ kind: 'perform', stage: { check: 'witnessMark' } });
    const slot = { pass: 'marks', stage: 'mark', round: 1 };
    walk.does('stage.done', { ...slot, hole: 'h1', result: 'asMarked', check: 'witnessMark' });
    walk.does('stage.done', { ...slot, hole: 'h2', result: 'moved', check: 'witnessMark' });
    expect(walk.kinds('open')).toEqual(['witnessMoved']);
  });

  it('a strip-down records break-loose torque against the thread', () => {
    const walk = new Walk().opened('stripDown').took(aWrench());
    expect(walk.instruction).toMatchObject({ kind: 'pull', slot: { hole: 'h4' }, direction: 'ccw', window: null });
    expect(walk.pulls('87').where).toBe('strip/h3');
  });
});

describe('W11 forced takeover', () => {
  it('looks at every hole from the last instruction on before any pull', () => {
    const walk = aWalk().to('p3', 'h3').as('sup', 'supervisor');
    walk.does('walk.takenOver', { tablet: 'tablet-2', forced: true }, 'office').as('tech');
    walk.boot = 'boot-9';
    for (const hole of ['h3', 'h4']) {
      expect(walk.instruction).toMatchObject({ kind: 'lookAtWork', forced: true, slot: { hole } });
      walk.does(
        'walk.resumed',
        { cause: 'handedOver', begun: 'notBegun', way: 'asInstructed', at: { pass: 'p3', hole, stage: 's' } },
        'tablet-2',
      );
    }
    expect(walk.where).toBe('p3/h3');
    expect(walk.tries('walk.paused', { cause: 'asked' })?.code).toBe('notTheWriter');
  });
});
