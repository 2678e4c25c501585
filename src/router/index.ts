import {
  createRouter,
  createWebHistory,
  type NavigationGuardReturn,
  type RouteLocationNormalized,
  type Router,
} from 'vue-router';
import { openWalk } from '@/composables/openWalk';
import { useSessionStore } from '@/stores/useSessionStore';
import { useTabletStore } from '@/stores/useTabletStore';
import { officeRoutes } from './officeRoutes';
import { loadStand } from './standPages';
import { standRoutes } from './standRoutes';

/** Where a tablet that was killed inside a walk begins again: on that walk (W9). */
function reopened(to: RouteLocationNormalized): NavigationGuardReturn {
  const walk = openWalk.get();
  const starts = to.path === '/' || to.path === '/stand/jobs';
  return walk && starts && useSessionStore().signedIn ? `/stand/walks/${walk}` : true;
}

function guarded(to: RouteLocationNormalized): NavigationGuardReturn {
  const needs = to.meta.needs ?? 'nothing';
  if (needs === 'nothing') return true;
  if (!useTabletStore().enrolled) return '/';
  if (needs === 'person' && !useSessionStore().signedIn) return { path: '/stand/sign-in', query: { to: to.fullPath } };
  return true;
}

let loaded = false;

/** The rest of the stand, once the page that was asked for is there. A part that does not come is tried when it is needed. */
function loadWhenIdle(): void {
  if (loaded) return;
  loaded = true;
  setTimeout(() => void loadStand().catch(() => (loaded = false)), LOAD_REST_MS);
}
const LOAD_REST_MS = 1200;

/** What the pages wait for. */
export interface PagesOptions {
  /** Resolves when this tablet's storage was read: before that nobody knows who stands here. */
  started: Promise<unknown>;
  /** Brings what only the office needs. */
  openOffice: () => Promise<void>;
}

/** All pages. */
export function createPages({ started, openOffice }: PagesOptions): Router {
  const router = createRouter({
    history: createWebHistory(),
    routes: [
      ...standRoutes,
      ...officeRoutes,
      { path: '/:rest(.*)*', name: 'unknown', component: () => import('@/pages/stand/NotFoundPage.vue') },
    ],
  });
  router.afterEach((to) => {
    if (to.path.startsWith('/stand')) loadWhenIdle();
  });
  let first = true;
  router.beforeEach(async (to) => {
    if (to.path.startsWith('/office')) await openOffice();
    else await started;
    if (first) {
      first = false;
      const again = reopened(to);
      if (again !== true) return again;
    }
    return guarded(to);
  });
  return router;
}
