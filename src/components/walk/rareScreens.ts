import { defineAsyncComponent } from 'vue';

/** Screens that a pull never needs: loaded when they come up, or before, while nobody waits. */
const loaders = {
  WalkEnd: () => import('./WalkEnd.vue'),
  WalkHeld: () => import('./WalkHeld.vue'),
  WalkParts: () => import('./WalkParts.vue'),
  WalkPerform: () => import('./WalkPerform.vue'),
  WalkRepair: () => import('./WalkRepair.vue'),
  WalkReview: () => import('./WalkReview.vue'),
  WalkRework: () => import('./WalkRework.vue'),
  WalkStep: () => import('./WalkStep.vue'),
  WalkTake: () => import('./WalkTake.vue'),
  WalkWait: () => import('./WalkWait.vue'),
};

/** The screens as components. */
export const rareScreens = {
  WalkEnd: defineAsyncComponent(loaders.WalkEnd),
  WalkHeld: defineAsyncComponent(loaders.WalkHeld),
  WalkParts: defineAsyncComponent(loaders.WalkParts),
  WalkPerform: defineAsyncComponent(loaders.WalkPerform),
  WalkRepair: defineAsyncComponent(loaders.WalkRepair),
  WalkReview: defineAsyncComponent(loaders.WalkReview),
  WalkRework: defineAsyncComponent(loaders.WalkRework),
  WalkStep: defineAsyncComponent(loaders.WalkStep),
  WalkTake: defineAsyncComponent(loaders.WalkTake),
  WalkWait: defineAsyncComponent(loaders.WalkWait),
};

/** Loads them all: on a first visit no worker answers yet, and the network may go at any moment. */
export const loadRareScreens = (): Promise<unknown> => Promise.all(Object.values(loaders).map((load) => load()));
