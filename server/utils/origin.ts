import type { H3Event } from 'h3'
import { getHeader } from 'h3'
import { deviceInWords } from './device'

/** Where a sign-in comes from. */
export interface Origin { address: string, device: string }

/**
 * The address of the socket, or, behind a proxy that is named as trusted, what that proxy appended last to its header:
 * whatever stands before it was sent by the visitor and could be anything.
 */
export function originOf(event: H3Event, trustedProxyHeader: string): Origin {
  const told = trustedProxyHeader ? getHeader(event, trustedProxyHeader)?.split(',').at(-1)?.trim() : undefined
  return {
    address: (told || event.node.req.socket.remoteAddress || 'unknown').slice(0, 100),
    device: deviceInWords(getHeader(event, 'user-agent')),
  }
}
