import { createRouter, createWebHistory, type RouteLocationNormalized } from 'vue-router'
import { homeFor, routes } from '@/router/routes.ts'
import { useSessionStore } from '@/stores/session.ts'

/** Who may come where. The server decides what each page may hold; this only spares people pages of refusals. */
export async function guard(to: RouteLocationNormalized) {
  const session = useSessionStore()
  await session.load()
  // Only now is it known where home is: '/' was resolved before the first answer.
  if (to.redirectedFrom?.name === 'home' && session.user) {
    const home = homeFor(session.user.roles)
    if (to.name !== home.name) return home
  }
  if (to.name === 'sign-in' && session.user) return homeFor(session.user.roles)
  if (to.meta.open) return true
  if (!session.user) {
    const asked = to.redirectedFrom?.name === 'home' ? undefined : { to: to.fullPath }
    return { name: 'sign-in', query: asked }
  }
  if (to.meta.roles && !session.can(...to.meta.roles)) return { name: 'forbidden' }
  return true
}

export const router = createRouter({
  history: createWebHistory(),
  routes,
  scrollBehavior: (to, from, saved) => {
    if (saved) return saved
    return to.path === from.path ? undefined : { top: 0 }
  },
})

router.beforeEach(guard)
