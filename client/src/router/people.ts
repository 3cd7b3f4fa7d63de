import type { RouteRecordRaw } from 'vue-router'
import { BUYING_ROLES } from '#shared/contracts/endpoint'

export const peopleRoutes: RouteRecordRaw[] = [
  {
    path: '/sign-in',
    name: 'sign-in',
    component: () => import('@/views/people/SignInView.vue'),
    meta: { access: 'public', title: 'Sign in', layout: 'plain' },
  },
  {
    path: '/forgotten-password',
    name: 'forgotten-password',
    component: () => import('@/views/people/ForgottenPasswordView.vue'),
    meta: { access: 'public', title: 'Forgotten password', layout: 'plain' },
  },
  {
    // The token stands behind #, which no browser sends to a server or names to another site.
    path: '/link',
    name: 'sign-in-link',
    component: () => import('@/views/people/SignInLinkView.vue'),
    meta: { access: 'public', title: 'Mail link', layout: 'plain' },
  },
  {
    path: '/account',
    name: 'account',
    component: () => import('@/views/people/AccountView.vue'),
    meta: { access: 'signed-in', title: 'Your account' },
  },
  {
    path: '/people',
    name: 'people',
    component: () => import('@/views/people/PeopleView.vue'),
    meta: { access: 'signed-in', title: 'People' },
  },
  {
    path: '/people/invitation',
    name: 'invite-person',
    component: () => import('@/views/people/InvitePersonView.vue'),
    meta: { access: ['admin', 'vendor', 'operator'], title: 'Invite a person' },
  },
  {
    path: '/people/:personId/change',
    name: 'change-person',
    props: true,
    component: () => import('@/views/people/ChangePersonView.vue'),
    meta: { access: ['admin', 'vendor', 'operator'], title: 'Change a person' },
  },
  {
    path: '/company',
    name: 'company',
    component: () => import('@/views/people/CompanyView.vue'),
    meta: { access: 'signed-in', title: 'Company' },
  },
  {
    path: '/vendors',
    name: 'vendors',
    component: () => import('@/views/people/VendorsView.vue'),
    meta: { access: BUYING_ROLES, title: 'Vendors' },
  },
  {
    path: '/vendors/invitation',
    name: 'invite-vendor',
    component: () => import('@/views/people/InviteVendorView.vue'),
    meta: { access: ['admin'], title: 'Invite a vendor' },
  },
  {
    path: '/vendors/:vendorId',
    name: 'vendor',
    props: true,
    component: () => import('@/views/people/VendorView.vue'),
    meta: { access: BUYING_ROLES, title: 'Vendor' },
  },
  {
    path: '/customers',
    name: 'customers',
    component: () => import('@/views/people/CustomersView.vue'),
    meta: { access: ['vendor'], title: 'Customers' },
  },
  {
    path: '/companies',
    name: 'companies',
    component: () => import('@/views/people/CompaniesView.vue'),
    meta: { access: ['operator'], title: 'Companies' },
  },
  {
    path: '/companies/new',
    name: 'create-company',
    component: () => import('@/views/people/CreateCompanyView.vue'),
    meta: { access: ['operator'], title: 'Set up a company' },
  },
]
