import type { H3Event } from 'h3'
import { getRequestURL } from 'h3'

/** An absolute address of this shop: from the configured base, else from the address the request came to. */
export function publicLink(event: H3Event, path: string): string {
  const base = String(useRuntimeConfig(event).public.baseUrl) || getRequestURL(event).origin
  return new URL(path, base).href
}
