import { expect } from 'vitest'
import type { Role } from '../../shared/domain/roles'
import type { Person } from '../../shared/types/person'
import { writePerson } from '../../server/services/people'
import type { Database } from '../../server/utils/db'
import type { PageOptions, WatchedPage } from './browser'
import { runAxe, signIn } from './browser'

const PASSWORD = 'a-password-for-tests'
const emailOf = (role: Role) => `${role}@demo.invalid`

/** A person of a role who can sign in. */
export async function makeAccount(db: Database, role: Role, name = `Test ${role}`): Promise<Person> {
  const account = { email: emailOf(role), name, role, mustChangePassword: false }
  return { id: await writePerson(db, null, { ...account, password: PASSWORD }), ...account }
}

/** Opens pages signed in as a person of a role; signs in once for each. Call inside `describe`. */
export function useSignedIn(open: (url: string, options?: PageOptions) => Promise<WatchedPage>, url: () => string) {
  const states = new Map<Role, PageOptions['storageState']>()
  return async function openAs(role: Role, options: PageOptions = {}): Promise<WatchedPage> {
    let state = states.get(role)
    if (!state) {
      const door = await open(url())
      await signIn(door, emailOf(role), PASSWORD)
      state = await door.context().storageState()
      states.set(role, state)
    }
    return open(url(), { ...options, storageState: state })
  }
}

/** Nothing serious by axe, and nothing wider than the window. */
export async function expectSound(page: WatchedPage): Promise<void> {
  expect(await runAxe(page)).toEqual([])
  expect(await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth)).toBe(true)
}
