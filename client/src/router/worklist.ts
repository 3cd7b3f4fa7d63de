import type { RouteRecordRaw } from 'vue-router'

export const worklistRoutes: RouteRecordRaw[] = [
  {
    path: '/',
    name: 'worklist',
    component: () => import('@/views/worklist/WorklistView.vue'),
    meta: { access: 'signed-in', title: 'Worklist' },
  },
]
