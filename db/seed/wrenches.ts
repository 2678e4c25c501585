import type { WrenchKind, WrenchSnapshot } from '@shared/crib/wrench';
import type { TorqueUnit } from '@shared/quantity/unit';

const DAY_MS = 86_400_000;

interface WrenchLine {
  tag: string;
  serial: string;
  kind: WrenchKind;
  drive: string;
  range: readonly [string, string];
  unit?: TorqueUnit;
  /** Of the torque it shows; of the scale for a setting wrench. */
  step: string;
  cw: string;
  ccw: string | null;
  turn?: string;
  dueInDays: number;
  cycles: number;
  certificate: string;
  state?: WrenchSnapshot['state'];
}

/** Brindle Lane's crib. W-07 has lapsed, W-04 is quarantined, W-08 away, W-14 retired; W-10 is in pound-feet. */
// prettier-ignore
const lines: readonly WrenchLine[] = [
  { tag: 'W-06', serial: 'T07-061', kind: 'torqueAngle', drive: '3/8 in', range: ['8', '122'], step: '0.1', cw: '3', ccw: '4', turn: '2', dueInDays: 106, cycles: 2210, certificate: 'K-5512' },
  { tag: 'W-03', serial: 'T20-112', kind: 'torqueAngle', drive: '1/2 in', range: ['20', '340'], step: '0.1', cw: '3', ccw: '4', turn: '2', dueInDays: 41, cycles: 3644, certificate: 'K-5107' },
  { tag: 'W-02', serial: 'T01-015', kind: 'torqueAngle', drive: '1/4 in', range: ['1.5', '30'], step: '0.01', cw: '3', ccw: '4', turn: '2', dueInDays: 205, cycles: 1830, certificate: 'K-5498' },
  { tag: 'W-10', serial: 'D0750', kind: 'torque', drive: '3/8 in', range: ['5', '75'], unit: 'lbf.ft', step: '0.1', cw: '2', ccw: '3', dueInDays: 288, cycles: 940, certificate: 'K-5530' },
  { tag: 'W-01', serial: 'K2140', kind: 'setting', drive: '3/8 in', range: ['8', '135'], step: '0.5', cw: '4', ccw: '4', dueInDays: 262, cycles: 1320, certificate: 'K-5521' },
  { tag: 'W-11', serial: 'K2209', kind: 'setting', drive: '3/8 in', range: ['8', '135'], step: '0.5', cw: '4', ccw: '6', dueInDays: 150, cycles: 4651, certificate: 'K-5290' },
  { tag: 'W-12', serial: 'D3390', kind: 'dial', drive: '1/2 in', range: ['16', '160'], step: '1', cw: '4', ccw: '4', dueInDays: 154, cycles: 210, certificate: 'K-5433' },
  { tag: 'W-07', serial: 'K4471', kind: 'setting', drive: '1/2 in', range: ['40', '200'], step: '1', cw: '4', ccw: null, dueInDays: -12, cycles: 2050, certificate: 'K-4807' },
  { tag: 'W-04', serial: 'T20-118', kind: 'torqueAngle', drive: '1/2 in', range: ['20', '340'], step: '0.1', cw: '3', ccw: '4', turn: '2', dueInDays: 120, cycles: 3300, certificate: 'K-5350', state: 'quarantined' },
  { tag: 'W-08', serial: 'T80-007', kind: 'torqueAngle', drive: '3/4 in', range: ['80', '800'], step: '1', cw: '3', ccw: '4', turn: '2', dueInDays: 15, cycles: 2700, certificate: 'K-5011', state: 'away' },
  { tag: 'W-14', serial: 'D3102', kind: 'dial', drive: '1/2 in', range: ['16', '160'], step: '1', cw: '6', ccw: '6', dueInDays: -400, cycles: 4900, certificate: 'K-3902', state: 'retired' },
];

/** The second shop's crib. */
// prettier-ignore
const harrowgateLines: readonly WrenchLine[] = [
  { tag: 'H-1', serial: 'HT-0031', kind: 'torqueAngle', drive: '1/2 in', range: ['10', '200'], step: '0.1', cw: '2', ccw: '3', turn: '2', dueInDays: 77, cycles: 410, certificate: 'V-118' },
  { tag: 'H-2', serial: 'HC-0007', kind: 'setting', drive: '3/8 in', range: ['10', '60'], step: '0.5', cw: '4', ccw: '4', dueInDays: 300, cycles: 75, certificate: 'V-131' },
];

function snapshotOf(line: WrenchLine, id: string, todayMs: number): WrenchSnapshot {
  const { tag, serial, kind, drive, step, cw, ccw, cycles, certificate } = line;
  const unit = line.unit ?? 'N.m';
  const [low, high] = line.range;
  const isSetting = kind === 'setting';
  return {
    id,
    tag,
    serial,
    kind,
    drive,
    range: { low, high, unit },
    unit,
    ...(isSetting ? { scaleStep: step } : {}),
    resolution: { torque: isSetting ? null : step, angle: line.turn === undefined ? null : '1' },
    accuracy: { cw, ccw },
    turnAccuracy: line.turn ?? null,
    due: { date: new Date(todayMs + line.dueInDays * DAY_MS).toISOString().slice(0, 10), cycles: 5000 },
    cycles,
    state: line.state ?? 'inService',
    certificate,
  };
}

/** Wrenches with due dates counted from today, best first; `idOf` makes an id from a tag. */
export const brindleWrenches = (todayMs: number, idOf: (tag: string) => string): WrenchSnapshot[] =>
  lines.map((line) => snapshotOf(line, idOf(line.tag), todayMs));

/** The second shop's wrenches. */
export const secondShopWrenches = (todayMs: number, idOf: (tag: string) => string): WrenchSnapshot[] =>
  harrowgateLines.map((line) => snapshotOf(line, idOf(line.tag), todayMs));
