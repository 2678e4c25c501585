import type { CatalogueJoint, CatalogueProcedure } from '@shared/contracts/catalogue.contract';
import type { JobRow } from '@shared/contracts/jobRow.contract';
import type { WalkRow, WalkStateName } from '@shared/contracts/walkRow.contract';
import type { KnownCatalogue } from '@/stores/useTabletStore';
import type { WalkOnTablet } from './useTabletContents';

/** A walk as the lists of the stand show it: what this tablet has, and what the shop has said. */
export interface StandWalk {
  id: string;
  job: string;
  joint: string;
  purpose: string;
  state: WalkStateName;
  /** Its chain is on this tablet. */
  here: boolean;
  /** This tablet writes it, or may have to: it goes on here. */
  ours: boolean;
  changedAt: string;
  readings: { done: number; due: number } | null;
  forked: boolean;
}

/** Newest approved revision of a procedure, or null. */
export function approvedOf(catalogue: KnownCatalogue, code: string): CatalogueProcedure | null {
  const approved = Object.values(catalogue.procedures).filter(
    (each) => each.code === code && each.state === 'approved',
  );
  return approved.sort((a, b) => b.revision - a.revision)[0] ?? null;
}

/** Open jobs, the one changed last first; `text` finds number, engine, serial, customer. */
export function openJobs(catalogue: KnownCatalogue, text: string): JobRow[] {
  const wanted = text.trim().toLowerCase();
  return Object.values(catalogue.jobs)
    .filter((job) => job.state === 'open')
    .filter((job) =>
      [job.number, job.engineFamily, job.engineModel, job.engineSerial, job.customer, job.vin].some((field) =>
        field.toLowerCase().includes(wanted),
      ),
    )
    .sort((a, b) => (a.changedAt < b.changedAt ? 1 : -1));
}

/** Joints of a job that are still part of it. */
export const jointsOf = (catalogue: KnownCatalogue, job: string): CatalogueJoint[] =>
  Object.values(catalogue.joints).filter((joint) => joint.job === job && !joint.retired);

function merged(
  id: string,
  row: WalkRow | undefined,
  local: WalkOnTablet | undefined,
  tablet: string,
): StandWalk | null {
  if (!row && !local) return null;
  const ours = row ? row.writer === tablet || (local !== undefined && local.waiting > 0) : true;
  return {
    id,
    job: row?.job ?? local?.job ?? '',
    joint: row?.joint ?? local?.joint ?? '',
    purpose: row?.purpose ?? local?.purpose ?? '',
    state: row?.state ?? 'walking',
    here: local !== undefined,
    ours,
    changedAt: local?.lastAt ?? row?.changedAt ?? '',
    readings: row ? { done: row.readingsDone, due: row.readingsDue } : null,
    forked: row?.forked ?? local?.forked ?? false,
  };
}

/** Every walk known here, the one changed last first. What this tablet has and the server does not yet counts too. */
export function walksKnown(catalogue: KnownCatalogue, here: readonly WalkOnTablet[], tablet: string): StandWalk[] {
  const ids = new Set([...Object.keys(catalogue.walks), ...here.map(({ walk }) => walk)]);
  return [...ids]
    .flatMap(
      (id) =>
        merged(
          id,
          catalogue.walks[id],
          here.find(({ walk }) => walk === id),
          tablet,
        ) ?? [],
    )
    .sort((a, b) => (a.changedAt < b.changedAt ? 1 : -1));
}

const ended = new Set<WalkStateName>(['finished', 'voided']);

/** Not ended: it reads *not finished: do not run* until it is (W12). */
export const isUnderWay = ({ state }: StandWalk): boolean => !ended.has(state);
