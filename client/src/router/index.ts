import { createRouter, type Router, type RouterHistory, type RouteLocationNormalized } from 'vue-router'
import { useSessionStore } from '@/stores/session'
import { mayOpen } from './access'
import { awardRoutes } from './awards'
import { orderRoutes } from './orders'
import { partRoutes } from './parts'
import { peopleRoutes } from './people'
import { enquiryRoutes } from './enquiries'
import { rfqRoutes } from './rfqs'
import { sampleRoutes } from './samples'
import { specificationRoutes } from './specifications'
import { worklistRoutes } from './worklist'

const notFound = () => import('@/views/NotFoundView.vue')

export function guardAccess(to: RouteLocationNormalized) {
  const { person } = useSessionStore()
  if (mayOpen(to.meta.access, person?.roles ?? null)) return true
  if (!person) return { name: 'sign-in', query: { next: to.fullPath } }
  // Same sheet as for an address that does not exist, with the address left as typed.
  return { name: 'not-found', params: { path: to.path.slice(1).split('/') }, query: to.query, hash: to.hash, replace: true }
}

export function createAppRouter(history: RouterHistory): Router {
  const router = createRouter({
    history,
    routes: [
      ...worklistRoutes,
      ...peopleRoutes,
      ...partRoutes,
      ...specificationRoutes,
      ...rfqRoutes,
      ...enquiryRoutes,
      ...sampleRoutes,
      ...awardRoutes,
      ...orderRoutes,
      { path: '/:path(.*)*', name: 'not-found', component: notFound, meta: { access: 'public', title: 'Not found' } },
    ],
    scrollBehavior: (to, from, saved) => saved ?? (to.hash && to.name !== 'sign-in-link' ? { el: to.hash } : to.path === from.path ? undefined : { top: 0 }),
  })

  router.beforeEach(guardAccess)
  router.afterEach((to, from) => {
    document.title = `${to.meta.title} – Dotside`
    // A new view is announced by moving the reading position to its heading.
    if (from.name && to.path !== from.path) requestAnimationFrame(() => document.getElementById('content')?.focus({ preventScroll: true }))
  })
  return router
}
