import { computed, type ComputedRef } from 'vue';
import type { CatalogueJoint, CatalogueProcedure } from '@shared/contracts/catalogue.contract';
import type { JobRow } from '@shared/contracts/jobRow.contract';
import { useTabletStore } from '@/stores/useTabletStore';
import { approvedOf, isUnderWay, jointsOf, openJobs, walksKnown, type StandWalk } from './standJobs';
import { useTabletContents } from './useTabletContents';

export type { StandWalk } from './standJobs';

/** Jobs, joints and walks as the stand lists them, offline too. */
export interface StandJobs {
  /** False until this tablet's own walks were read. */
  ready: ComputedRef<boolean>;
  search: (text: string) => JobRow[];
  job: (id: string) => JobRow | null;
  joints: (job: string) => CatalogueJoint[];
  joint: (id: string) => CatalogueJoint | null;
  procedure: (code: string) => CatalogueProcedure | null;
  walks: ComputedRef<StandWalk[]>;
  /** On this tablet and not ended. */
  underWay: ComputedRef<StandWalk[]>;
  walksOf: (joint: string) => StandWalk[];
}

/** What the office has told and what is on this tablet, put together for lists. */
export function useStandJobs(): StandJobs {
  const store = useTabletStore();
  const contents = useTabletContents();
  const walks = computed(() => walksKnown(store.catalogue, contents.walks.value ?? [], store.tablet?.id ?? ''));
  return {
    ready: computed(() => contents.walks.value !== null || contents.failure.value !== null),
    search: (text) => openJobs(store.catalogue, text),
    job: (id) => store.catalogue.jobs[id] ?? null,
    joints: (job) => jointsOf(store.catalogue, job),
    joint: (id) => store.catalogue.joints[id] ?? null,
    procedure: (code) => approvedOf(store.catalogue, code),
    walks,
    underWay: computed(() => walks.value.filter((walk) => walk.here && walk.ours && isUnderWay(walk))),
    walksOf: (joint) => walks.value.filter((walk) => walk.joint === joint),
  };
}
