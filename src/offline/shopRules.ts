import { decide } from '@shared/walk/decide';
import { evolve } from '@shared/walk/evolve';
import { initialWalk, type WalkState } from '@shared/walk/state';
import { view, type WalkView } from '@shared/walk/view';
import type { WalkLog } from './walkLog';
import type { WalkRules } from './walkRules';

/** The rules of the shop's walks, as server and public page have them. */
export const shopRules: WalkRules<WalkState, WalkView> = { initial: initialWalk, decide, evolve, view };

/** A walk of the shop on this tablet. */
export type ShopWalkLog = WalkLog<WalkState, WalkView>;
