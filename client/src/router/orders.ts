import type { RouteRecordRaw } from 'vue-router'
import { AWARD_READERS } from './awards'

export const orderRoutes: RouteRecordRaw[] = [
  { path: '/orders', name: 'orders', component: () => import('@/views/orders/OrdersView.vue'), meta: { access: AWARD_READERS, title: 'Purchase orders' } },
  { path: '/orders/:orderId', name: 'order', props: true, component: () => import('@/views/orders/OrderView.vue'), meta: { access: AWARD_READERS, title: 'Purchase order' } },
  { path: '/purchase-orders', name: 'vendor-orders', props: { mine: true }, component: () => import('@/views/orders/OrdersView.vue'), meta: { access: ['vendor'], title: 'Purchase orders' } },
  {
    path: '/purchase-orders/:orderId',
    name: 'vendor-order',
    props: (route) => ({ orderId: route.params.orderId, mine: true }),
    component: () => import('@/views/orders/OrderView.vue'),
    meta: { access: ['vendor'], title: 'Purchase order' },
  },
]
