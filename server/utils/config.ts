import type { H3Event } from 'h3'
import { z } from 'zod'

const signInConfig = z.object({
  session: z.object({ name: z.string(), maxAge: z.number() }),
  trustedProxyHeader: z.string(),
})

/** What sign-in reads of `runtimeConfig`; Nitro types it as unknown. */
export const readSignInConfig = (event: H3Event) => signInConfig.parse(useRuntimeConfig(event))
