import type { Component } from 'vue';
import type { RouteRecordRaw } from 'vue-router';

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
  { path: '/', name: 'first', component: () => import('@/pages/stand/FirstPage.vue') },
  {
    path: '/stand',
    component: () => import('@/layouts/StandLayout.vue'),
    children: [
      { path: '', redirect: '/stand/jobs' },
      page('enrol', 'enrol', 'nothing', () => import('@/pages/stand/EnrolPage.vue')),
      page('sign-in', 'sign-in', 'tablet', () => import('@/pages/stand/SignInPage.vue')),
      page('jobs', 'jobs', 'person', () => import('@/pages/stand/JobsPage.vue')),
      page('jobs/:job', 'job', 'person', () => import('@/pages/stand/JobPage.vue')),
      page('jobs/:job/joints/:joint', 'joint', 'person', () => import('@/pages/stand/JointPage.vue')),
      page('walks/:walk', 'walk', 'person', () => import('@/pages/stand/WalkPage.vue')),
      page('tablet', 'tablet', 'tablet', () => import('@/pages/stand/TabletPage.vue')),
      page('settings', 'settings', 'nothing', () => import('@/pages/stand/SettingsPage.vue')),
    ],
  },
];
