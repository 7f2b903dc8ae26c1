import type { Role } from '../domain/roles'

/** Who is signed in, as pages and routes know them. */
export interface Person { id: string, name: string, email: string, role: Role, mustChangePassword: boolean }
