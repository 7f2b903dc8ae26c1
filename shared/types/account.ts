import type { Role } from '../domain/roles'

/** One sign-in on one device that still stands. */
export interface SessionView { id: string, device: string, createdAt: string, lastSeenAt: string, expiresAt: string, isCurrent: boolean }

/** A personal access token; its secret is shown once, when it is made. */
export interface TokenView { id: string, name: string, createdAt: string, lastUsedAt: string | null }
export interface MadeToken extends TokenView { token: string }

/** Somebody who signs in, as the owner sees them. */
export interface PersonView {
  id: string
  name: string
  email: string
  role: Role
  /** When they were kept from signing in; null while they may. */
  disabledAt: string | null
  mustChangePassword: boolean
  /** The last sign of them on any device; null if they never signed in. */
  lastSeenAt: string | null
  /** Sign-ins that stand now. */
  openSessions: number
  version: number
}

/** A person and the password to hand to them, shown once. */
export interface PersonWithPassword { person: PersonView, password: string }
