import type { RouteRecordRaw } from 'vue-router'
import { clientPaths } from '#shared/contract/links.ts'

/** Every page by name. Each loads when it is opened. */
export const routes: RouteRecordRaw[] = [
  { path: '/', name: 'home', redirect: { name: 'builds' } },
  {
    path: '/sign-in',
    name: 'sign-in',
    component: () => import('../views/SignInView.vue'),
    meta: { title: 'Sign in', access: 'guest' },
  },
  {
    path: '/register',
    name: 'register',
    component: () => import('../views/RegisterView.vue'),
    meta: { title: 'Create an account', access: 'guest' },
  },
  {
    path: '/password-resets',
    name: 'ask-reset',
    component: () => import('../views/AskResetView.vue'),
    meta: { title: 'Forgotten password', access: 'anybody' },
  },
  {
    path: clientPaths.passwordReset(':token'),
    name: 'reset-password',
    component: () => import('../views/ResetPasswordView.vue'),
    props: true,
    meta: { title: 'Set a new password', access: 'anybody' },
  },
  {
    path: clientPaths.invitation(':token'),
    name: 'invitation',
    component: () => import('../views/InvitationView.vue'),
    props: true,
    meta: { title: 'Invitation', access: 'anybody' },
  },
  {
    path: '/account',
    name: 'account',
    component: () => import('../views/AccountView.vue'),
    meta: { title: 'Account' },
  },
  {
    path: '/builds',
    name: 'builds',
    component: () => import('../views/BuildsView.vue'),
    meta: { title: 'Builds' },
  },
  {
    path: '/builds/:buildId',
    name: 'build',
    component: () => import('../views/BuildView.vue'),
    props: true,
    meta: { title: 'Wiring', wide: true },
  },
  {
    path: '/builds/:buildId/people',
    name: 'people',
    component: () => import('../views/PeopleView.vue'),
    props: true,
    meta: { title: 'People' },
  },
  {
    path: '/catalog',
    name: 'catalog',
    component: () => import('../views/CatalogView.vue'),
    meta: { title: 'Catalog', access: 'anybody' },
  },
  {
    path: '/catalog/models/:modelId',
    name: 'model',
    component: () => import('../views/ModelView.vue'),
    props: true,
    meta: { title: 'Model', access: 'anybody' },
  },
  {
    path: '/catalog/connectors/:typeId',
    name: 'connector-type',
    component: () => import('../views/ConnectorTypeView.vue'),
    props: true,
    meta: { title: 'Connector', access: 'anybody' },
  },
  {
    path: '/catalog/add',
    name: 'add-model',
    component: () => import('../views/ModelFormView.vue'),
    meta: { title: 'Add a model' },
  },
  {
    path: '/catalog/models/:modelId/edit',
    name: 'edit-model',
    component: () => import('../views/ModelFormView.vue'),
    props: true,
    meta: { title: 'Change a model' },
  },
  {
    path: '/rules',
    name: 'rules',
    component: () => import('../views/RulesView.vue'),
    meta: { title: 'Rules', access: 'anybody' },
  },
  {
    path: '/rules/:ruleId',
    name: 'rule',
    component: () => import('../views/RuleView.vue'),
    props: true,
    meta: { title: 'Rule', access: 'anybody' },
  },
  {
    path: '/mailbox',
    name: 'mailbox',
    component: () => import('../views/MailboxView.vue'),
    meta: { title: 'Mailbox', access: 'administrator' },
  },
  {
    path: '/users',
    name: 'users',
    component: () => import('../views/UsersView.vue'),
    meta: { title: 'Accounts', access: 'administrator' },
  },
  {
    path: '/:path(.*)*',
    name: 'not-found',
    component: () => import('../views/NotFoundView.vue'),
    meta: { title: 'Not found', access: 'anybody' },
  },
]
