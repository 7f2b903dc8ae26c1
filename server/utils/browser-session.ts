import type { H3Event } from 'h3'
import type { OpenedSession } from '../services/sessions'
import { readSignInConfig } from './config'
import { originOf } from './origin'

/** Seals the session into this browser's cookie, in place of whatever it held. */
export async function rememberSession(event: H3Event, { personId, sessionId, secret }: OpenedSession): Promise<void> {
  await replaceUserSession(event, { user: { id: personId }, secure: { sessionId, secret } })
}

/** Where a sign-in comes from, how long it lasts and what it replaces, as this server is configured. */
export function signInTerms(event: H3Event, sessionId: string | null) {
  const config = readSignInConfig(event)
  return {
    origin: originOf(event, config.trustedProxyHeader),
    terms: { lifetimeSeconds: config.session.maxAge, replaces: sessionId },
  }
}
