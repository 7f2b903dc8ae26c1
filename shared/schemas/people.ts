import { z } from 'zod'
import { ROLES } from '../domain/roles'
import { line, versionSeen } from './common'
import { chosenPassword, heldPassword } from './password'
import { email } from './sign-in'

const role = z.enum(ROLES, { error: 'Choose a role' })

/** Somebody who is to sign in; the password is made for them. */
export const newPerson = z.object({
  name: line('their name'),
  email: email('their e-mail'),
  role,
})
export type NewPerson = z.output<typeof newPerson>

/** What the owner may change of a person. */
export const personChange = z.object({
  name: line('their name').optional(),
  role: role.optional(),
  /** Whether they are kept from signing in. */
  disabled: z.boolean({ error: 'Say whether they may sign in' }).optional(),
  version: versionSeen,
})
export type PersonChange = z.output<typeof personChange>

/** A person changes their own password. */
export const passwordChange = z.object({
  current: heldPassword('your present password'),
  next: chosenPassword('a new password'),
}).refine(({ current, next }) => current !== next, { path: ['next'], message: 'New password must differ from the present one' })
export type PasswordChange = z.output<typeof passwordChange>

export const newToken = z.object({ name: line('what the token is for', 80) })
export type NewToken = z.output<typeof newToken>
