import type { RouteLocationNormalized, RouteRecordRaw } from 'vue-router';
import type { Role } from '../api/session';

declare module 'vue-router' {
  interface RouteMeta {
    /** Reached without a session. */
    open?: boolean;
    /** The only role that may come here; the server refuses the others anyway. */
    role?: Role;
  }
}

const numeric = (to: RouteLocationNormalized) => ({ id: Number(to.params.id) });

/** Every page is a chunk of its own: signing in loads no plots. */
export const routes: RouteRecordRaw[] = [
  { path: '/sign-in', name: 'sign-in', meta: { open: true }, component: () => import('../pages/SignInPage.vue') },
  {
    path: '/password/:token',
    name: 'password',
    meta: { open: true },
    props: true,
    component: () => import('../pages/PasswordPage.vue'),
  },
  {
    path: '/',
    component: () => import('../layouts/MainLayout.vue'),
    children: [
      { path: '', redirect: { name: 'plans' } },
      { path: 'plans', name: 'plans', component: () => import('../pages/PlansPage.vue') },
      { path: 'plans/new', name: 'new-plan', component: () => import('../pages/PlanPage.vue') },
      {
        path: 'plans/:id(\\d+)',
        name: 'plan',
        props: numeric,
        component: () => import('../pages/PlanPage.vue'),
      },
      { path: 'targets', name: 'targets', component: () => import('../pages/TargetsPage.vue') },
      { path: 'targets/:slug', name: 'target', props: true, component: () => import('../pages/TargetPage.vue') },
      { path: 'releases', name: 'releases', component: () => import('../pages/ReleasesPage.vue') },
      {
        path: 'releases/:id(\\d+)',
        name: 'release',
        props: numeric,
        component: () => import('../pages/ReleasePage.vue'),
      },
      { path: 'tolerance', name: 'tolerance', component: () => import('../pages/TolerancePage.vue') },
      { path: 'tolerance/new', name: 'new-replay', component: () => import('../pages/NewReplayPage.vue') },
      {
        path: 'replays/:id(\\d+)',
        name: 'replay',
        props: numeric,
        component: () => import('../pages/ReplayPage.vue'),
      },
      { path: 'people', name: 'people', meta: { role: 'admin' }, component: () => import('../pages/PeoplePage.vue') },
      { path: 'audit', name: 'audit', meta: { role: 'admin' }, component: () => import('../pages/AuditPage.vue') },
      { path: 'account', name: 'account', component: () => import('../pages/AccountPage.vue') },
      {
        path: ':path(.*)*',
        name: 'not-found',
        meta: { open: true },
        component: () => import('../pages/ErrorNotFound.vue'),
      },
    ],
  },
];
