import type { Component } from 'vue';
import type { RouteRecordRaw } from 'vue-router';
import { standPages } from './standPages';

declare module 'vue-router' {
  interface RouteMeta {
    /** Who may see it: anybody at this browser, an enrolled tablet, or a person signed in at one. */
    needs?: 'nothing' | 'tablet' | 'person';
  }
}

type Page = () => Promise<{ default: Component }>;

const page = (path: string, name: string, needs: 'nothing' | 'tablet' | 'person', component: Page): RouteRecordRaw => ({
  path,
  name: `stand-${name}`,
  component,
  props: true,
  meta: { needs },
});

/** The stand. Each page is loaded when it is opened; the service worker keeps them all for offline. */
export const standRoutes: RouteRecordRaw[] = [
  { path: '/', name: 'first', component: standPages.first },
  {
    path: '/stand',
    component: () => import('@/layouts/StandLayout.vue'),
    children: [
      { path: '', redirect: '/stand/jobs' },
      page('enrol', 'enrol', 'nothing', standPages.enrol),
      page('sign-in', 'sign-in', 'tablet', standPages.signIn),
      page('jobs', 'jobs', 'person', standPages.jobs),
      page('jobs/:job', 'job', 'person', standPages.job),
      page('jobs/:job/joints/:joint', 'joint', 'person', standPages.joint),
      page('walks/:walk', 'walk', 'person', standPages.walk),
      page('tablet', 'tablet', 'tablet', standPages.tablet),
      page('settings', 'settings', 'nothing', standPages.settings),
    ],
  },
];
