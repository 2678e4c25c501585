import { canonicalJson } from '../../record/canonicalJson';
import type { Role } from '../../people/roles';
import { commandOf } from '../../walk/commands';
import { decide } from '../../walk/decide';
import { evolve } from '../../walk/evolve';
import type { WalkEvent } from '../../walk/events';
import type { WalkState } from '../../walk/state';
import type { ProofRoles } from '../proofDocument';
import type { Progress } from './chainOfProof';
import type { ProofProblem } from './problem';

/** What came of deciding again. `state` is the last that could be worked out. */
export interface Redecided {
  state: WalkState;
  checked: number;
  readings: number;
  problems: ProofProblem[];
}

const STRETCH = 25;

/** The roles of a person as the event could know them: those of the last cursor not after its own (decision 1). */
export function rolesAt(roles: readonly ProofRoles[], person: string, known: number): readonly Role[] {
  return roles.filter((entry) => entry.person === person && entry.since <= known).at(-1)?.roles ?? [];
}

const valueOf = (data: object, field: string): unknown => (data as Record<string, unknown>)[field];

/** The first member on which the two differ. */
function differingField(a: object, b: object): string {
  const fields = [...new Set([...Object.keys(a), ...Object.keys(b)])].sort();
  const text = (data: object, field: string): string => canonicalJson(valueOf(data, field) ?? null);
  return fields.find((field) => text(a, field) !== text(b, field)) ?? '';
}

/** Decides one event again from the state before it; null where the rules make of it just what stands there. */
function problemOf(state: WalkState, event: WalkEvent, roles: readonly Role[]): ProofProblem | null {
  const { seq } = event;
  const decided = decide(state, commandOf(event, roles));
  if (!decided.ok) return { code: 'refused', seq, why: decided.error.code };
  if (canonicalJson(decided.value.data) === canonicalJson(event.data)) return null;
  const field = differingField(decided.value.data, event.data);
  return { code: event.type === 'reading.taken' ? 'judgedOtherwise' : 'decidedOtherwise', seq, field };
}

/** Rules throw on what cannot be (a stage that is nowhere): in somebody else's document that is a finding, not a crash. */
function attempt<T>(work: () => T): { value: T } | null {
  try {
    return { value: work() };
  } catch {
    return null;
  }
}

const isReading = ({ type }: WalkEvent): boolean => type === 'reading.taken' || type === 'reading.elsewhere';

/** Decides every event again, and with it judges every reading again (decision 1, J7). Names each that comes out otherwise. */
export async function decideAgain(
  initial: WalkState,
  events: readonly WalkEvent[],
  roles: readonly ProofRoles[],
  progress: Progress,
): Promise<Redecided> {
  let state = initial;
  let readings = 0;
  const problems: ProofProblem[] = [];
  for (const [index, event] of events.entries()) {
    const before = state;
    const done = attempt(() => ({
      problem: problemOf(before, event, rolesAt(roles, event.by, event.known)),
      after: evolve(before, event),
    }));
    if (!done)
      return { state, checked: index, readings, problems: [...problems, { code: 'unreadable', seq: event.seq }] };
    state = done.value.after;
    if (done.value.problem) problems.push(done.value.problem);
    else if (isReading(event)) readings += 1;
    if (index % STRETCH === STRETCH - 1) await progress(index + 1, events.length);
  }
  await progress(events.length, events.length);
  return { state, checked: events.length, readings, problems };
}
