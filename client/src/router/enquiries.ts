import type { RouteRecordRaw } from 'vue-router'

export const enquiryRoutes: RouteRecordRaw[] = [
  { path: '/enquiries', name: 'enquiries', component: () => import('@/views/quotes/EnquiriesView.vue'), meta: { access: ['vendor'], title: 'Enquiries' } },
  { path: '/enquiries/:rfqId', name: 'enquiry', props: true, component: () => import('@/views/quotes/EnquiryView.vue'), meta: { access: ['vendor'], title: 'Enquiry' } },
]
