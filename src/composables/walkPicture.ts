import { shallowRef, watch, type ShallowRef } from 'vue';
import { isoToMs } from '@shared/kernel/time';
import type { Role } from '@shared/people/roles';
import type { Now } from '@shared/walk/instruction';
import { view, type WalkView } from '@shared/walk/view';
import type { WalkState } from '@shared/walk/state';
import type { AppendRequest, WalkAct } from '@/offline/walkAct';
import type { WalkSnapshot } from '@/offline/walkLog';
import type { ShopWalkLog } from '@/offline/shopRules';
import { useSessionStore } from '@/stores/useSessionStore';
import type { useTabletStore } from '@/stores/useTabletStore';
import { tabletRuntime } from './tabletRuntime';
import type { ActMore, StandPerson, WalkAccess } from './walkAccess';

/** A walk as its screens see it, and how it is let go. */
export interface WalkPicture extends WalkAccess {
  /** Out of sight for long: writes `walk.paused`, so that the return looks at the work first (W9). */
  pauseHidden(): Promise<void>;
  stop(): void;
}

/** What the picture is painted with. */
export interface PictureTools {
  now: Readonly<ShallowRef<Now>>;
  store: ReturnType<typeof useTabletStore>;
  rolesOf: (person: string) => readonly Role[];
  leave: () => void;
}

const LOOK_AGAIN_MS = 60_000;

/** Whether the view may read differently only because time went on: a wait has ended, or a minute has passed. */
function isStale({ instruction }: WalkView, seen: Now, now: Now): boolean {
  if (instruction.kind === 'wait' && isoToMs(now.at) >= isoToMs(instruction.until)) return true;
  return now.mono - seen.mono >= LOOK_AGAIN_MS;
}

/** The view of the state, made again when the state is another or time makes it another, not every second. */
function viewOver(state: () => WalkState, now: Readonly<ShallowRef<Now>>) {
  let seen = now.value;
  const shown = shallowRef(view(state(), seen));
  const look = (): void => {
    seen = now.value;
    shown.value = view(state(), seen);
  };
  const stops = [
    watch(state, look, { flush: 'sync' }),
    watch(now, (next) => {
      if (isStale(shown.value, seen, next)) look();
    }),
  ];
  return { shown, stop: () => stops.forEach((stop) => stop()) };
}

function requestFor(act: WalkAct, person: StandPerson, { by, pin, blobs }: ActMore, head: string): AppendRequest {
  const who = by ?? person;
  const request: AppendRequest = { act, by: who.id, roles: who.roles, head };
  if (blobs) request.blobs = blobs;
  if (pin === undefined) return request;
  const { pinVersion = 0 } = tabletRuntime().personById(who.id) ?? {};
  return { ...request, pin: { pin, person: who.id, pinVersion } };
}

function personOf(state: WalkState, { store }: PictureTools): StandPerson {
  const { person } = useSessionStore();
  if (person) return person;
  // Signed out elsewhere while the walk is open: what was begun still belongs to whoever records.
  const recorder = store.catalogue.people[state.hands.records];
  return { id: state.hands.records, name: recorder?.name ?? '', roles: recorder?.roles ?? [] };
}

const pinCheck = async (person: string, pin: string) => {
  const proof = await tabletRuntime().checkPin(person, pin);
  return proof.ok ? null : proof.error;
};

type Read = Pick<WalkAccess, 'walk' | 'state' | 'view' | 'now' | 'readOnly' | 'brokenAt' | 'person'>;
type Known = Pick<WalkAccess, 'people' | 'wrenches' | 'job'>;

function readings(
  log: ShopWalkLog,
  snapshot: ShallowRef<WalkSnapshot<WalkState, WalkView>>,
  shown: ShallowRef<WalkView>,
  tools: PictureTools,
): Read {
  return {
    walk: log.walk,
    get state() {
      return snapshot.value.state;
    },
    get view() {
      return shown.value;
    },
    get now() {
      return tools.now.value;
    },
    get readOnly() {
      return snapshot.value.readOnly;
    },
    get brokenAt() {
      return snapshot.value.broken?.seq ?? null;
    },
    get person() {
      return personOf(snapshot.value.state, tools);
    },
  };
}

const known = ({ store }: PictureTools, job: () => string | undefined): Known => ({
  get people() {
    return Object.values(store.catalogue.people).filter(({ state }) => state === 'active');
  },
  get wrenches() {
    return Object.values(store.catalogue.wrenches);
  },
  get job() {
    return store.catalogue.jobs[job() ?? ''] ?? null;
  },
});

/** Two sets of getters as one object; spreading would read them once and for all. */
const joined = <A extends object, B extends object>(a: A, b: B): A & B =>
  Object.defineProperties(a, Object.getOwnPropertyDescriptors(b)) as A & B;

/** Paints a walk for its screens: every property is read afresh from the log's last snapshot. */
export function walkPicture(log: ShopWalkLog, tools: PictureTools): WalkPicture {
  const snapshot = shallowRef(log.snapshot());
  const stopHearing = log.subscribe((next) => (snapshot.value = next));
  const { shown, stop } = viewOver(() => snapshot.value.state, tools.now);
  const acts = {
    act: async (what: WalkAct, more: ActMore = {}) => {
      const person = personOf(snapshot.value.state, tools);
      const saved = await log.append(requestFor(what, person, more, snapshot.value.head));
      return saved.ok ? null : saved.error;
    },
    checkPin: pinCheck,
    leave: tools.leave,
    pauseHidden: async () => {
      const { records } = snapshot.value.state.hands;
      const act: WalkAct = { type: 'walk.paused', data: { cause: 'hidden' } };
      // Refused where it changes nothing: paused already, signed, or not yet opened. Then there is nothing to ask about.
      await log.append({ act, by: records, roles: tools.rolesOf(records) });
    },
    stop: () => {
      stop();
      stopHearing();
    },
  };
  const facts = joined(
    readings(log, snapshot, shown, tools),
    known(tools, () => snapshot.value.state.opened?.job),
  );
  return joined(facts, acts);
}
