import { readdirSync } from 'node:fs'
import { join } from 'node:path'
import { defineNuxtModule } from 'nuxt/kit'

/** The address and method a route file answers to, as Nitro reads its name: `units/[tag]/index.patch.ts`. */
function readFileName(file: string): { method: string, path: string } | null {
  const parts = /^(.*?)(?:\.(get|post|put|patch|delete))?\.ts$/.exec(file)
  if (!parts?.[1] || parts[1].includes('[...')) return null
  const path = parts[1].replaceAll('\\', '/').replace(/(^|\/)index$/, '').replaceAll(/\[(\w+)\]/g, '{$1}')
  return { method: parts[2] ?? 'get', path: `/api/${path}` }
}

/** Makes `#route-index`: every route file with its address, so that `/api/openapi.json` can describe what each says of itself. */
export default defineNuxtModule({
  meta: { name: 'route-index' },
  setup(_options, nuxt) {
    const folder = join(nuxt.options.rootDir, 'server/api')
    nuxt.hook('nitro:config', (config) => {
      config.virtual ??= {}
      config.virtual['#route-index'] = () => {
        const entries = readdirSync(folder, { recursive: true, encoding: 'utf8' }).sort().flatMap((file) => {
          const route = file.endsWith('.ts') && !file.startsWith('openapi') ? readFileName(file) : null
          return route ? [`{ method: '${route.method}', path: '${route.path}', load: () => import(${JSON.stringify(join(folder, file))}) }`] : []
        })
        return `export const routes = [\n${entries.join(',\n')}\n]`
      }
    })
  },
})
