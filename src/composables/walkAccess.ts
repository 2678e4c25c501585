import { inject, provide, type InjectionKey } from 'vue';
import type { CataloguePerson, CatalogueWrench } from '@shared/contracts/catalogue.contract';
import type { JobRow } from '@shared/contracts/jobRow.contract';
import type { Role } from '@shared/people/roles';
import type { Now } from '@shared/walk/instruction';
import type { WalkState } from '@shared/walk/state';
import type { WalkView } from '@shared/walk/view';
import type { LogRefusal, NewBlob, WalkAct } from '@/offline/walkAct';

export type { LogRefusal, WalkAct } from '@/offline/walkAct';

/** Who does something at the stand: the person signed in, or a supervisor who gives a PIN. */
export interface StandPerson {
  id: string;
  name: string;
  roles: readonly Role[];
}

/** What goes with an act besides its data. `by`: another person than the one signed in; then with the PIN. */
export interface ActMore {
  by?: StandPerson;
  pin?: string;
  blobs?: NewBlob[];
}

/**
 * A walk as its screens see it. Every property is read afresh (and is reactive); `act` gives null when the event is saved
 * for good, else why nothing was written.
 */
export interface WalkAccess {
  readonly walk: string;
  readonly state: WalkState;
  readonly view: WalkView;
  /** Moves on once a second, so that waits count down. */
  readonly now: Now;
  readonly readOnly: boolean;
  /** The stored chain does not hold from this event on; null: it does. */
  readonly brokenAt: number | null;
  readonly person: StandPerson;
  readonly people: readonly CataloguePerson[];
  readonly wrenches: readonly CatalogueWrench[];
  readonly job: JobRow | null;
  act(act: WalkAct, more?: ActMore): Promise<LogRefusal | null>;
  /** Checks a PIN here, offline too, before it is sealed: null, or why it did not hold. */
  checkPin(
    person: string,
    pin: string,
  ): Promise<LogRefusal | { code: string; params?: Record<string, unknown> } | null>;
  /** Leaves for the jobs; the walk stays as it is. */
  leave(): void;
}

const key: InjectionKey<WalkAccess> = Symbol('walk');

/** Makes a walk known to every screen below. */
export const provideWalk = (walk: WalkAccess): void => provide(key, walk);

/** The walk this screen stands in. */
export function useWalkAccess(): WalkAccess {
  const walk = inject(key);
  if (!walk) throw new Error('no walk is provided here');
  return walk;
}
