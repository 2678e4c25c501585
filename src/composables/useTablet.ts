import { computed, type ComputedRef } from 'vue';
import type { CataloguePerson } from '@shared/contracts/catalogue.contract';
import { hasRight } from '@shared/people/roles';
import { useSessionStore, type SignedIn } from '@/stores/useSessionStore';
import { useTabletStore, type Named, type TabletTrouble } from '@/stores/useTabletStore';
import { tabletRuntime } from './tabletRuntime';

/** Why something was not done; translated as `errors.<code>`. */
export interface TabletRefusal {
  code: string;
  params?: Record<string, unknown>;
}

/** This tablet and who stands at it. Commands give null when done, else why not. */
export interface UseTabletReturn {
  ready: ComputedRef<boolean>;
  enrolled: ComputedRef<boolean>;
  tablet: ComputedRef<Named | null>;
  shop: ComputedRef<Named | null>;
  trouble: ComputedRef<TabletTrouble>;
  /** Everybody who may sign in at a stand, by name: the tiles. */
  people: ComputedRef<CataloguePerson[]>;
  person: ComputedRef<SignedIn | null>;
  enrol: (code: string, name: string) => Promise<TabletRefusal | null>;
  /** The demo's door: this browser becomes a demo tablet. */
  enrolDemo: () => Promise<TabletRefusal | null>;
  signIn: (person: string, pin: string) => Promise<TabletRefusal | null>;
  signOut: () => Promise<void>;
  /** Reads the storage again after it failed. */
  retryStorage: () => Promise<void>;
}

/** This tablet: enrolment, name tiles, signing in and out. */
export function useTablet(): UseTabletReturn {
  const store = useTabletStore();
  const session = useSessionStore();
  const people = computed(() =>
    Object.values(store.catalogue.people)
      .filter((person) => person.state === 'active' && hasRight(person.roles, 'walk'))
      .sort((a, b) => a.name.localeCompare(b.name)),
  );
  return {
    ready: computed(() => store.ready),
    enrolled: computed(() => store.enrolled),
    tablet: computed(() => store.tablet),
    shop: computed(() => store.shop),
    trouble: computed(() => store.trouble),
    people,
    person: computed(() => session.person),
    enrol: async (code, name) => {
      const done = await tabletRuntime().enrol(code.trim(), name.trim());
      return done.ok ? null : done.error;
    },
    enrolDemo: async () => {
      const done = await tabletRuntime().enrolDemo();
      return done.ok ? null : done.error;
    },
    signIn: async (person, pin) => {
      const done = await tabletRuntime().signIn(person, pin);
      return done.ok ? null : done.error;
    },
    signOut: () => tabletRuntime().signOut(),
    retryStorage: () => tabletRuntime().start(),
  };
}
