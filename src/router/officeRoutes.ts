import type { RouteRecordRaw } from 'vue-router';

declare module 'vue-router' {
  interface RouteMeta {
    /** Place of the office's rail that a page belongs to. */
    place?: string;
  }
}

type Page = () => Promise<unknown>;

const page = (path: string, name: string, component: Page, place?: string): RouteRecordRaw => ({
  path,
  name: `office-${name}`,
  component,
  meta: place ? { place } : {},
});

/** The office, loaded only when somebody opens it: nothing of it is on the stand's way. */
export const officeRoutes: RouteRecordRaw[] = [
  page('/office/sign-in', 'sign-in', () => import('@/pages/office/OfficeSignIn.vue')),
  {
    path: '/office',
    component: () => import('@/layouts/OfficeLayout.vue'),
    children: [
      { path: '', name: 'office', component: () => import('@/pages/office/OfficeHome.vue') },
      page('jobs', 'jobs', () => import('@/pages/office/JobsPage.vue'), 'jobs'),
      page('jobs/new', 'job-new', () => import('@/pages/office/JobFormPage.vue'), 'jobs'),
      page('jobs/:id', 'job', () => import('@/pages/office/JobPage.vue'), 'jobs'),
      page('jobs/:id/change', 'job-change', () => import('@/pages/office/JobFormPage.vue'), 'jobs'),
      page('walks/:id', 'walk', () => import('@/pages/office/WalkPage.vue'), 'jobs'),
      page('countersign', 'countersign', () => import('@/pages/office/CountersignPage.vue'), 'countersign'),
      page('proofs', 'proofs', () => import('@/pages/office/ProofsPage.vue'), 'proofs'),
      page('proofs/:id', 'proof', () => import('@/pages/office/ProofPage.vue'), 'proofs'),
      page('crib', 'crib', () => import('@/pages/office/CribPage.vue'), 'crib'),
      page('procedures', 'procedures', () => import('@/pages/office/ProceduresPage.vue'), 'procedures'),
      page('procedures/:id', 'procedure', () => import('@/pages/office/ProcedurePage.vue'), 'procedures'),
      page('shop', 'shop', () => import('@/pages/office/ShopPage.vue'), 'shop'),
      page('pin', 'pin', () => import('@/pages/office/PinPage.vue'), 'pin'),
      page(':rest(.*)*', 'unknown', () => import('@/pages/office/UnknownPage.vue')),
    ],
  },
];
