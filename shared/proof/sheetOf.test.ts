import { beforeAll, describe, expect, it } from 'vitest';
import { makeProofKit, procedureOf, sketchPlan, type KitWishes, type ProofKit } from '../../tests/support/proofKit';
import { testIds } from '../../tests/support/walkBook';
import { say } from './phrase';
import { proofFacts, speakerFor } from './proofFacts';
import { proofHeadState } from './proofMap';
import { compareLabels } from './sheet/source';
import type { SideSheet } from './sideSheet';

const names: SideSheet = {
  names: { [testIds.technician]: 'Ilse Marchetti-Vane', [testIds.supervisor]: 'Tobias Renquist' },
  customer: 'Harbour Freight Lines',
  claim: 'WR-88120',
  vinHead: 'ZZ9KD63X5TB',
  vinTail: '004417',
};

const plain = (text: string): string => text.replaceAll('\u00a0', ' ');
const claimOf = ({ document }: ProofKit, language: 'en' | 'es' = 'en', side = names): string =>
  plain(document.sheet.claim.map((said) => say(said, speakerFor(document, side, language))).join(' '));
const kitOf = (wishes: KitWishes = {}, code = 'HEAD-D6') => makeProofKit(procedureOf(code), wishes);

describe('the first sentence (D1)', () => {
  let kit: ProofKit;
  beforeAll(async () => {
    kit = await kitOf({ plan: sketchPlan });
  });

  it('claims what is known, and tells the deviation and the correction', () => {
    expect(claimOf(kit)).toBe(
      'Recorded: 14 of 14 fasteners through 4 passes, torque typed, turns keyed in by the wrench. ' +
        '56 of 56 final readings in window. Bolt 5 was over, replaced, and taken again out of the joint’s order ' +
        '(rework rule, manual p. 212). Bolt 9: typed 16.3 N·m, voided (“digits swapped”), typed again 60.4 N·m.',
    );
  });

  it('does so in Spanish', () => {
    expect(claimOf(kit, 'es')).toContain('Registrado: 14 de 14 elementos en 4 pasadas');
    expect(claimOf(kit, 'es')).toContain('El tornillo 5 quedó por encima, se sustituyó');
  });

  it('holds no name and no language: only ids stand in the sheet (decision 7)', () => {
    const text = JSON.stringify(kit.document.sheet);
    for (const secret of ['Ilse', 'Renquist', 'Harbour', 'ZZ9KD63X5TB', 'Recorded:', 'WR-88120'])
      expect(text).not.toContain(secret);
  });

  it('says one source for all where all came alike', async () => {
    expect(claimOf(await kitOf({ plan: { source: 'streamed' } }))).toContain('readings sent by the wrench.');
  });

  it('stamps what a simulated wrench sent', async () => {
    expect(claimOf(await kitOf({ plan: { source: 'simulated' } }))).toMatch(/^A simulated wrench sent readings/);
  });

  it('counts an accepted reading as outside, and names who accepted', async () => {
    const slips = [{ at: { pass: 'p4', hole: 'h3' }, kind: 'value' as const, value: '104' }];
    const accepted = await kitOf({ plan: { slips, settle: () => 'accept' } });
    expect(claimOf(accepted)).toContain(
      '55 of 56 final readings in window. Bolt 3 was over, accepted by Tobias Renquist.',
    );
    expect(claimOf(accepted, 'en', { names: {} })).toContain('accepted by supervisor 1');
    expect(accepted.document.sheet.counts.accepted).toBe(1);
    expect(proofHeadState(accepted.document, 'h3', 'new')).toMatchObject({ fill: 'accepted', flag: { text: '+9°' } });
  });

  it('says so where nobody countersigned and where somebody decided about his own readings (P2)', async () => {
    const slips = [{ at: { pass: 'p4', hole: 'h3' }, kind: 'value' as const, value: '104' }];
    const policy = { judgement: 'simple', countersign: 'notRequired', shopOfOne: true } as const;
    const people = { [testIds.technician]: ['technician', 'supervisor'] as const };
    const alone = await kitOf({
      setting: { policy, people, supervisor: testIds.technician },
      plan: { slips, settle: () => 'accept' },
    });
    expect(claimOf(alone)).toContain('Issued without a countersignature, as the rules of this shop allow.');
    expect(claimOf(alone)).toContain('The shop is one person: who decided also pulled or recorded.');
  });

  it('tells four deviations and counts the others, which stand in the table', async () => {
    const slips = ['h1', 'h2', 'h3', 'h4', 'h6', 'h7'].map((hole) => ({
      at: { pass: 'p3', hole },
      kind: 'value' as const,
      value: '104',
    }));
    const many = await kitOf({ plan: { slips } });
    expect(claimOf(many)).toContain('2 more deviations are listed below.');
    expect(many.document.sheet.deviations).toHaveLength(6);
  });

  it('speaks of marks looked at in a recheck, and claims no reading', async () => {
    const recheck = await kitOf({ setting: { purpose: 'recheck' } });
    expect(claimOf(recheck)).toBe(
      'Rechecked: 14 of 14 fasteners, looked at by eye. 14 of 14 witness marks as marked, judged by eye.',
    );
  });

  it('keeps clicks apart: they measured nothing', async () => {
    const crib = (await kitOf()).log.book.setting.wrenches.filter(({ kind }) => kind === 'setting');
    const clicked = await kitOf({ setting: { wrenches: crib } }, 'FLY-F4');
    expect(clicked.document.sheet.counts.measured.count).toBe(0);
    expect(claimOf(clicked)).toMatch(/(\d+) of \1 clicked at the setting asked for; a click measures nothing\./);
  });
});

