import type { RouteRecordRaw } from 'vue-router'

export const SAMPLE_READERS = ['engineer', 'checker', 'quality', 'buyer', 'approver'] as const

export const sampleRoutes: RouteRecordRaw[] = [
  { path: '/samples', name: 'samples', component: () => import('@/views/samples/SamplesView.vue'), meta: { access: SAMPLE_READERS, title: 'Samples' } },
  {
    path: '/samples/new',
    name: 'request-samples',
    props: (route) => ({ rfqId: typeof route.query.rfq === 'string' ? route.query.rfq : null }),
    component: () => import('@/views/samples/RequestSamplesView.vue'),
    meta: { access: ['buyer', 'engineer', 'quality'], title: 'Ask for samples' },
  },
  { path: '/samples/:requestId', name: 'sample', props: true, component: () => import('@/views/samples/SampleView.vue'), meta: { access: SAMPLE_READERS, title: 'Samples' } },
  {
    path: '/samples/:requestId/reports/:setId',
    name: 'sample-report',
    props: true,
    component: () => import('@/views/samples/SampleReportView.vue'),
    meta: { access: SAMPLE_READERS, title: 'Sample report' },
  },
  { path: '/sample-requests', name: 'vendor-samples', props: { mine: true }, component: () => import('@/views/samples/SamplesView.vue'), meta: { access: ['vendor'], title: 'Samples' } },
  { path: '/sample-requests/:requestId', name: 'vendor-sample', props: true, component: () => import('@/views/samples/VendorSampleView.vue'), meta: { access: ['vendor'], title: 'Samples' } },
  {
    path: '/sample-requests/:requestId/reports/:setId',
    name: 'vendor-sample-report',
    props: true,
    component: () => import('@/views/samples/VendorReportView.vue'),
    meta: { access: ['vendor'], title: 'Sample report' },
  },
]
