import { createRouter, createWebHistory, type RouteRecordRaw } from 'vue-router';
import { useSession } from '../stores/session.ts';

declare module 'vue-router' {
  interface RouteMeta {
    /** Pages that a person without an account may open. */
    open?: boolean;
    title?: string;
  }
}

// Sign-in is in the first bundle, since everybody meets it; every other page comes when it is asked for.
const routes: RouteRecordRaw[] = [
  {
    path: '/',
    name: 'shelf',
    component: () => import('../views/ShelfView.vue'),
    meta: { title: 'The Shelf' },
  },
  {
    path: '/sign-in',
    name: 'sign-in',
    component: () => import('../views/SignInView.vue'),
    meta: { open: true, title: 'Sign in' },
  },
  {
    path: '/sign-up',
    name: 'sign-up',
    component: () => import('../views/SignUpView.vue'),
    meta: { open: true, title: 'Sign up' },
  },
  {
    path: '/confirm/:token',
    name: 'confirm',
    component: () => import('../views/ConfirmView.vue'),
    props: true,
    meta: { open: true, title: 'Confirm your address' },
  },
  {
    path: '/new-password/:token?',
    name: 'new-password',
    component: () => import('../views/NewPasswordView.vue'),
    props: true,
    meta: { open: true, title: 'New password' },
  },
  {
    path: '/invitation/:token',
    name: 'invitation',
    component: () => import('../views/InvitationView.vue'),
    props: true,
    meta: { open: true, title: 'Invitation' },
  },
  {
    path: '/notebooks/:notebook',
    name: 'notebook',
    component: () => import('../views/NotebookView.vue'),
    props: true,
  },
  {
    path: '/notebooks/:notebook/plan',
    name: 'plan',
    component: () => import('../views/PlanView.vue'),
    props: true,
    meta: { title: 'Plan' },
  },
  {
    path: '/notebooks/:notebook/freeze',
    name: 'freeze',
    component: () => import('../views/FreezeView.vue'),
    props: true,
    meta: { title: 'Freeze a record' },
  },
  {
    path: '/records/:record',
    name: 'record',
    component: () => import('../views/RecordView.vue'),
    props: true,
    meta: { title: 'Record' },
  },
  {
    path: '/review/:token',
    name: 'review',
    component: () => import('../views/ReviewView.vue'),
    props: true,
    meta: { open: true, title: 'Review' },
  },
  {
    path: '/read/:token',
    name: 'read',
    component: () => import('../views/PublicCopyView.vue'),
    props: true,
    meta: { open: true },
  },
  {
    path: '/read-record/:token',
    name: 'read-record',
    component: () => import('../views/PublicRecordView.vue'),
    props: true,
    meta: { open: true },
  },
  {
    path: '/groups',
    name: 'groups',
    component: () => import('../views/GroupsView.vue'),
    meta: { title: 'Groups' },
  },
  {
    path: '/groups/:group',
    name: 'group',
    component: () => import('../views/GroupView.vue'),
    props: true,
    meta: { title: 'Group' },
  },
  {
    path: '/records',
    name: 'records',
    component: () => import('../views/RecordsView.vue'),
    meta: { title: 'Records' },
  },
  {
    path: '/account',
    name: 'account',
    component: () => import('../views/AccountView.vue'),
    meta: { title: 'My account' },
  },
  {
    path: '/operator',
    name: 'operator',
    component: () => import('../views/OperatorView.vue'),
    meta: { title: 'Operator’s room' },
  },
  {
    path: '/help/notation',
    name: 'help',
    component: () => import('../views/NotationHelpView.vue'),
    meta: { open: true, title: 'Help on the notation' },
  },
  {
    path: '/:unknown(.*)*',
    name: 'unknown',
    component: () => import('../views/UnknownView.vue'),
    meta: { open: true, title: 'Not here' },
  },
];

export const router = createRouter({
  history: createWebHistory(),
  routes,
  scrollBehavior: (to, _from, saved) => saved ?? (to.hash ? { el: to.hash } : { top: 0 }),
});

router.beforeEach(async (to) => {
  document.title = to.meta.title === undefined ? 'Stillroom' : `${to.meta.title} · Stillroom`;
  if (to.meta.open === true) return true;
  const session = useSession();
  await session.ready();
  if (session.me !== null) return true;
  return { name: 'sign-in', query: to.fullPath === '/' ? {} : { to: to.fullPath } };
});
