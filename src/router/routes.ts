import type { RouteRecordRaw } from 'vue-router'

/** Every screen, lazy. Below a project the path carries the project's id. */
const projectScreens: RouteRecordRaw[] = [
  {
    path: '',
    name: 'project',
    component: () => import('../views/project/ProjectView.vue'),
    props: true,
    meta: { title: 'Devices', access: 'signed-in' },
  },
  {
    path: 'devices/:deviceId',
    name: 'device',
    component: () => import('../views/device/DeviceView.vue'),
    props: true,
    meta: { title: 'Device', access: 'signed-in' },
  },
  {
    path: 'upload',
    name: 'upload',
    component: () => import('../views/upload/UploadView.vue'),
    props: true,
    meta: { title: 'Upload', access: 'signed-in' },
  },
  {
    path: 'compare',
    name: 'compare',
    component: () => import('../views/compare/CompareView.vue'),
    props: true,
    meta: { title: 'Compare', access: 'signed-in' },
  },
  {
    path: 'spectra',
    name: 'spectra',
    component: () => import('../views/spectra/SpectraView.vue'),
    props: true,
    meta: { title: 'Spectra', access: 'signed-in' },
  },
  {
    path: 'people',
    name: 'people',
    component: () => import('../views/people/PeopleView.vue'),
    props: true,
    meta: { title: 'People', access: 'signed-in' },
  },
  {
    path: 'activity',
    name: 'activity',
    component: () => import('../views/activity/ActivityView.vue'),
    props: true,
    meta: { title: 'Activity', access: 'signed-in' },
  },
  {
    path: 'settings',
    name: 'project-settings',
    component: () => import('../views/project-settings/ProjectSettingsView.vue'),
    props: true,
    meta: { title: 'Project settings', access: 'signed-in' },
  },
]

const administrationScreens: RouteRecordRaw[] = [
  { path: '', redirect: { name: 'accounts' } },
  {
    path: 'accounts',
    name: 'accounts',
    component: () => import('../views/administration/AccountsView.vue'),
    meta: { title: 'Accounts', access: 'administrator' },
  },
  {
    path: 'outbox',
    name: 'outbox',
    component: () => import('../views/administration/OutboxView.vue'),
    meta: { title: 'Mail', access: 'administrator' },
  },
  {
    path: 'health',
    name: 'health',
    component: () => import('../views/administration/HealthView.vue'),
    meta: { title: 'Health', access: 'administrator' },
  },
  {
    path: 'audit-trail',
    name: 'audit-trail',
    component: () => import('../views/administration/AuditTrailView.vue'),
    meta: { title: 'Audit trail', access: 'administrator' },
  },
]

export const routes: RouteRecordRaw[] = [
  {
    path: '/',
    component: () => import('../layouts/ShellLayout.vue'),
    children: [
      {
        path: '',
        name: 'home',
        component: () => import('../views/home/HomeView.vue'),
        meta: { title: 'Home', access: 'signed-in' },
      },
      {
        path: 'projects/new',
        name: 'project-new',
        component: () => import('../views/project-new/ProjectNewView.vue'),
        meta: { title: 'New project', access: 'signed-in' },
      },
      {
        path: 'projects/:projectId',
        component: () => import('../layouts/ProjectLayout.vue'),
        props: true,
        children: projectScreens,
      },
      {
        path: 'account',
        name: 'account',
        component: () => import('../views/account/AccountView.vue'),
        meta: { title: 'Account', access: 'signed-in' },
      },
      {
        path: 'administration',
        component: () => import('../layouts/AdministrationLayout.vue'),
        children: administrationScreens,
      },
    ],
  },
  {
    path: '/',
    component: () => import('../layouts/PlainLayout.vue'),
    children: [
      {
        path: 'sign-in',
        name: 'sign-in',
        component: () => import('../views/sign-in/SignInView.vue'),
        meta: { title: 'Sign in', access: 'guest' },
      },
      {
        path: 'first-administrator',
        name: 'first-administrator',
        component: () => import('../views/first-administrator/FirstAdministratorView.vue'),
        meta: { title: 'First administrator', access: 'guest' },
      },
      {
        path: 'reset-password/:token?',
        name: 'reset-password',
        component: () => import('../views/password-reset/PasswordResetView.vue'),
        props: true,
        meta: { title: 'Reset the password', access: 'anyone' },
      },
      {
        path: 'invitations/:token',
        name: 'invitation',
        component: () => import('../views/invitation/InvitationView.vue'),
        props: true,
        meta: { title: 'Invitation', access: 'anyone' },
      },
      {
        path: 'unreachable',
        name: 'unreachable',
        component: () => import('../views/unreachable/UnreachableView.vue'),
        meta: { title: 'No connection', access: 'anyone' },
      },
      {
        path: ':path(.*)*',
        name: 'not-found',
        component: () => import('../views/not-found/NotFoundView.vue'),
        meta: { title: 'Not found', access: 'anyone' },
      },
    ],
  },
]
