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

/** All pages. `started` resolves when this tablet's storage was read: before that nobody knows who stands here. */
export function createPages(started: Promise<unknown>): Router {
  const router = createRouter({
    history: createWebHistory(),
    routes: [
      ...standRoutes,
      ...officeRoutes,
      { path: '/:rest(.*)*', name: 'unknown', component: () => import('@/pages/stand/NotFoundPage.vue') },
    ],
  });
  let first = true;
  router.beforeEach(async (to) => {
    if (!to.path.startsWith('/office')) await started;
    if (first) {
      first = false;
      const again = reopened(to);
      if (again !== true) return again;
    }
    return guarded(to);
  });
  return router;
}
