import type { RouteRecordRaw } from 'vue-router'
import { PART_KINDS } from '#shared/contracts/part-rows'
import { PART_READERS } from '#shared/contracts/parts'

const KIND = `:kind(${PART_KINDS.join('|')})`

export const partRoutes: RouteRecordRaw[] = [
  {
    // Without a kind the library opens at its cores.
    path: `/parts/${KIND}?`,
    name: 'parts',
    props: (route) => ({ kind: route.params.kind || 'core' }),
    component: () => import('@/views/parts/PartsView.vue'),
    meta: { access: PART_READERS, title: 'Parts library' },
  },
  {
    path: `/parts/${KIND}/add`,
    name: 'add-part',
    props: true,
    component: () => import('@/views/parts/AddPartView.vue'),
    meta: { access: ['engineer'], title: 'Add a row' },
  },
  {
    path: `/parts/${KIND}/import`,
    name: 'import-parts',
    props: true,
    component: () => import('@/views/parts/ImportPartsView.vue'),
    meta: { access: ['engineer'], title: 'Import rows' },
  },
  {
    path: `/parts/${KIND}/row/:id`,
    name: 'part',
    props: (route) => ({ ...route.params, version: Number(route.query.version) || null }),
    component: () => import('@/views/parts/PartView.vue'),
    meta: { access: PART_READERS, title: 'Parts library' },
  },
  {
    path: `/parts/${KIND}/row/:id/change`,
    name: 'change-part',
    props: true,
    component: () => import('@/views/parts/ChangePartView.vue'),
    meta: { access: ['engineer'], title: 'Change a row' },
  },
]