describe('the tables', () => {
  it('have every reading with window, verdict and source (D2)', async () => {
    const { document } = await kitOf({ plan: sketchPlan });
    const { columns, rows } = document.sheet;
    expect(rows.map(({ label }) => label)).toEqual(Array.from({ length: 14 }, (_, index) => `${index + 1}`));
    expect(rows.flatMap(({ cells }) => cells).filter((cell) => cell?.value)).toHaveLength(56);
    // Bolt 5's new fastener took its torques with the wrench that was in hand.
    expect(columns.map(({ source, wrench }) => [source, wrench])).toEqual([
      ['typed', null],
      ['typed', null],
      ['keyed', 'W-03'],
      ['keyed', 'W-03'],
    ]);
    expect(columns[2]?.windows).toEqual([
      { groups: ['A'], window: { target: '90', low: '85', high: '95', unit: 'deg' } },
    ]);
    expect(columns.map(({ hasEnd }) => hasEnd)).toEqual([false, false, false, true]);
  });

  it('keep windows of groups apart', async () => {
    const { columns, heads } = (await kitOf({}, 'MAIN-D6')).document.sheet;
    expect(columns[1]?.windows.map(({ groups, window }) => [groups.join(''), window.target])).toEqual([
      ['A', '90'],
      ['B', '60'],
    ]);
    expect(new Set(heads.map(({ outcome }) => outcome))).toEqual(new Set(['in']));
  });

  it('show every round of a repeated pass, and count the last (R12)', async () => {
    const { columns, counts } = (await kitOf({}, 'MAN-F4')).document.sheet;
    const rounds = columns.filter(({ round }) => round !== null);
    expect(rounds.length).toBeGreaterThan(1);
    expect(rounds.map(({ isFinal }) => isFinal)).toEqual(rounds.map((_, index) => index === rounds.length - 1));
    expect(counts.measured.count).toBe(30);
    expect(counts.readings).toBe(columns.length * 10);
  });

  it('keep what was replaced and what was voided, both values', async () => {
    const { sheet } = (await kitOf({ plan: sketchPlan })).document;
    const speaker = speakerFor((await kitOf({ plan: sketchPlan })).document, names, 'en');
    expect(sheet.earlier.map(({ said }) => plain(say(said, speaker)))).toEqual([
      'pass 1 30.5 N·m in window, pass 2 60.5 N·m in window, pass 3 104° over',
    ]);
    expect(sheet.changes.map(({ place, said }) => [place.label, plain(say(said, speaker))])).toEqual([
      ['9', 'typed 16.3 N·m, voided (“digits swapped”), typed again 60.4 N·m'],
    ]);
    expect(sheet.heads.find(({ hole }) => hole === 'h5')?.fastenerNo).toBe(2);
    expect(sheet.parts.filter(({ part }) => part === 'headBolt').map(({ count, fitted }) => [count, fitted])).toEqual([
      [14, 15],
      [1, 15],
    ]);
  });

  it('sort labels as a person counts', () => {
    expect(['S10', '10', 'S2', '2', 'A', '2b'].sort(compareLabels)).toEqual(['2', '2b', '10', 'A', 'S2', 'S10']);
  });

  it('print the facts that are known, and only the end of a VIN whose head is withheld', async () => {
    const { document } = await kitOf();
    const facts = (side: SideSheet) =>
      Object.fromEntries(
        proofFacts(document, side, speakerFor(document, side, 'en')).map(({ label, value }) => [label, plain(value)]),
      );
    expect(facts(names)).toMatchObject({
      Vehicle: 'ZZ9KD63X5TB004417',
      Odometer: '84,210 km',
      Customer: 'Harbour Freight Lines',
      Procedure: 'HEAD-D6 rev 1, approved 2 May 2026',
    });
    expect(facts({ names: {}, vinTail: '004417' })).toMatchObject({ Vehicle: 'ends 004417' });
    expect(facts({ names: {} })).not.toHaveProperty('Customer');
  });
});
