import { shallowRef } from 'vue';
import type { Role } from '@shared/people/roles';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { WalkCommand } from '@shared/walk/commands';
import { decide } from '@shared/walk/decide';
import type { WalkEvent } from '@shared/walk/events';
import { evolve } from '@shared/walk/evolve';
import type { Now } from '@shared/walk/instruction';
import type { Refusal } from '@shared/walk/refusal';
import { initialWalk, type WalkState } from '@shared/walk/state';
import { view } from '@shared/walk/view';
import type { ActMore, WalkAccess, WalkAct } from '../walkAccess';

const SEAL = 'a5'.repeat(32);
const roles: Record<string, readonly Role[]> = { ilse: ['technician'], greta: ['supervisor'] };
const people = [
  { id: 'ilse', name: 'Ilse Marchetti-Vane', roles: ['technician' as const], state: 'active' as const, pinVersion: 1 },
  { id: 'greta', name: 'Greta Holm', roles: ['supervisor' as const], state: 'active' as const, pinVersion: 1 },
];

/** A walk in memory, decided by the real rules, and everything that was written to it. */
export interface MemoryWalk extends WalkAccess {
  events: WalkEvent[];
  write: (act: WalkAct) => void;
}

interface Book {
  state: () => WalkState;
  now: () => Now;
  events: WalkEvent[];
  attempt: (act: WalkAct, more?: ActMore) => Refusal | null;
}

/** The chain in memory: decides, folds, and lets a second pass with every act. */
function bookOf(procedure: ProcedureDocument): Book {
  const state = shallowRef<WalkState>(initialWalk(procedure, '00'.repeat(32)));
  const events: WalkEvent[] = [];
  let mono = 0;
  const now = (): Now => ({ at: new Date(1_800_000_000_000 + mono).toISOString(), mono, boot: 'boot' });
  const attempt = (act: WalkAct, { by, pin }: ActMore = {}): Refusal | null => {
    mono += 1000;
    const who = by?.id ?? 'ilse';
    const data = pin === undefined ? act.data : { ...act.data, seal: SEAL };
    const place = { ...now(), by: who, tablet: 'tablet', known: 1 };
    const command = { type: act.type, data, ...place, roles: roles[who] } as unknown as WalkCommand;
    const decided = decide(state.value, command);
    if (!decided.ok) return decided.error;
    const event = { ...decided.value, ...place, seq: state.value.seq + 1, branch: 0 };
    events.push(event);
    state.value = evolve(state.value, event);
    return null;
  };
  return { state: () => state.value, now, events, attempt };
}

/** For tests: a walk of this procedure, at which Ilse is signed in. */
export function memoryWalk(procedure: ProcedureDocument): MemoryWalk {
  const book = bookOf(procedure);
  return {
    walk: 'memory',
    events: book.events,
    get state() {
      return book.state();
    },
    get view() {
      return view(book.state(), book.now());
    },
    get now() {
      return book.now();
    },
    readOnly: false,
    brokenAt: null,
    person: { id: 'ilse', name: 'Ilse Marchetti-Vane', roles: ['technician'] },
    people,
    wrenches: [],
    job: null,
    act: (act, more) => Promise.resolve(book.attempt(act, more)),
    checkPin: () => Promise.resolve(null),
    leave: () => undefined,
    write: (act) => {
      const refused = book.attempt(act);
      if (refused) throw new Error(`${act.type}: ${refused.code}`);
    },
  };
}
