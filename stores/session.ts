import type { Permission } from '#shared/domain/roles'
import { may } from '#shared/domain/roles'
import type { Me } from '#shared/types/me'

/** Who is signed in and which shop this is. Filled once per visit from `/api/me`; the server checks every deed again. */
export const useSessionStore = defineStore('session', () => {
  const me = ref<Me>({ person: null, firstRun: false, shop: null })
  const person = computed(() => me.value.person)
  const shop = computed(() => me.value.shop)
  const can = (permission: Permission) => person.value !== null && may(person.value.role, permission)
  return { me, person, shop, can }
})
