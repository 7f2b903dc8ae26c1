import type { Permission } from './shared/domain/roles'

declare module '#app' {
  interface PageMeta {
    /** The permission a visitor must hold to open the page. */
    may?: Permission
  }
}

export {}
