import type { RouteRecordRaw } from 'vue-router'

export const RFQ_READERS = ['buyer', 'approver', 'engineer', 'checker', 'quality'] as const

export const rfqRoutes: RouteRecordRaw[] = [
  { path: '/rfqs', name: 'rfqs', component: () => import('@/views/rfqs/RfqsView.vue'), meta: { access: RFQ_READERS, title: 'Enquiries' } },
  { path: '/rfqs/new', name: 'new-rfq', component: () => import('@/views/rfqs/WriteRfqView.vue'), meta: { access: ['buyer'], title: 'New enquiry' } },
  { path: '/rfqs/:rfqId', name: 'rfq', props: true, component: () => import('@/views/rfqs/RfqView.vue'), meta: { access: RFQ_READERS, title: 'Enquiry' } },
  { path: '/rfqs/:rfqId/edit', name: 'edit-rfq', props: true, component: () => import('@/views/rfqs/WriteRfqView.vue'), meta: { access: ['buyer'], title: 'Change the enquiry' } },
]
