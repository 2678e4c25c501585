import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { Result } from '@shared/kernel/result';
import type { Role } from '@shared/people/roles';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { WalkCommand, WalkCommandData } from '@shared/walk/commands';
import { decide } from '@shared/walk/decide';
import type { EarlierWork, Purpose, WalkEvent, WalkEventType, WalkPolicy } from '@shared/walk/events';
import { evolve } from '@shared/walk/evolve';
import type { Now } from '@shared/walk/instruction';
import type { Refusal } from '@shared/walk/refusal';
import { initialWalk, type WalkState } from '@shared/walk/state';

/** What somebody is about to do: a command without the moment and the roles, which the book adds. */
export type Draft = {
  [T in WalkEventType]: {
    type: T;
    data: WalkCommandData[T];
    by: string;
    /** Seconds that pass before it. */
    after?: number;
    /** Written by the shop, not by the tablet (decision 4). */
    office?: true;
  };
}[WalkEventType];

/** Everything that is settled before a walk begins. */
export interface WalkSetting {
  job: string;
  joint: string;
  procedure: ProcedureDocument;
  revision: number;
  /** SHA-256 of the document's canonical JSON. */
  hash: string;
  tablet: string;
  boot: string;
  /** Catalogue cursor of the tablet. */
  known: number;
  /** Milliseconds since 1970 at which the first event is written, and running time of the tablet then. */
  startMs: number;
  startMono?: number;
  people: Readonly<Record<string, readonly Role[]>>;
  pulls: string;
  records: string;
  supervisor: string;
  /** The crib, best first: the first that suits is taken. */
  wrenches: readonly WrenchSnapshot[];
  purpose?: Purpose;
  policy?: WalkPolicy;
  earlier?: EarlierWork;
}

const PLAIN_SEAL = 'a5'.repeat(32);

/** A walk being written: state, events and a clock that only moves when somebody does something. No signatures. */
export interface WalkBook {
  readonly setting: WalkSetting;
  readonly state: WalkState;
  readonly events: readonly WalkEvent[];
  now(): Now;
  /** Lets time pass. */
  pass(ms: number): void;
  /** The tablet was killed and started again: another boot, running time from zero (W9). */
  reboot(boot: string): void;
  /** Decides and appends, or says why not and changes nothing. */
  attempt(draft: Draft): Result<WalkEvent, Refusal>;
  /** As `attempt`, for drafts that must go through: throws with the refusal's code. */
  issue(draft: Draft): WalkEvent;
}

/** The tablet's clock and running time, which move only when somebody lets time pass. */
function clockOf(setting: WalkSetting): Pick<WalkBook, 'now' | 'pass' | 'reboot'> {
  let ms = setting.startMs;
  let mono = setting.startMono ?? 60_000;
  let { boot } = setting;
  return {
    now: () => ({ at: new Date(ms).toISOString(), mono, boot }),
    pass: (milliseconds) => {
      ms += milliseconds;
      mono += milliseconds;
    },
    reboot: (next) => {
      boot = next;
      mono = 0;
    },
  };
}

/** A new book before its first event. */
export function openBook(setting: WalkSetting): WalkBook {
  let state = initialWalk(setting.procedure, setting.hash);
  const events: WalkEvent[] = [];
  const clock = clockOf(setting);

  const commandOf = ({ type, data, by, office }: Draft): WalkCommand => {
    const tablet = office ? 'office' : setting.tablet;
    const roles = setting.people[by] ?? [];
    return { type, data, by, ...clock.now(), tablet, known: setting.known, roles } as WalkCommand;
  };

  const attempt = (draft: Draft): Result<WalkEvent, Refusal> => {
    clock.pass((draft.after ?? 1) * 1000);
    const command = commandOf(draft);
    const decided = decide(state, command);
    if (!decided.ok) return decided;
    const { at, mono, boot, by, tablet, known } = command;
    const event: WalkEvent = { ...decided.value, seq: state.seq + 1, branch: 0, at, mono, boot, by, tablet, known };
    state = evolve(state, event);
    events.push(event);
    return { ok: true, value: event };
  };

  const issue = (draft: Draft): WalkEvent => {
    const issued = attempt(withSeal(draft, PLAIN_SEAL));
    if (issued.ok) return issued.value;
    throw new Error(`${draft.type} refused: ${issued.error.code} ${JSON.stringify(issued.error.params ?? {})}`);
  };

  return {
    setting,
    get state() {
      return state;
    },
    events,
    ...clock,
    attempt,
    issue,
  };
}

/** Whether the draft carries a sealed PIN that is still to be made (decision 6). */
export function wantsSeal(draft: Draft): boolean {
  if (draft.type === 'wrench.taken') return draft.data.override?.seal === '';
  return 'seal' in draft.data && draft.data.seal === '';
}

/** The draft with its seal in place; as it is where it carries none. */
export function withSeal(draft: Draft, seal: string): Draft {
  if (!wantsSeal(draft)) return draft;
  const data =
    draft.type === 'wrench.taken' && draft.data.override
      ? { ...draft.data, override: { ...draft.data.override, seal } }
      : { ...draft.data, seal };
  return { ...draft, data } as Draft;
}
