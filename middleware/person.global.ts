import { may, PERMISSIONS, ROLE_LABELS } from '#shared/domain/roles'

/** Pages that anybody may open: the two doors, the buyer's sheet and what a label's code leads to. */
function isPublic(path: string): boolean {
  return path === '/sign-in' || path.startsWith('/p/') || path.startsWith('/s/')
}

/**
 * Where to send a visitor; never the lock, which is the guard of each route. A page says who may open it by
 * `definePageMeta({ may: 'people.manage' })`.
 */
export default defineNuxtRouteMiddleware((to) => {
  const { me, person } = useSessionStore()
  if (me.firstRun) return to.path === '/first-run' ? undefined : navigateTo('/first-run')
  if (to.path === '/first-run') return navigateTo('/')
  if (isPublic(to.path)) return
  if (!person) return navigateTo({ path: '/sign-in', query: to.fullPath === '/' ? {} : { next: to.fullPath } })
  if (person.mustChangePassword) return to.path === '/account/password' ? undefined : navigateTo('/account/password')
  const { may: needed } = to.meta
  if (!needed || may(person.role, needed)) return
  const holders = PERMISSIONS[needed].map(role => ROLE_LABELS[role]).join(' or ')
  return abortNavigation(createError({
    statusCode: 403,
    message: `Your role (${ROLE_LABELS[person.role]}) does not open this page. Ask somebody with the role ${holders}.`,
  }))
})
