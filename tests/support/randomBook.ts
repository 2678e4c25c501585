import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { Random, WalkBook } from './walker';
import { WalkOracle } from './walkOracle';
import { smallProcedures } from './smallProcedures';
import { testBook, testIds, testSetting } from './walkBook';

const joints = smallProcedures();

/** Enough of each that dropping some ends no walk. */
const plenty = (wrenches: readonly WrenchSnapshot[]): WrenchSnapshot[] =>
  Array.from({ length: 9 }, (_, copy) =>
    wrenches.map((wrench) => ({ ...wrench, id: wrench.id.replace(/^0/, String(copy)), tag: `${wrench.tag}-${copy}` })),
  ).flat();

/** Sometimes a crib without any wrench that measures torque: clicked and gauged readings. */
function clickingCrib(wrenches: readonly WrenchSnapshot[]): WrenchSnapshot[] {
  const [bar] = wrenches;
  const gauge = bar && {
    ...bar,
    id: bar.id.replace(/.$/, 'f'),
    tag: 'G-01',
    kind: 'angleGauge' as const,
    turnAccuracy: '1',
    accuracy: { cw: null, ccw: null },
  };
  return [...wrenches.filter(({ kind }) => kind === 'setting'), ...(gauge ? [gauge] : [])];
}

/** A small joint under circumstances of all kinds: earlier work, a trial fit, two people, other wrenches. */
export function randomBook(random: Random): { book: WalkBook; oracle: WalkOracle } {
  const procedure = random.pick(joints);
  const purpose = random.chance(0.8) ? 'finalAssembly' : 'trialFit';
  const readingsTaken = random.chance(0.15);
  const usedHoles = readingsTaken ? procedure.holes.map(({ id }) => id).filter(() => random.chance(0.5)) : [];
  const { wrenches } = testSetting(procedure);
  const book = testBook(procedure, {
    purpose,
    earlier: { readingsTaken, usedHoles },
    records: random.chance(0.3) ? testIds.colleague : testIds.technician,
    wrenches: plenty(random.chance(0.2) ? clickingCrib(wrenches) : wrenches),
  });
  return { book, oracle: new WalkOracle(procedure, purpose, usedHoles) };
}
