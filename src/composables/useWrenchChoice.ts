import { computed, type ComputedRef } from 'vue';
import type { Stage } from '@shared/procedure/procedure';
import { suits, type SuitabilityWarning } from '@shared/crib/suitability';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { SlotRef } from '@shared/walk/events';
import { needOf, wrenchObjections, type WrenchObjection } from '@shared/walk/instruction';
import type { TakenWrench } from '@shared/walk/state';
import type { WalkAccess } from './walkAccess';

/** A wrench of the crib beside this stage: whether it suits, and every "no" (W3, K2). */
export interface WrenchOffer {
  wrench: WrenchSnapshot;
  taken: TakenWrench | null;
  objections: WrenchObjection[];
  warnings: SuitabilityWarning[];
}

const letters = (text: string): string => text.toLowerCase().replace(/[^a-z0-9]/g, '');
const figures = (text: string): string => text.replace(/\D/g, '').replace(/^0+/, '');

/** The wrench that was scanned or typed: its tag, its serial, or the figures of its tag where only one has them. */
export function wrenchByTag(offers: readonly WrenchOffer[], text: string): WrenchOffer | null {
  const wanted = letters(text);
  if (wanted === '') return null;
  const exact = offers.find(({ wrench }) => letters(wrench.tag) === wanted || letters(wrench.serial) === wanted);
  if (exact || !/^\d+$/.test(wanted)) return exact ?? null;
  const alike = offers.filter(({ wrench }) => figures(wrench.tag) === figures(wanted));
  return alike.length === 1 ? (alike[0] ?? null) : null;
}

/** Last three of the serial, as asked for where a wrench is picked from the list (W3). */
export const serialTail = (wrench: WrenchSnapshot): string => letters(wrench.serial).slice(-3);

/** Every wrench of the crib for this stage; those that suit come first, those never in service last. */
export function useWrenchChoice(walk: WalkAccess, slot: () => SlotRef, stage: () => Stage): ComputedRef<WrenchOffer[]> {
  return computed(() => {
    const need = needOf(walk.state, slot(), stage());
    const offers = walk.wrenches
      .filter(({ state }) => state !== 'retired')
      .map((row): WrenchOffer => {
        const wrench = { ...row.snapshot, state: row.state };
        const taken = walk.state.wrenches[row.id] ?? null;
        const fit = suits(wrench, need, walk.now.at);
        const inWalk = taken ? wrenchObjections(walk.state, taken, slot(), stage(), walk.now.at) : [];
        const dropped = inWalk.filter(({ code }) => ['dropped', 'overloaded', 'reachedLimit'].includes(code));
        return { wrench, taken, objections: [...dropped, ...fit.reasons], warnings: fit.warnings };
      });
    const rank = (offer: WrenchOffer): number => Math.min(1, offer.objections.length) * 2 + (offer.taken ? 0 : 1);
    return offers.sort(
      (a, b) => rank(a) - rank(b) || a.wrench.tag.localeCompare(b.wrench.tag, 'en', { numeric: true }),
    );
  });
}
