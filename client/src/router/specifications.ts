import type { RouteRecordRaw } from 'vue-router'
import type { Access } from '#shared/contracts/endpoint'

export const SPECIFICATION_READERS: Access = ['engineer', 'checker', 'quality', 'buyer', 'approver']

export const specificationRoutes: RouteRecordRaw[] = [
  {
    path: '/specifications',
    name: 'specifications',
    component: () => import('@/views/specifications/SpecificationsView.vue'),
    meta: { access: SPECIFICATION_READERS, title: 'Winding specifications' },
  },
  {
    path: '/specifications/new',
    name: 'new-specification',
    component: () => import('@/views/specifications/NewSpecificationView.vue'),
    meta: { access: ['engineer'], title: 'New specification' },
  },
  {
    path: '/specifications/copy',
    name: 'copy-specification',
    component: () => import('@/views/specifications/CopySpecificationView.vue'),
    meta: { access: ['engineer'], title: 'Copy a proven part' },
  },
  {
    path: '/specifications/import',
    name: 'import-specification',
    component: () => import('@/views/specifications/ImportSpecificationView.vue'),
    meta: { access: ['engineer'], title: 'Import a specification' },
  },
  {
    path: '/specifications/:specificationId',
    name: 'specification',
    props: true,
    component: () => import('@/views/specifications/SpecificationView.vue'),
    meta: { access: SPECIFICATION_READERS, title: 'Winding specification' },
  },
  {
    path: '/specifications/:specificationId/compare',
    name: 'compare-revisions',
    props: true,
    component: () => import('@/views/specifications/CompareView.vue'),
    meta: { access: SPECIFICATION_READERS, title: 'Compare revisions' },
  },
  {
    path: '/specifications/:specificationId/revisions/:revisionId',
    name: 'revision',
    props: true,
    component: () => import('@/views/specifications/RevisionView.vue'),
    meta: { access: SPECIFICATION_READERS, title: 'Revision' },
  },
  {
    path: '/specifications/:specificationId/revisions/:revisionId/workbench',
    name: 'workbench',
    props: true,
    component: () => import('@/views/specifications/WorkbenchView.vue'),
    meta: { access: SPECIFICATION_READERS, title: 'Workbench' },
  },
]
