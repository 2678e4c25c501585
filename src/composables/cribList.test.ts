import { describe, expect, it } from 'vitest';
import type { WrenchRow } from '@shared/contracts/wrenches.contract';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import { aWrench } from '../../tests/support/aWalk';
import { cribLines, isWanted } from './cribList';

const NOW = '2026-06-13T12:00:00Z';
const row = (
  tag: string,
  change: Partial<WrenchSnapshot> = {},
  state: WrenchRow['state'] = 'inService',
): WrenchRow => ({
  id: tag,
  snapshot: aWrench({ id: tag, tag, due: { date: '2027-01-01', cycles: 5000 }, cycles: 0, ...change }),
  state,
  changedAt: NOW,
});
const standings = (...rows: WrenchRow[]) =>
  cribLines(rows, NOW).map(({ wrench, standing }) => `${wrench.tag} ${standing}`);

describe('the crib', () => {
  it('puts first what may not be used today', () => {
    const lapsed = row('W-07', { due: { date: '2026-06-01', cycles: null } });
    expect(
      standings(
        row('W-01'),
        row('W-14', {}, 'retired'),
        row('W-08', {}, 'away'),
        lapsed,
        row('W-04', {}, 'quarantined'),
      ),
    ).toEqual(['W-07 lapsed', 'W-04 quarantined', 'W-08 away', 'W-01 inService', 'W-14 retired']);
  });

  it('lapses by cycles as well as by date (K2)', () => {
    expect(cribLines([row('W-01', { cycles: 5000 })], NOW)[0]).toMatchObject({
      standing: 'lapsed',
      due: { lapsed: 'cycles', cyclesLeft: 0 },
    });
  });

  it('tells what falls due soon, by days or by cycles', () => {
    expect(standings(row('W-03', { due: { date: '2026-07-24', cycles: null } }))).toEqual(['W-03 soon']);
    expect(standings(row('W-11', { cycles: 4651 }))).toEqual(['W-11 soon']);
    expect(standings(row('W-06', { due: { date: '2026-09-27', cycles: 5000 }, cycles: 3300 }))).toEqual([
      'W-06 inService',
    ]);
  });

  it('draws every range in newton metres', () => {
    // 1 lbf·ft = 1.3558179483314004 N·m (REF-UNIT-02), times 5 and 75, rounded to drawing accuracy.
    const [line] = cribLines([row('W-10', { range: { low: '5', high: '75', unit: 'lbf.ft' } })], NOW);
    expect(line?.range).toEqual({ low: 6.779, high: 101.686 });
    expect(cribLines([row('G-1', { range: null })], NOW)[0]?.range).toBeNull();
  });

  it('finds by tag, serial or certificate, state and drive together', () => {
    const [line] = cribLines([row('W-03', { serial: 'T20-112', certificate: 'K-5107', drive: '1/2 in' })], NOW);
    if (!line) throw new Error('no line');
    expect(isWanted(line, ' t20 ', 'any', 'any')).toBe(true);
    expect(isWanted(line, 'k-5107', 'inService', '1/2 in')).toBe(true);
    expect(isWanted(line, '', 'lapsed', 'any')).toBe(false);
    expect(isWanted(line, '', 'any', '3/8 in')).toBe(false);
  });
});
