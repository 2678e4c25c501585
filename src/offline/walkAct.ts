import type { Role } from '@shared/people/roles';
import type { WalkCommandData } from '@shared/walk/commands';
import type { Refusal } from '@shared/walk/refusal';
import type { StorageErrorCode } from './storageError';

type Unsealed<D> = D extends { seal: string } ? Omit<D, 'seal'> & { seal?: string } : D;
type ActData = {
  [T in keyof WalkCommandData]: T extends 'wrench.taken'
    ? Omit<WalkCommandData[T], 'override'> & { override?: { reason: string; by: string; renews?: number } }
    : Unsealed<WalkCommandData[T]>;
};

/** What a person wants to happen in a walk: name and data, without the seal, which only the log can make. */
export type WalkAct = { [T in keyof ActData]: { type: T; data: ActData[T] } }[keyof ActData];

/** A PIN to seal for the event (decision 6): it leaves the tablet encrypted to the shop, beside the event. */
export interface PinToSeal {
  pin: string;
  person: string;
  pinVersion: number;
}

/** A photo or curve stored with the event that names it. */
export interface NewBlob {
  sha256: string;
  contentType: string;
  bytes: ArrayBuffer;
}

/** One thing to append to a walk. */
export interface AppendRequest {
  act: WalkAct;
  by: string;
  roles: readonly Role[];
  /** Head the screen showed when it was asked for; a different one now means a stale screen (decision 11). */
  head?: string;
  pin?: PinToSeal;
  blobs?: NewBlob[];
}

/** Reasons of the log itself, besides those of the rules. */
export type LogRefusalCode =
  StorageErrorCode | 'log.readOnly' | 'log.chainBroken' | 'log.sealFailed' | 'log.textNotWritable' | 'log.tooLong';

/** Why nothing was written; translated as `errors.<code>`. */
export type LogRefusal = Refusal | { code: LogRefusalCode; params?: Refusal['params'] };

/** The act with its seal written where the event carries it: the rules see only the sealed form. */
export function withSeal(act: WalkAct, seal: string): WalkAct {
  if (act.type !== 'wrench.taken') return { ...act, data: { ...act.data, seal } } as WalkAct;
  const { override } = act.data;
  return override ? { ...act, data: { ...act.data, override: { ...override, seal } } as typeof act.data } : act;
}
