import { z } from 'zod'
import { line } from './common'
import { chosenPassword, heldPassword } from './password'
import { currency, ituRegion, timeZone } from './shop'

/** An e-mail as it is kept: trimmed, lower case. */
export const email = (label: string) => z.string({ error: `Enter ${label}` }).trim().toLowerCase()
  .min(1, `Enter ${label}`)
  .max(254, 'E-mail must be 254 characters or less')
  .pipe(z.email('E-mail must look like name@example.org'))

export const signInInput = z.object({
  email: email('your e-mail'),
  password: heldPassword('your password'),
})
export type SignInInput = z.output<typeof signInInput>

/** The shop and its first owner, made once. */
export const firstRunInput = z.object({
  shopName: line('the shop’s name'),
  currency,
  timeZone,
  ituRegion,
  name: line('your name'),
  email: email('your e-mail'),
  password: chosenPassword('a password'),
})
export type FirstRunInput = z.output<typeof firstRunInput>
