import type { H3Event } from 'h3'
import { z } from 'zod'

const signInConfig = z.object({
  session: z.object({ name: z.string(), maxAge: z.number() }),
  trustedProxyHeader: z.string(),
})

/** What sign-in reads of `runtimeConfig`; Nitro types it as unknown. */
export const readSignInConfig = (event: H3Event) => signInConfig.parse(useRuntimeConfig(event))

const labelConfig = z.object({ public: z.object({ baseUrl: z.string() }) })

/** The address the shop has set for its labels and links; empty where it has set none. */
export const readBaseUrl = (event: H3Event) => labelConfig.parse(useRuntimeConfig(event)).public.baseUrl
