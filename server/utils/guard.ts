import type { H3Event } from 'h3'
import { getHeader, getMethod } from 'h3'
import type { Permission } from '../../shared/domain/roles'
import { may, PERMISSIONS, ROLE_LABELS } from '../../shared/domain/roles'
import { forbidden, signInNeeded } from './errors'
import type { Proof } from './person'
import { findProof } from './person'

/** Who may use a route: those holding a permission, anybody signed in, or anyone at all. */
export type May = Permission | 'signed-in' | 'anyone'

/** The one guard. Gives back what it proved, or refuses with 401 or 403. */
export async function requireMay(event: H3Event, who: May): Promise<Proof | null> {
  const proof = await findProof(event)
  if (proof?.by === 'session') refuseOtherSites(event)
  if (who === 'anyone') return proof
  if (!proof) throw signInNeeded()
  if (who !== 'signed-in' && proof.person.mustChangePassword) {
    throw forbidden('Choose a password of your own first, on your account page.', 'password-change-needed')
  }
  if (who !== 'signed-in' && !may(proof.person.role, who)) {
    const holders = PERMISSIONS[who].map(role => ROLE_LABELS[role]).join(' or ')
    throw forbidden(`Your role (${ROLE_LABELS[proof.person.role]}) does not do this. Ask somebody with the role ${holders}.`)
  }
  return proof
}

/** A write carried by a cookie must come from our own pages (SameSite=Lax is the first lock, this is the second). */
function refuseOtherSites(event: H3Event): void {
  const method = getMethod(event)
  if (method === 'GET' || method === 'HEAD') return
  const site = getHeader(event, 'sec-fetch-site')
  if (site && site !== 'same-origin' && site !== 'none') throw forbidden('This request came from another site, so it was refused.', 'other-site')
}
