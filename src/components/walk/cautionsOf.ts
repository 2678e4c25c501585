import type { Step } from '@shared/procedure/procedure';
import type { CautionName } from '@/components/base/cautionName';

const known: Readonly<Record<CautionName, true>> = {
  eyes: true,
  support: true,
  coldJoint: true,
  noBreaker: true,
  noImpact: true,
  grip: true,
  smoothPull: true,
  noUniversal: true,
  range: true,
  layStill: true,
  usedOnce: true,
  clickIsNoMeasure: true,
  manualFirst: true,
};

const isCaution = (name: string | undefined): name is CautionName => name !== undefined && Object.hasOwn(known, name);

/** Cautions that the author put beside these steps, each once; a name this version does not know shows nothing. */
export const cautionsOf = (steps: readonly Step[]): CautionName[] => [
  ...new Set(steps.flatMap(({ caution }) => (isCaution(caution) ? [caution] : []))),
];
