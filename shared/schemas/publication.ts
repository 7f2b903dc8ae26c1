import { z } from 'zod'
import { line } from './common'

export const revocation = z.object({ why: line('why the link is taken back') })

/** A public sheet's token: 192 random bits in base64url. Anything else names nothing. */
export const publicationToken = z.string().regex(/^[\w-]{32}$/, 'This link has been taken back, or was never given.')
export const publicationParams = z.object({ token: publicationToken })
