declare module '#route-index' {
  import type { AnyRouteDefinition } from './utils/route'

  export const routes: { method: string, path: string, load: () => Promise<{ default: { definition: AnyRouteDefinition } }> }[]
}
