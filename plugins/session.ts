import type { Me } from '#shared/types/me'

/** Who is signed in, before the first page is drawn: asked while rendering, with the visitor's own cookie, and handed on. */
export default defineNuxtPlugin({
  name: 'session',
  dependsOn: ['pinia'],
  async setup() {
    const session = useSessionStore()
    if (import.meta.server) session.me = await useRequestFetch()<Me>('/api/me')
  },
})
