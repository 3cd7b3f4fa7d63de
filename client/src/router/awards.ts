import type { RouteRecordRaw } from 'vue-router'

export const AWARD_READERS = ['buyer', 'approver', 'engineer', 'checker', 'quality'] as const

export const awardRoutes: RouteRecordRaw[] = [
  { path: '/awards', name: 'awards', component: () => import('@/views/awards/AwardsView.vue'), meta: { access: AWARD_READERS, title: 'Awards' } },
  { path: '/awards/:awardId', name: 'award', props: true, component: () => import('@/views/awards/AwardView.vue'), meta: { access: AWARD_READERS, title: 'Award' } },
  { path: '/awards/:awardId/order', name: 'place-order', props: true, component: () => import('@/views/orders/PlaceOrderView.vue'), meta: { access: ['buyer'], title: 'Place the order' } },
  { path: '/comparisons/:rfqId', name: 'comparison', props: true, component: () => import('@/views/awards/ComparisonView.vue'), meta: { access: ['buyer', 'approver'], title: 'Comparison' } },
]
