/** The ideal technician of the demo, for tests in every room. */
export { demoProcedures } from '../../db/seed/procedures/index';
export { seededRandom, type Random } from '../../db/seed/walker/random';
export { withSeal, type Draft, type WalkBook, type WalkSetting } from '../../db/seed/walker/walkBook';
export { openLog, walkOn, type WalkLog } from '../../db/seed/walker/walkLog';
export { atKind, walkDrafts, walkPlain, type Slip, type WalkPlan } from '../../db/seed/walker/walkOn';
export { nextDraft, readingDraft } from '../../db/seed/walker/technician';
export { readingFor } from '../../db/seed/walker/reading';
export { parseWalkEventData } from '@shared/contracts/walkEvents';
